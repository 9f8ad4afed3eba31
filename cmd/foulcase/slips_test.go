package main

import (
	"math/rand/v2"
	"slices"
	"testing"

	"example.org/foulcase/eval"
)

func TestEdits(t *testing.T) {
	forms := slices.Sorted(edits("oué"))
	for _, want := range []string{"ué", "oé", "ou", "uoé", "oéu", "aoué", "ouéz", "oubé", "zué", "oux", "o'é"} {
		if _, ok := slices.BinarySearch(forms, want); !ok {
			t.Errorf("%q is no form one edit away from oué", want)
		}
	}
	for _, not := range []string{"o", "uéo", "ouéab"} {
		if _, ok := slices.BinarySearch(forms, not); ok {
			t.Errorf("%q is more than one edit away from oué", not)
		}
	}
	// 4 places to add one of 27 signs, 3 letters to drop or to replace, 2 to swap.
	if want := 4*27 + 3 + 3*27 + 2; len(forms) != want {
		t.Errorf("%d forms, want %d", len(forms), want)
	}
}

// What is typed for a word of the small model is of the kind that was asked for.
func TestSlipSource(t *testing.T) {
	source, err := openSlipSource(tinyModel(t))
	if err != nil {
		t.Fatal(err)
	}
	defer source.close()
	known := func(word string) bool { _, ok := source.lexicon.ID([]byte(word)); return ok }
	random := rand.New(rand.NewPCG(1, 1))
	for _, kind := range []eval.Kind{eval.Nonword, eval.Realword} {
		drawn := 0
		for range 3000 {
			for _, word := range []string{"harbour", "the", "sheer", "there"} {
				if form := source.mistype(kind, word, random); form != "" {
					drawn++
					if form == word || known(form) != (kind == eval.Realword) {
						t.Fatalf("%s %q for %q", kind, form, word)
					}
				}
			}
		}
		if drawn == 0 {
			t.Errorf("no %s in 12,000 draws", kind)
		}
	}
	if form := source.mistype(eval.Nonword, "zyzzy", random); form != "" {
		t.Errorf("%q for an unknown word", form)
	}
	if got := source.neighbours("shear"); !slices.Equal(got, []string{"sheer"}) {
		t.Errorf("neighbours of shear: %q", got)
	}
}

func TestMixFlag(t *testing.T) {
	m := mix{eval.Nonword: 6}
	if err := m.Set("realword=2.5, repeat=1,split=0"); err != nil {
		t.Fatal(err)
	}
	if got, want := m.String(), "realword=2.5, repeat=1"; got != want {
		t.Errorf("%q, want %q", got, want)
	}
	for _, bad := range []string{"", "nonword", "nonword=", "nonword=-1", "nonword=NaN", "nonword=Inf", "word=1", "nonword=0"} {
		if err := m.Set(bad); err == nil {
			t.Errorf("%q is taken", bad)
		}
	}
}
