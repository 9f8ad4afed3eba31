package eval_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.org/foulcase/eval"
)

// Worked by hand: (|25-15|-1)^2/40 = 2.025 and (|11-1|-1)^2/12 = 6.75; the exact
// p of 11/1 is 2(1+12)/2^12. The p values are the project's reference values.
func TestMcNemarValues(t *testing.T) {
	for _, c := range []struct {
		a, b          int
		chi, p, exact float64
	}{
		{25, 15, 2.025, .1547, .1539},
		{15, 25, 2.025, .1547, .1539},
		{11, 1, 6.75, .0094, .00635},
		{0, 0, 0, 1, 1},
		{4, 4, 0, 1, 1},
		{0, 5, 3.2, .0736, 2. / 32},
	} {
		m := eval.McNemarTest(c.a, c.b)
		if math.Abs(m.ChiSquared-c.chi) > 1e-9 || math.Abs(m.P-c.p) > 5e-5 || math.Abs(m.Exact-c.exact) > 5e-5 {
			t.Errorf("%d/%d: %+v, want %v, %v, %v", c.a, c.b, m, c.chi, c.p, c.exact)
		}
	}
	if m := eval.McNemarTest(60000, 61000); !(m.Exact > 0 && math.Abs(m.Exact-m.P) < 1e-4) {
		t.Errorf("with many items the two ways must agree: %+v", m)
	}
}

func TestCompareOutcomes(t *testing.T) {
	a := []bool{true, true, false, false, true, false}
	b := []bool{true, false, true, false, false, false}
	if m := eval.CompareOutcomes(a, b); m.OnlyA != 2 || m.OnlyB != 1 {
		t.Errorf("%+v", m)
	}
}

// means is the metric of two systems' scores an item.
func means(a, b []float64) func([]int) (x, y []float64) {
	return func(sample []int) ([]float64, []float64) {
		x, y := 0., 0.
		for _, i := range sample {
			x += a[i]
			y += b[i]
		}
		return []float64{x / float64(len(sample))}, []float64{y / float64(len(sample))}
	}
}

func TestPairedBootstrap(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 1))
	n := 300
	a, better, noise := make([]float64, n), make([]float64, n), make([]float64, n)
	for i := range a {
		a[i] = r.Float64()
		better[i] = a[i] + .02 + .1*r.NormFloat64()
		noise[i] = a[i] + .1*r.NormFloat64()
	}
	for _, c := range []struct {
		about     string
		b         []float64
		low, high float64 // what Better must lie between
	}{
		{"itself", a, 0, 0},
		{"better by a fifth of its spread", better, .98, 1},
		{"noise", noise, .02, .98},
	} {
		p := eval.PairedBootstrap(n, means(a, c.b), eval.Resampling{})[0]
		if p.Resamples != 1000 || p.Better < c.low || p.Better > c.high || p.Low > p.Difference || p.High < p.Difference {
			t.Errorf("%s: %+v", c.about, p)
		}
		if again := eval.PairedBootstrap(n, means(a, c.b), eval.Resampling{})[0]; again != p {
			t.Errorf("%s: %+v, then %+v", c.about, p, again)
		}
	}
}

// Of many experiments, about 95 in 100 have the true accuracy in the interval,
// and all have the measured one.
func TestIntervalCoverage(t *testing.T) {
	r := rand.New(rand.NewPCG(9, 5))
	const truth, pairsEach, experiments = .7, 150, 200
	covered := 0
	for seed := range uint64(experiments) {
		var pairs []eval.Pair
		var rankings []eval.Ranking
		for range pairsEach {
			pairs = append(pairs, eval.Pair{Observed: "bouy", Intended: "buoy"})
			answer := "boy"
			if r.Float64() < truth {
				answer = "buoy"
			}
			rankings = append(rankings, eval.Ranking{Word: "bouy", Candidates: []string{answer}})
		}
		report, err := eval.ScoreList(pairs, rankings, nil, eval.Resampling{Resamples: 200, Seed: seed})
		if err != nil {
			t.Fatal(err)
		}
		m, _ := report.Metric("accuracy@1", "")
		if m.Low > m.Value || m.Value > m.High {
			t.Fatalf("%v is not in [%v, %v]", m.Value, m.Low, m.High)
		}
		if m.Low <= truth && truth <= m.High {
			covered++
		}
	}
	if covered < experiments*88/100 || covered == experiments {
		t.Errorf("%d of %d intervals hold the truth", covered, experiments)
	}
}
