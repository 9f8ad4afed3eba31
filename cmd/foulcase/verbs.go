package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/spf13/pflag"
)

// A verb is one thing that foulcase does.
type verb struct {
	name     string // one word, or two: "proof", "lm train"
	operands string // as the synopsis shows them
	summary  string // one line, for the overview
	about    string // what a user must know beyond the flags
	examples string // command lines, a line each; tests run them
	// declare adds the verb's flags and returns what it does with them.
	declare func(*pflag.FlagSet) action
}

// exampleLines returns the command lines of the examples.
func (v verb) exampleLines() []string {
	var lines []string
	for line := range strings.Lines(v.examples) {
		if line = strings.TrimSpace(line); line != "" {
			lines = append(lines, line)
		}
	}
	return lines
}

// verbs lists every verb in the order the overview shows them.
func verbs() []verb {
	return []verb{
		proofVerb(),
		rankVerb(),
		ledgerVerb(),
		stetVerb(),
		editorVerb(),
		lmTrainVerb(),
		lmMeasureVerb(),
		channelFitVerb(),
		channelShowVerb(),
		modelBuildVerb(),
		modelCalibrateVerb(),
		modelShowVerb(),
		modelCheckVerb(),
		evalListVerb(),
		evalTextVerb(),
		evalNoiseVerb(),
		evalPageVerb(),
		evalCompareVerb(),
		manualVerb(),
		completionVerb(),
	}
}

// flagSet declares the verb's flags on a new set.
func (v verb) flagSet() (*pflag.FlagSet, action) {
	fs := pflag.NewFlagSet(v.name, pflag.ContinueOnError)
	fs.SortFlags = false
	fs.SetOutput(io.Discard)
	fs.Usage = func() {}
	return fs, v.declare(fs)
}

// findVerb splits args into the verb they begin with and what follows it.
func findVerb(args []string) (verb, []string, bool) {
	for _, v := range verbs() {
		n := 1 + strings.Count(v.name, " ")
		if len(args) >= n && strings.Join(args[:n], " ") == v.name {
			return v, args[n:], true
		}
	}
	return verb{}, nil, false
}

// isFamily tells whether verbs of two words begin with word.
func isFamily(word string) bool {
	for _, v := range verbs() {
		if strings.HasPrefix(v.name, word+" ") {
			return true
		}
	}
	return false
}

// printOverview lists the verbs, or those of one family.
func printOverview(w io.Writer, family string) {
	if family == "" {
		fmt.Fprint(w, "foulcase finds misspellings in documents, those that are words too.\n\n")
	}
	fmt.Fprint(w, "Usage: foulcase VERB [flags] [operands]\n\n")
	for _, v := range verbs() {
		if family == "" || strings.HasPrefix(v.name, family+" ") {
			fmt.Fprintf(w, "  %-15s %s\n", v.name, v.summary)
		}
	}
	fmt.Fprint(w, "\n`foulcase VERB --help` tells the flags of a verb and shows an example;\n"+
		"`foulcase --version` tells the version and the model inside.\n"+
		"Exit codes: 0 nothing marked, 1 something marked, 2 trouble.\n")
}

// printHelp describes one verb.
func printHelp(w io.Writer, v verb, fs *pflag.FlagSet) {
	fmt.Fprintf(w, "foulcase %s: %s\n\n", v.name, v.summary)
	fmt.Fprintf(w, "Usage: foulcase %s [flags] %s\n\n", v.name, v.operands)
	fmt.Fprintf(w, "%s\n\n", strings.TrimSpace(v.about))
	fmt.Fprintf(w, "Flags:\n%s\n", fs.FlagUsagesWrapped(80))
	fmt.Fprint(w, "For example:\n")
	for _, line := range v.exampleLines() {
		fmt.Fprintf(w, "  %s\n", line)
	}
}
