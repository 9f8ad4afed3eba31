package eval_test

import (
	"math"
	"reflect"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

var few = eval.Resampling{Resamples: 200, Seed: 7}

// value returns a metric's value, failing when there is none of that name.
func value(t *testing.T, r *eval.Report, name, class string) float64 {
	t.Helper()
	m, ok := r.Metric(name, class)
	if !ok {
		t.Fatalf("no metric %q of class %q", name, class)
	}
	return float64(m.Value)
}

func same(a, b float64) bool { return math.Abs(a-b) < 1e-12 || math.IsNaN(a) && math.IsNaN(b) }

// logbook is two watches of a pilot office's log: five errors, of which one a
// repeat, 24 words.
func logbook() []eval.Item {
	unknown := knows("launh", "alot", "heavey")
	var items []eval.Item
	for i, s := range []eval.Sentence{
		{Document: "forenoon", Source: "The launh will birth at noon.", References: []string{"The launch will berth at noon."}},
		{Document: "forenoon", Source: "There is alot of swell.", References: []string{"There is a lot of swell."}},
		{Document: "dog", Source: "Wind Westerly, fresh to strong.", References: []string{"wind westerly; fresh to strong."}},
		{Document: "dog", Source: "Moor with in the the pool, heavey lines.", References: []string{"Moor within the pool, heavy lines."}},
	} {
		s.Line = i + 1
		items = append(items, eval.Gold(s, unknown))
	}
	return items
}

// flag marks the n-th occurrence of a text.
func flag(item eval.Item, text string, kind eval.Kind, corrections ...string) eval.Flag {
	at := strings.Index(item.Source, text)
	return eval.Flag{Start: at, End: at + len(text), Observed: text, Kind: kind, Grade: "mark", Corrections: corrections}
}

func perfect(items []eval.Item) [][]eval.Flag {
	flags := make([][]eval.Flag, len(items))
	for i, item := range items {
		for _, s := range item.Spans {
			if !s.Neutral {
				flags[i] = append(flags[i], eval.Flag{Start: s.Start, End: s.End, Kind: s.Kind, Corrections: s.Corrections})
			}
		}
	}
	return flags
}

func TestPerfectText(t *testing.T) {
	items := logbook()
	r, err := eval.ScoreText(items, perfect(items), few)
	if err != nil {
		t.Fatal(err)
	}
	seen := 0
	for _, m := range r.Metrics {
		want := eval.Number(1)
		if m.Name == "false.alarms" {
			want = 0
		}
		if m.Value != want || m.Low != want || m.High != want {
			t.Errorf("%s of %q: %v [%v, %v], want %v", m.Name, m.Class, m.Value, m.Low, m.High, want)
		}
		if m.Name == "detection.recall" {
			seen++
		}
	}
	if seen != 6 || r.Words != 24 || r.Documents != 2 || r.Items != 4 {
		t.Errorf("%d classes, %d words, %d documents, %d items", seen, r.Words, r.Documents, r.Items)
	}
}

func TestSilentText(t *testing.T) {
	items := logbook()
	r, err := eval.ScoreText(items, make([][]eval.Flag, len(items)), few)
	if err != nil {
		t.Fatal(err)
	}
	for name, want := range map[string]float64{
		"detection.precision": math.NaN(), "detection.recall": 0, "detection.f1": 0, "correction.f0.5": 0,
		"first.of.detected": math.NaN(), "false.alarms": 0,
	} {
		if got := value(t, r, name, ""); !same(got, want) {
			t.Errorf("%s is %v, want %v", name, got, want)
		}
	}
}

// Counted by hand. Errors: launh, birth, alot, with in, the the, heavey: six.
// Flags that count: launh right, birth found but its second correction right,
// swell wrong, "in" right (of "with in"), heavey right under another kind: 5,
// of which 4 find an error and 3 correct it first. Not counted: Westerly, on
// neutral ground, and "with", a second flag on one error.
func TestTextByHand(t *testing.T) {
	items := logbook()
	flags := [][]eval.Flag{
		{
			flag(items[0], "launh", eval.Nonword, "launch", "lunch"),
			flag(items[0], "birth", eval.Realword, "births", "berth"),
		},
		{flag(items[1], "swell", eval.Realword, "spell")},
		{flag(items[2], "Westerly", eval.Nonword, "westerly")},
		{
			flag(items[3], "with", eval.Realword, "width"),
			flag(items[3], " in", eval.Split, "in"),
			flag(items[3], "heavey lines", eval.Realword, "heavy lines"),
		},
	}
	r, err := eval.ScoreText(items, flags, few)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name, class string
		want        float64
	}{
		{"detection.precision", "", 4. / 5},
		{"detection.recall", "", 4. / 6},
		{"detection.f1", "", 2 * (4. / 5) * (4. / 6) / (4./5 + 4./6)},
		{"detection.f0.5", "", 1.25 * (4. / 5) * (4. / 6) / (.25*4/5 + 4./6)},
		{"correction.precision", "", 3. / 5},
		{"correction.recall", "", 3. / 6},
		{"first.of.detected", "", 3. / 4},
		{"first.of.one.edit", "", 3. / 4}, // "with in" for "within" is one edit too
		{"first.of.one.edit", "nonword", 1},
		{"first.of.one.edit", "realword", 0},
		{"listed.of.detected", "", 1},
		{"false.alarms", "", 1000. / 24},
		{"detection.precision", "realword", 2. / 3},
		{"detection.recall", "realword", 1},
		{"correction.recall", "realword", 0},
		{"detection.precision", "nonword", 1},
		{"detection.recall", "nonword", 1},
		{"detection.recall", "split", 1},
		{"detection.precision", "runon", math.NaN()},
		{"detection.recall", "runon", 0},
		{"detection.recall", "repeat", 0},
		{"false.alarms", "realword", 1000. / 24},
	} {
		if got := value(t, r, c.name, c.class); !same(got, c.want) {
			t.Errorf("%s of %q is %v, want %v", c.name, c.class, got, c.want)
		}
	}
}

// A correction is judged by the text it makes, whatever bytes the flag covers.
func TestCorrectionsByEffect(t *testing.T) {
	item := eval.Gold(eval.Sentence{
		Source: "Moor with in the the pool.", References: []string{"Moor within the pool."},
	}, knows())
	for _, c := range []struct {
		text       string
		correction string
		rank       int
	}{
		{"with in", "within", 1},
		{"with in", "Within", 1},
		{"th in", "thin", 1},
		{" in", "in", 1},
		{"Moor with in the", "Moor within the", 1},
		{"with", "within", 0},
		{"with in", "with", 0},
	} {
		f := flag(item, c.text, eval.Split, c.correction)
		outcomes, verdicts, err := eval.Judge(item, []eval.Flag{f})
		if err != nil || outcomes[0] != eval.Right || verdicts[0].Rank != c.rank {
			t.Errorf("%q to %q: outcome %v, rank %d, want %d; %v", c.text, c.correction, outcomes[0], verdicts[0].Rank, c.rank, err)
		}
	}
	second := eval.Flag{Start: 17, End: 20, Corrections: []string{""}}
	if _, v, _ := eval.Judge(item, []eval.Flag{second}); v[1].Rank != 1 {
		t.Errorf("the second \"the\" taken out: %+v", v[1])
	}
}

func TestTextRefuses(t *testing.T) {
	items := logbook()
	if _, err := eval.ScoreText(items, nil, few); err == nil {
		t.Error("flags for no item are taken for four")
	}
	for _, f := range []eval.Flag{{Start: -1, End: 3}, {Start: 4, End: 3}, {Start: 0, End: 999}} {
		flags := make([][]eval.Flag, len(items))
		flags[2] = []eval.Flag{f}
		if _, err := eval.ScoreText(items, flags, few); err == nil || !strings.Contains(err.Error(), "line 3") {
			t.Errorf("flag at %d to %d: error %v", f.Start, f.End, err)
		}
	}
}

func TestClean(t *testing.T) {
	items := []eval.Item{
		{Document: "1", Source: strings.Repeat("ebb ", 60)},
		{Document: "1", Source: strings.Repeat("ebb ", 40)},
		{Document: "2", Source: strings.Repeat("flow ", 100)},
	}
	flags := [][]eval.Flag{
		{{Start: 0, End: 3, Kind: eval.Nonword, Grade: "mark"}},
		nil,
		{{Start: 0, End: 4, Kind: eval.Realword, Grade: "query"}, {Start: 5, End: 9, Kind: eval.Realword, Grade: "mark"}},
	}
	r, err := eval.ScoreClean(items, flags, few)
	if err != nil {
		t.Fatal(err)
	}
	for class, want := range map[string]float64{"": 15, "nonword": 5, "realword": 10, "split": 0, "mark": 10, "query": 5} {
		if got := value(t, r, "flags", class); !same(got, want) {
			t.Errorf("%q: %v a 1,000 words, want %v", class, got, want)
		}
	}
	if m, _ := r.Metric("flags", ""); m.Low != 10 || m.High != 20 || m.N != 200 || r.Documents != 2 {
		t.Errorf("%+v of %d documents", m, r.Documents)
	}
}

func TestList(t *testing.T) {
	pairs := []eval.Pair{
		{Observed: "launh", Intended: "launch"},
		{Observed: "Quay’s", Intended: "quays"},
		{Observed: "birth", Intended: "berth"},
		{Observed: "skarow", Intended: "Skarrow"},
		{Observed: "alot", Intended: "a lot", Spaces: true},
	}
	rankings := []eval.Ranking{
		{Word: "launh", Candidates: []string{"launch", "lunch"}},
		{Word: "Quay’s", Candidates: []string{"keys", "quay", "QUAYS"}},
		{Word: "birth"},
		{Word: "skarow", Candidates: []string{"sparrow", "skarrow"}},
		{Word: "alot", Candidates: strings.Fields("b c d e f g h i j k l allot")},
	}
	r, err := eval.ScoreList(pairs, rankings, knows("launh", "skarow", "alot"), few)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name, class string
		want        float64
	}{
		{"accuracy@1", "", 1. / 5},
		{"accuracy@3", "", 3. / 5},
		{"accuracy@20", "", 3. / 5},
		{"coverage", "", 3. / 5},
		{"mrr", "", (1 + 1./3 + 1./2) / 5},
		{"accuracy@1", "deletion", 1. / 3}, // launh, skarow, alot
		{"accuracy@3", "insertion", 1},
		{"accuracy@20", "substitution", 0},
		{"accuracy@1", "realword", 0},
		{"coverage", "nonword", 2. / 3},
		{"coverage", "space", 0},
		{"mrr", "5-8 letters", (1 + 1./3 + 1./2) / 4},
		{"mrr", "1-4 letters", 0},
	} {
		if got := value(t, r, c.name, c.class); !same(got, c.want) {
			t.Errorf("%s of %q is %v, want %v", c.name, c.class, got, c.want)
		}
	}
	ranks, err := eval.Ranks(pairs, rankings)
	if err != nil || !reflect.DeepEqual(ranks, []int{1, 3, 0, 2, 0}) {
		t.Errorf("ranks %v, %v", ranks, err)
	}
	rankings[1].Word = "quays"
	if _, err := eval.ScoreList(pairs, rankings, nil, few); err == nil || !strings.Contains(err.Error(), "ranking 2") {
		t.Errorf("rankings of other words: %v", err)
	}
	if _, err := eval.ScoreList(pairs, rankings[:3], nil, few); err == nil {
		t.Error("rankings are missing and it does not matter")
	}
}
