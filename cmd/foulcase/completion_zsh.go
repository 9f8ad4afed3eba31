package main

import (
	"fmt"
	"io"
	"strings"
)

func printZshCompletion(w io.Writer, all []completedVerb) error {
	var b strings.Builder
	b.WriteString("#compdef foulcase\n# Completes command lines of foulcase in zsh; printed by foulcase completion zsh.\n_foulcase() {\n\tlocal -a choices\n")
	first, summaries := firstWords(all)
	b.WriteString("\tif (( CURRENT == 2 )); then\n")
	zshChoices(&b, append(first, "help", "--version"), append(summaries, "explain a verb", "tell the version"))
	b.WriteString("\tfi\n\tcase \"$words[2] \" in\n")
	b.WriteString("\t'help ') (( CURRENT == 3 )) && compadd -- " + strings.Join(first, " ") + "; return ;;\n")
	for _, family := range families(all) {
		fmt.Fprintf(&b, "\t'%s ')\n\tif (( CURRENT == 3 )); then\n", family)
		var words, summaries []string
		for _, v := range all {
			if v.words[0] == family {
				words, summaries = append(words, v.words[1]), append(summaries, v.summary)
			}
		}
		zshChoices(&b, words, summaries)
		b.WriteString("\tfi ;;\n")
	}
	b.WriteString("\tesac\n\tcase \"$words[2] $words[3] \" in\n")
	for _, v := range all {
		fmt.Fprintf(&b, "\t'%s '*)\n\t\tshift %d words; (( CURRENT -= %[2]d ))\n\t\t_arguments -s -S", strings.Join(v.words, " "), len(v.words))
		for _, f := range v.flags {
			for _, spec := range zshFlag(f) {
				b.WriteString(" \\\n\t\t\t" + zshQuote(spec))
			}
		}
		b.WriteString(" \\\n\t\t\t" + zshQuote(zshOperands(v)) + " ;;\n")
	}
	b.WriteString("\tesac\n}\nif [[ $funcstack[1] == _foulcase ]]; then\n\t_foulcase \"$@\"\nelse\n\tcompdef _foulcase foulcase\nfi\n")
	_, err := io.WriteString(w, b.String())
	return err
}

// zshChoices offers words with their summaries, and returns.
func zshChoices(b *strings.Builder, words, summaries []string) {
	b.WriteString("\t\tchoices=(")
	for i, word := range words {
		b.WriteString("\n\t\t\t" + zshQuote(zshEscape(word)+":"+summaries[i]))
	}
	b.WriteString(")\n\t\t_describe verb choices\n\t\treturn\n")
}

// zshFlag describes a flag to _arguments, a line a spelling.
func zshFlag(f completedFlag) []string {
	var specs []string
	for _, spelling := range f.spellings() {
		spec := spelling
		if f.many {
			spec = "*" + spec
		}
		if !f.bare && strings.HasPrefix(spelling, "--") {
			spec += "="
		}
		spec += "[" + zshEscape(f.usage) + "]"
		if !f.bare {
			spec += ":" + zshEscape(f.label) + ":" + zshAction(f.values, f.files)
		}
		specs = append(specs, spec)
	}
	return specs
}

func zshOperands(v completedVerb) string {
	if v.operands == nil {
		return "*:path:_files"
	}
	return "1:operand:" + zshAction(v.operands, false)
}

// zshAction says what may be written: words, files, or nothing that is known.
func zshAction(words []string, files bool) string {
	switch {
	case len(words) > 0:
		return "(" + strings.Join(words, " ") + ")"
	case files:
		return "_files"
	}
	return " "
}

var zshEscape = strings.NewReplacer(`\`, `\\`, ":", `\:`, "[", `\[`, "]", `\]`).Replace

// zshQuote puts s between single quotation marks.
func zshQuote(s string) string { return "'" + strings.ReplaceAll(s, "'", `'\''`) + "'" }
