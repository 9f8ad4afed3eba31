package foulcase_test

import (
	"context"
	"math/rand/v2"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase"
	"github.com/rogpeppe/go-internal/txtar"
)

// markup is what a writer types in the languages of markup, of records and of programs,
// half of it leaving something open.
var markup = []string{
	"-->", "<p>", "</p>", "<script>", "\"", "'", ",", "{", "}", "[", "]", "\\", "\\begin{verbatim}\n", "\\end{verbatim}\n", "%", "$", "/*", "*/", "//",
	"::\n\n", "----\n", "====\n", ".. ", "msgstr \"", "#", "\t", ":", "<", "&", "&amp;", "    ", "\r", "lang=\"de\"", "```", "---\n", "\x00", "\u2028", "\U0001F6A2",
}

// TestDraftOfEachFormat: whatever is typed into a document of any format, the marks stand
// where they say, and once settled they are those of Proof, its error included.
func TestDraftOfEachFormat(t *testing.T) {
	paths, err := filepath.Glob("testdata/proof/*.txtar")
	if err != nil || len(paths) == 0 {
		t.Fatalf("no documents in testdata/proof: %v", err)
	}
	typed := slices.Concat(pieces, markup)
	for _, path := range paths {
		t.Run(filepath.Base(path), func(t *testing.T) {
			archive, err := txtar.ParseFile(path)
			if err != nil {
				t.Fatal(err)
			}
			for _, f := range archive.Files {
				if f.Name == "marks" || f.Name == "house.txt" {
					continue
				}
				format, _ := foulcase.FormatOf(f.Name)
				rng := rand.New(rand.NewPCG(uint64(len(f.Data)), 4))
				typeInto(t, rng, format, strings.Repeat(string(f.Data)+"\n", 3), typed, 60)
			}
		})
	}
}

// typeInto types at random into a document, a few edits between two looks at the marks,
// and in the end takes all of it out and puts it back. Short tests take a quarter of the rounds.
func typeInto(t *testing.T, rng *rand.Rand, format, document string, typed []string, rounds int) {
	whole := document
	o := foulcase.Options{Format: format}
	d := draft(t, document, o)
	if testing.Short() {
		rounds /= 4
	}
	for round := range rounds {
		for range 1 + rng.IntN(3) {
			start := toRune(document, rng.IntN(len(document)+1))
			end := toRune(document, min(len(document), start+rng.IntN(4)*rng.IntN(4)*rng.IntN(6)))
			piece := typed[rng.IntN(len(typed))]
			document = document[:start] + piece + document[end:]
			if err := d.Edit(start, end, []byte(piece)); err != nil {
				t.Fatal(err)
			}
		}
		if string(d.Source()) != document {
			t.Fatal("the source is not what the edits make")
		}
		marks, _ := d.Marks(context.Background(), nil)
		checkPlaces(t, document, marks)
		if round%5 == 4 {
			marks, err := d.Settle(context.Background(), nil)
			want, wantErr := proofed(document, o)
			if (err == nil) != (wantErr == nil) || err != nil && err.Error() != wantErr.Error() {
				t.Fatalf("round %d: error %v, of Proof %v", round, err, wantErr)
			}
			sameMarks(t, format, marks, want)
		}
	}
	for _, all := range []string{"", whole} {
		if err := d.Edit(0, len(document), []byte(all)); err != nil {
			t.Fatal(err)
		}
		document = all
		want, _ := proofed(document, o)
		marks, _ := d.Settle(context.Background(), nil)
		sameMarks(t, format, marks, want)
	}
}

// proofed is what Proof yields.
func proofed(document string, o foulcase.Options) (marks []foulcase.Mark, err error) {
	for m, err := range engine().Proof(context.Background(), strings.NewReader(document), o) {
		if err != nil {
			return marks, err
		}
		marks = append(marks, m)
	}
	return marks, nil
}
