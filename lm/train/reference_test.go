package train_test

import (
	"bufio"
	"bytes"
	"context"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"example.org/foulcase/lm"
	"example.org/foulcase/lm/train"
)

// The files of testdata/mkn are an independent estimate of interpolated
// modified Kneser-Ney; its README gives their origin and the figures below.
const reference = "testdata/mkn"

// trainReference trains on the reference text without quantising.
func trainReference(t testing.TB, o train.Options) (*train.Result, *train.Vocabulary) {
	t.Helper()
	f := open(t, "train.txt")
	o.ProbBits, o.BackoffBits = train.ExactBits, train.ExactBits
	r, v, err := train.TrainRaw(context.Background(), f, o)
	if err != nil {
		t.Fatal(err)
	}
	return r, v
}

func open(t testing.TB, name string) *os.File {
	t.Helper()
	f, err := os.Open(filepath.Join(reference, name))
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { f.Close() })
	return f
}

func openModel(t testing.TB, section []byte) *lm.Model {
	t.Helper()
	m, err := lm.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	if err := m.Verify(); err != nil {
		t.Fatal(err)
	}
	return m
}

// grams maps each n-gram, spelled out, to its log10 values.
func grams(t *testing.T, tables lm.Tables, v *train.Vocabulary) []map[string][2]float64 {
	t.Helper()
	var b bytes.Buffer
	if err := train.WriteARPA(&b, tables, v.Word); err != nil {
		t.Fatal(err)
	}
	out := make([]map[string][2]float64, len(tables))
	order := -1
	for line := range strings.Lines(b.String()) {
		fields := strings.Split(strings.TrimSuffix(line, "\n"), "\t")
		switch {
		case strings.HasSuffix(line, "-grams:\n"):
			order++
			out[order] = map[string][2]float64{}
		case len(fields) > 1:
			var values [2]float64
			values[0], _ = strconv.ParseFloat(fields[0], 64)
			if len(fields) > 2 {
				values[1], _ = strconv.ParseFloat(fields[2], 64)
			}
			out[order][fields[1]] = values
		}
	}
	return out
}

func TestReferenceEntries(t *testing.T) {
	for _, order := range []int{3, 5} {
		t.Run(fmt.Sprint("order ", order), func(t *testing.T) {
			r, v := trainReference(t, train.Options{Order: order})
			want, wantWords, err := train.ReadARPA(open(t, fmt.Sprintf("order%d.arpa.gz", order)))
			if err != nil {
				t.Fatal(err)
			}
			got, ref := grams(t, r.Tables, v), grams(t, want, wantWords)
			for k := range ref {
				if len(got[k]) != len(ref[k]) || len(ref[k]) == 0 {
					t.Errorf("%d %d-grams, want %d", len(got[k]), k+1, len(ref[k]))
				}
				for gram, w := range ref[k] {
					g, ok := got[k][gram]
					if !ok || math.Abs(g[0]-w[0]) > 1e-5 || math.Abs(g[1]-w[1]) > 1e-5 {
						t.Errorf("%q: %v, want %v", gram, g, w)
					}
				}
			}
		})
	}
}

func TestReferenceDiscounts(t *testing.T) {
	r, _ := trainReference(t, train.Options{Order: 5})
	want := []train.Discounts{
		{.572844, 1.19388, 1.79976},
		{.825614, 1.11900, 1.39947},
		{.911204, 1.14041, 1.53981},
		{.959102, 1.27086, 1.90810},
		{.992837, 1.70941, 3.00000},
	}
	for k, d := range r.Discounts {
		for i := range d {
			if math.Abs(d[i]-want[k][i]) > 1e-5 {
				t.Errorf("order %d: %v, want %v", k+1, d, want[k])
			}
		}
	}
}

func TestReferencePerplexity(t *testing.T) {
	for _, c := range []struct {
		order     int
		all, seen float64
	}{{3, 125.145225, 93.177035}, {5, 125.140165, 93.249533}} {
		r, v := trainReference(t, train.Options{Order: c.order})
		got, err := train.Measure(openModel(t, r.Section), train.RawText(open(t, "heldout.txt"), v, false), train.BeginID,
			func(id uint32) bool { return id == train.UnknownID })
		if err != nil {
			t.Fatal(err)
		}
		if got.Sentences != 300 || got.Tokens != 3264 || got.Unseen != 162 {
			t.Errorf("order %d: %d sentences, %d tokens, %d unseen", c.order, got.Sentences, got.Tokens, got.Unseen)
		}
		if p := got.Perplexity(); math.Abs(p-c.all) > 1e-5*c.all {
			t.Errorf("order %d: perplexity %f, want %f", c.order, p, c.all)
		}
		if p := got.PerplexitySeen(); math.Abs(p-c.seen) > 1e-5*c.seen {
			t.Errorf("order %d: perplexity of seen words %f, want %f", c.order, p, c.seen)
		}
	}
}

func TestReferenceSentences(t *testing.T) {
	for _, order := range []int{3, 5} {
		r, v := trainReference(t, train.Options{Order: order})
		m := openModel(t, r.Section)
		lines := bufio.NewScanner(open(t, fmt.Sprintf("heldout.order%d.tsv", order)))
		for sentence, err := range train.RawText(open(t, "heldout.txt"), v, false) {
			if err != nil || !lines.Scan() {
				t.Fatal("files differ in length", err)
			}
			field, _, _ := strings.Cut(lines.Text(), "\t")
			want, err := strconv.ParseFloat(field, 64)
			if err != nil {
				t.Fatal(err)
			}
			sum, err := train.Measure(m, one(sentence), train.BeginID, nil)
			if got := sum.LogProb / math.Ln10; err != nil || math.Abs(got-want) > 1e-4 {
				t.Errorf("order %d: sentence %q: %v, want %v (%v)", order, lines.Text(), got, want, err)
			}
		}
	}
}

// one is a text of one sentence.
func one(sentence []uint32) train.Sentences {
	return func(yield func([]uint32, error) bool) { yield(sentence, nil) }
}
