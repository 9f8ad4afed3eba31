package main

import (
	"fmt"
	"io"
	"strings"
)

// fishHead begins the script with the two questions about the words before the
// cursor: do they begin with these, and are they these?
const fishHead = `# Completes command lines of foulcase in fish; printed by foulcase completion fish.
function __foulcase_after
	set -l given (commandline -opc)
	set -e given[1]
	set -l words (count $argv)
	test (count $given) -ge $words; or return 1
	test "$given[1..$words]" = "$argv"
end
function __foulcase_right_after
	set -l given (commandline -opc)
	set -e given[1]
	test "$given" = "$argv"
end
complete -c foulcase -f
`

func printFishCompletion(w io.Writer, all []completedVerb) error {
	var b strings.Builder
	b.WriteString(fishHead)
	first, summaries := firstWords(all)
	for i, word := range first {
		fmt.Fprintf(&b, "complete -c foulcase -n __foulcase_right_after -a %s -d %s\n", word, fishQuote(summaries[i]))
		fmt.Fprintf(&b, "complete -c foulcase -n '__foulcase_right_after help' -a %s -d %s\n", word, fishQuote(summaries[i]))
	}
	b.WriteString("complete -c foulcase -n __foulcase_right_after -a help -d 'explain a verb'\n" +
		"complete -c foulcase -n __foulcase_right_after -l version -d 'tell the version'\n")
	for _, v := range all {
		if len(v.words) == 2 {
			fmt.Fprintf(&b, "complete -c foulcase -n '__foulcase_right_after %s' -a %s -d %s\n", v.words[0], v.words[1], fishQuote(v.summary))
		}
		after := fmt.Sprintf("complete -c foulcase -n '__foulcase_after %s'", strings.Join(v.words, " "))
		if v.operands == nil {
			b.WriteString(after + " -F\n")
		} else {
			fmt.Fprintf(&b, "%s -a %s\n", after, fishQuote(strings.Join(v.operands, " ")))
		}
		for _, f := range v.flags {
			b.WriteString(after + fishFlag(f) + "\n")
		}
	}
	_, err := io.WriteString(w, b.String())
	return err
}

// fishFlag describes a flag to complete.
func fishFlag(f completedFlag) string {
	s := " -l " + f.name
	if f.letter != "" {
		s += " -s " + f.letter
	}
	switch {
	case f.bare:
	case len(f.values) > 0:
		s += " -x -a " + fishQuote(strings.Join(f.values, " "))
	case f.files:
		s += " -r -F"
	default:
		s += " -x"
	}
	return s + " -d " + fishQuote(f.usage)
}

// fishQuote puts s between single quotation marks.
func fishQuote(s string) string {
	return "'" + strings.NewReplacer(`\`, `\\`, "'", `\'`).Replace(s) + "'"
}
