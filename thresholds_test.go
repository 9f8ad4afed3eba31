package foulcase

import (
	"math/rand/v2"
	"slices"
	"testing"
)

// doubts draws n probabilities in [least, most).
func doubts(random *rand.Rand, n int, least, most float64) []float64 {
	p := make([]float64, n)
	for i := range p {
		p[i] = least + (most-least)*random.Float64()
	}
	return p
}

func TestLeastOfAsksNoMoreForALargerBudget(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	held := 0
	for range 300 {
		p := doubts(random, random.IntN(80), random.Float64()*.5, 1)
		words := 1 + random.IntN(4000)
		before := 1.0
		for _, budget := range budgets {
			th := thresholds{budget: budget}
			least := th.leastOf(words, slices.Clone(p))
			if least > before {
				t.Fatalf("budget %v asks for %v, a smaller one for %v", budget, least, before)
			}
			if more := th.leastOf(2*words, slices.Clone(p)); more > least {
				t.Fatalf("twice the words ask for %v, once for %v", more, least)
			}
			if least > 0 {
				held++
			}
			before = least
		}
	}
	if held < 100 {
		t.Errorf("%d cases held by a budget: too few to tell", held)
	}
}

func TestLeastOfSparesRightFindings(t *testing.T) {
	random := rand.New(rand.NewPCG(2, 2))
	for _, n := range []int{0, 1, 40, 5000} {
		th := thresholds{budget: .1}
		if least := th.leastOf(50, doubts(random, n, .97, 1)); least != 0 {
			t.Errorf("%d findings, all but surely right, are cut under %v", n, least)
		}
	}
}

// TestLeastOfHoldsDoubtfulFindings counts what the findings over the floor are
// expected to be: no more false ones than granted, and the next would be too many.
func TestLeastOfHoldsDoubtfulFindings(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 2))
	for _, c := range []struct {
		words  int
		budget float64
	}{{1000, 5}, {10000, 1}, {400, 10}, {300, .1}} {
		p := doubts(random, 400, .1, .6)
		th := thresholds{budget: c.budget}
		least := th.leastOf(c.words, p)
		granted := c.budget*float64(c.words)/1000 + spareFalse
		charged := func(floor float64) (sum float64) {
			for _, v := range p {
				if v >= floor {
					sum += (1 - v) - falsePerRight*v
				}
			}
			return sum
		}
		slices.Sort(p)
		at, _ := slices.BinarySearch(p, least)
		if at == 0 || at == len(p) {
			t.Fatalf("budget %v in %d words: all or none of 400 doubtful findings are kept, from %v", c.budget, c.words, least)
		}
		if charged(least) > granted {
			t.Errorf("budget %v in %d words: %v false alarms are kept, %v granted", c.budget, c.words, charged(least), granted)
		}
		if charged(p[at-1]) <= granted {
			t.Errorf("budget %v in %d words: one more would be no more than the %v granted", c.budget, c.words, granted)
		}
	}
}

func TestGradesRiseWithP(t *testing.T) {
	e := &Engine{judgement: &Judgement{
		Budgets:       []BudgetRow{{1, KindTable{.9, .8, .7, .6, .5}}, {10, KindTable{.3, .2, .3, .1, .4}}},
		DefaultBudget: 10, MarkShare: .1, LeastP: .15,
	}}
	th := e.thresholdsFor(0)
	rank := map[Grade]int{GradeDoubt: 0, GradeQuery: 1, GradeMark: 2}
	for _, k := range Kinds() {
		before, seen := 0, map[Grade]bool{}
		for p := 0.0; p <= 1; p += 1. / 512 {
			g := th.grade(k, p)
			if rank[g] < before {
				t.Errorf("%v: p %v is a %v, a smaller one more", k, p, g)
			}
			before, seen[g] = rank[g], true
		}
		if len(seen) != 3 {
			t.Errorf("%v: grades %v, want all three", k, seen)
		}
	}
	for k, want := range map[Kind]float64{Nonword: .3, Split: .15} {
		if th.grade(k, want) != GradeQuery || th.grade(k, want-1e-9) != GradeDoubt {
			t.Errorf("%v: want a query from %v", k, want)
		}
	}
	if th.grade(Realword, .8) != GradeMark || th.grade(Realword, .8-1e-9) != GradeQuery {
		t.Error("realword: want a mark from .8")
	}
}
