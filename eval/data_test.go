package eval_test

import (
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

// open opens a file of the development data, which lies beside the project and
// is no part of it.
func open(t *testing.T, name string) *os.File {
	f, err := os.Open(filepath.Join("..", "..", "shared", "data", "dev", name))
	if err != nil {
		t.Skipf("needs the development data: %v", err)
	}
	t.Cleanup(func() { f.Close() })
	return f
}

// The annotators counted the errors of each passage (column 3). The alignment
// must find so many, but where it is left to rule otherwise: names that lack a
// capital, hyphens, and passages that the corrector gave up on.
func TestHolbrookCounts(t *testing.T) {
	columns := []eval.Column{eval.Source, eval.Reference, eval.Intended, eval.Document}
	sentences, err := eval.ReadSentences("holbrook", open(t, "holbrook-context.tsv"), columns)
	if err != nil {
		t.Fatal(err)
	}
	agree := 0
	for _, s := range sentences {
		errors := 0
		for _, span := range eval.Gold(s, knows()).Spans {
			if !span.Neutral {
				errors++
			}
		}
		if s.Intended == strconv.Itoa(errors) {
			agree++
		}
	}
	if agree < len(sentences)*96/100 {
		t.Errorf("the annotators' number of errors in %d of %d passages", agree, len(sentences))
	}
}

// Each sentence of natural real-word errors has one of known place and
// correction.
func TestNaturalErrors(t *testing.T) {
	columns := []eval.Column{eval.Source, eval.Reference, eval.Observed, eval.Intended, eval.Document}
	sentences, err := eval.ReadSentences("natural", open(t, "realword-natural-context.tsv"), columns)
	if err != nil {
		t.Fatal(err)
	}
	for _, s := range sentences {
		found := 0
		for _, span := range eval.Gold(s, knows()).Spans {
			if span.Neutral {
				continue
			}
			found++
			// The file names some errors by their lemmas.
			if !strings.HasPrefix(strings.ToLower(span.Corrections[0]), strings.ToLower(s.Intended)) {
				t.Errorf("line %d: %v, want %q", s.Line, span.Corrections, s.Intended)
			}
		}
		if found == 0 {
			t.Errorf("line %d: %q is not found", s.Line, s.Observed)
		}
	}
}

// Every other file reads, and no sentence's spans fail to fit it.
func TestDevelopmentData(t *testing.T) {
	for name, columns := range map[string]string{
		"learner-context.tsv":        "source,reference,observed,intended,-",
		"jfleg-context.tsv":          "source,rewrite,rewrite,rewrite,rewrite",
		"eracond-context.tsv":        "source,full,reference",
		"german-learner-context.tsv": "source,reference,full,-",
	} {
		c, err := eval.ParseColumns(columns)
		if err != nil {
			t.Fatal(err)
		}
		sentences, err := eval.ReadSentences(name, open(t, name), c)
		if err != nil {
			t.Fatal(err)
		}
		items := make([]eval.Item, len(sentences))
		for i, s := range sentences {
			items[i] = eval.Gold(s, func(w string) bool { return len(w)%2 == 0 })
		}
		r, err := eval.ScoreText(items, perfect(items), eval.Resampling{Resamples: 10})
		if err != nil {
			t.Fatal(err)
		}
		if m, _ := r.Metric("correction.f1", ""); m.Value != 1 || m.N < 100 {
			t.Errorf("%s: perfect answers to %v errors score %v", name, m.N, m.Value)
		}
	}
	for _, name := range []string{"birkbeck.tsv", "toefl-spell.tsv", "wikipedia-common.tsv"} {
		pairs, err := eval.ReadPairs(name, open(t, name))
		if err != nil || len(pairs) < 500 {
			t.Errorf("%s: %d pairs, %v", name, len(pairs), err)
		}
	}
	items, err := eval.ReadClean("clean", open(t, "clean-state-union.txt"))
	if err != nil || len(items) < 1000 {
		t.Errorf("%d paragraphs, %v", len(items), err)
	}
}
