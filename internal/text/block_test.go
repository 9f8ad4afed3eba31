package text_test

import (
	"bytes"
	"strings"
	"testing"
	"unicode/utf8"

	"example.org/foulcase/internal/text"
)

// checkBlock fails when a block's map to the source is not in order and inside
// it, or a byte of text that claims to be a source byte is another one.
func checkBlock(t testing.TB, b *text.Block, source []byte) {
	t.Helper()
	begin, end := b.Source(0, len(b.Text))
	if begin < 0 || end > int64(len(source)) || len(b.Text) == 0 {
		t.Fatalf("block %q at %d..%d of %d bytes", b.Text, begin, end, len(source))
	}
	if !bytes.Equal(b.Raw(0, len(b.Text)), source[begin:end]) {
		t.Fatalf("block %q: raw %q, source %q", b.Text, b.Raw(0, len(b.Text)), source[begin:end])
	}
	last := begin
	for i := range b.Text {
		from, to := b.Source(i, i+1)
		if from < last || to <= from && from != last || to > end {
			t.Fatalf("block %q: byte %d is at %d..%d after %d", b.Text, i, from, to, last)
		}
		if last = from; to == from+1 && !isSpace(rune(b.Text[i])) && b.Text[i] != source[from] && utf8.RuneStart(b.Text[i]) && (b.Text[i] < utf8.RuneSelf || source[from] >= utf8.RuneSelf) && !bytes.Contains(b.Text, []byte("\uFFFC")) {
			t.Fatalf("block %q: byte %d is %q, source byte %d is %q", b.Text, i, b.Text[i], from, source[from])
		}
	}
	if got, want := b.Position(0), position(source, int(begin)); got != want {
		t.Fatalf("block %q: position %v, want %v", b.Text, got, want)
	}
	if got, want := b.Position(len(b.Text)), position(source, int(end)); got != want {
		t.Fatalf("block %q: the end is at %v, want %v", b.Text, got, want)
	}
}

// position counts lines and columns the plain way: from the whole prefix.
func position(source []byte, offset int) text.Position {
	prefix := strings.TrimPrefix(string(source[:offset]), "\uFEFF")
	prefix = strings.ReplaceAll(prefix, "\r\n", "\n")
	prefix = strings.ReplaceAll(prefix, "\r", "\n")
	last := prefix[strings.LastIndexByte(prefix, '\n')+1:]
	column := 0
	for _, c := range []byte(last) {
		if utf8.RuneStart(c) {
			column++
		}
	}
	return text.Position{Line: strings.Count(prefix, "\n") + 1, Column: column + 1}
}

func TestPositions(t *testing.T) {
	source := "\uFEFFone\r\ntwo\rthr\u00E9e\n\n\U0001F600 e\u0301x\nend"
	for word, want := range map[string]text.Position{
		"one":  {Line: 1, Column: 1},
		"two":  {Line: 2, Column: 1},
		"thr":  {Line: 3, Column: 1},
		"e\n":  {Line: 3, Column: 5},
		"x\n":  {Line: 5, Column: 5},
		"end":  {Line: 6, Column: 1},
		"\r\n": {Line: 1, Column: 4},
	} {
		if got := position([]byte(source), strings.Index(source, word)); got != want {
			t.Fatalf("the test's own count of %q is %v, want %v", word, got, want)
		}
	}
	for _, b := range blocks(t, source, text.Plain) {
		checkBlock(t, b, []byte(source))
	}
}

// TestLineMapCuts: the map gives the same however the source is cut.
func TestLineMapCuts(t *testing.T) {
	source := []byte("a\r\nb\rc\n\r\n\u00E9\U0001F600x\r")
	for cut := range source {
		var m text.LineMap
		m.Feed(source[:cut])
		if got, want := m.Position(), position(source, cut); got != want && source[max(cut-1, 0)] != '\r' {
			t.Errorf("at %d: %v, want %v", cut, got, want)
		}
		m.Feed(source[cut:])
		if got, want := m.Position(), position(source, len(source)); got != want {
			t.Errorf("cut at %d: %v, want %v", cut, got, want)
		}
	}
	m := text.NewLineMap(text.Position{Line: 3, Column: 7})
	m.Feed([]byte("ab"))
	if got := m.Position(); got != (text.Position{Line: 3, Column: 9}) {
		t.Errorf("from 3:7 on two columns: %v", got)
	}
}
