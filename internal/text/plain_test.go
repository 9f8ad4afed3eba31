package text_test

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"runtime"
	"slices"
	"strings"
	"testing"
	"testing/iotest"

	"example.org/foulcase/internal/text"
)

// wrapped76 is a paragraph broken by hand at 76 columns.
const wrapped76 = `The duty pilot keeps the log of the watch and enters every vessel that asks
for a pilot, with the hour, the draught and the berth that it was given by
Harbour Control. Fog, ice and gales are entered when they begin and when they
end.`

func TestPlainBlocks(t *testing.T) {
	for _, c := range []struct {
		name, in string
		want     []string
	}{
		{"empty", "", nil},
		{"white space", " \n\r\n\t\n", nil},
		{"no line end", "fog", []string{"fog"}},
		{"blank lines", "\n\nfog\n\n \t\nice\n\n", []string{"fog", "ice"}},
		{"CRLF", "fog\r\n\r\nice\r\n", []string{"fog", "ice"}},
		{"CR", "fog\r\rice\r", []string{"fog", "ice"}},
		{"byte order mark", "\uFEFFfog", []string{"fog"}},
		{"wrapped", wrapped76, []string{wrapped76}},
		{"heading", "Fog signals\n" + wrapped76, []string{"Fog signals", wrapped76}},
		{"list", "Bring:\n- rope\n- chain\n- a lamp that burns for the whole of the watch\nand longer", []string{"Bring:", "- rope", "- chain", "- a lamp that burns for the whole of the watch\nand longer"}},
		{"numbered", "1. Slow down when the fog signal is heard again\n2. Stop\n(a) Listen\n12) Go", []string{"1. Slow down when the fog signal is heard again", "2. Stop", "(a) Listen", "12) Go"}},
		{"verse", "The tide is out\nThe moon is low\nThe pilots row", []string{"The tide is out", "The moon is low", "The pilots row"}},
		{"word list", "berth\nbirth\nquay", []string{"berth", "birth", "quay"}},
		{
			"a paragraph a line", strings.Repeat("The bar is closed. ", 12) + "\nShort line here that ends without a point\nAnother",
			[]string{strings.TrimSpace(strings.Repeat("The bar is closed. ", 12)), "Short line here that ends without a point", "Another"},
		},
		{"NUL and bad UTF-8", "fog\x00 \xff\xfe", []string{"fog\x00 \xff\xfe"}},
	} {
		if got := texts(t, c.in, text.Plain); !slices.Equal(got, c.want) {
			t.Errorf("%s: got %q, want %q", c.name, got, c.want)
		}
	}
}

// found is a token with its place in the source.
type found struct {
	from, to int64
	kind     text.Kind
	norm     string
}

// read returns all tokens of a document; each block is checked against source.
func read(t testing.TB, r io.Reader, source []byte, f text.Format, o text.Options) []found {
	t.Helper()
	var all []found
	var s text.Segmenter
	var last int64
	for b, err := range text.Blocks(r, f, o) {
		if err != nil {
			t.Fatal(err)
		}
		if from, _ := b.Source(0, len(b.Text)); from < last {
			t.Fatalf("a block at %d after one that ends at %d", from, last)
		}
		checkBlock(t, b, source)
		checkTokens(t, b.Text)
		for sentence := range s.Sentences(b.Text) {
			for _, k := range sentence.Tokens {
				from, to := b.Source(k.Start, k.End)
				all = append(all, found{from, to, k.Kind, string(k.Norm)})
				last = to
			}
		}
	}
	return all
}

// document is plain text of several lines, paragraphs and line ends with words
// that tempt a reader to cut them.
func document(paragraphs int) string {
	var b strings.Builder
	b.WriteString("\uFEFF")
	for i := range paragraphs {
		switch i % 5 {
		case 0:
			b.WriteString(wrapped76 + "\n\n")
		case 1:
			fmt.Fprintf(&b, "\r\nNotice %d to masters\r\nMr. Brook\u2019s na\u00EFve cafe\u0301 at no. %d, e.g. https://x.y/%d.\r\n\r\n", i, i, i)
		case 2:
			b.WriteString(strings.Repeat("The well-known pilot didn\u2019t wait: \u201CGo!\u201D he said. Then 3.5 m were left in the U.S. harbour. ", 1+i%97) + "\n")
		case 3:
			b.WriteString("old mac line\rnext mac line\r\r\x00 bad \xff\xc3 bytes \u6E2F\u53E3\n\n")
		case 4:
			b.WriteString(strings.Repeat("never a point in this long row of words ", 1+i%41) + ".\n\n")
		}
	}
	return b.String()
}

// TestChunks: reads of any size give the same tokens, and so do chunks of any
// size, although a sentence longer than the smallest may be cut.
func TestChunks(t *testing.T) {
	source := document(150)
	want := read(t, strings.NewReader(source), []byte(source), text.Plain, text.Options{})
	if len(want) < 5000 {
		t.Fatalf("only %d tokens", len(want))
	}
	for _, chunk := range []int{1, 4 << 10, 5001, 8 << 10, 100_000, 1 << 20} {
		got := read(t, strings.NewReader(source), []byte(source), text.Plain, text.Options{Chunk: chunk})
		if !slices.Equal(got, want) {
			t.Errorf("chunks of %d bytes give other tokens", chunk)
		}
	}
	for name, r := range map[string]io.Reader{
		"one byte":          iotest.OneByteReader(strings.NewReader(source)),
		"half":              iotest.HalfReader(strings.NewReader(source)),
		"data with the end": iotest.DataErrReader(strings.NewReader(source)),
	} {
		if got := read(t, r, []byte(source), text.Plain, text.Options{}); !slices.Equal(got, want) {
			t.Errorf("%s: other tokens", name)
		}
	}
}

// TestCutBetweenSentences: a line longer than the chunk is cut where a sentence
// ends.
func TestCutBetweenSentences(t *testing.T) {
	source := strings.Repeat("The tide turned at the bar. Mr. Brook left in the 3.5 m boat. ", 5000)
	n := 0
	for b, err := range text.Blocks(strings.NewReader(source), text.Plain, text.Options{}) {
		if err != nil {
			t.Fatal(err)
		}
		if n++; len(b.Text) > 64<<10 || !bytes.HasPrefix(b.Text, []byte("The tide")) && !bytes.HasPrefix(b.Text, []byte("Mr. Brook")) {
			t.Errorf("block %d of %d bytes begins with %.20q", n, len(b.Text), b.Text)
		}
	}
	if n < 2 {
		t.Errorf("%d blocks", n)
	}
}

// TestNoWhiteSpace: a chunk without white space is passed over, what follows is
// read.
func TestNoWhiteSpace(t *testing.T) {
	source := strings.Repeat("x", 200<<10) + " The tide.\n\n" + strings.Repeat("\u6E2F", 70<<10) + "\nFog."
	got := read(t, strings.NewReader(source), []byte(source), text.Plain, text.Options{})
	var words []string
	for _, f := range got {
		if f.kind == text.Word && len(f.norm) < 10 {
			words = append(words, f.norm)
		}
	}
	if want := []string{"the", "tide", "fog"}; !slices.Equal(words, want) {
		t.Errorf("got %q, want %q", words, want)
	}
}

// endless yields one line of n bytes.
type endless struct{ left int }

func (e *endless) Read(p []byte) (int, error) {
	const words = "the pilot left the berth "
	if e.left == 0 {
		return 0, io.EOF
	}
	n := min(len(p), e.left, len(words))
	copy(p, words[:n])
	e.left -= n
	return n, nil
}

// TestOneLongLine: memory is bounded by the chunk, not by the line.
func TestOneLongLine(t *testing.T) {
	size := 100 << 20
	if testing.Short() {
		size = 10 << 20
	}
	var most uint64
	blocks, tokens := 0, 0
	var s text.Segmenter
	for b, err := range text.Blocks(&endless{size}, text.Plain, text.Options{}) {
		if err != nil {
			t.Fatal(err)
		}
		for sentence := range s.Sentences(b.Text) {
			tokens += len(sentence.Tokens)
		}
		if blocks++; blocks%100 == 0 {
			runtime.GC()
			var m runtime.MemStats
			runtime.ReadMemStats(&m)
			most = max(most, m.HeapAlloc)
		}
	}
	if tokens < size/25*5-5 {
		t.Errorf("%d tokens", tokens)
	}
	if most > 16<<20 {
		t.Errorf("%d bytes of live memory", most)
	}
}

func TestReadError(t *testing.T) {
	broken := errors.New("the disk is gone")
	for _, f := range text.Formats() {
		var got error
		n := 0
		for b, err := range text.Blocks(io.MultiReader(strings.NewReader("One tide.\n\n"), iotest.ErrReader(broken)), f, text.Options{}) {
			if n++; err == nil && b == nil || got != nil {
				t.Fatal("no block and no error, or something after an error")
			}
			got = err
		}
		if !errors.Is(got, broken) {
			t.Errorf("%s: the error is %v", f, got)
		}
	}
}

func TestFormats(t *testing.T) {
	for path, want := range map[string]text.Format{
		"a.md": text.Markdown, "A.MD": text.Markdown, "x/y.markdown": text.Markdown, "a.txt": text.Plain, "a": text.Plain, "": text.Plain, "a.md/b": text.Plain,
	} {
		if got, _ := text.FormatOf(path); got != want {
			t.Errorf("FormatOf(%q) = %s, want %s", path, got, want)
		}
	}
	for _, f := range text.Formats() {
		if got, err := text.ParseFormat(string(f)); got != f || err != nil {
			t.Errorf("ParseFormat(%q) = %q, %v", f, got, err)
		}
		if len(f.Extensions()) == 0 {
			t.Errorf("%s has no extensions", f)
		}
	}
	if _, err := text.ParseFormat("runes"); err == nil || !strings.Contains(err.Error(), "markdown") {
		t.Errorf("the error does not name the formats: %v", err)
	}
	for b, err := range text.Blocks(strings.NewReader("x"), "runes", text.Options{}) {
		if b != nil || err == nil {
			t.Error("an unknown format was read")
		}
	}
}
