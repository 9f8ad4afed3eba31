package eval_test

import (
	"math"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

func TestGate(t *testing.T) {
	before := &eval.Report{Metrics: []eval.Metric{{Name: "accuracy@1", Value: .75}, {Name: "mrr", Class: "two edits", Value: .5}}}
	after := &eval.Report{Metrics: []eval.Metric{
		{Name: "accuracy@1", Value: .5},
		{Name: "mrr", Class: "two edits", Value: .5},
		{Name: "flags", Value: eval.Number(math.NaN())},
	}}
	for _, c := range []struct {
		gate  string
		fails int
	}{
		{"accuracy@1>=0.5", 0},
		{"accuracy@1>0.5", 1},
		{"accuracy@1<=.5, accuracy@1<0.5", 1},
		{"two edits:mrr>=0.4,accuracy@1>=0.6,accuracy@1>=0.7", 2},
		{"delta:accuracy@1>=-0.25", 0},
		{"delta:accuracy@1>-0.25", 1},
		{"delta:two edits:mrr>=0", 0},
		{"flags<2", 1},
		{"flags>=-1e9", 1},
	} {
		g, err := eval.ParseGate(c.gate)
		if err != nil {
			t.Fatal(err)
		}
		failures, err := g.Check(before, after)
		if err != nil || len(failures) != c.fails {
			t.Errorf("%s: %+v, %v, want %d failures", c.gate, failures, err, c.fails)
		}
		for _, condition := range g {
			again, err := eval.ParseGate(condition.String())
			if err != nil || again[0] != condition {
				t.Errorf("%q is read as %+v, %v", condition, again, err)
			}
		}
	}
}

func TestGateRefuses(t *testing.T) {
	for _, list := range []string{"", "accuracy@1", "accuracy@1>=", ">=0.5", "accuracy@1>=high", "accuracy@1>=NaN", "a>=1,", "accuracy@1=0.5"} {
		if g, err := eval.ParseGate(list); err == nil {
			t.Errorf("%q is read as %v", list, g)
		}
	}
	r := &eval.Report{Metrics: []eval.Metric{{Name: "accuracy@1", Value: .5}}}
	for list, want := range map[string]string{
		"accuracy@2>0":         "it has accuracy@1",
		"space:accuracy@1>0":   `no class "space"`,
		"delta:accuracy@1>=-1": "a change needs two results",
	} {
		g, err := eval.ParseGate(list)
		if err != nil {
			t.Fatal(err)
		}
		if failures, err := g.Check(nil, r); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%s: %v, %v", list, failures, err)
		}
	}
}
