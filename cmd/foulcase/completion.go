package main

import (
	"io"
	"slices"
	"strings"

	"github.com/spf13/pflag"
)

func completionVerb() verb {
	return verb{
		name:     "completion",
		operands: "bash|zsh|fish",
		summary:  "print a script that completes command lines",
		about: `
Prints a script for a shell, made of the verbs and flags. Have it read when the
shell starts:

  bash  source <(foulcase completion bash)  in ~/.bashrc
  zsh   source <(foulcase completion zsh)   in ~/.zshrc, after compinit
  fish  foulcase completion fish | source   in ~/.config/fish/config.fish`,
		examples: `
			foulcase completion bash`,
		declare: declareCompletion,
	}
}

// shells are the shells that command lines are completed in.
var shells = map[string]func(io.Writer, []completedVerb) error{
	"bash": printBashCompletion,
	"zsh":  printZshCompletion,
	"fish": printFishCompletion,
}

func declareCompletion(*pflag.FlagSet) action {
	return func(c *console, operands []string) (status, error) {
		if len(operands) != 1 || shells[operands[0]] == nil {
			return trouble, misusef("name one shell: bash, zsh or fish")
		}
		return clean, shells[operands[0]](c.out, completedVerbs())
	}
}

// completedVerb is what can be written after a verb.
type completedVerb struct {
	words    []string // of its name
	summary  string
	flags    []completedFlag
	operands []string // what may stand there; nil stands for files
}

// completedFlag is a flag and what can be written after it.
type completedFlag struct {
	name   string // without its dashes
	letter string // its short form, or ""
	usage  string
	bare   bool     // it takes no value
	label  string   // of the value
	values []string // what the value may be, if that is known
	files  bool     // the value is a path
	many   bool     // it may be given again
}

// completedVerbs lists all verbs with their flags.
func completedVerbs() []completedVerb {
	var all []completedVerb
	for _, v := range verbs() {
		c := completedVerb{words: strings.Fields(v.name), summary: v.summary}
		if strings.Contains(v.operands, "|") {
			c.operands = strings.Split(v.operands, "|")
		}
		fs, _ := v.flagSet()
		fs.VisitAll(func(f *pflag.Flag) { c.flags = append(c.flags, completeFlag(f)) })
		c.flags = append(c.flags, completedFlag{name: "help", usage: "tell the flags and show an example", bare: true})
		all = append(all, c)
	}
	return all
}

func completeFlag(f *pflag.Flag) completedFlag {
	label, usage := pflag.UnquoteUsage(f)
	usage, _, _ = strings.Cut(usage, ";")
	usage, _, _ = strings.Cut(usage, " (")
	c := completedFlag{name: f.Name, letter: f.Shorthand, usage: usage, bare: f.NoOptDefVal != "", label: label}
	if one, ok := f.Value.(*choice); ok {
		c.values = one.among
		c.label = f.Name
	}
	c.files = slices.ContainsFunc([]string{"FILE", "PATH", "DIR"}, func(s string) bool { return strings.HasSuffix(label, s) })
	_, c.many = f.Value.(pflag.SliceValue)
	return c
}

// spellings are the ways to write the flag.
func (f completedFlag) spellings() []string {
	if f.letter == "" {
		return []string{"--" + f.name}
	}
	return []string{"-" + f.letter, "--" + f.name}
}

// firstWords lists what can be written after "foulcase": the first words of the
// verbs, with the summary of those that are whole.
func firstWords(all []completedVerb) (words, summaries []string) {
	for _, v := range all {
		if slices.Contains(words, v.words[0]) {
			continue
		}
		words = append(words, v.words[0])
		if len(v.words) == 1 {
			summaries = append(summaries, v.summary)
		} else {
			summaries = append(summaries, "verbs: "+strings.Join(secondWords(all, v.words[0]), ", "))
		}
	}
	return words, summaries
}

// secondWords lists what can be written after the first word of a family.
func secondWords(all []completedVerb, family string) []string {
	var words []string
	for _, v := range all {
		if v.words[0] == family && len(v.words) == 2 {
			words = append(words, v.words[1])
		}
	}
	return words
}

// families lists the first words that verbs of two words begin with.
func families(all []completedVerb) []string {
	var words []string
	for _, v := range all {
		if len(v.words) == 2 && !slices.Contains(words, v.words[0]) {
			words = append(words, v.words[0])
		}
	}
	return words
}
