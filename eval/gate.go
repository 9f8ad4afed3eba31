package eval

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
)

// A Gate is what a result must reach, condition by condition.
type Gate []Condition

// A Condition bounds a metric, or what it changed by from one result to another.
type Condition struct {
	Delta  bool // the change is bounded
	Class  string
	Metric string
	Op     string // one of >= > <= <
	Bound  float64
}

// A Failure is a condition that does not hold.
type Failure struct {
	Condition
	Value Number // null where the metric is not defined, which holds no condition
}

// gateOps are tried in order, so a longer one stands before one that it begins with.
var gateOps = []string{">=", "<=", ">", "<"}

// ParseGate reads conditions parted by commas: "accuracy@1>=0.8",
// "realword:detection.recall>=0.3" with a class, "delta:mrr>-0.005" for a
// change. Values are those of --emit jsonl: shares of 1, or counts.
func ParseGate(list string) (Gate, error) {
	var g Gate
	for text := range strings.SplitSeq(list, ",") {
		c, err := parseCondition(strings.TrimSpace(text))
		if err != nil {
			return nil, fmt.Errorf("%q: %w", text, err)
		}
		g = append(g, c)
	}
	return g, nil
}

func parseCondition(text string) (Condition, error) {
	for _, op := range gateOps {
		metric, value, ok := strings.Cut(text, op)
		if !ok {
			continue
		}
		bound, err := strconv.ParseFloat(strings.TrimSpace(value), 64)
		if err != nil || !Number(bound).Defined() {
			return Condition{}, fmt.Errorf("want a number behind %s", op)
		}
		c := Condition{Op: op, Bound: bound}
		metric, c.Delta = strings.CutPrefix(strings.TrimSpace(metric), "delta:")
		if i := strings.LastIndexByte(metric, ':'); i >= 0 {
			c.Class, metric = metric[:i], metric[i+1:]
		}
		if c.Metric = metric; metric == "" {
			return Condition{}, fmt.Errorf("want a metric before %s", op)
		}
		return c, nil
	}
	return Condition{}, fmt.Errorf("want a metric, one of %s, and a number, such as accuracy@1>=0.8", strings.Join(gateOps, " "))
}

// String writes the condition as ParseGate reads it.
func (c Condition) String() string {
	name := c.Metric
	if c.Class != "" {
		name = c.Class + ":" + name
	}
	if c.Delta {
		name = "delta:" + name
	}
	return name + c.Op + strconv.FormatFloat(c.Bound, 'g', -1, 64)
}

// Changes says whether a condition is on a change.
func (g Gate) Changes() bool {
	return slices.ContainsFunc(g, func(c Condition) bool { return c.Delta })
}

// Check returns the conditions that do not hold for the report b; a is the one
// before, for conditions on changes, and may be nil when there are none. A
// metric that a report does not have is an error.
func (g Gate) Check(a, b *Report) ([]Failure, error) {
	var failures []Failure
	for _, c := range g {
		value, err := c.value(b)
		if err == nil && c.Delta {
			var before Number
			if a == nil {
				return nil, fmt.Errorf("%s: a change needs two results", c)
			}
			before, err = c.value(a)
			value -= before
		}
		if err != nil {
			return nil, err
		}
		if !c.holds(float64(value)) {
			failures = append(failures, Failure{c, value})
		}
	}
	return failures, nil
}

func (c Condition) value(r *Report) (Number, error) {
	m, ok := r.Metric(c.Metric, c.Class)
	if ok {
		return m.Value, nil
	}
	var known []string
	for _, m := range r.Metrics {
		if m.Class == c.Class {
			known = append(known, m.Name)
		}
	}
	if len(known) == 0 {
		return 0, fmt.Errorf("%s: the report has no class %q", c, c.Class)
	}
	return 0, fmt.Errorf("%s: the report has no such metric; it has %s", c, strings.Join(known, ", "))
}

// holds is false for a value that is not a number.
func (c Condition) holds(value float64) bool {
	switch c.Op {
	case ">=":
		return value >= c.Bound
	case ">":
		return value > c.Bound
	case "<=":
		return value <= c.Bound
	}
	return value < c.Bound
}
