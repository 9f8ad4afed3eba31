package foulcase_test

import (
	"errors"
	"path/filepath"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/channel"
	"example.org/foulcase/internal/modelfile"
	"example.org/foulcase/lm/english"
)

// withFitted opens the English model with a section of fitted pairs, or with
// none.
func withFitted(t *testing.T, section []byte) (*foulcase.Engine, error) {
	t.Helper()
	whole, err := modelfile.Open(english.Model())
	if err != nil {
		t.Fatal(err)
	}
	w := modelfile.NewWriter()
	for _, name := range whole.Names() {
		body, _ := whole.Section(name)
		if name == foulcase.SectionFitted {
			continue
		}
		if err := w.Set(name, body); err != nil {
			t.Fatal(err)
		}
	}
	if section != nil {
		if err := w.Set(foulcase.SectionFitted, section); err != nil {
			t.Fatal(err)
		}
	}
	path := filepath.Join(t.TempDir(), "fitted.fcm")
	if err := w.WriteFile(path); err != nil {
		t.Fatal(err)
	}
	e, err := foulcase.OpenFile(path)
	if err == nil {
		t.Cleanup(func() { e.Close() })
	}
	return e, err
}

func TestFitted(t *testing.T) {
	e, err := withFitted(t, channel.FittedSection([]channel.Pair{{Observed: "ancher", Intended: "anchor"}}))
	if err != nil {
		t.Fatal(err)
	}
	if seen, recorded := e.Fitted("Ancher", "Anchor"); !seen || !recorded {
		t.Errorf("the fitted pair: seen %v, recorded %v", seen, recorded)
	}
	if seen, recorded := e.Fitted("harbur", "harbour"); seen || !recorded {
		t.Errorf("another pair: seen %v, recorded %v", seen, recorded)
	}
	old, err := withFitted(t, nil)
	if err != nil {
		t.Fatal(err)
	}
	if seen, recorded := old.Fitted("ancher", "anchor"); seen || recorded {
		t.Errorf("a model that does not say: seen %v, recorded %v", seen, recorded)
	}
	if _, err := withFitted(t, []byte("fcfp")); !errors.Is(err, channel.ErrFitted) {
		t.Errorf("a section cut short: %v", err)
	}
}
