package text_test

import (
	"bytes"
	"slices"
	"testing"

	"example.org/foulcase/internal/text"
)

var seeds = []string{
	"", "The well-known pilot didn't wait: \u201CGo!\u201D he said.", document(6),
	"a\r\n\r\nb\rc\x00\xff\xc3", "'\u2019\u2018`\u00B4'", "J. K. e.g. U.S. ... . . . 3.5 -x --y _z_ *w* <a b> {c} `d` ``e'' $f %g @h #i",
	"---\nx: y\n---\n# *b*erth &amp; `c`\n\n| a | b |\n|---|---|\n| c |\n\n- [x](y \"z\")\n\n[^1]: n\n\n<div>\n", "\u02BCx \u00B7y \uFFFCz e\u0301\u0301 \u0301 \U0001F469\u200D\U0001F680",
	"\uFEFF\uFEFF", "[a](b [a](b <", "\\&\\&amp;&#0;&#x110000;", "\u2029\u200B\u3000\u0085",
}

func FuzzSegmenter(f *testing.F) {
	for _, s := range seeds {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, block []byte) {
		before := bytes.Clone(block)
		checkTokens(t, block)
		if !bytes.Equal(block, before) {
			t.Fatal("the text was changed")
		}
	})
}

func FuzzPlain(f *testing.F) {
	for _, s := range seeds {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, source []byte) {
		all := read(t, bytes.NewReader(source), source, text.Plain, text.Options{})
		if other := read(t, oneByOne{bytes.NewReader(source)}, source, text.Plain, text.Options{}); !slices.Equal(all, other) {
			t.Fatal("the size of reads changes the tokens")
		}
	})
}

// oneByOne reads a byte at a time.
type oneByOne struct{ r *bytes.Reader }

func (o oneByOne) Read(p []byte) (int, error) { return o.r.Read(p[:min(1, len(p))]) }

func FuzzMarkdown(f *testing.F) { fuzzFormat(f, text.Markdown) }

// fuzzFormat holds the reader of a format to what is true of any document: its
// blocks come in order and point into the source, and so do their tokens. More
// seeds are documents of the format.
func fuzzFormat(f *testing.F, format text.Format, more ...string) {
	for _, s := range append(more, seeds...) {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, source []byte) { checkReader(t, format, source) })
}

// checkReader reads a document and checks all that can be checked of any. A
// document that is refused is read no further.
func checkReader(t testing.TB, format text.Format, source []byte) {
	t.Helper()
	var s text.Segmenter
	var last int64
	for b, err := range text.Blocks(bytes.NewReader(source), format, text.Options{}) {
		if err != nil {
			return
		}
		checkBlock(t, b, source)
		checkTokens(t, b.Text)
		if from, _ := b.Source(0, 0); from < last {
			t.Fatalf("a block at %d after one at %d", from, last)
		} else {
			last = from
		}
		for sentence := range s.Sentences(b.Text) {
			for _, k := range sentence.Tokens {
				if from, to := b.Source(k.Start, k.End); from >= to {
					t.Fatalf("token %q comes from %d..%d", b.Text[k.Start:k.End], from, to)
				}
			}
		}
	}
}
