package main

import (
	"fmt"
	"math"
	"runtime"
	"slices"
	"strconv"
	"strings"

	"github.com/spf13/pflag"
)

// choice is a flag that takes one of a few words.
type choice struct {
	value string
	among []string
	label string // stands for the words in the help, where they are many
}

func (c *choice) String() string { return c.value }

func (c *choice) Type() string {
	if c.label != "" {
		return c.label
	}
	return strings.Join(c.among, "|")
}

func (c *choice) Set(s string) error {
	if !slices.Contains(c.among, s) {
		return fmt.Errorf("want %s", orList(c.among))
	}
	c.value = s
	return nil
}

// choiceFlag declares a flag whose default is the first of the words.
func choiceFlag(fs *pflag.FlagSet, name, usage string, among ...string) *choice {
	return namedChoiceFlag(fs, name, "", usage, among...)
}

// namedChoiceFlag is choiceFlag with a label for the words in the help.
func namedChoiceFlag(fs *pflag.FlagSet, name, label, usage string, among ...string) *choice {
	c := &choice{among[0], among, label}
	fs.Var(c, name, usage)
	return c
}

func emitFlag(fs *pflag.FlagSet) *choice {
	return choiceFlag(fs, "emit", "how results are printed", "lines", "jsonl")
}

func colorFlag(fs *pflag.FlagSet) *choice {
	return choiceFlag(fs, "color", "when lines are coloured", "auto", "always", "never")
}

func jobsFlag(fs *pflag.FlagSet) *count {
	n := count(runtime.GOMAXPROCS(0))
	fs.Var((*jobs)(&n), "jobs", "how many files are read at once")
	return &n
}

// jobs is a count to maxJobs.
type jobs count

// maxJobs is how many files, at most, are open at once, whatever is asked for.
const maxJobs = 256

func (n *jobs) String() string { return (*count)(n).String() }
func (n *jobs) Type() string   { return (*count)(n).Type() }

func (n *jobs) Set(s string) error {
	var v count
	if err := v.Set(s); err != nil || v > maxJobs {
		return fmt.Errorf("want a whole number from 1 to %d", maxJobs)
	}
	*n = jobs(v)
	return nil
}

// count is a flag that takes a whole number from 1 on.
type count int

func (n *count) String() string { return strconv.Itoa(int(*n)) }
func (n *count) Type() string   { return "N" }

func (n *count) Set(s string) error {
	v, err := strconv.Atoi(s)
	if err != nil || v < 1 {
		return fmt.Errorf("want a whole number from 1 on")
	}
	*n = count(v)
	return nil
}

// rate is a flag that takes a positive number; 0 means it was not given.
type rate float64

func (r *rate) Type() string { return "N" }

func (r *rate) String() string {
	if *r == 0 {
		return ""
	}
	return strconv.FormatFloat(float64(*r), 'g', -1, 64)
}

func (r *rate) Set(s string) error {
	v, err := strconv.ParseFloat(s, 64)
	if err != nil || !(v > 0) || math.IsInf(v, 0) {
		return fmt.Errorf("want a number above 0")
	}
	*r = rate(v)
	return nil
}

// size is a flag that takes a number of bytes: "26MiB", "1G", "500000".
type size int64

func (z *size) Type() string { return "SIZE" }

func (z *size) String() string {
	if *z == 0 {
		return ""
	}
	return formatSize(int64(*z))
}

func (z *size) Set(s string) error {
	n, err := parseSize(s)
	if err != nil {
		return err
	}
	*z = size(n)
	return nil
}

// sizeUnits are tried in order, so a suffix stands after those that end in it.
// A bare letter is binary, as memory is counted.
var sizeUnits = []struct {
	suffix string
	bytes  float64
}{
	{"KiB", 1 << 10},
	{"MiB", 1 << 20},
	{"GiB", 1 << 30},
	{"KB", 1e3},
	{"MB", 1e6},
	{"GB", 1e9},
	{"K", 1 << 10},
	{"M", 1 << 20},
	{"G", 1 << 30},
	{"B", 1},
	{"", 1},
}

// parseSize reads a number of bytes with or without a unit.
func parseSize(s string) (int64, error) {
	for _, u := range sizeUnits {
		number, ok := strings.CutSuffix(s, u.suffix)
		if !ok {
			continue
		}
		v, err := strconv.ParseFloat(strings.TrimSpace(number), 64)
		if err != nil || !(v*u.bytes >= 1) || v*u.bytes > 1<<50 {
			break
		}
		return int64(v * u.bytes), nil
	}
	return 0, fmt.Errorf("want a number of bytes such as 26MiB, 500KB or 1G")
}

// formatSize writes a number of bytes in the binary unit that reads best.
func formatSize(n int64) string {
	switch {
	case n >= 1<<30:
		return fmt.Sprintf("%.1f GiB", float64(n)/(1<<30))
	case n >= 1<<20:
		return fmt.Sprintf("%.1f MiB", float64(n)/(1<<20))
	case n >= 1<<10:
		return fmt.Sprintf("%.1f KiB", float64(n)/(1<<10))
	}
	return fmt.Sprintf("%d B", n)
}

// orList joins words as a sentence does: "a, b or c".
func orList(words []string) string {
	if len(words) < 2 {
		return strings.Join(words, "")
	}
	last := len(words) - 1
	return strings.Join(words[:last], ", ") + " or " + words[last]
}
