package tree

import (
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

func TestKnown(t *testing.T) {
	marks := []KnownMark{
		{"00000000000000ff", "log/b.txt", "untill"},
		{"00000000000000aa", "log/b.txt", "ancher"},
		{"00000000000000aa", "log/b.txt", "ancher"},
		{"0123456789abcdef", "a\tb\\n.txt", "with\nin"},
	}
	path := filepath.Join(t.TempDir(), "known.tsv")
	write := func(marks []KnownMark) string {
		t.Helper()
		if err := WriteKnown(path, marks); err != nil {
			t.Fatal(err)
		}
		data, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		return string(data)
	}
	first := write(marks)
	want := "0123456789abcdef\ta\\tb\\\\n.txt\twith\\nin\n" +
		"00000000000000aa\tlog/b.txt\tancher\n00000000000000aa\tlog/b.txt\tancher\n" +
		"00000000000000ff\tlog/b.txt\tuntill\n"
	if body := strings.TrimPrefix(first, knownHead); body != want {
		t.Errorf("the file holds\n%s, want\n%s", body, want)
	}
	read, err := ReadKnown(strings.NewReader(first), path)
	if err != nil {
		t.Fatal(err)
	}
	if want := []KnownMark{marks[3], marks[1], marks[2], marks[0]}; !slices.Equal(read, want) {
		t.Errorf("read %q, want %q", read, want)
	}
	slices.Reverse(marks)
	if again := write(marks); again != first {
		t.Errorf("the same marks in another order give\n%s", again)
	}
}

func TestReadKnownErrors(t *testing.T) {
	good := "00000000000000aa\ta\tb\n"
	for file, want := range map[string]string{
		"# head\n\n" + good + "00\ta\tb\n":         "known:4: want a fingerprint of 16 digits",
		good + "00000000000000aa\ta\n":             "known:2: want a fingerprint",
		good + "00000000000000AA\ta\tb\n":          "known:2: want a fingerprint",
		"<<<<<<< HEAD\n" + good:                    "known:1: a mark of a merge",
		good + "=======\n" + good:                  "known:2: a mark of a merge",
		good + strings.Repeat("x", maxKnownLine+1): "known:2: ",
	} {
		if _, err := ReadKnown(strings.NewReader(file), "known"); err == nil || !strings.HasPrefix(err.Error(), want) {
			t.Errorf("%.60q: error %v, want %q", file, err, want)
		}
	}
}

func FuzzKnown(f *testing.F) {
	f.Add(knownHead + "00000000000000aa\tlog/b\\t.txt\tancher\\\\\r\n")
	f.Fuzz(func(t *testing.T, file string) {
		marks, err := ReadKnown(strings.NewReader(file), "known")
		if err != nil {
			return
		}
		var written strings.Builder
		if err := printKnown(&written, marks); err != nil {
			t.Fatal(err)
		}
		again, err := ReadKnown(strings.NewReader(written.String()), "again")
		if err != nil || len(again) != len(marks) {
			t.Fatalf("%d marks came back as %d: %v", len(marks), len(again), err)
		}
		for _, m := range marks {
			if !slices.Contains(again, m) {
				t.Errorf("%q did not come back", m)
			}
		}
	})
}
