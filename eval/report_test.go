package eval_test

import (
	"encoding/json"
	"math"
	"reflect"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

func report() *eval.Report {
	return &eval.Report{
		Task: "text", Items: 2, Words: 10, Resamples: 1000, Seed: 1,
		Metrics: []eval.Metric{
			{Name: "detection.recall", Value: .5, Low: .25, High: .75, N: 4},
			{Name: "false.alarms", Value: 1.5, Low: 0, High: 3, N: 10},
			{Name: "detection.recall", Class: "runon", Value: eval.Number(math.NaN()), Low: eval.Number(math.NaN()), High: eval.Number(math.NaN())},
		},
	}
}

// A report goes through JSON unchanged, values that are not defined included.
func TestReportJSON(t *testing.T) {
	data, err := json.Marshal(report())
	if err != nil {
		t.Fatal(err)
	}
	for _, part := range []string{
		`{"metric":"detection.recall","value":0.5,"low":0.25,"high":0.75,"n":4}`,
		`{"metric":"detection.recall","class":"runon","value":null,"low":null,"high":null,"n":0}`,
	} {
		if !strings.Contains(string(data), part) {
			t.Errorf("%s\nlacks %s", data, part)
		}
	}
	var back eval.Report
	if err := json.Unmarshal(data, &back); err != nil {
		t.Fatal(err)
	}
	if back.Metrics[2].Value.Defined() || back.Metrics[2].Low.Defined() {
		t.Errorf("null came back as %v", back.Metrics[2].Value)
	}
	want := report()
	want.Metrics, back.Metrics = want.Metrics[:2], back.Metrics[:2]
	if !reflect.DeepEqual(&back, want) {
		t.Errorf("%+v", back)
	}
}

func TestTable(t *testing.T) {
	var markdown, plain strings.Builder
	if err := report().Table().WriteMarkdown(&markdown); err != nil {
		t.Fatal(err)
	}
	if err := report().Table().WritePlain(&plain); err != nil {
		t.Fatal(err)
	}
	if want := `| class | n | detection.recall | false.alarms |
| --- | ---: | ---: | ---: |
| all | 4 | 50.0 [25.0, 75.0] | 1.50 [0.00, 3.00] |
| runon | 0 | - | - |
`; markdown.String() != want {
		t.Errorf("got\n%s", markdown.String())
	}
	if want := `class  n   detection.recall       false.alarms
all    4  50.0 [25.0, 75.0]  1.50 [0.00, 3.00]
runon  0                  -                  -
`; plain.String() != want {
		t.Errorf("got\n%s", plain.String())
	}
}
