package lexicon_test

import (
	"testing"

	"example.org/foulcase/candidates/lexicon"
)

func TestSpellingVariants(t *testing.T) {
	tests := []struct {
		a, b string
		want bool
	}{
		{"colour", "color", true},
		{"neighbourhood", "neighborhood", true},
		{"favourites", "favorites", true},
		{"behaviours", "behaviors", true},
		{"organise", "organize", true},
		{"organisations", "organizations", true},
		{"analysing", "analyzing", true},
		{"colourised", "colorized", true},
		{"centre", "center", true},
		{"centred", "centered", true},
		{"kilometres", "kilometers", true},
		{"theatre", "theater", true},
		{"travelled", "traveled", true},
		{"counsellors", "counselors", true},
		{"marvellous", "marvelous", true},
		{"fulfil", "fulfill", true},
		{"skilful", "skillful", true},
		{"instalment", "installment", true},
		{"catalogue", "catalog", true},
		{"dialogues", "dialogs", true},
		{"encyclopaedia", "encyclopedia", true},
		{"foetus", "fetus", true},
		{"manoeuvre", "maneuver", true},
		{"defence", "defense", true},
		{"licence", "license", true},
		{"practised", "practiced", true},
		{"programme", "program", true},
		{"judgement", "judgment", true},
		{"ageing", "aging", true},
		{"mouldy", "moldy", true},
		{"ploughs", "plows", true},
		{"sceptical", "skeptical", true},
		{"greyish", "grayish", true},
		{"focussed", "focused", true},
		{"worshipping", "worshiping", true},

		{"colour", "colour", false},
		{"quay", "key", false},
		{"berth", "birth", false},
		{"pier", "peer", false},
		{"four", "for", false},
		{"rates", "rate", false},
		{"hoping", "hopping", false},
		{"our", "or", false},
		{"wise", "wize", false},
		{"their", "there", false},
		{"tower", "towre", false},
		{"ball", "bale", false},
	}
	for _, tt := range tests {
		if got := lexicon.SpellingVariants(tt.a, tt.b); got != tt.want {
			t.Errorf("SpellingVariants(%q, %q) = %v", tt.a, tt.b, got)
		}
		if got := lexicon.SpellingVariants(tt.b, tt.a); got != tt.want {
			t.Errorf("SpellingVariants(%q, %q) = %v", tt.b, tt.a, got)
		}
	}
}

// TestVariants has pairs that only the word lists can tell apart.
func TestVariants(t *testing.T) {
	varieties := map[string]lexicon.Variety{
		"filing": lexicon.Both, "filling": lexicon.Both,
		"prise": lexicon.Both, "prize": lexicon.Both,
		"traveled": lexicon.US, "travelled": lexicon.Both,
		"colour": lexicon.GB, "color": lexicon.US,
		"judgement": lexicon.Both, "judgment": lexicon.Both,
		"catalog": lexicon.Both, "catalogue": lexicon.Both,
		"cancelled": lexicon.Both, "canceled": lexicon.Both,
		"berth": lexicon.GB, "birth": lexicon.US,
	}
	var b lexicon.Builder
	for form, v := range varieties {
		b.Add(form, lexicon.Entry{Variety: v, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true}, "")
	}
	section, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	l, err := lexicon.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	tests := []struct {
		a, b string
		want bool
	}{
		{"filing", "filling", false},
		{"prise", "prize", false},
		{"berth", "birth", false},
		{"traveled", "travelled", true},
		{"colour", "color", true},
		{"judgement", "judgment", true},
		{"catalog", "catalogue", true},
		{"cancelled", "canceled", true},
		{"colour", "colour", false},
	}
	for _, tt := range tests {
		a, _ := l.ID([]byte(tt.a))
		b, _ := l.ID([]byte(tt.b))
		if got := l.Variants(a, b); got != tt.want || l.Variants(b, a) != tt.want {
			t.Errorf("Variants(%s, %s) = %v", tt.a, tt.b, got)
		}
	}
	if l.Variants(0, uint32(l.Len())) {
		t.Error("a class is a variant of a form")
	}
}
