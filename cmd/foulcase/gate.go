package main

import (
	"fmt"
	"strings"

	"example.org/foulcase/eval"
	"github.com/spf13/pflag"
)

// gate is a flag that takes conditions on metrics.
type gate struct {
	conditions eval.Gate
}

func gateFlag(fs *pflag.FlagSet, g *gate) {
	fs.Var(g, "gate", "what must hold, else the exit code is 1: accuracy@1>=0.8 and the like, with a class runon:detection.recall>=0.3, parted by commas")
}

func (g *gate) Type() string { return "CONDITIONS" }

func (g *gate) String() string {
	var all []string
	for _, c := range g.conditions {
		all = append(all, c.String())
	}
	return strings.Join(all, ",")
}

func (g *gate) Set(s string) error {
	more, err := eval.ParseGate(s)
	g.conditions = append(g.conditions, more...)
	return err
}

// passGate prints the conditions that do not hold for the report after, before
// being the one that changes are counted from, if any.
func passGate(c *console, g eval.Gate, before, after *eval.Report) (status, error) {
	failures, err := g.Check(before, after)
	if err != nil {
		return trouble, fmt.Errorf("--gate: %w", err)
	}
	for _, f := range failures {
		value := "not defined"
		if f.Value.Defined() {
			value = fmt.Sprintf("%.4g", float64(f.Value))
		}
		fmt.Fprintf(c.err, "gate: %s does not hold: it is %s\n", f.Condition, value)
	}
	if len(failures) > 0 {
		return marked, nil
	}
	return clean, nil
}
