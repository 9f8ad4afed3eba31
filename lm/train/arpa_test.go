package train_test

import (
	"bytes"
	"compress/gzip"
	"errors"
	"fmt"
	"io"
	"math"
	"strings"
	"testing"

	"example.org/foulcase/lm"
	"example.org/foulcase/lm/train"
)

// berkeley holds the bigrams of one sentence of the Berkeley Restaurant
// Project: Jurafsky and Martin, Speech and Language Processing, 3rd ed. draft,
// chapter 3, where the sentence comes to .000031.
const berkeley = `
\data\
ngram 1=7
ngram 2=5

\1-grams:
-9	<unk>
-99	<s>	0
-9	</s>
-9	i	0
-9	want	0
-9	english	0
-9	food	0

\2-grams:
%s	<s> i
%s	i want
%s	want english
%s	english food
%s	food </s>

\end\
`

func TestBerkeleySentence(t *testing.T) {
	var logs []any
	for _, p := range []float64{.25, .33, .0011, .5, .68} {
		logs = append(logs, fmt.Sprint(math.Log10(p)))
	}
	tables, v, err := train.ReadARPA(strings.NewReader(fmt.Sprintf(berkeley, logs...)))
	if err != nil {
		t.Fatal(err)
	}
	section, err := lm.Encode(tables, lm.Codebooks{})
	if err != nil {
		t.Fatal(err)
	}
	sum, err := train.Measure(openModel(t, section), train.RawText(strings.NewReader("i want english food\n"), v, false), train.BeginID, nil)
	if got := math.Exp(sum.LogProb); err != nil || math.Abs(got-3.0855e-5) > 1e-9 {
		t.Errorf("probability %v, want 3.0855e-5 (%v)", got, err)
	}
}

func TestARPARoundTrip(t *testing.T) {
	r, v := trainReference(t, train.Options{Order: 4, Threshold: 1e-5})
	var first, second, zipped bytes.Buffer
	if err := train.WriteARPA(&first, r.Tables, v.Word); err != nil {
		t.Fatal(err)
	}
	z := gzip.NewWriter(&zipped)
	z.Write(first.Bytes())
	z.Close()
	for _, in := range []io.Reader{bytes.NewReader(first.Bytes()), &zipped} {
		tables, words, err := train.ReadARPA(in)
		if err != nil {
			t.Fatal(err)
		}
		second.Reset()
		if err := train.WriteARPA(&second, tables, words.Word); err != nil {
			t.Fatal(err)
		}
		// Words may be numbered anew, so lines compare as sets; values may
		// move by the rounding of the two conversions.
		a, b := grams(t, r.Tables, v), grams(t, tables, words)
		for k := range a {
			if len(a[k]) != len(b[k]) {
				t.Errorf("%d %d-grams became %d", len(a[k]), k+1, len(b[k]))
			}
			for gram, x := range a[k] {
				if y := b[k][gram]; math.Abs(x[0]-y[0]) > 2e-6 || math.Abs(x[1]-y[1]) > 2e-6 {
					t.Errorf("%q: %v became %v", gram, x, y)
				}
			}
		}
	}
}

// pruned lacks the bigram "b c", parent of "a b c", and the bigram "a b", its
// context, as other estimators' pruned files may.
const pruned = `
\data\
ngram 1=4
ngram 2=1
ngram 3=1

\1-grams:
-1	<s>	-0.5
-1	a	-0.3
-1	b	-0.2
-1	c	-0.1

\2-grams:
-0.4	<s> a	-0.25

\3-grams:
-0.1	a b c

\end\
`

func TestARPACompletes(t *testing.T) {
	tables, v, err := train.ReadARPA(strings.NewReader(pruned))
	if err != nil {
		t.Fatal(err)
	}
	section, err := lm.Encode(tables, lm.Codebooks{})
	if err != nil {
		t.Fatal(err)
	}
	m := openModel(t, section)
	var s lm.State
	for _, step := range []struct {
		word string
		want float64 // log10
	}{{"<s>", -1}, {"a", -.4}, {"b", -1 - .3 - .25}, {"c", -.1}, {"b", -1 - .1}, {"c", -1 - .2}} {
		var p float32
		p, s = m.Score(s, v.ID(step.word))
		if got := float64(p) / math.Ln10; math.Abs(got-step.want) > 1e-5 {
			t.Errorf("%s: %v, want %v", step.word, got, step.want)
		}
	}
}

func TestARPARefuses(t *testing.T) {
	good := fmt.Sprintf(berkeley, "-1", "-1", "-1", "-1", "-1")
	for _, c := range []struct{ what, old, new, say string }{
		{"cut off", "\n\\end\\\n", "", "ends early"},
		{"cut in a section", good[strings.Index(good, "-1\twant english"):], "", "ends early"},
		{"no header", "\\data\\", "data", "ends early"},
		{"count too high", "ngram 2=5", "ngram 2=6", "header counts 6"},
		{"count too low", "ngram 1=7", "ngram 1=6", "header counts 6"},
		{"count no number", "ngram 2=5", "ngram 2=five", "no count"},
		{"order lacking in the header", "ngram 2=5", "ngram 3=5", "2-grams should be"},
		{"order lacking", "\\2-grams:", "\\3-grams:", "should begin"},
		{"counts of no order", "ngram 1=7\nngram 2=5\n", "", "order 0"},
		{"not a number", "-1\ti want", "NaN\ti want", "no number"},
		{"no number at all", "-1\ti want", "x\ti want", "no number"},
		{"positive", "-1\ti want", "0.1\ti want", "above zero"},
		{"unknown word", "want english", "want welsh", `"welsh" is no unigram`},
		{"too few words", "-1\ti want", "-1\twant", "fields"},
		{"back-off in the highest order", "i want", "i want\t-1\t-1", "fields"},
		{"twice", "want english", "i want", "before"},
		{"unigram twice", "-9\twant", "-9\ti", "before"},
		{"wrong end", "\\end\\", "\\und\\", "should be"},
	} {
		bad := strings.Replace(good, c.old, c.new, 1)
		if bad == good {
			t.Fatalf("%s: nothing replaced", c.what)
		}
		_, _, err := train.ReadARPA(strings.NewReader(bad))
		if !errors.Is(err, train.ErrARPA) || !strings.Contains(err.Error(), "line ") || !strings.Contains(err.Error(), c.say) {
			t.Errorf("%s: error %q, want one with a line and %q", c.what, err, c.say)
		}
	}
	if _, _, err := train.ReadARPA(bytes.NewReader([]byte{0x1f, 0x8b, 1, 2})); !errors.Is(err, train.ErrARPA) {
		t.Errorf("broken gzip: %v", err)
	}
}

func FuzzReadARPA(f *testing.F) {
	f.Add([]byte(fmt.Sprintf(berkeley, "-1", "-1", "-1", "-1", "-1")))
	f.Add([]byte(pruned))
	f.Fuzz(func(t *testing.T, file []byte) {
		tables, v, err := train.ReadARPA(bytes.NewReader(file))
		if err != nil {
			return
		}
		section, err := lm.Encode(tables, lm.Codebooks{})
		if err != nil {
			t.Fatalf("what was read cannot be written: %v", err)
		}
		if err := openModel(t, section).Verify(); err != nil {
			t.Fatal(err)
		}
		if err := train.WriteARPA(io.Discard, tables, v.Word); err != nil {
			t.Fatal(err)
		}
	})
}
