package main

import (
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"io"
	"runtime"
	"slices"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/eval"
	"example.org/foulcase/internal/report"
	"github.com/spf13/pflag"
)

// resampling makes every measurement draw the same resamples.
var resampling = eval.Resampling{Seed: 1}

// measureFlags are the flags of every verb that measures.
type measureFlags struct {
	set     *pflag.FlagSet // all flags of the verb
	verb    string
	engine  engineFlags
	jobs    *count
	emit    *choice
	results string
	gate    gate
}

func (f *measureFlags) declare(fs *pflag.FlagSet) {
	f.set, f.verb = fs, fs.Name()
	f.engine.declare(fs)
	f.jobs = jobsFlag(fs)
	f.emit = emitFlag(fs)
	fs.StringVar(&f.results, "results", "", "`FILE` to write the result to, item by item, for eval compare and eval page")
	gateFlag(fs, &f.gate)
}

// measurement is a run of the harness.
type measurement struct {
	flags  *measureFlags
	engine *foulcase.Engine
	result *eval.Result
}

// start opens the engine and notes what the run is of. The caller closes the
// engine.
func (f *measureFlags) start(task string, files []string) (*measurement, foulcase.Options, error) {
	switch {
	case len(files) == 0:
		return nil, foulcase.Options{}, misusef("no list or text to measure on")
	case f.gate.conditions.Changes():
		return nil, foulcase.Options{}, misusef("--gate: delta: is for eval compare, which has two results")
	}
	e, o, err := f.engine.open()
	if err != nil {
		return nil, o, err
	}
	command, options := f.typed()
	return &measurement{f, e, &eval.Result{
		Format:  eval.ResultFormat,
		Task:    task,
		Command: slices.Concat([]string{"foulcase"}, strings.Fields(f.verb), command, files),
		Version: programVersion(),
		Go:      runtime.Version(),
		Model:   e.Hash(),
		Options: options,
	}}, o, nil
}

// unmeasured are flags that do not bear on what comes out.
var unmeasured = []string{"results", "gate", "emit", "jobs"}

// typed returns the flags that were set, as arguments and by name.
func (f *measureFlags) typed() (args []string, options map[string]string) {
	options = map[string]string{}
	f.set.Visit(func(flag *pflag.Flag) {
		if slices.Contains(unmeasured, flag.Name) {
			return
		}
		values := []string{flag.Value.String()}
		if list, ok := flag.Value.(pflag.SliceValue); ok {
			values = list.GetSlice()
		}
		for _, v := range values {
			args = append(args, "--"+flag.Name+"="+v)
		}
		options[flag.Name] = strings.Join(values, ",")
	})
	slices.Sort(args)
	return args, options
}

// finish reports what was measured and says whether the gate was passed.
func (m *measurement) finish(c *console) (status, error) {
	r := m.result
	r.Sum(resampling)
	for _, d := range r.Data {
		if err := m.print(c.out, d.Name, d.Report, d.Overlap); err != nil {
			return trouble, err
		}
	}
	if len(r.Data) > 1 {
		if err := m.print(c.out, allData, r.Report, r.Overlap); err != nil {
			return trouble, err
		}
	}
	if m.flags.results != "" {
		if err := r.WriteFile(m.flags.results); err != nil {
			return trouble, err
		}
	}
	return passGate(c, m.flags.gate.conditions, nil, r.Report)
}

// allData is what the files of a run are called together.
const allData = "all"

// metricObject is a metric as --emit jsonl prints it.
type metricObject struct {
	Task  string `json:"task"`
	Data  string `json:"data"`
	Model string `json:"model"` // hash
	eval.Metric
	Fitted *float64 `json:"fitted,omitempty"` // share of the data that the model was fitted on, when it is known
}

// print prints the report on one file of data, or on all.
func (m *measurement) print(w io.Writer, data string, r *eval.Report, o eval.Overlap) error {
	if m.flags.emit.value == "jsonl" {
		var fitted *float64
		if share := o.Share(); o.Recorded {
			fitted = &share
		}
		enc := report.JSONLines(w)
		for _, metric := range r.Metrics {
			if err := enc.Encode(metricObject{r.Task, data, m.result.Model, metric, fitted}); err != nil {
				return err
			}
		}
		return nil
	}
	size := fmt.Sprintf("%d items", r.Items)
	if r.Words > 0 {
		size += fmt.Sprintf(", %d words", r.Words)
	}
	if _, err := fmt.Fprintf(w, "%s: %s, 95 %% intervals of %d resamples, model %s\n%s", data, size, r.Resamples, m.result.Model, overlapLine(r.Task, o)); err != nil {
		return err
	}
	return r.Table().WritePlain(w)
}

// overlapLine says what of the data the model was fitted on, where that can be.
func overlapLine(task string, o eval.Overlap) string {
	what := "errors"
	if task == eval.TaskList {
		what = "pairs"
	}
	switch {
	case o.Of == 0:
		return ""
	case !o.Recorded:
		return "the model does not say what it was fitted on\n"
	}
	return fmt.Sprintf("the model was fitted on %d of the %d %s (%.1f %%)\n", o.Fitted, o.Of, what, 100*o.Share())
}

// reader is a reader of package eval; name is the file's in errors.
type reader[T any] func(name string, r io.Reader) ([]T, error)

// readData reads a file of test data, and returns what is known of it without
// measuring.
func readData[T any](c *console, path string, read reader[T]) ([]T, eval.DataFile, error) {
	in := findInputs([]string{path}, c.in, standardInput)[0]
	file := eval.DataFile{Name: in.path}
	r, err := in.open()
	if err != nil {
		return nil, file, err
	}
	defer r.Close()
	sum := sha256.New()
	data, err := read(in.path, io.TeeReader(r, sum))
	if err != nil {
		return nil, file, err
	}
	if len(data) == 0 {
		return nil, file, fmt.Errorf("%s: nothing to measure in it", in.path)
	}
	file.SHA256 = hex.EncodeToString(sum.Sum(nil))
	return data, file, nil
}

// knownBy tells words from other forms as package eval asks for it.
func knownBy(e *foulcase.Engine) func(string) bool {
	return func(word string) bool {
		stem, _ := strings.CutSuffix(strings.ReplaceAll(word, "’", "'"), "'s")
		return e.Known(word) || e.Known(stem)
	}
}
