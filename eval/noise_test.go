package eval_test

import (
	"math"
	"testing"

	"example.org/foulcase/eval"
)

// Ten words, one of them a slip; the figures are counted by hand.
func TestScoreNoise(t *testing.T) {
	items := []eval.Item{{
		Line: 1, Source: "The pilots borded the launch and then the tied turned.",
		Spans: []eval.Span{{Start: 11, End: 17, Kind: eval.Nonword, Corrections: []string{"boarded"}}},
	}}
	flags := [][]eval.Flag{{
		{Start: 0, End: 3, Observed: "The", Kind: eval.Realword, Grade: "query", P: .2, Corrections: []string{"the"}},
		{Start: 11, End: 17, Observed: "borded", Kind: eval.Nonword, Grade: "mark", P: .9, Corrections: []string{"boarded"}},
		{Start: 33, End: 41, Observed: "then the", Kind: eval.Repeat, Grade: "query", P: .1},
		{Start: 42, End: 46, Observed: "tied", Kind: eval.Realword, Grade: "mark", P: .8, Corrections: []string{"tide"}},
		{Start: 47, End: 53, Observed: "turned", Kind: eval.Realword, Grade: "mark", P: .05, Corrections: []string{"turn"}, Held: true},
	}}
	j, err := eval.JudgeAll(items, flags)
	if err != nil {
		t.Fatal(err)
	}
	report := j.ScoreNoise(eval.Resampling{Resamples: 20})
	if report.Task != eval.TaskNoise || report.Words != 10 {
		t.Errorf("%+v", report)
	}
	for _, want := range []struct {
		name, class string
		value       float64
	}{
		{"correction.recall", "nonword", 1},
		{"good.flagged", "", 1000 * 4. / 9},
		{"good.flagged", "repeat", 1000 * 2. / 9},
		{"good.flagged", "mark", 1000 * 1. / 9},
		{"harmed", "", 1000 * 1. / 9}, // "the" for "The" changes no word
		{"harmed", "mark", 1000 * 1. / 9},
		{"harmed", "nonword", 0},
		{"calibration.error", "nonword", .1},
	} {
		m, ok := report.Metric(want.name, want.class)
		if !ok || math.Abs(float64(m.Value)-want.value) > 1e-9 {
			t.Errorf("%s of %q: %v, want %v", want.name, want.class, m.Value, want.value)
		}
	}
}
