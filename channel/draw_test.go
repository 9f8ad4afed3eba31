package channel_test

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"example.org/foulcase/channel"
)

// ways adds up, for every form, the probabilities of all ways to come to it from
// the intended letters with exactly so many edits: the oracle of Draw.
func ways(m *channel.Model, l channel.Symbol, intended []channel.Letter, edits int, typed string, p float64, add func(string, float64)) {
	at := func(i int) channel.Symbol {
		if i < len(intended) {
			return intended[i].Sym
		}
		return channel.Edge
	}
	step := func(letters int, text string, cost float32, used int) {
		next := l
		if letters > 0 {
			next = at(letters - 1)
		}
		if used <= edits {
			ways(m, next, intended[letters:], edits-used, typed+text, p*math.Exp(-float64(cost)), add)
		}
	}
	for x := channel.Symbol(1); x <= channel.Other; x++ {
		step(0, string(x.Rune()), m.Insert(x, l, at(0)), 1)
	}
	if len(intended) == 0 {
		if edits == 0 {
			add(typed, p*math.Exp(-float64(m.Stop(l))))
		}
		return
	}
	c := intended[0]
	step(1, string(c.Rune), m.Emit(c, l, c, at(1)), 0)
	step(1, "", m.Drop(l, c.Sym, at(1)), 1)
	for x := channel.Symbol(1); x <= channel.Other; x++ {
		if x != c.Sym {
			step(1, string(x.Rune()), m.Emit(channel.Letter{Sym: x}, l, c, at(1)), 1)
		}
	}
	if len(intended) > 1 && at(1) != c.Sym {
		step(2, string(intended[1].Rune)+string(c.Rune), m.Swap(c.Sym, at(1)), 1)
	}
	for _, r := range m.Rules() {
		n := int(r.NIntended)
		if n > len(intended) || !r.Fits(l, at(n)) {
			continue
		}
		same, text := true, ""
		for j := range n {
			same = same && r.Intended[j] == at(j)
		}
		for _, x := range r.Observed[:r.NObserved] {
			text += string(x.Rune())
		}
		if same {
			step(n, text, r.Cost, 1)
		}
	}
}

// TestDrawFollowsTheModel draws many forms of short words and holds how often
// each comes to what it weighs. Five standard deviations are allowed.
func TestDrawFollowsTheModel(t *testing.T) {
	m := fitSlips(t)
	const draws = 10000
	for _, intended := range []string{"on", "ph", "t'"} {
		want, all := map[string]float64{}, 0.0
		for edits := 1; edits <= 3; edits++ {
			ways(m, channel.Edge, channel.AppendLetters(nil, []byte(intended)), edits, "", 1, func(form string, p float64) {
				if form != intended {
					want[form] += p
					all += p
				}
			})
		}
		got := map[string]float64{}
		random := rand.New(rand.NewPCG(1, 2))
		for range draws {
			got[string(m.Draw(nil, []byte(intended), random))]++
		}
		frequent := 0
		for form, n := range got {
			p := want[form] / all
			if p == 0 {
				t.Fatalf("%q drawn for %q cannot come from it", form, intended)
			}
			if deviation := math.Sqrt(draws * p * (1 - p)); math.Abs(n-draws*p) > 5*deviation+3 {
				t.Errorf("%q drawn for %q %.0f times, want %.0f ± %.0f", form, intended, n, draws*p, deviation)
			}
			if p > .01 {
				frequent++
				if best := math.Exp(-m.Cost(form, intended)); want[form] < best*(1-1e-6) {
					t.Errorf("%q for %q weighs %g in all, and its best way %g", form, intended, want[form], best)
				}
			}
		}
		if frequent < 5 {
			t.Errorf("%q has only %d frequent forms", intended, frequent)
		}
	}
}

func TestDraw(t *testing.T) {
	m := fitSlips(t)
	random := rand.New(rand.NewPCG(3, 4))
	for _, intended := range []string{"station", "harbour", "café", "well-found", "don't", "a"} {
		for range 200 {
			form := m.Draw([]byte("> "), []byte(intended), random)
			if string(form[:2]) != "> " || string(form[2:]) == intended {
				t.Fatalf("%q drawn for %q", form, intended)
			}
		}
	}
	if form := m.Draw(nil, nil, random); len(form) > 0 {
		t.Errorf("%q drawn for no word", form)
	}
	long := strings.Repeat("tide", 5000)
	if form := string(m.Draw(nil, []byte(long), random)); form == long || form != "" && math.Abs(float64(len(form)-len(long))) > 12 {
		t.Errorf("%d bytes drawn for a word of %d", len(form), len(long))
	}
	draw := func() (forms string) {
		random := rand.New(rand.NewPCG(5, 6))
		for range 20 {
			forms += string(m.Draw(nil, []byte("mooring"), random)) + " "
		}
		return forms
	}
	if a, b := draw(), draw(); a != b {
		t.Errorf("one seed, two outcomes:\n%s\n%s", a, b)
	}
}

func BenchmarkDraw(b *testing.B) {
	m := fitSlips(b)
	random := rand.New(rand.NewPCG(1, 1))
	var form []byte
	for b.Loop() {
		form = m.Draw(form[:0], []byte("maintenance"), random)
	}
}
