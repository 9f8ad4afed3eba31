package main

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/internal/modelfile"
)

// A model made before fitted pairs were noted says so; --fitted notes them and
// changes nothing else.
func TestFittedIsNotedLater(t *testing.T) {
	whole, dir := tinyModel(t), t.TempDir()
	old, noted := filepath.Join(dir, "old.fcm"), filepath.Join(dir, "noted.fcm")
	pairs := filepath.Join(projectRoot(t), "testdata", "tiny", "pairs.tsv")
	copyWithout(t, whole, foulcase.SectionFitted, old)

	if out := mustRun(t, "eval", "list", "--model", old, pairs); !strings.Contains(out, "\nthe model does not say what it was fitted on\n") {
		t.Errorf("an old model measures without a word:\n%s", out)
	}
	mustRun(t, "model", "build", "--from", old, "--fitted", pairs, "-o", noted)
	if !bytes.Equal(readAll(t, noted), readAll(t, whole)) {
		t.Error("a model with the pairs noted later is another than one that noted them at once")
	}
	// The channel of an old model does not inherit what another was fitted on.
	mixed := filepath.Join(dir, "mixed.fcm")
	mustRun(t, "model", "build", "--from", whole, "--from", old, "-o", mixed)
	if !bytes.Equal(readAll(t, mixed), readAll(t, old)) {
		t.Error("a channel taken over has another's fitted pairs")
	}
}

// copyWithout copies a model less one section.
func copyWithout(t *testing.T, from, section, to string) {
	t.Helper()
	file, err := modelfile.OpenPath(from)
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	w := modelfile.NewWriter()
	for _, name := range file.Names() {
		if body, _ := file.Section(name); name != section {
			if err := w.Set(name, body); err != nil {
				t.Fatal(err)
			}
		}
	}
	if err := w.WriteFile(to); err != nil {
		t.Fatal(err)
	}
}

func readAll(t *testing.T, path string) []byte {
	t.Helper()
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	return data
}
