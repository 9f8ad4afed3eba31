package eval_test

import (
	"bytes"
	"errors"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

// A place for each flag and each error, in order; what is held back is judged
// after the rest and does not enter the report.
func TestPlaces(t *testing.T) {
	items := logbook()
	held := flag(items[0], "birth", eval.Realword, "berth")
	held.Held = true
	alarm := flag(items[1], "swell", eval.Realword, "spell")
	alarm.Held = true
	beside := flag(items[1], "alot", eval.Nonword, "allot")
	beside.Held = true
	flags := [][]eval.Flag{
		{flag(items[0], "launh", eval.Nonword, "lunch", "launch"), held},
		{flag(items[1], "alot", eval.Runon, "a lot"), beside, alarm},
		{flag(items[2], "Westerly", eval.Nonword, "westerly")},
		{flag(items[3], "the the pool, heavey", eval.Repeat, "the pool, heavey")},
	}
	j, err := eval.JudgeAll(items, flags)
	if err != nil {
		t.Fatal(err)
	}
	type row struct {
		line, unit        int
		observed, outcome string
		rank              int
		reported, missed  bool
	}
	var got []row
	for _, p := range j.Places {
		got = append(got, row{p.Line, p.Unit, p.Observed, p.Outcome, p.Rank, p.Reported(), p.Missed()})
	}
	want := []row{
		{1, 0, "launh", eval.PlaceRight, 2, true, false},
		{1, 0, "birth", eval.PlaceRight, 1, false, true},
		{2, 0, "alot", eval.PlaceRight, 1, true, false},
		{2, 0, "alot", eval.PlaceNeither, 0, false, false},
		{2, 0, "swell", eval.PlaceWrong, 0, false, false},
		{3, 1, "Westerly", eval.PlaceNeither, 0, true, false},
		{4, 1, "with in", eval.PlaceMissed, 0, false, true},
		{4, 1, "the the", eval.PlaceRight, 1, true, false},
		{4, 1, "heavey", eval.PlaceRight, 0, true, false},
	}
	if !reflect.DeepEqual(got, want) {
		t.Errorf("got  %+v\nwant %+v", got, want)
	}
	if again := j.Places[8]; !again.Again || j.Places[7].Again {
		t.Error("one flag on two errors is to be counted with the one that it corrects")
	}
	r := j.ScoreText(few)
	for name, want := range map[string]float64{
		"detection.recall": 4. / 6, "detection.precision": 1, "correction.recall": 2. / 6, "correction.precision": 2. / 3, "false.alarms": 0,
	} {
		if got := value(t, r, name, ""); !same(got, want) {
			t.Errorf("%s is %v, want %v", name, got, want)
		}
	}
}

func TestContext(t *testing.T) {
	long := strings.Repeat("é buoy ", 30) + "launh\n\tand " + strings.Repeat("tide ", 30)
	item := eval.Item{Source: long, Spans: []eval.Span{{Start: strings.Index(long, "launh"), End: strings.Index(long, "launh") + 5, Kind: eval.Nonword}}}
	j, err := eval.JudgeAll([]eval.Item{item}, [][]eval.Flag{nil})
	if err != nil {
		t.Fatal(err)
	}
	context := j.Places[0].Context
	if !strings.HasPrefix(context, "… ") || !strings.HasSuffix(context, "tide …") || !strings.Contains(context, "buoy launh and tide") || len(context) > 140 {
		t.Errorf("%q", context)
	}
	unbroken := strings.Repeat("é", 200)
	item = eval.Item{Source: unbroken, Spans: []eval.Span{{Start: 200, End: 202, Kind: eval.Nonword}}}
	if j, err = eval.JudgeAll([]eval.Item{item}, [][]eval.Flag{nil}); err != nil || strings.ContainsRune(j.Places[0].Context, '\uFFFD') {
		t.Errorf("%q, %v", j.Places[0].Context, err)
	}
}

func TestOverlap(t *testing.T) {
	seen := eval.Fitted(func(observed, intended string) (bool, bool) { return observed == "launh" && intended == "launch", true })
	pairs := []eval.Pair{{Observed: "launh", Intended: "launch"}, {Observed: "launh", Intended: "lunch"}, {Observed: "bouy", Intended: "buoy"}}
	if o := seen.OverlapOf(pairs); o != (eval.Overlap{Recorded: true, Of: 3, Fitted: 1}) || !same(o.Share(), 1./3) {
		t.Errorf("%+v", o)
	}
	if o := seen.OverlapOfErrors(logbook()); o != (eval.Overlap{Recorded: true, Of: 6, Fitted: 1}) {
		t.Errorf("%+v", o)
	}
	silent := eval.Fitted(func(string, string) (bool, bool) { return false, false })
	if o := silent.OverlapOf(pairs); o != (eval.Overlap{Of: 3}) || o.Share() != 0 {
		t.Errorf("%+v", o)
	}
	outcomes, err := eval.PairOutcomes(pairs[:2], []eval.Ranking{{Word: "launh"}, {Word: "launh"}}, nil, seen)
	if err != nil {
		t.Fatal(err)
	}
	r := eval.ScorePairs(outcomes, few)
	for _, class := range []string{"fitted on", "not fitted on"} {
		if m, ok := r.Metric("coverage", class); !ok || m.N != 1 {
			t.Errorf("class %q: %+v", class, m)
		}
	}
}

// Two files: the places of the second belong to its units, and the whole is
// more than its parts.
func TestResultOfSeveralFiles(t *testing.T) {
	items := logbook()
	r := watch(t, eval.TaskText, items, perfect(items))
	j, err := eval.JudgeAll(items[:2], make([][]eval.Flag, 2))
	if err != nil {
		t.Fatal(err)
	}
	r.AddTexts(eval.DataFile{Name: "more.tsv", Overlap: eval.Overlap{Recorded: true, Of: 3, Fitted: 1}}, j, few)
	r.Sum(few)
	if got := value(t, r.Report, "detection.recall", ""); !same(got, 6./9) || r.Report.Items != 6 || r.Report.Documents != 3 {
		t.Errorf("recall %v of %d items, %d documents", got, r.Report.Items, r.Report.Documents)
	}
	if last := r.Places[len(r.Places)-1]; r.Units[last.Unit].Data != 1 || r.Data[1].Report.Items != 2 || r.Overlap.Fitted != 1 {
		t.Errorf("%+v of %+v", last, r.Units)
	}
}

func TestResultFile(t *testing.T) {
	items := logbook()
	r := watch(t, eval.TaskText, items, perfect(items))
	r.Command, r.Options = []string{"foulcase", "eval", "text", "<log>.tsv"}, map[string]string{"budget": "1"}
	r.Places[0].Ledger = "channel 4.5"
	path := filepath.Join(t.TempDir(), "result.json")
	for range 2 { // the second time over the first
		if err := r.WriteFile(path); err != nil {
			t.Fatal(err)
		}
	}
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{`"format": 1`, `"<log>.tsv"`, `"outcome": "right"`, `"sha256": "cc"`} {
		if !bytes.Contains(data, []byte(want)) {
			t.Errorf("no %s in\n%s", want, data)
		}
	}
	back, err := eval.ReadResult(path, bytes.NewReader(data))
	if err != nil {
		t.Fatal(err)
	}
	var again bytes.Buffer
	if err := back.Write(&again); err != nil || !bytes.Equal(again.Bytes(), data) {
		t.Errorf("read and written it is\n%s\n%v", again.String(), err)
	}
	if files, _ := filepath.Glob(filepath.Join(filepath.Dir(path), ".*")); len(files) > 0 {
		t.Errorf("left over: %v", files)
	}
	if err := r.WriteFile(filepath.Join(path, "below")); err == nil {
		t.Error("written below a file")
	}
}

func TestReadResultRefuses(t *testing.T) {
	report := `"report": {}, "data": [{"report": {}}]`
	for _, c := range []struct {
		text string
		want error
		says string
	}{
		{"", eval.ErrNoResult, "name a file written by"},
		{"ebb\tflow\n", eval.ErrNoResult, "name a file written by"},
		{`{"path": "log.txt"}`, eval.ErrNoResult, "name a file written by"},
		{`{"format": 2}`, eval.ErrNewerResult, "update foulcase"},
		{`{"format": 1}`, eval.ErrNoResult, "no report"},
		{`{"format": 1, "task": 7}`, eval.ErrNoResult, "measure again"},
		{`{"format": 1, "report": {}, "data": [{}]}`, eval.ErrNoResult, "data 1"},
		{`{"format": 1, "pairs": [{"data": 1}], ` + report + `}`, eval.ErrNoResult, "pair 1"},
		{`{"format": 1, "units": [{"data": -1}], ` + report + `}`, eval.ErrNoResult, "unit 1"},
		{`{"format": 1, "units": [{}], "places": [{"unit": 1, "flag": {}}], ` + report + `}`, eval.ErrNoResult, "place 1"},
		{`{"format": 1, "units": [{}], "places": [{}], ` + report + `}`, eval.ErrNoResult, "place 1"},
	} {
		if _, err := eval.ReadResult("r.json", strings.NewReader(c.text)); !errors.Is(err, c.want) || !strings.Contains(err.Error(), c.says) || !strings.HasPrefix(err.Error(), "r.json: ") {
			t.Errorf("%s: %v", c.text, err)
		}
	}
}

func FuzzReadResult(f *testing.F) {
	var body bytes.Buffer
	if err := slipList(1, 0, 3).Write(&body); err != nil {
		f.Fatal(err)
	}
	f.Add(body.Bytes())
	f.Add([]byte(`{"format": 1, "task": "text", "units": [{}], "places": [{"flag": {}}], "report": {}, "data": [{"report": {}}]}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		r, err := eval.ReadResult("r", bytes.NewReader(data))
		if err != nil {
			return
		}
		// What is read can be compared: with itself it does not differ.
		if c, err := eval.Compare(r, r, nil, eval.Resampling{Resamples: 2}); err == nil && len(c.Better)+len(c.Worse) > 0 {
			t.Fatalf("%+v", c)
		}
	})
}
