package main

import (
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

// writeTree makes a folder with files of these names; a name that ends in a
// slash is an empty folder.
func writeTree(t *testing.T, names ...string) string {
	t.Helper()
	root := t.TempDir()
	for _, name := range names {
		path := filepath.Join(root, filepath.FromSlash(name))
		if strings.HasSuffix(name, "/") {
			path = filepath.Join(path, "x")
		}
		if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
			t.Fatal(err)
		}
		if strings.HasSuffix(name, "/") {
			continue
		}
		if err := os.WriteFile(path, []byte(name), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	return root
}

func TestFindInputs(t *testing.T) {
	root := writeTree(t, "b.txt", "a.md", "c.png", "sub/d.TXT", ".hidden/e.txt", "sub/.f.txt", "bare", "empty/")
	at := func(name string) string { return filepath.Join(root, filepath.FromSlash(name)) }
	inputs := findInputs([]string{at("bare"), "-", root, at("nothing"), at("empty")}, strings.NewReader("typed"), "notes.md")
	var got []string
	for _, in := range inputs {
		mark := ""
		if in.err != nil {
			mark = "!"
		}
		got = append(got, mark+in.path)
	}
	want := []string{at("bare"), "notes.md", at("a.md"), at("b.txt"), at("sub/d.TXT"), "!" + at("nothing"), "!" + at("empty")}
	if !slices.Equal(got, want) {
		t.Errorf("found\n%q, want\n%q", got, want)
	}
	if err := inputs[len(inputs)-1].err; err == nil || !strings.Contains(err.Error(), ".md") {
		t.Errorf("the empty folder's error is %v, want one that names the extensions", err)
	}
	if total := totalSize(inputs); total != 0 {
		t.Errorf("total size %d with standard input, want 0 for unknown", total)
	}
	if total := totalSize(inputs[2:]); total != int64(len("a.md")+len("b.txt")+len("sub/d.TXT")) {
		t.Errorf("total size %d", total)
	}
}

func TestStandardInputOnce(t *testing.T) {
	var got []string
	for _, in := range findInputs([]string{"-", "-"}, strings.NewReader("typed"), "-") {
		r, err := in.open()
		if err != nil {
			t.Fatal(err)
		}
		data, err := io.ReadAll(r)
		if err != nil {
			t.Fatal(err)
		}
		got = append(got, string(data))
	}
	if want := []string{"typed"}; !slices.Equal(got, want) {
		t.Errorf("read %q, want %q", got, want)
	}
}

func TestCorpusReader(t *testing.T) {
	read := func(texts ...string) string {
		t.Helper()
		var c corpus
		for _, text := range texts {
			c.inputs = append(c.inputs, input{path: "x", in: strings.NewReader(text)})
		}
		data, err := io.ReadAll(c.reader())
		if err != nil {
			t.Fatal(err)
		}
		return string(data)
	}
	if got, want := read("a\n", "", "b", "c\nd"), "a\nb\nc\nd\n"; got != want {
		t.Errorf("read %q, want %q", got, want)
	}
	if got := read(); got != "" {
		t.Errorf("read %q from nothing", got)
	}
	missing := corpus{inputs: []input{{path: filepath.Join(t.TempDir(), "gone.txt")}}}
	if _, err := io.ReadAll(missing.reader()); err == nil || !strings.Contains(err.Error(), "gone.txt") {
		t.Errorf("error %v, want one that names the file", err)
	}
}

func TestEachLine(t *testing.T) {
	var lines []string
	err := eachLine(strings.NewReader("a\r\n\n b c \nlast"), func() error { return nil }, func(line string) error {
		lines = append(lines, line)
		return nil
	})
	if want := []string{"a", "", "b c", "last"}; err != nil || !slices.Equal(lines, want) {
		t.Errorf("lines %q, %v; want %q", lines, err, want)
	}
	long := "ok\n" + strings.Repeat("x", maxLine+1)
	err = eachLine(strings.NewReader(long), func() error { return nil }, func(string) error { return nil })
	if err == nil || !strings.Contains(err.Error(), "standard input:2:") {
		t.Errorf("a line too long gives %v, want an error that names line 2", err)
	}
}

// TestEachLineAnswersAtOnce holds a conversation: each answer must be flushed
// before the next question is asked.
func TestEachLineAnswersAtOnce(t *testing.T) {
	questions, ask := io.Pipe()
	flushed := make(chan []string)
	var pending []string
	go func() {
		flush := func() error {
			if len(pending) > 0 {
				flushed <- pending
				pending = nil
			}
			return nil
		}
		eachLine(questions, flush, func(line string) error {
			pending = append(pending, line)
			return nil
		})
		close(flushed)
	}()
	for _, word := range []string{"one", "two"} {
		if _, err := io.WriteString(ask, word+"\n"); err != nil {
			t.Fatal(err)
		}
		if got := <-flushed; !slices.Equal(got, []string{word}) {
			t.Errorf("answers %q after the question %q", got, word)
		}
	}
	ask.Close()
	for range flushed {
		t.Error("an answer without a question")
	}
}
