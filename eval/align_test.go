package eval

import (
	"math/rand/v2"
	"strings"
	"testing"
)

// The steps found cost what the cheapest of all ways costs, though equal ends
// are cut off before the table is filled.
func TestAlignmentIsCheapest(t *testing.T) {
	r := rand.New(rand.NewPCG(6, 6))
	words := strings.Fields("a an the in to into with within out without lot alot The , . - pilot pilots")
	draw := func() []token {
		var s []string
		for range r.IntN(6) {
			s = append(s, words[r.IntN(len(words))])
		}
		return tokenize(strings.Join(s, " "))
	}
	for range 3000 {
		a, b := draw(), draw()
		got := 0.0
		for _, e := range align(a, b) {
			got += editCost(t, a[e.i:e.i2], b[e.j:e.j2])
		}
		if want := cheapest(t, a, b); got > want+1e-9 || got < want-1e-9 {
			t.Fatalf("%v\n%v\ncost %v, cheapest %v, edits %v", a, b, got, want, align(a, b))
		}
	}
}

// cheapest tries every way of taking tokens off the front.
func cheapest(t *testing.T, a, b []token) float64 {
	if len(a)+len(b) == 0 {
		return 0
	}
	best := 1e9
	for p := range min(len(a), 3) + 1 {
		for q := range min(len(b), 3) + 1 {
			if allowed(a[:p], b[:q]) {
				best = min(best, editCost(t, a[:p], b[:q])+cheapest(t, a[p:], b[q:]))
			}
		}
	}
	return best
}

func allowed(a, b []token) bool {
	ok := len(a)+len(b) == 1
	if len(a) == 1 && len(b) == 1 {
		_, ok = substitution(&a[0], &b[0])
	} else if len(a) > 0 && len(b) > 0 && len(a)*len(b) <= 4 {
		_, ok = movedSpace(a, b)
	}
	return ok
}

func editCost(t *testing.T, a, b []token) float64 {
	t.Helper()
	if !allowed(a, b) {
		t.Fatalf("%v for %v is no edit", b, a)
	}
	switch {
	case len(a)+len(b) == 1:
		return costGap
	case len(a) == 1 && len(b) == 1:
		cost, _ := substitution(&a[0], &b[0])
		return cost
	}
	cost, _ := movedSpace(a, b)
	return cost
}

// Texts too long for the table are one edit, not an afternoon.
func TestAlignmentIsBounded(t *testing.T) {
	a := tokenize(strings.Repeat("ebb ", 3000))
	b := tokenize(strings.Repeat("flood ", 3000))
	if got := align(a, b); len(got) != 1 || got[0] != (edit{0, 3000, 0, 3000}) {
		t.Errorf("%d edits, the first %v", len(got), got[0])
	}
	s := Sentence{Source: strings.Repeat("ebb ", 3000), References: []string{strings.Repeat("flood ", 3000)}}
	for _, span := range Gold(s, func(string) bool { return false }).Spans {
		if !span.Neutral {
			t.Fatalf("an error where nothing could be aligned: %+v", span)
		}
	}
}

func TestTokens(t *testing.T) {
	for text, want := range map[string]string{
		"":                            "",
		"The pilot's dogs' well-kept": "The|pilot's|dogs|'|well|-|kept",
		"'tis o'clock rock'n'roll":    "'tis|o'clock|rock'n'roll",
		"do n't , what 's it’s":       "don't|,|what's|it’s",
		"a 's' 6 'm":                  "a's|'|6|'m",
		"3.14 1,000 x--y":             "3|.|14|1|,|000|x|-|-|y",
		"na\u0308ive \xff é":          "na\u0308ive|\xff|é",
	} {
		var got []string
		for _, tok := range tokenize(text) {
			got = append(got, tok.text)
		}
		if s := strings.Join(got, "|"); s != want {
			t.Errorf("%q: %s, want %s", text, s, want)
		}
	}
	if n := Words("Moor at 6 , we do n't wait ."); n != 5 {
		t.Errorf("%d words, want 5", n)
	}
}
