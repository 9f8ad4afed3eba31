package text_test

import (
	"slices"
	"strings"
	"testing"
	"unicode"

	"golang.org/x/text/unicode/norm"

	"example.org/foulcase/internal/text"
)

func fold(s string) string { return string(text.Fold(nil, []byte(s))) }

func TestFold(t *testing.T) {
	for in, want := range map[string]string{
		"":                     "",
		"Berth":                "berth",
		"DON\u2019T":           "don't",
		"\u2018Tis":            "'tis",
		"don`t":                "don't",
		"Cafe\u0301":           "caf\u00E9",
		"CAF\u00C9":            "caf\u00E9",
		"co\u00ADop\u200B":     "coop\u200B",
		"co\u00ADop\u200D":     "coop",
		"e\u00AD\u0301":        "\u00E9",
		"well\u2011known":      "well-known",
		"\uFB01nal \uFB04":     "final ffl",
		"\u0130":               "i\u0307",
		"\u212Angstr\u00F6m":   "kngstr\u00F6m",
		"\u212B":               "\u00E5",
		"a\xffB":               "a\xffb",
		"stra\u00DFe \u01C5un": "stra\u00DFe \u01C6un",
	} {
		if got := fold(in); got != want {
			t.Errorf("Fold(%q) = %q, want %q", in, got, want)
		}
	}
	if got := string(text.Fold([]byte("e"), []byte("\u0301X"))); got != "e\u0301x" {
		t.Errorf("Fold changed what stood before: %q", got)
	}
}

// TestFoldAllRunes checks every code point, alone and with a combining mark
// after it: the fold is idempotent and the same for NFC and NFD.
func TestFoldAllRunes(t *testing.T) {
	for r := rune(0); r <= unicode.MaxRune; r++ {
		if !unicode.IsGraphic(r) && !unicode.Is(unicode.Cf, r) || unicode.In(r, unicode.Han, unicode.Hangul) {
			continue
		}
		for _, s := range []string{string(r), "a" + string(r), string(r) + "\u0301"} {
			want := fold(s)
			if got := fold(want); got != want {
				t.Fatalf("%U: Fold(%q) = %q", r, want, got)
			}
			if got := fold(norm.NFC.String(s)); got != want {
				t.Fatalf("%U: NFC folds to %q, %q to %q", r, got, s, want)
			}
			if got := fold(norm.NFD.String(s)); got != want {
				t.Fatalf("%U: NFD folds to %q, %q to %q", r, got, s, want)
			}
		}
	}
}

func TestCaseOf(t *testing.T) {
	for want, words := range map[text.Case][]string{
		text.NoCase: {"", "42", "'", "\u6E2F"},
		text.Lower:  {"berth", "'tis", "don't", "x", "\u00E9t\u00E9", "e\u0301"},
		text.Title:  {"Berth", "A", "'Tis", "\u00C9t\u00E9", "E\u0301te", "I'm", "\u01C5un"},
		text.Upper:  {"BERTH", "DON'T", "\u00C9T\u00C9", "NASA"},
		text.Mixed:  {"iPhone", "McDonald", "O'Neill", "PCs", "eE"},
	} {
		for _, w := range words {
			if got := text.CaseOf([]byte(w)); got != want {
				t.Errorf("CaseOf(%q) = %v, want %v", w, got, want)
			}
		}
	}
}

func TestApplyCase(t *testing.T) {
	for _, c := range []struct {
		pattern    text.Case
		form, want string
	}{
		{text.Lower, "berth", "berth"},
		{text.Lower, "London", "London"},
		{text.Title, "berth", "Berth"},
		{text.Title, "'tis", "'Tis"},
		{text.Title, "\u00E9t\u00E9", "\u00C9t\u00E9"},
		{text.Title, "iPhone", "iPhone"},
		{text.Title, "7", "7"},
		{text.Title, "", ""},
		{text.Upper, "McDonald's", "MCDONALD'S"},
		{text.Mixed, "berth", "berth"},
		{text.NoCase, "berth", "berth"},
	} {
		if got := text.ApplyCase(c.pattern, c.form); got != c.want {
			t.Errorf("ApplyCase(%v, %q) = %q, want %q", c.pattern, c.form, got, c.want)
		}
	}
}

// TestComposedAndDecomposed: text in NFC and in NFD has the same tokens.
func TestComposedAndDecomposed(t *testing.T) {
	for _, s := range []string{
		"La na\u00EFve caf\u00E9 \u00C9COLE \u00C9t\u00E9 \u00E0 Z\u00FCrich\u2019s \u0178 \u00D8re d\u2019\u00C9ole McD\u00FCnn \u00C9A \u00E9",
		"L\u2019\u00C5ngstr\u00F6m \u01D5b \u1EA4n \u1EC7 co\u00ADop\u00E9ra 5 \u00E9 \u00E9-mail J. \u00C9. Brook",
	} {
		c, d := norm.NFC.String(s), norm.NFD.String(s)
		if c == d {
			t.Fatalf("%q has no decomposition", s)
		}
		if a, b := norms(c), norms(d); !slices.Equal(a, b) {
			t.Errorf("normal forms\n%q\n%q", a, b)
		}
		if a, b := sentences(c), sentences(d); norm.NFC.String(strings.Join(b, "|")) != strings.Join(a, "|") {
			t.Errorf("tokens\n%q\n%q", a, b)
		}
	}
}

func TestNorms(t *testing.T) {
	got := norms("Dog\u2019s GitHub x 5kg NASA U.S. J. Brook foo_bar, (caf\u00E9) U.N.'s")
	want := []string{"dog's", "github", "x", "", "nasa", "u.s", "j", "brook", "", "", "", "caf\u00E9", "", "u.n.'s"}
	if !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}
