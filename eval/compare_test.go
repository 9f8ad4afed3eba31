package eval_test

import (
	"errors"
	"math"
	"reflect"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

// Worked by hand: of three items B gains one on two and loses one on the third.
// A sample draws the third k times, k of B(3, 1/3), and B is better when k < 2:
// 20/27 of the samples, and never level. So P is near 2 x 7/27.
func TestPairedBootstrapByHand(t *testing.T) {
	a, b := []float64{0, 0, 1}, []float64{1, 1, 0}
	p := eval.PairedBootstrap(3, means(a, b), eval.Resampling{Resamples: 20000})[0]
	if math.Abs(p.Better-20./27) > .015 || math.Abs(p.P-14./27) > .03 || !same(float64(p.Difference), 1./3) || p.Low != -1 || p.High != 1 {
		t.Errorf("%+v, want better in 20/27 of the samples", p)
	}
}

// Swapped, the systems differ the other way, by as much and as surely.
func TestPairedBootstrapSwaps(t *testing.T) {
	a, b := []float64{0, .5, 1, .2, .9}, []float64{.1, .5, .8, .9, 1}
	p, q := eval.PairedBootstrap(5, means(a, b), few)[0], eval.PairedBootstrap(5, means(b, a), few)[0]
	if p.Difference != -q.Difference || p.Low != -q.High || p.High != -q.Low || p.P != q.P || p.Better+q.Better > 1 {
		t.Errorf("%+v\n%+v", p, q)
	}
	if itself := eval.PairedBootstrap(5, means(a, a), few)[0]; itself.P != 1 || itself.Better != 0 || itself.Difference != 0 {
		t.Errorf("a system and itself: %+v", itself)
	}
}

// The more items B gains, the surer it is.
func TestPairedBootstrapIsMonotone(t *testing.T) {
	a, b := make([]float64, 40), make([]float64, 40)
	last := eval.PairedBootstrap(40, means(a, b), few)[0]
	for i := range 12 {
		b[i] = 1
		p := eval.PairedBootstrap(40, means(a, b), few)[0]
		if p.Difference <= last.Difference || p.Better < last.Better || p.P > last.P {
			t.Fatalf("with %d items gained %+v, with one less %+v", i+1, p, last)
		}
		last = p
	}
	if last.P > .02 {
		t.Errorf("12 of 40 items gained and none lost: p %v", last.P)
	}
}

// slipList is a result on a list of four pairs at given ranks.
func slipList(ranks ...int) *eval.Result {
	r := &eval.Result{Format: eval.ResultFormat, Task: eval.TaskList, Model: "0123456789abcdef"}
	var outcomes []eval.PairOutcome
	for i, rank := range ranks {
		outcomes = append(outcomes, eval.PairOutcome{
			Line: i + 1, Observed: strings.Repeat("x", i+1), Intended: "quay", Rank: rank,
			Classes: []string{[]string{"deletion", "two edits"}[i%2]},
		})
	}
	r.AddPairs(eval.DataFile{Name: "slips.tsv", SHA256: "aa", Measured: "bb"}, outcomes, few)
	r.Sum(few)
	return r
}

func TestCompareLists(t *testing.T) {
	a, b := slipList(1, 2, 0, 7), slipList(1, 1, 5, 0)
	c, err := eval.Compare(a, b, []string{"two edits"}, few)
	if err != nil {
		t.Fatal(err)
	}
	want := map[string][2]float64{
		"accuracy@1 ": {1. / 4, 2. / 4}, "accuracy@5 ": {2. / 4, 3. / 4}, "accuracy@20 ": {3. / 4, 3. / 4},
		"mrr ":                 {(1 + 1./2 + 1./7) / 4, (1 + 1 + 1./5) / 4},
		"accuracy@1 two edits": {0, 1. / 2}, "accuracy@5 two edits": {1. / 2, 1. / 2},
		"accuracy@20 two edits": {1, 1. / 2}, "mrr two edits": {(1./2 + 1./7) / 2, 1. / 2},
	}
	if len(c.Rows) != len(want) {
		t.Errorf("%d rows, want %d", len(c.Rows), len(want))
	}
	for _, row := range c.Rows {
		w, ok := want[row.Metric+" "+row.Class]
		if !ok || !same(float64(row.A), w[0]) || !same(float64(row.B), w[1]) || !same(float64(row.Difference), w[1]-w[0]) {
			t.Errorf("%s of %q: %v and %v, difference %v, want %v", row.Metric, row.Class, row.A, row.B, row.Difference, w)
		}
	}
	if test := c.Tests[0]; test.OnlyA != 0 || test.OnlyB != 1 || test.Items != 4 {
		t.Errorf("first alone: %+v", test)
	}
	if test := c.Tests[2]; test.OnlyA != 1 || test.OnlyB != 1 {
		t.Errorf("first 20: %+v", test)
	}
	better := []eval.Changed{
		{Data: "slips.tsv", Line: 2, Observed: "xx", Wanted: "quay", A: "rank 2", B: "rank 1"},
		{Data: "slips.tsv", Line: 3, Observed: "xxx", Wanted: "quay", A: "missing", B: "rank 5"},
	}
	if !reflect.DeepEqual(c.Better, better) || len(c.Worse) != 1 || c.Worse[0].B != "missing" {
		t.Errorf("better %+v, worse %+v", c.Better, c.Worse)
	}
}

// watch is a result on the logbook, with flags as a system gave them.
func watch(t *testing.T, task string, items []eval.Item, flags [][]eval.Flag) *eval.Result {
	t.Helper()
	j, err := eval.JudgeAll(items, flags)
	if err != nil {
		t.Fatal(err)
	}
	r := &eval.Result{Format: eval.ResultFormat, Task: task}
	r.AddTexts(eval.DataFile{Name: "log.tsv", SHA256: "cc", Measured: eval.HashItems(items)}, j, few)
	r.Sum(few)
	return r
}

// B finds everything but for one launch, and flags a good word; A finds the
// launch alone, with its right correction second.
func TestCompareTexts(t *testing.T) {
	items := logbook()
	a := make([][]eval.Flag, len(items))
	a[0] = []eval.Flag{flag(items[0], "launh", eval.Nonword, "lunch", "launch")}
	b := perfect(items)
	b[0] = b[0][1:]
	b[1] = append(b[1], flag(items[1], "swell", eval.Realword, "spell"))
	c, err := eval.Compare(watch(t, eval.TaskText, items, a), watch(t, eval.TaskText, items, b), []string{"nonword"}, few)
	if err != nil {
		t.Fatal(err)
	}
	for _, row := range c.Rows {
		switch row.Metric + row.Class {
		case "detection.recall":
			if !same(float64(row.A), 1./6) || !same(float64(row.B), 5./6) {
				t.Errorf("recall: %+v", row)
			}
		case "false.alarms":
			if row.A != 0 || !same(float64(row.B), 1000./24) {
				t.Errorf("false alarms: %+v", row)
			}
		case "correction.recallnonword":
			if row.A != 0 || !same(float64(row.B), 1./2) {
				t.Errorf("nonwords corrected: %+v", row)
			}
		}
	}
	if len(c.Rows) != 18 || c.Units != 2 {
		t.Errorf("%d rows of %d units", len(c.Rows), c.Units)
	}
	found, corrected := c.Tests[0], c.Tests[1]
	if found.OnlyA != 1 || found.OnlyB != 5 || corrected.OnlyA != 0 || corrected.OnlyB != 5 || found.Items != 6 {
		t.Errorf("%+v", c.Tests)
	}
	worse := []eval.Changed{
		{Data: "log.tsv", Line: 1, Observed: "launh", Wanted: "launch", A: "found, right correction at 2", B: "missed"},
		{Data: "log.tsv", Line: 2, Observed: "swell", A: "let stand", B: "false alarm"},
	}
	if len(c.Better) != 5 || !reflect.DeepEqual(c.Worse, worse) {
		t.Errorf("better %+v\nworse %+v", c.Better, c.Worse)
	}
}

func TestCompareCleans(t *testing.T) {
	items := []eval.Item{{Line: 1, Source: "Slack water at noon."}, {Line: 2, Source: "Wind fresh."}}
	flagged := func(grade string) [][]eval.Flag {
		f := flag(items[0], "Slack", eval.Realword, "Black")
		f.Grade = grade
		return [][]eval.Flag{{f}, nil}
	}
	a, b := watch(t, eval.TaskClean, items, flagged("query")), watch(t, eval.TaskClean, items, make([][]eval.Flag, 2))
	c, err := eval.Compare(a, b, []string{"query"}, few)
	if err != nil {
		t.Fatal(err)
	}
	if len(c.Rows) != 2 || !same(float64(c.Rows[1].A), 1000./6) || c.Rows[1].B != 0 || len(c.Tests) != 0 || len(c.Better) != 1 || len(c.Worse) != 0 {
		t.Errorf("%+v", c)
	}
	if _, err := eval.Compare(a, b, []string{"doubt"}, few); err == nil || !strings.Contains(err.Error(), "query") {
		t.Errorf("an unknown class: %v", err)
	}
}

func TestCompareRefuses(t *testing.T) {
	items := logbook()
	text := watch(t, eval.TaskText, items, make([][]eval.Flag, len(items)))
	for about, change := range map[string]func(r *eval.Result){
		`the other of "text"`:          func(r *eval.Result) { r.Task = eval.TaskText },
		"1 files, the other of 2":      func(r *eval.Result) { r.Data = append(r.Data, r.Data[0]) },
		"not the same file":            func(r *eval.Result) { r.Data[0].SHA256 = "dd" },
		"measured other texts":         func(r *eval.Result) { r.Data[0].Measured = "dd" },
		`read as "" for one and "m2"`:  func(r *eval.Result) { r.Data[0].Read = "m2" },
		"holds 4 items, the other 3":   func(r *eval.Result) { r.Pairs = r.Pairs[1:] },
		`pair 1 is "x" in one and "xx`: func(r *eval.Result) { r.Pairs[0].Observed = "xx" },
	} {
		b := slipList(1, 2, 3, 4)
		change(b)
		if _, err := eval.Compare(slipList(1, 2, 3, 4), b, nil, few); !errors.Is(err, eval.ErrIncomparable) || !strings.Contains(err.Error(), about) {
			t.Errorf("want %q: %v", about, err)
		}
	}
	longer := watch(t, eval.TaskText, items, make([][]eval.Flag, len(items)))
	longer.Units[1].Words++
	if _, err := eval.Compare(text, longer, nil, few); !errors.Is(err, eval.ErrIncomparable) {
		t.Errorf("documents of other lengths: %v", err)
	}
}

func TestShownP(t *testing.T) {
	if p, name := eval.McNemarTest(11, 1).Shown(); name != "exact" || math.Abs(p-.00635) > 5e-6 {
		t.Errorf("11/1: %v, %s", p, name)
	}
	if p, name := eval.McNemarTest(25, 15).Shown(); name != "chi-squared" || math.Abs(p-.1547) > 5e-5 {
		t.Errorf("25/15: %v, %s", p, name)
	}
}
