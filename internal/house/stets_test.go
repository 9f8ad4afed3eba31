package house

import (
	"os"
	"path/filepath"
	"strings"
	"sync"
	"testing"

	"example.org/foulcase"
)

// mark is a mark of the pilots' watch log.
func mark(observed, context string) foulcase.Mark {
	return foulcase.Mark{
		Observed: observed, Context: context, P: .9,
		Corrections: []foulcase.Correction{{Text: "right", P: .9}, {Text: "other", P: .1}},
	}
}

func openTestBook(t *testing.T, path string) *book {
	t.Helper()
	b, err := openBook(path)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

func TestStands(t *testing.T) {
	path := filepath.Join(t.TempDir(), "notes", "stets.jsonl")
	b := openTestBook(t, path)
	here := mark("ancher", "let go her ancher near the pier")
	for _, d := range []Decision{
		DecisionOn("log.txt", here, Stet, Here),
		DecisionOn("log.txt", mark("With\nout", "went with out us"), Stet, Everywhere),
		DecisionOn("log.txt", mark("recieved", "he recieved it"), Corrected, ""),
	} {
		for range 2 {
			if err := b.record(d); err != nil {
				t.Fatal(err)
			}
		}
	}
	again := openTestBook(t, path)
	if n := len(again.list()); n != 3 {
		t.Errorf("%d decisions", n)
	}
	if d := again.list()[2]; d.Intended != "right" || d.Kind != "nonword" || d.P != .9 || d.Path != "internal/house/log.txt" && d.Path != "log.txt" {
		t.Errorf("%+v", d)
	}
	for _, b := range []*book{b, again} {
		for _, tt := range []struct {
			path string
			m    foulcase.Mark
			want bool
		}{
			{"log.txt", here, true},
			{"other.txt", here, false},
			{"log.txt", mark("ancher", "let go an ancher near the pier"), false},
			{"other.txt", mark("with out", ""), true},
			{"other.txt", mark("WITH OUT's", ""), true},
			{"log.txt", mark("recieved", "he recieved it"), false},
		} {
			if got := b.stands(tt.path, tt.m); got != tt.want {
				t.Errorf("%s %q: %v", tt.path, tt.m.Observed, got)
			}
		}
	}
}

func TestDecisionsAreKeptWholeByManyAtOnce(t *testing.T) {
	path := write(t, t.TempDir(), "stets.jsonl", `{"decision":"stet","scope":"everywhere","observed":"first"}`) // no line end
	const writers, words = 4, 25
	var group sync.WaitGroup
	for w := range writers {
		b := openTestBook(t, path)
		group.Go(func() {
			for k := range words {
				word := strings.Repeat("x", 1+w*words+k)
				if err := b.record(Decision{Decision: Stet, Scope: Everywhere, Observed: word}); err != nil {
					t.Error(err)
				}
			}
		})
	}
	group.Wait()
	if n := len(openTestBook(t, path).list()); n != 1+writers*words {
		t.Errorf("%d decisions, want %d", n, 1+writers*words)
	}
}

func TestBadDecisions(t *testing.T) {
	dir := t.TempDir()
	for line, want := range map[string]string{
		`{`: "unexpected end", `[]`: "cannot unmarshal",
		`{"decision":"stet"}`:                                                       `"observed" is empty`,
		`{"decision":"let","observed":"a"}`:                                         `"decision" is "let"`,
		`{"decision":"stet","observed":"a"}`:                                        `"scope" is ""`,
		`{"decision":"stet","scope":"here","observed":"a"}`:                         `"fingerprint" is ""`,
		`{"decision":"corrected","observed":"a"}`:                                   `"intended" is empty`,
		`{"decision":"stet","observed":"` + strings.Repeat("a", maxDecision) + `"}`: "longer than",
	} {
		path := write(t, dir, "stets.jsonl", "\n"+line+"\n")
		if _, err := openBook(path); err == nil || !strings.HasPrefix(err.Error(), path+":2: ") || !strings.Contains(err.Error(), want) {
			t.Errorf("%.60s: %v, want %s", line, err, want)
		}
	}
	path := filepath.Join(dir, "none.jsonl")
	b := openTestBook(t, path)
	if err := b.record(Decision{Decision: Stet, Scope: Everywhere, Observed: strings.Repeat("a", maxDecision)}); err == nil {
		t.Error("a decision was recorded that cannot be read")
	}
	if _, err := os.Stat(path); err == nil {
		t.Error("a file was made for nothing")
	}
}

// FuzzDecisions holds the reader to errors with a line, and what it took to coming
// back the same from a file.
func FuzzDecisions(f *testing.F) {
	f.Add([]byte(`{"decision":"stet","scope":"everywhere","observed":"Lisk"}` + "\n" + `{"decision":"corrected","observed":"a","intended":"b"}`))
	f.Add([]byte("{}\n\n\xff"))
	f.Fuzz(func(t *testing.T, data []byte) {
		b := openTestBook(t, "")
		if err := b.read(data); err != nil {
			if !strings.HasPrefix(err.Error(), ":") {
				t.Errorf("%v names no line", err)
			}
			return
		}
		again := openTestBook(t, "")
		for _, d := range b.list() {
			line, err := encode(d)
			if err != nil || strings.Contains(line, "\n") {
				t.Fatalf("%q: %v", line, err)
			}
			if err := again.read([]byte(line)); err != nil {
				t.Errorf("%q: %v", line, err)
			}
		}
		if len(again.list()) != len(b.list()) {
			t.Errorf("%v came back as %v", b.list(), again.list())
		}
	})
}
