package main

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/eval"
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

// The lists that the English model's channel was fitted on are refused, and
// those kept for measuring are not, though they share common slips with them.
func TestDataIsHeldOut(t *testing.T) {
	data := filepath.Join(projectRoot(t), "..", "shared", "data")
	train := func(name string) string { return filepath.Join(data, "train", name) }
	if _, err := os.Stat(train("toefl-spell.tsv")); err != nil {
		t.Skipf("needs the fitting and development data: %v", err)
	}
	model := filepath.Join(t.TempDir(), "english.fcm")
	mustRun(t, "model", "build", "--from", filepath.Join(projectRoot(t), "lm", "english", "english.fcm"), "--fitted", train("wikipedia-common.tsv"),
		"--fitted", train("toefl-spell.tsv"), "--fitted", train("typos-mixed.tsv"), "-o", model)
	e, err := foulcase.OpenFile(model)
	if err != nil {
		t.Fatal(err)
	}
	defer e.Close()
	for _, c := range []struct {
		path    string
		refused bool
	}{
		{train("wikipedia-common.tsv"), true},
		{train("toefl-spell.tsv"), true},
		{train("typos-mixed.tsv"), true},
		{filepath.Join(data, "dev", "wikipedia-common.tsv"), false},
		{filepath.Join(data, "dev", "toefl-spell.tsv"), false},
		{filepath.Join(data, "dev", "birkbeck.tsv"), false},
	} {
		pairs, err := eval.ReadPairs(c.path, bytes.NewReader(readAll(t, c.path)))
		if err != nil {
			t.Fatal(err)
		}
		o := eval.Fitted(e.Fitted).OverlapOf(pairs)
		err = new(evalListFlags).refuseFitted(eval.DataFile{Name: c.path, Overlap: o})
		if (err != nil) != c.refused {
			t.Errorf("%s: fitted on %d of %d: %v", c.path, o.Fitted, o.Of, err)
		}
		t.Logf("%s: fitted on %d of %d, %.1f %%", filepath.Base(c.path), o.Fitted, o.Of, 100*o.Share())
	}
}
