package eval_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.org/foulcase/eval"
)

// The figures were worked out by hand: of two bins of equal width the first
// holds .1 .2 .3 with one right, |.2 - 1/3| = 2/15, the second .6 .8 .9 with two
// right, |23/30 - 2/3| = 1/10; of three bins of equal count the pairs .1 .2,
// .3 .6 and .8 .9 have one right each, |.15 - .5|, |.45 - .5| and |.85 - .5|.
func TestCalibrationErrorByHand(t *testing.T) {
	p := []float64{.9, .1, .3, .6, .2, .8}
	right := []bool{false, false, false, true, true, true}
	if got, want := eval.CalibrationError(p, right, 2), (3*2./15+3*.1)/6; math.Abs(got-want) > 1e-12 {
		t.Errorf("equal width: %v, want %v", got, want)
	}
	bins := eval.EqualCountBins(p, right, 3)
	if got, want := eval.BinnedError(bins), (.35+.05+.35)/3; math.Abs(got-want) > 1e-12 {
		t.Errorf("equal count: %v, want %v", got, want)
	}
	if len(bins) != 3 || bins[1].Low != .2 || bins[1].High != .6 || bins[1].N != 2 {
		t.Errorf("bins %+v", bins)
	}
	if got := eval.CalibrationError(nil, nil, 10); !math.IsNaN(got) {
		t.Errorf("of nothing: %v", got)
	}
}

func TestBins(t *testing.T) {
	right := make([]bool, 7)
	width := eval.EqualWidthBins([]float64{0, .1, .100001, .5, .99, 1, 1}, right, 10)
	var counts []int
	for _, b := range width {
		counts = append(counts, b.N)
	}
	want := []int{2, 1, 1, 3} // a bin takes its upper edge, and 0 is in the first
	if len(counts) != len(want) {
		t.Fatalf("bins %+v", width)
	}
	for i := range want {
		if counts[i] != want[i] {
			t.Fatalf("bins %+v, want counts %v", width, want)
		}
	}
	// What is equal stays together, so the order of the predictions is no matter.
	same := eval.EqualCountBins([]float64{.5, .5, .5, .5, .5, .5, .9}, []bool{true, false, true, false, true, false, true}, 3)
	if len(same) != 2 || same[0].N != 6 || same[1].N != 1 {
		t.Errorf("bins %+v", same)
	}
}

// Where p tells the truth the error is what chance makes of it; where every p is
// a tenth too high it is a tenth.
func TestCalibrationErrorOfDraws(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 2))
	var p, high []float64
	var right []bool
	for range 20000 {
		x := .9 * random.Float64()
		p = append(p, x)
		high = append(high, x+.1)
		right = append(right, random.Float64() < x)
	}
	if got := eval.CalibrationError(p, right, 10); got > .015 {
		t.Errorf("true probabilities: %v", got)
	}
	if got := eval.CalibrationError(high, right, 10); math.Abs(got-.1) > .01 {
		t.Errorf("a tenth too high: %v", got)
	}
}

// The metric is the function on the predictions of a class.
func TestCalibrationMetric(t *testing.T) {
	flag := func(start int, kind eval.Kind, p float64) eval.Flag {
		return eval.Flag{Start: start, End: start + 4, Kind: kind, P: p, Corrections: []string{"buoy"}}
	}
	items := []eval.Item{
		{Line: 1, Source: "bouy bouy bouy", Spans: []eval.Span{{Start: 0, End: 4, Kind: eval.Nonword, Corrections: []string{"buoy"}}}},
		{Line: 2, Source: "tied tied tied", Spans: []eval.Span{{Start: 5, End: 9, Neutral: true}}},
	}
	held := flag(10, eval.Realword, .3)
	held.Held = true
	j, err := eval.JudgeAll(items, [][]eval.Flag{
		{flag(0, eval.Nonword, .9), flag(5, eval.Nonword, .95)},
		{flag(0, eval.Realword, .6), flag(5, eval.Realword, .8), held}, // the second is neither right nor wrong
	})
	if err != nil {
		t.Fatal(err)
	}
	metrics := j.Calibration(eval.Resampling{Resamples: 50})
	for i, want := range []struct {
		class eval.Kind
		value float64
		n     float64
	}{
		{"", (.1 + .95 + .6 + .3) / 4, 4}, // .9 belongs to the ninth bin and .95 to the tenth
		{eval.Nonword, (.1 + .95) / 2, 2},
		{eval.Realword, (.6 + .3) / 2, 2},
	} {
		m := metrics[i]
		p, right := eval.Predictions(j.Places, want.class)
		if m.Name != "calibration.error" || m.Class != string(want.class) || math.Abs(float64(m.Value)-want.value) > 1e-12 || m.N != want.n {
			t.Errorf("%+v, want %+v", m, want)
		}
		if got := eval.CalibrationError(p, right, 10); math.Abs(got-want.value) > 1e-12 {
			t.Errorf("%q: the function gives %v, want %v", want.class, got, want.value)
		}
	}
	// What is held back is left out of the second metric.
	for i, want := range []struct {
		class eval.Kind
		value float64
		n     float64
	}{{"", (.1 + .95 + .6) / 3, 3}, {eval.Nonword, (.1 + .95) / 2, 2}, {eval.Realword, .6, 1}} {
		if m := metrics[3+i]; m.Name != "calibration.reported" || m.Class != string(want.class) || math.Abs(float64(m.Value)-want.value) > 1e-12 || m.N != want.n {
			t.Errorf("%+v, want %+v", m, want)
		}
	}
}
