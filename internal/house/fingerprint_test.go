package house_test

import (
	"os"
	"path/filepath"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
)

// birth is a mark of the pilots' watch log.
func birth() foulcase.Mark {
	return foulcase.Mark{
		Line: 10, Column: 62, Offset: 512, Length: 5, Observed: "birth", Kind: foulcase.Realword,
		Context: "The launch Kittiwake will birth at noon on the flood",
	}
}

func TestFingerprintKeeps(t *testing.T) {
	want := house.Fingerprint("papers/watch-log.txt", birth())
	if len(want) != 16 {
		t.Fatalf("fingerprint %q: want 16 digits", want)
	}
	abs, err := filepath.Abs("papers/watch-log.txt")
	if err != nil {
		t.Fatal(err)
	}
	for name, tt := range map[string]struct {
		path   string
		change func(*foulcase.Mark)
	}{
		"lines moved":     {"papers/watch-log.txt", func(m *foulcase.Mark) { m.Line, m.Offset = 99, 4711 }},
		"far text":        {"papers/watch-log.txt", func(m *foulcase.Mark) { m.Context = "Our own launch Kittiwake will birth at noon on an ebb" }},
		"capitals":        {"papers/watch-log.txt", func(m *foulcase.Mark) { m.Context = "launch Kittiwake will birth at NOON, on the flood" }},
		"another chance":  {"papers/watch-log.txt", func(m *foulcase.Mark) { m.P = .5 }},
		"path uncleaned":  {"./papers//x/../watch-log.txt", func(m *foulcase.Mark) {}},
		"path from above": {abs, func(m *foulcase.Mark) {}},
	} {
		m := birth()
		tt.change(&m)
		if got := house.Fingerprint(tt.path, m); got != want {
			t.Errorf("%s: %s, want %s", name, got, want)
		}
	}
}

func TestFingerprintTellsApart(t *testing.T) {
	seen := map[string]string{house.Fingerprint("a.txt", birth()): "the mark itself"}
	for name, tt := range map[string]struct {
		path   string
		change func(*foulcase.Mark)
	}{
		"path":          {"b.txt", func(m *foulcase.Mark) {}},
		"part":          {"a.txt", func(m *foulcase.Mark) { m.Part = "notes" }},
		"kind":          {"a.txt", func(m *foulcase.Mark) { m.Kind = foulcase.Nonword }},
		"form":          {"a.txt", func(m *foulcase.Mark) { m.Observed = "noon" }},
		"word before":   {"a.txt", func(m *foulcase.Mark) { m.Context = "The launch Kittiwake shall birth at noon on the flood" }},
		"word after":    {"a.txt", func(m *foulcase.Mark) { m.Context = "The launch Kittiwake will birth at dawn on the flood" }},
		"markup inside": {"a.txt", func(m *foulcase.Mark) { m.Observed = "bi*r*th" }},
	} {
		m := birth()
		tt.change(&m)
		got := house.Fingerprint(tt.path, m)
		if other, ok := seen[got]; ok {
			t.Errorf("%s: the fingerprint of %s", name, other)
		}
		seen[got] = name
	}
}

func TestNameIsFromTheRootOfTheRepository(t *testing.T) {
	root := t.TempDir()
	deep := filepath.Join(root, "papers", "2031")
	for _, dir := range []string{filepath.Join(root, ".git"), deep} {
		if err := os.MkdirAll(dir, 0o755); err != nil {
			t.Fatal(err)
		}
	}
	want := "papers/2031/log.txt"
	if got := house.Name(filepath.Join(deep, "log.txt")); got != want {
		t.Errorf("absolute: %q, want %q", got, want)
	}
	t.Chdir(deep)
	if got := house.Name("log.txt"); got != want {
		t.Errorf("from its folder: %q, want %q", got, want)
	}
}
