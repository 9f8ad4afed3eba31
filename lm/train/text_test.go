package train_test

import (
	"errors"
	"fmt"
	"iter"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/lm/train"
)

func smallLexicon(t *testing.T, forms ...string) *lexicon.Lexicon {
	t.Helper()
	var b lexicon.Builder
	for _, f := range append(forms, "'s") {
		b.Add(f, lexicon.Entry{}, "")
	}
	section, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	lex, err := lexicon.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	return lex
}

func documents(docs ...string) iter.Seq2[[]byte, error] {
	return text.Documents(strings.NewReader(strings.Join(docs, "\n\n") + "\n"))
}

func collect(t *testing.T, s train.Sentences) [][]uint32 {
	t.Helper()
	var out [][]uint32
	for sentence, err := range s {
		if err != nil {
			t.Fatal(err)
		}
		out = append(out, slices.Clone(sentence))
	}
	return out
}

func TestTextToIDs(t *testing.T) {
	lex := smallLexicon(t, "the", "pilot", "boards", "at", "pier")
	id := func(w string) uint32 {
		n, ok := lex.ID([]byte(w))
		if !ok {
			t.Fatalf("no %q", w)
		}
		return n
	}
	begin, end, number := lex.ClassID(lexicon.Begin), lex.ClassID(lexicon.End), lex.ClassID(lexicon.Number)
	got := collect(t, train.Text(documents("The pilot boards at 1200. The pilot's pier.\n?!"), lex, train.Whole, 2))
	want := [][]uint32{
		{begin, id("the"), id("pilot"), id("boards"), id("at"), number, end},
		{begin, id("the"), id("pilot"), id("'s"), id("pier"), end},
	}
	if !slices.EqualFunc(got, want, slices.Equal) {
		t.Errorf("%v, want %v", got, want)
	}
}

// manyDocuments are more than a worker's piece.
func manyDocuments() []string {
	r := rand.New(rand.NewPCG(1, 2))
	var docs []string
	for i := range 3000 {
		docs = append(docs, fmt.Sprintf("The pilot boards at pier %d. ", i)+strings.Repeat("The pilot boards. ", 1+r.IntN(100)))
	}
	return docs
}

func TestPartsMakeTheWhole(t *testing.T) {
	lex := smallLexicon(t, "the", "pilot", "boards", "at", "pier")
	docs := manyDocuments()
	whole := collect(t, train.Text(documents(docs...), lex, train.Whole, 1))
	if again := collect(t, train.Text(documents(docs...), lex, train.Whole, 5)); !slices.EqualFunc(whole, again, slices.Equal) {
		t.Error("sentences depend on the number of workers")
	}
	training := collect(t, train.Text(documents(docs...), lex, train.Training, 2))
	held := collect(t, train.Text(documents(docs...), lex, train.HeldOut, 2))
	if len(training)+len(held) != len(whole) {
		t.Errorf("%d and %d sentences of %d", len(training), len(held), len(whole))
	}
	if share := float64(len(held)) / float64(len(whole)); share < .07 || share > .13 {
		t.Errorf("a share of %v is held out, want a tenth", share)
	}
}

func TestTextStopsEarly(t *testing.T) {
	lex := smallLexicon(t, "the", "pilot", "boards")
	n := 0
	for range train.Text(documents(manyDocuments()...), lex, train.Whole, 3) {
		if n++; n == 10 {
			break
		}
	}
	if n != 10 {
		t.Errorf("%d sentences", n)
	}
}

func TestTextPassesErrorsOn(t *testing.T) {
	lex := smallLexicon(t, "the", "pilot", "boards")
	broken := errors.New("broken disk")
	docs := func(yield func([]byte, error) bool) {
		_ = yield([]byte("The pilot boards."), nil) && yield(nil, broken)
	}
	n := 0
	var last error
	for _, err := range train.Text(docs, lex, train.Whole, 2) {
		n++
		last = err
	}
	if n != 2 || !errors.Is(last, broken) {
		t.Errorf("%d steps, at last %v", n, last)
	}
}
