package main

import (
	"fmt"
	"io"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/eval"
)

// seed makes every measurement draw the same resamples.
const seed = 1

// readData reads a file of test data with one of the readers of package eval.
func readData[T any](c *console, path string, read func(name string, r io.Reader) ([]T, error)) ([]T, error) {
	in := findInputs([]string{path}, c.in, standardInput)[0]
	r, err := in.open()
	if err != nil {
		return nil, err
	}
	defer r.Close()
	data, err := read(in.path, r)
	if err == nil && len(data) == 0 {
		err = fmt.Errorf("%s: nothing to measure in it", in.path)
	}
	return data, err
}

// knownBy tells words from other forms as package eval asks for it.
func knownBy(e *foulcase.Engine) func(string) bool {
	return func(word string) bool {
		stem, _ := strings.CutSuffix(strings.ReplaceAll(word, "’", "'"), "'s")
		return e.Known(word) || e.Known(stem)
	}
}

// metricObject is a metric as --emit jsonl prints it.
type metricObject struct {
	Task  string `json:"task"`
	Data  string `json:"data"`
	Model string `json:"model"` // hash
	eval.Metric
}

// printReport prints the report on one file of data.
func printReport(w io.Writer, r *eval.Report, data, model, emit string) error {
	if emit == "jsonl" {
		enc := jsonLines(w)
		for _, m := range r.Metrics {
			if err := enc.Encode(metricObject{r.Task, data, model, m}); err != nil {
				return err
			}
		}
		return nil
	}
	size := fmt.Sprintf("%d items", r.Items)
	if r.Words > 0 {
		size += fmt.Sprintf(", %d words", r.Words)
	}
	if _, err := fmt.Fprintf(w, "%s: %s, 95 %% intervals of %d resamples, model %s\n", data, size, r.Resamples, model); err != nil {
		return err
	}
	return r.Table().WritePlain(w)
}
