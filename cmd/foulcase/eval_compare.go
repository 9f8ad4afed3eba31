package main

import (
	"fmt"
	"io"
	"os"
	"strings"

	"example.org/foulcase/eval"
	"example.org/foulcase/internal/report"
	"github.com/spf13/pflag"
)

func evalCompareVerb() verb {
	return verb{
		name:     "eval compare",
		operands: "BEFORE.json AFTER.json",
		summary:  "tell whether one result is better than another",
		about: `
Compares two results that eval list, text or noise wrote with --results, item by
item. They must be of the same data, byte for byte, read in the same way.

For the chief metrics it prints both values, the difference with its 95 %
interval and its p by paired bootstrap (Koehn 2004) over pairs or documents;
then McNemar's test of what is right in one result alone, its p exact below 25
such items; then how many items changed, and the first of those that got better
and worse.

--gate names what must hold of AFTER, and behind "delta:" of the difference;
what does not hold is printed and the exit code is 1.

--emit jsonl prints one object: task, units, resamples, rows, tests, better and
worse.`,
		examples: `
			foulcase eval compare before.json after.json
			foulcase eval compare --class deletion --gate 'accuracy@1>=0.3,delta:mrr>-0.2' before.json after.json`,
		declare: declareEvalCompare,
	}
}

// compareFlags are what the user asked of eval compare.
type compareFlags struct {
	classes []string
	show    int
	gate    gate
	emit    *choice
}

func declareEvalCompare(fs *pflag.FlagSet) action {
	f := new(compareFlags)
	fs.StringArrayVar(&f.classes, "class", nil, "`CLASS` to compare by itself too; may be repeated")
	fs.IntVar(&f.show, "show", 5, "how many of the items that got better, and worse, are listed")
	gateFlag(fs, &f.gate)
	f.emit = emitFlag(fs)
	return f.run
}

func (f *compareFlags) run(c *console, paths []string) (status, error) {
	if len(paths) != 2 {
		return trouble, misusef("want two results, the one before and the one after, not %d", len(paths))
	}
	var results [2]*eval.Result
	for i, path := range paths {
		var err error
		if results[i], err = readResult(path); err != nil {
			return trouble, err
		}
	}
	before, after := results[0], results[1]
	comparison, err := eval.Compare(before, after, f.classes, resampling)
	if err != nil {
		return trouble, err
	}
	if f.emit.value == "jsonl" {
		err = report.JSONLines(c.out).Encode(comparison)
	} else {
		err = f.print(c.out, comparison, paths, results)
	}
	if err != nil {
		return trouble, err
	}
	return passGate(c, f.gate.conditions, before.Report, after.Report)
}

// readResult reads a result file.
func readResult(path string) (*eval.Result, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	return eval.ReadResult(path, f)
}

func (f *compareFlags) print(w io.Writer, c *eval.Comparison, paths []string, results [2]*eval.Result) error {
	var b strings.Builder
	for i, path := range paths {
		fmt.Fprintf(&b, "%c: %s, model %s, foulcase %s\n", 'A'+i, path, results[i].Model, results[i].Version)
	}
	fmt.Fprintf(&b, "task %s, %d units, 95 %% intervals of %d paired resamples\n\n", c.Task, c.Units, c.Resamples)
	if err := c.Table().WritePlain(&b); err != nil {
		return err
	}
	for _, t := range c.Tests {
		p, name := t.Shown()
		fmt.Fprintf(&b, "\n%s: of %d in A alone %d, in B alone %d; McNemar p %s (%s)", t.Question, t.Items, t.OnlyA, t.OnlyB, pText(p), name)
	}
	fmt.Fprintf(&b, "\n%d items better, %d worse\n", len(c.Better), len(c.Worse))
	f.list(&b, "better", c.Better)
	f.list(&b, "worse", c.Worse)
	_, err := io.WriteString(w, b.String())
	return err
}

// pText writes a p with its sign of comparison.
func pText(p float64) string {
	if p < .0001 {
		return "< 0.0001"
	}
	return fmt.Sprintf("= %.4f", p)
}

// list prints the first of the items that changed.
func (f *compareFlags) list(w io.Writer, how string, items []eval.Changed) {
	for _, item := range items[:max(0, min(f.show, len(items)))] {
		wanted := ""
		if item.Wanted != "" {
			wanted = " for " + report.Quoted(item.Wanted)
		}
		fmt.Fprintf(w, "  %-6s  %s:%d: %s%s: %s -> %s\n", how, item.Data, item.Line, report.Quoted(item.Observed), wanted, item.A, item.B)
	}
}
