package eval_test

import (
	"math"
	"reflect"
	"testing"

	"example.org/foulcase/eval"
)

// found is a flag on an error, alarm one where nothing is wrong, missed an error
// without a flag.
func found(kind eval.Kind, p float64, grade string, rank int) eval.Place {
	return eval.Place{
		Line: 1, Observed: "bouy", Context: "moor at the bouy", Outcome: eval.PlaceRight, Rank: rank,
		Flag:  &eval.Flag{Start: 12, End: 16, Observed: "bouy", Kind: kind, P: p, Grade: grade, Corrections: []string{"buoy"}, Held: grade == ""},
		Error: &eval.Span{Start: 12, End: 16, Kind: kind, Corrections: []string{"buoy"}},
	}
}

func alarm(kind eval.Kind, p float64, grade string) eval.Place {
	place := found(kind, p, grade, 0)
	place.Outcome, place.Error = eval.PlaceWrong, nil
	return place
}

func missed(kind eval.Kind) eval.Place {
	place := found(kind, 0, "", 0)
	place.Outcome, place.Flag = eval.PlaceMissed, nil
	return place
}

// The points are counted by hand.
func TestRecallCurve(t *testing.T) {
	places := []eval.Place{
		found(eval.Nonword, .9, "mark", 1),
		alarm(eval.Nonword, .8, "mark"),
		found(eval.Realword, .8, "query", 1),
		missed(eval.Nonword),
		alarm(eval.Realword, .3, "query"),
		found(eval.Nonword, .1, "", 2), // held back
		{Outcome: eval.PlaceNeither, Flag: &eval.Flag{Kind: eval.Nonword, P: .95, Grade: "mark"}},
	}
	for _, want := range []struct {
		kind       eval.Kind
		curve      [][2]float64
		all, marks [2]float64
	}{
		{"", [][2]float64{{.25, 1}, {.5, 2. / 3}, {.5, .5}, {.75, .6}}, [2]float64{.5, .5}, [2]float64{.25, .5}},
		{eval.Nonword, [][2]float64{{1. / 3, 1}, {1. / 3, .5}, {1. / 3, .5}, {2. / 3, 2. / 3}}, [2]float64{1. / 3, .5}, [2]float64{1. / 3, .5}},
	} {
		curve, all, marks := eval.RecallCurve(places, want.kind)
		if !reflect.DeepEqual(curve, want.curve) || all != want.all || marks != want.marks {
			t.Errorf("%q: %v, all %v, marks %v; want %+v", want.kind, curve, all, marks, want)
		}
	}
}

// At a share of none or all the interval has a closed form, z²/(n+z²).
func TestWilson(t *testing.T) {
	const z2 = 1.959964 * 1.959964
	if low, high := eval.Wilson(0, 10); math.Abs(low) > 1e-12 || math.Abs(high-z2/(10+z2)) > 1e-12 {
		t.Errorf("0 of 10: [%v, %v]", low, high)
	}
	if low, high := eval.Wilson(1, 10); math.Abs(high-1) > 1e-12 || math.Abs(low-10/(10+z2)) > 1e-12 {
		t.Errorf("10 of 10: [%v, %v]", low, high)
	}
	if low, high := eval.Wilson(.5, 40); math.Abs(low+high-1) > 1e-12 || low <= .34 || high >= .66 {
		t.Errorf("20 of 40: [%v, %v]", low, high)
	}
}

func TestCut(t *testing.T) {
	for _, test := range []struct {
		place eval.Place
		want  [3]string
	}{
		{
			eval.Place{Observed: "the", Context: "then the tide", Flag: &eval.Flag{Start: 5, End: 8}},
			[3]string{"then ", "the", " tide"},
		},
		{ // a context that was cut begins 60 bytes before the place
			eval.Place{Observed: "the", Context: "… the launch lay alongside all that afternoon until finally the tide turned", Flag: &eval.Flag{Start: 500, End: 503}},
			[3]string{"… the launch lay alongside all that afternoon until finally ", "the", " tide turned"},
		},
		{ // line breaks in the text are spaces in the context
			eval.Place{Observed: "with\n in", Context: "moored with in", Error: &eval.Span{Start: 7, End: 15}},
			[3]string{"moored ", "with in", ""},
		},
		{
			eval.Place{Observed: "quay", Context: "moored", Error: &eval.Span{}},
			[3]string{"moored ", "quay", ""},
		},
	} {
		if got := eval.Cut(test.place); got != test.want {
			t.Errorf("%q", got)
		}
	}
}
