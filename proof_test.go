package foulcase_test

import (
	"bytes"
	"context"
	"errors"
	"flag"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/lm/english"
	"github.com/rogpeppe/go-internal/txtar"
)

var update = flag.Bool("update", false, "rewrite the expectations in testdata/proof")

// engine is the embedded English model, opened once for all tests.
var engine = sync.OnceValue(func() *foulcase.Engine {
	e, err := foulcase.Open(english.Model())
	if err != nil {
		panic(err)
	}
	return e
})

func proof(t testing.TB, document string, o foulcase.Options) []foulcase.Mark {
	t.Helper()
	var marks []foulcase.Mark
	for m, err := range engine().Proof(context.Background(), strings.NewReader(document), o) {
		if err != nil {
			t.Fatal(err)
		}
		marks = append(marks, m)
	}
	return marks
}

// TestDocuments proofs whole documents; what must be found stands beside each.
// Anything found beyond that fails too.
func TestDocuments(t *testing.T) {
	paths, err := filepath.Glob("testdata/proof/*.txtar")
	if err != nil || len(paths) == 0 {
		t.Fatalf("no documents in testdata/proof: %v", err)
	}
	for _, path := range paths {
		t.Run(filepath.Base(path), func(t *testing.T) { checkDocument(t, path) })
	}
}

func checkDocument(t *testing.T, path string) {
	archive, err := txtar.ParseFile(path)
	if err != nil {
		t.Fatal(err)
	}
	var o foulcase.Options
	var document, want *txtar.File
	for i := range archive.Files {
		switch f := &archive.Files[i]; f.Name {
		case "marks":
			want = f
		case "house.txt":
			if o.House, err = foulcase.ReadHouse(f.Name, bytes.NewReader(f.Data)); err != nil {
				t.Fatal(err)
			}
		default:
			document = f
			o.Format, _ = foulcase.FormatOf(f.Name)
		}
	}
	if document == nil || want == nil {
		t.Fatal("want a document and a file named marks")
	}
	var got strings.Builder
	for _, m := range proof(t, string(document.Data), o) {
		fmt.Fprintf(&got, "%d:%d %s %q -> %q\n", m.Line, m.Column, m.Kind, m.Observed, m.Corrections[0].Text)
	}
	if *update {
		want.Data = []byte(got.String())
		if err := os.WriteFile(path, txtar.Format(archive), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	if got.String() != string(want.Data) {
		t.Errorf("found:\n%swant:\n%s", got.String(), want.Data)
	}
}

// manifest is invented text with slips of every kind, a few times over so that
// it is longer than one block.
var manifest = strings.Repeat("The pilot recieved the order at noon. He tied the boat with out help to the the quay,\r\n"+
	"and alot of rain fell on the naïve crew – ☂ – all nihgt.\n\n", 900)

func TestMarksPointIntoTheDocument(t *testing.T) {
	marks := proof(t, manifest, foulcase.Options{})
	if len(marks) < 900 {
		t.Fatalf("%d marks in a document with thousands of slips", len(marks))
	}
	last := int64(-1)
	for _, m := range marks {
		if got := manifest[m.Offset : m.Offset+m.Length]; got != m.Observed {
			t.Fatalf("offset %d says %q, the document %q", m.Offset, m.Observed, got)
		}
		before := manifest[:m.Offset]
		if line := 1 + strings.Count(before, "\n"); m.Line != line {
			t.Fatalf("offset %d is in line %d, the mark says %d", m.Offset, line, m.Line)
		}
		start := strings.LastIndexByte(before, '\n') + 1
		if column := 1 + len([]rune(before[start:])); m.Column != column {
			t.Fatalf("offset %d is in column %d, the mark says %d", m.Offset, column, m.Column)
		}
		if m.Offset <= last || m.P < 0 || m.P > 1 || len(m.Corrections) == 0 {
			t.Fatalf("mark out of order or out of range: %+v", m)
		}
		last = m.Offset
	}
}

func TestProofIsTheSameForAnyReaderAndAtOnce(t *testing.T) {
	want := fmt.Sprint(proof(t, manifest, foulcase.Options{}))
	var group sync.WaitGroup
	for range 4 {
		group.Go(func() {
			var marks []foulcase.Mark
			r := io.MultiReader(strings.NewReader(manifest[:4097]), strings.NewReader(manifest[4097:]))
			for m, err := range engine().Proof(context.Background(), r, foulcase.Options{}) {
				if err != nil {
					t.Error(err)
					return
				}
				marks = append(marks, m)
			}
			if fmt.Sprint(marks) != want {
				t.Error("another run gives other marks")
			}
		})
	}
	group.Wait()
}

func TestProofStopsOnErrors(t *testing.T) {
	broken := errors.New("the cable parted")
	r := io.MultiReader(strings.NewReader("The pilot recieved the order.\n\n"), failing{broken})
	var marks int
	var got error
	for m, err := range engine().Proof(context.Background(), r, foulcase.Options{}) {
		if got = err; err == nil && m.Observed == "recieved" {
			marks++
		}
	}
	if marks != 1 || !errors.Is(got, broken) {
		t.Errorf("marks before the error: %d, error %v", marks, got)
	}

	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	for _, err := range engine().Proof(ctx, strings.NewReader(manifest), foulcase.Options{}) {
		if !errors.Is(err, context.Canceled) {
			t.Errorf("cancelled: %v", err)
		}
	}
	for _, err := range engine().Proof(context.Background(), strings.NewReader(""), foulcase.Options{Format: "runes"}) {
		if err == nil || !strings.Contains(err.Error(), "runes") {
			t.Errorf("an unknown format gives %v", err)
		}
	}
}

type failing struct{ err error }

func (f failing) Read([]byte) (int, error) { return 0, f.err }

func TestVariety(t *testing.T) {
	const document = "The colour of the grey harbor was dull."
	for variety, want := range map[foulcase.Variety]string{
		foulcase.AnyVariety: "",
		foulcase.American:   "colour>color",
		foulcase.British:    "harbor>harbour",
	} {
		var got []string
		for _, m := range proof(t, document, foulcase.Options{Variety: variety}) {
			got = append(got, m.Observed+">"+m.Corrections[0].Text)
		}
		if s := strings.Join(got, " "); s != want {
			t.Errorf("%v: %q, want %q", variety, s, want)
		}
	}
}

func TestHouseWords(t *testing.T) {
	const document = "The Skarrow launch lay by the zilverbank all night. She left the zilverbnak at dawn."
	house, err := foulcase.ReadHouse("list", strings.NewReader("Skarrow\nzilverbank\n"))
	if err != nil {
		t.Fatal(err)
	}
	marks := proof(t, document, foulcase.Options{House: house})
	if len(marks) != 1 || marks[0].Observed != "zilverbnak" || marks[0].Corrections[0].Text != "zilverbank" {
		t.Errorf("with house words: %+v", marks)
	}
	if slices.ContainsFunc(marks, func(m foulcase.Mark) bool { return m.Observed == "Skarrow" }) {
		t.Error("a house word is marked")
	}
}

func TestBudgetOnlyAddsMarks(t *testing.T) {
	has := map[int64]bool{}
	for _, m := range proof(t, manifest, foulcase.Options{Budget: 20}) {
		has[m.Offset] = true
	}
	for _, m := range proof(t, manifest, foulcase.Options{Budget: 0.1}) {
		if !has[m.Offset] {
			t.Fatalf("%q is found at the smaller budget alone", m.Observed)
		}
	}
}

func FuzzProof(f *testing.F) {
	f.Add("The launch will birth at noon.", "plain")
	f.Add("# Notice\n\nthe **be**rth\xff\x00 `code` alot’s\r\n", "markdown")
	f.Fuzz(func(t *testing.T, document, format string) {
		for m, err := range engine().Proof(context.Background(), strings.NewReader(document), foulcase.Options{Format: format, Budget: 20}) {
			if err != nil {
				return
			}
			if m.Offset < 0 || m.Length <= 0 || m.Offset+m.Length > int64(len(document)) {
				t.Fatalf("%+v lies outside the document", m)
			}
		}
	})
}

// TestRunonsComeFirst: a word that is two without their space is read so before words that
// are some letters away, wherever it stands.
func TestRunonsComeFirst(t *testing.T) {
	for _, document := range []string{
		"Alot of rain fell on the crew.", "He likes it alot.", "There was alot of salt in the box.", "It was infact a good berth.",
	} {
		marks := proof(t, document, foulcase.Options{})
		if len(marks) != 1 || marks[0].Kind != foulcase.Runon || !strings.Contains(marks[0].Corrections[0].Text, " ") {
			t.Errorf("%s: %+v", document, marks)
		}
	}
}
