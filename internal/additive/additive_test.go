package additive

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"reflect"
	"testing"
)

// draw makes examples whose true log-odds are a sum of steps and a feature that
// says nothing.
func draw(n int, seed uint64) (examples []Example, truth []float64) {
	random := rand.New(rand.NewPCG(seed, 1))
	for range n {
		x := []float32{float32(random.Float64() * 10), float32(random.IntN(3)), float32(random.Float64())}
		odds := -1 + 2*math.Floor(float64(x[0])/4) - float64(x[1])
		truth = append(truth, odds)
		examples = append(examples, Example{X: x, Yes: random.Float64() < 1/(1+math.Exp(-odds)), Weight: 1})
	}
	return examples, truth
}

var names = []string{"a", "b", "noise"}

func TestFitFindsTheSteps(t *testing.T) {
	examples, _ := draw(20000, 1)
	m := Fit(names, examples, Options{})
	b, err := m.Bind(names)
	if err != nil {
		t.Fatal(err)
	}
	test, truth := draw(2000, 2)
	far, mean := 0, 0.0
	for i, e := range test {
		d := math.Abs(b.LogOdds(e.X) - truth[i])
		mean += d / float64(len(test))
		if d > .5 { // the bin that a step falls into
			far++
		}
	}
	if mean > .15 || far > len(test)/20 {
		t.Errorf("log-odds are off by %.2f on average, by over .5 in %d of %d", mean, far, len(test))
	}
	for _, term := range m.Terms {
		for _, v := range term.Values {
			if term.Feature == "noise" && math.Abs(v) > .25 {
				t.Errorf("noise counts for %.2f nats", v)
			}
		}
	}
}

func TestFitIsRepeatable(t *testing.T) {
	examples, _ := draw(3000, 3)
	a, b := Fit(names, examples, Options{}), Fit(names, examples, Options{})
	if !reflect.DeepEqual(a, b) {
		t.Error("two fits of the same examples differ")
	}
}

func TestWeightsCountAsCopies(t *testing.T) {
	examples, _ := draw(2000, 4)
	twice := append(append([]Example(nil), examples...), examples...)
	weighed := make([]Example, len(examples))
	for i, e := range examples {
		e.Weight = 2
		weighed[i] = e
	}
	b1, _ := Fit(names, twice, Options{}).Bind(names)
	b2, _ := Fit(names, weighed, Options{}).Bind(names)
	for _, e := range examples[:200] {
		if d := math.Abs(b1.LogOdds(e.X) - b2.LogOdds(e.X)); d > 1e-6 {
			t.Fatalf("examples twice and of weight 2 differ by %g nats", d)
		}
	}
}

// With one outcome alone there is nothing to learn but that.
func TestOneOutcome(t *testing.T) {
	m := Fit([]string{"a"}, []Example{{X: []float32{1}, Weight: 1}, {X: []float32{2}, Weight: 1}}, Options{})
	if m.Base != -surest || len(m.Terms) != 0 {
		t.Errorf("got %+v", m)
	}
	if m := Fit([]string{"a"}, nil, Options{}); m.Base != 0 {
		t.Errorf("no examples: base %v, want even odds", m.Base)
	}
}

func TestAccountAddsUp(t *testing.T) {
	examples, _ := draw(3000, 5)
	b, _ := Fit(names, examples, Options{}).Bind(names)
	for _, e := range examples[:100] {
		sum := b.Base()
		b.Account(e.X, func(_ string, _ float32, nats float64) { sum += nats })
		if d := math.Abs(sum - b.LogOdds(e.X)); d > 1e-9 {
			t.Fatalf("terms add up to %g more than the log-odds", d)
		}
	}
}

func TestBindRefuses(t *testing.T) {
	for name, text := range map[string]string{
		"unknown feature": `{"base":0,"terms":[{"feature":"z","cuts":[1],"values":[0,1]}]}`,
		"values missing":  `{"base":0,"terms":[{"feature":"a","cuts":[1],"values":[0]}]}`,
		"cuts descending": `{"base":0,"terms":[{"feature":"a","cuts":[2,1],"values":[0,1,2]}]}`,
	} {
		var m Model
		if err := json.Unmarshal([]byte(text), &m); err != nil {
			t.Fatal(err)
		}
		if _, err := m.Bind(names); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
}

func TestAtCuts(t *testing.T) {
	term := Term{Cuts: []float64{1, 3}, Values: []float64{-1, 0, 2}}
	for x, want := range map[float64]float64{0: -1, .99: -1, 1: 0, 2.9: 0, 3: 2, 99: 2} {
		if got := term.At(x); got != want {
			t.Errorf("at %v: %v, want %v", x, got, want)
		}
	}
}
