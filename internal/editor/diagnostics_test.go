package editor

import (
	"encoding/json"
	"strings"
	"testing"

	"example.org/foulcase"
)

// TestStringsOfJSON holds the strings written here to the reader of the standard
// library.
func TestStringsOfJSON(t *testing.T) {
	for _, s := range []string{"", "ebb", `"\`, "\x00\x1f\t\r\n", "\u00e9\U0001F6A2\u2028", "a\xff\xc3b\xed\xa0\x80"} {
		raw := appendString(nil, s)
		var got string
		if err := json.Unmarshal(raw, &got); err != nil || got != strings.ToValidUTF8(string([]rune(s)), "") {
			t.Errorf("%q: %s, error %v", s, raw, err)
		}
	}
}

func TestWording(t *testing.T) {
	for _, tt := range []struct {
		mark foulcase.Mark
		want string
	}{
		{foulcase.Mark{Observed: "ancher", Kind: foulcase.Nonword, P: .9999, Corrections: forms("anchor")}, `"ancher" is not a word known here: "anchor"? (p 0.99)`},
		{foulcase.Mark{Observed: "birth", Kind: foulcase.Realword, P: .5, Corrections: forms("berth")}, `"birth" is a word, but hardly the one meant: "berth"? (p 0.50)`},
		{foulcase.Mark{Observed: "alot", Kind: foulcase.Runon, P: .98, Corrections: forms("a lot", "also", "allot", "aloft")}, `"alot" seems to lack a space: "a lot", "also" or "allot"? (p 0.98)`},
		{foulcase.Mark{Observed: "with\n  in", Kind: foulcase.Split, P: .8, Corrections: forms("within")}, `"with in" seems to have a space too many: "within"? (p 0.80)`},
		{foulcase.Mark{Observed: "to to", Kind: foulcase.Repeat, P: .97, Corrections: forms("to")}, `"to to" stands there twice: "to"? (p 0.97)`},
		{foulcase.Mark{Observed: "pilotboat", Rule: foulcase.RuleHouse, P: 1, Corrections: forms("pilot boat")}, `"pilotboat" is written "pilot boat" in this house`},
	} {
		if got := wording(tt.mark); got != tt.want {
			t.Errorf("%s, want %s", got, tt.want)
		}
	}
}

func forms(texts ...string) []foulcase.Correction {
	var all []foulcase.Correction
	for _, text := range texts {
		all = append(all, foulcase.Correction{Text: text})
	}
	return all
}

// TestDifference: what is replaced is as little as can be, in whole code points.
func TestDifference(t *testing.T) {
	for _, tt := range []struct {
		old, new   string
		start, end int
		added      string
	}{
		{"ebb", "ebb", 3, 3, ""},
		{"", "ebb", 0, 0, "ebb"},
		{"ebb", "", 0, 3, ""},
		{"the ancher held", "the anchor held", 8, 9, "o"},
		{"aaa", "aaaa", 3, 3, "a"},
		{"x\u00e9y", "x\u00e8y", 1, 3, "\u00e8"}, // the first byte is the same
		{"x\u00e9y", "x\u0129y", 1, 3, "\u0129"}, // the last byte is the same
		{"\u00e9", "\u00e9\u00e8", 2, 2, "\u00e8"},
	} {
		start, end, added := difference([]byte(tt.old), []byte(tt.new))
		if start != tt.start || end != tt.end || string(added) != tt.added {
			t.Errorf("%q to %q: %d, %d, %q", tt.old, tt.new, start, end, added)
		}
	}
}
