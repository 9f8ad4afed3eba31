package editor

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"
	"unicode/utf16"
	"unicode/utf8"
)

var encodings = []encoding{utf8Units, utf16Units, utf32Units}

// reference finds positions the slow way: rune by rune from the beginning.
type reference struct {
	unit encoding
	text string
}

func (r reference) width(c rune) int {
	switch r.unit {
	case utf8Units:
		return utf8.RuneLen(c)
	case utf16Units:
		return utf16.RuneLen(c)
	}
	return 1
}

// places calls look with every offset of the text and the position there; last says
// that the line ends there.
func (r reference) places(look func(offset int, p position, last bool)) {
	var p position
	for i, c := range r.text {
		after := r.text[i+utf8.RuneLen(c):]
		switch {
		case c == '\n' && i > 0 && r.text[i-1] == '\r': // inside a line's end
			p = position{Line: p.Line + 1}
		case c == '\r' && strings.HasPrefix(after, "\n"):
			look(i, p, true)
		case c == '\r' || c == '\n':
			look(i, p, true)
			p = position{Line: p.Line + 1}
		default:
			look(i, p, false)
			p.Character += r.width(c)
		}
	}
	look(len(r.text), p, true)
}

func checkLines(t *testing.T, l *lines, text string) {
	t.Helper()
	source := []byte(text)
	size := 0
	for _, c := range l.chunks {
		size += c.size
	}
	if size != len(text) {
		t.Fatalf("chunks of %d bytes for a text of %d", size, len(text))
	}
	c := l.cursor(source)
	reference{l.unit, text}.places(func(offset int, p position, last bool) {
		if got := c.position(offset); got != p {
			t.Fatalf("%s: byte %d of %.80q is at %v, want %v", l.unit, offset, text, got, p)
		}
		if got, ok := l.offset(source, p); got != offset || !ok {
			t.Fatalf("%s: %v of %.80q is byte %d (%v), want %d", l.unit, p, text, got, ok, offset)
		}
		if last {
			far := position{p.Line, p.Character + 9999}
			if got, ok := l.offset(source, far); got != offset || !ok {
				t.Fatalf("%s: %v of %.80q is byte %d (%v), want the line's end, %d", l.unit, far, text, got, ok, offset)
			}
		}
	})
}

func TestLines(t *testing.T) {
	for _, unit := range encodings {
		for _, text := range []string{
			"", "a", "\n", "\r", "\r\n", "\n\r", "ebb\nflood", "ebb\r\nflood\r\n", "ebb\rflood\r\r\n\n",
			"caf\u00e9 e\u0301 \U0001F6A2 \u6e2f\n\U0001F6A2", strings.Repeat("pilot \U0001F6A2", 2000),
			strings.Repeat("launch\r\n", 3000), strings.Repeat("\r", 5000), strings.Repeat("\u00e9", 4001) + "\nend",
		} {
			l := lines{unit: unit}
			l.reset([]byte(text))
			checkLines(t, &l, text)
		}
	}
}

func TestPlacesThatAreNot(t *testing.T) {
	source := []byte("a\U0001F6A2b\r\nc")
	l := lines{unit: utf16Units}
	l.reset(source)
	for _, tt := range []struct {
		p    position
		want int
		ok   bool
	}{
		{position{0, 2}, 1, true}, // between the halves of a code point
		{position{0, 3}, 5, true},
		{position{0, 99}, 6, true},
		{position{2, 0}, len(source), false},
		{position{1 << 62, 1 << 62}, len(source), false},
		{position{-1, 1}, 1, false},
		{position{1, -7}, 8, false},
	} {
		if got, ok := l.offset(source, tt.p); got != tt.want || ok != tt.ok {
			t.Errorf("%v: byte %d (%v), want %d (%v)", tt.p, got, ok, tt.want, tt.ok)
		}
	}
}

// TestLinesFollowEdits holds lines kept through edits to those read anew.
func TestLinesFollowEdits(t *testing.T) {
	for seed := range uint64(30) {
		t.Run(fmt.Sprint(seed), func(t *testing.T) {
			r := rand.New(rand.NewPCG(seed, 1))
			text := randomText(r, r.IntN(5000))
			l := lines{unit: encodings[seed%3]}
			l.reset([]byte(text))
			for range 40 {
				start, end := randomStretch(r, text)
				added := randomText(r, r.IntN(1+r.IntN(3000)))
				text = text[:start] + added + text[end:]
				l.edit([]byte(text), start, end, len(added))
			}
			checkLines(t, &l, text)
		})
	}
}

// TestChunksStayFew: edits all over a text do not leave it in splinters.
func TestChunksStayFew(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 7))
	text := []byte(strings.Repeat("The launch left at noon.\n", 8000))
	l := lines{unit: utf16Units}
	l.reset(text)
	for range 20000 {
		at := r.IntN(len(text))
		text[at] = 'x'
		l.edit(text, at, at+1, 1)
	}
	if most := 3 * len(text) / chunkSize; len(l.chunks) > most {
		t.Errorf("%d chunks, want at most %d", len(l.chunks), most)
	}
}

// randomText is text of n code points, of every width and with every end of line.
func randomText(r *rand.Rand, n int) string {
	pieces := []string{"a", "e", " ", "t", "\n", "\r", "\r\n", "\u00e9", "\u0301", "\u6e2f", "\U0001F6A2", " the ", "ancher"}
	var b strings.Builder
	for range n {
		b.WriteString(pieces[r.IntN(len(pieces))])
	}
	return b.String()
}

// randomStretch picks part of a text, most often a short one.
func randomStretch(r *rand.Rand, text string) (start, end int) {
	start, end = r.IntN(len(text)+1), r.IntN(len(text)+1)
	if r.IntN(8) > 0 {
		end = min(start+r.IntN(20), len(text))
	}
	return whole(text, min(start, end)), whole(text, max(start, end))
}

// whole moves a place forward out of a code point and a \r\n.
func whole(text string, at int) int {
	for at < len(text) && (!utf8.RuneStart(text[at]) || at > 0 && text[at-1:at+1] == "\r\n") {
		at++
	}
	return at
}
