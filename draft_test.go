package foulcase_test

import (
	"bytes"
	"context"
	"errors"
	"math/rand/v2"
	"os"
	"reflect"
	"slices"
	"strings"
	"testing"
	"time"
	"unicode/utf8"

	"example.org/foulcase"
)

// draft begins a draft that is closed with the test.
func draft(t testing.TB, document string, o foulcase.Options) *foulcase.Draft {
	t.Helper()
	d, err := engine().NewDraft([]byte(document), o)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(d.Close)
	return d
}

// now returns the marks of a draft as it stands.
func now(t testing.TB, d *foulcase.Draft, progress func(done, total int)) []foulcase.Mark {
	t.Helper()
	marks, err := d.Marks(context.Background(), progress)
	if err != nil {
		t.Fatal(err)
	}
	return marks
}

// sameMarks fails where two readings of a document differ.
func sameMarks(t *testing.T, what string, got, want []foulcase.Mark) {
	t.Helper()
	for i := range max(len(got), len(want)) {
		switch {
		case i >= len(got):
			t.Fatalf("%s: no mark like %+v", what, want[i])
		case i >= len(want):
			t.Fatalf("%s: too many marks, first %+v", what, got[i])
		case !reflect.DeepEqual(got[i], want[i]):
			t.Fatalf("%s: mark %d\n%+v\nwant\n%+v", what, i, got[i], want[i])
		}
	}
}

// minutes is invented Markdown with slips, lists, code and a table.
const minutes = "---\ntitle: minutes\n---\n# Minuts of the pilots' meeting\n\n" +
	"The *pilots* met at noon. Alot of them had recieved the new `tide.tab` file, and\nthe harbour master thanked them for there *pati*ence.\n\n" +
	"- The launch needs a new ancher.\n- The log book is to to be kept dry\n  and out of the rain.\n\n```\nteh code\n```\n\n" +
	"| berth | wich ship |\n|---|---|\n| north | the *Skarrow* lies their |\n\n> Nobody spoke agianst it.\n\n1. Next meeting: untill further notice.\n"

// TestDraftReadsLikeProof: a draft's first marks are those of Proof.
func TestDraftReadsLikeProof(t *testing.T) {
	for _, c := range []struct {
		format, document string
	}{
		{"plain", manifest[:len(manifest)/3]},
		{"markdown", minutes},
		{"plain", ""},
		{"plain", "\uFEFFTeh pilot\r\nand teh ship\r\n"},
	} {
		o := foulcase.Options{Format: c.format}
		sameMarks(t, c.format, now(t, draft(t, c.document, o), nil), proof(t, c.document, o))
	}
}

// pieces are what a writer types, pastes and deletes.
var pieces = []string{
	"a", "e", " ", "\n", "\n\n", ". ", "teh ", "The ship ", "*", "`", "# ", "- ", "> ", "| ", "```\n", "<!-- ", "\r\n", "é", "☂", "recieve",
	"\n\nA new paragraph of the minutes.\n\n", "", "", "", "",
}

// TestDraftFollowsEdits: after any edits the source is what a plain splice gives,
// every mark stands where it says, and once settled the marks are those that
// Proof gives the whole.
func TestDraftFollowsEdits(t *testing.T) {
	for _, format := range []string{"plain", "markdown"} {
		t.Run(format, func(t *testing.T) {
			typeInto(t, rand.New(rand.NewPCG(4, 1)), format, strings.Repeat(minutes, 3)+manifest[:2000], pieces, 150)
		})
	}
}

// toRune goes back to where a code point begins.
func toRune(s string, at int) int {
	for at < len(s) && !utf8.RuneStart(s[at]) {
		at--
	}
	return at
}

// checkPlaces fails when a mark is not where it says.
func checkPlaces(t *testing.T, document string, marks []foulcase.Mark) {
	t.Helper()
	last := int64(-1)
	for _, m := range marks {
		if m.Offset < last || m.Offset+m.Length > int64(len(document)) || document[m.Offset:m.Offset+m.Length] != m.Observed {
			t.Fatalf("no such place: %+v", m)
		}
		last = m.Offset
		if line, column := placeOf(document, m.Offset); m.Line != line || m.Column != column {
			t.Fatalf("at %d:%d, says %+v", line, column, m)
		}
	}
}

// placeOf counts lines and code points from the start.
func placeOf(document string, offset int64) (line, column int) {
	before := strings.TrimPrefix(document[:offset], "\uFEFF")
	before = strings.ReplaceAll(strings.ReplaceAll(before, "\r\n", "\n"), "\r", "\n")
	i := strings.LastIndexByte(before, '\n')
	return strings.Count(before, "\n") + 1, len([]rune(before[i+1:])) + 1
}

// TestDraftJudgesWhatWasTouched: a keystroke costs one sentence or two, whatever
// the format, and no mark elsewhere moves.
func TestDraftJudgesWhatWasTouched(t *testing.T) {
	for _, format := range []string{"plain", "markdown"} {
		document := strings.Repeat("The pilot boarded the ship at noon. The sea was calm and the wind was light.\n\n", 400)
		d := draft(t, document, foulcase.Options{Format: format})
		if marks := now(t, d, nil); len(marks) > 0 {
			t.Fatalf("good text has marks: %+v", marks)
		}
		at := len(document)/2 + strings.Index(document[len(document)/2:], "boarded")
		for _, c := range "boareded " {
			if err := d.Edit(at, at, []byte(string(c))); err != nil {
				t.Fatal(err)
			}
			at++
			judged := 0
			now(t, d, func(_, total int) { judged = total })
			if judged < 1 || judged > 2 {
				t.Errorf("%s: %d sentences judged after a keystroke", format, judged)
			}
		}
		marks := now(t, d, nil)
		if len(marks) != 1 || marks[0].Observed != "boareded" || marks[0].Line != 401 {
			t.Errorf("%s: marks %+v", format, marks)
		}
	}
}

// TestDraftCutShort: what was judged before the context ended is not judged again.
func TestDraftCutShort(t *testing.T) {
	d := draft(t, manifest, foulcase.Options{})
	ctx, cancel := context.WithCancel(context.Background())
	whole := 0
	_, err := d.Marks(ctx, func(done, total int) {
		if whole = total; done > total/2 {
			cancel()
		}
	})
	if !errors.Is(err, context.Canceled) {
		t.Fatalf("error %v", err)
	}
	rest := 0
	marks := now(t, d, func(_, total int) { rest = total })
	if rest == 0 || rest > whole/2 {
		t.Errorf("%d of %d sentences judged again", rest, whole)
	}
	sameMarks(t, "after the cut", marks, proof(t, manifest, foulcase.Options{}))
}

// TestDraftTellsOfEachSentence: also within a block, for a judgement to be shown, paused
// and cut short there.
func TestDraftTellsOfEachSentence(t *testing.T) {
	d := draft(t, strings.Repeat("The pilot boarded the ship at noon. ", 50), foulcase.Options{Format: "markdown"})
	var told []int
	now(t, d, func(done, total int) {
		if told = append(told, done); total != 50 {
			t.Errorf("%d of %d", done, total)
		}
	})
	if len(told) != 50 || !slices.IsSorted(told) || told[49] != 50 {
		t.Errorf("told of %v", told)
	}
}

// TestDraftRests: a draft that rested goes on as one that did not, also where it was
// edited meanwhile.
func TestDraftRests(t *testing.T) {
	d, other := draft(t, minutes, foulcase.Options{Format: "markdown"}), draft(t, minutes, foulcase.Options{Format: "markdown"})
	d.Rest()
	now(t, other, nil)
	sameMarks(t, "rested before it was judged", now(t, d, nil), now(t, other, nil))
	d.Rest()
	d.Rest()
	at := strings.Index(minutes, "met")
	for _, one := range []*foulcase.Draft{d, other} {
		if err := one.Edit(at, at, []byte("recieved and ")); err != nil {
			t.Fatal(err)
		}
	}
	judged := 0
	marks, err := d.Marks(context.Background(), func(_, total int) { judged = total })
	if err != nil || judged != 1 {
		t.Errorf("%d sentences judged, error %v", judged, err)
	}
	sameMarks(t, "rested", marks, now(t, other, nil))
	d.Rest()
	settled, err := d.Settle(context.Background(), nil)
	if err != nil {
		t.Fatal(err)
	}
	sameMarks(t, "settled", settled, proof(t, string(d.Source()), foulcase.Options{Format: "markdown"}))
}

// TestDraftTakesOptions: a word that becomes a house word loses its mark at once.
func TestDraftTakesOptions(t *testing.T) {
	d := draft(t, "The skarrowing of the berth was done by noon. The ship recieved a pilot.", foulcase.Options{})
	before := now(t, d, nil)
	house, err := foulcase.ReadHouse("words", strings.NewReader("skarrowing\nrecieved\n"))
	if err != nil {
		t.Fatal(err)
	}
	d.SetOptions(foulcase.Options{House: house})
	after := now(t, d, nil)
	if len(before) == 0 || len(after) > 0 {
		t.Errorf("marks %+v, then %+v", before, after)
	}
}

// TestNamesOfCodeStand: a form that the document's code has is a name there, in proofs
// and in drafts; a common word is looked at all the same.
func TestNamesOfCodeStand(t *testing.T) {
	document := "// The bufr is emptied befor the the pump is strated.\nvar bufr, the, strated int\n"
	o := foulcase.Options{Format: "go"}
	var got []string
	for _, m := range proof(t, document, o) {
		got = append(got, m.Observed)
	}
	if want := []string{"befor", "the the"}; !slices.Equal(got, want) {
		t.Errorf("marked %q, want %q", got, want)
	}
	d := draft(t, document, o)
	sameMarks(t, "draft", now(t, d, nil), proof(t, document, o))
	at := strings.Index(document, "pump")
	if err := d.Edit(at, at, []byte("bufr ")); err != nil {
		t.Fatal(err)
	}
	if marks := now(t, d, nil); len(marks) != 2 {
		t.Errorf("after an edit: %+v", marks)
	}
}

// TestDraftHeedsTheHouse: what the writer lets stand, and what the house has written
// otherwise, count in a draft as in Proof.
func TestDraftHeedsTheHouse(t *testing.T) {
	house, err := foulcase.ReadHouse("words", strings.NewReader("pilot boat, not pilotboat\n"))
	if err != nil {
		t.Fatal(err)
	}
	document := "The pilotboat recieved a call.\n\n<!-- foulcase: stet recieved -->\n\nThe pilotboat recieved a call.\n"
	o := foulcase.Options{Format: "markdown", House: house}
	d := draft(t, document, o)
	marks := now(t, d, nil)
	sameMarks(t, "opened", marks, proof(t, document, o))
	rules := 0
	for _, m := range marks {
		if m.Rule == foulcase.RuleHouse && m.Corrections[0].Text == "pilot boat" {
			rules++
		}
	}
	if len(marks) != 3 || rules != 2 {
		t.Errorf("marks %+v", marks)
	}
	at := strings.Index(document, "<!--")
	if err := d.Edit(at, at+len("<!-- foulcase: stet recieved -->"), nil); err != nil {
		t.Fatal(err)
	}
	if marks := now(t, d, nil); len(marks) != 4 {
		t.Errorf("without the comment: %+v", marks)
	}
}

func TestDraftRefuses(t *testing.T) {
	if _, err := engine().NewDraft(nil, foulcase.Options{Format: "parchment"}); err == nil {
		t.Error("a draft of an unknown format")
	}
	if _, err := engine().NewDraft(nil, foulcase.Options{Format: "docx"}); !errors.Is(err, foulcase.ErrUnreadable) {
		t.Errorf("a draft of a packed document: %v", err)
	}
	d := draft(t, "fog", foulcase.Options{})
	for _, e := range [][2]int{{-1, 0}, {2, 1}, {0, 4}, {4, 4}} {
		if err := d.Edit(e[0], e[1], []byte("x")); err == nil || string(d.Source()) != "fog" {
			t.Errorf("edit %v: %v, source %q", e, err, d.Source())
		}
	}
}

// BenchmarkDraftKeystroke types at the end of a line in the middle of the file
// that FOULCASE_TEXT names, the tests' own text where it names none, and tells how
// long the marks take after each key. FOULCASE_FORMAT is the format, else plain.
// Run it with -cpu 1.
func BenchmarkDraftKeystroke(b *testing.B) {
	document := []byte(strings.Repeat(manifest, 6))
	if path := os.Getenv("FOULCASE_TEXT"); path != "" {
		var err error
		if document, err = os.ReadFile(path); err != nil {
			b.Fatal(err)
		}
	}
	d := draft(b, string(document), foulcase.Options{Format: os.Getenv("FOULCASE_FORMAT")})
	now(b, d, nil)
	typed := " The pilot recieved the order at noon and went on board with out his coat.\nThe launch lay along side. "
	var took []time.Duration
	at := len(document)/2 + bytes.IndexByte(document[len(document)/2:], '\n')
	for i := 0; b.Loop(); i++ {
		key := typed[i%len(typed)]
		start := time.Now()
		if err := d.Edit(at, at, []byte{key}); err != nil {
			b.Fatal(err)
		}
		now(b, d, nil)
		took = append(took, time.Since(start))
		at++
	}
	slices.Sort(took)
	b.ReportMetric(float64(took[len(took)/2].Microseconds()), "p50-µs")
	b.ReportMetric(float64(took[len(took)*99/100].Microseconds()), "p99-µs")
	b.ReportMetric(float64(len(strings.Fields(string(document)))), "words")
}
