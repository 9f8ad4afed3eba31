package main

import (
	"fmt"
	"io"
	"strings"
)

// bashHead begins the script. Bash parts a word at "=", which is taken back; what
// the user wrote is only ever handed to compgen as a word to begin with.
const bashHead = `# Completes command lines of foulcase in bash; printed by foulcase completion bash.
_foulcase() {
	local cur=${COMP_WORDS[COMP_CWORD]} prev=${COMP_WORDS[COMP_CWORD-1]} words= files= reply
	if [[ $cur == = ]]; then
		cur=
	elif [[ $prev == = ]]; then
		prev=${COMP_WORDS[COMP_CWORD-2]}
	fi
	case "$COMP_CWORD ${COMP_WORDS[1]} ${COMP_WORDS[2]} " in
`

const bashTail = `	esac
	COMPREPLY=()
	while IFS= read -r reply; do
		COMPREPLY+=("$reply")
	done < <(
		[[ -z $words ]] || compgen -W "$words" -- "$cur"
		[[ -z $files ]] || compgen -f -- "$cur"
	)
	[[ -z $files ]] || compopt -o filenames 2>/dev/null
}
complete -F _foulcase foulcase
`

func printBashCompletion(w io.Writer, all []completedVerb) error {
	var b strings.Builder
	b.WriteString(bashHead)
	first, _ := firstWords(all)
	bashCase(&b, `"1 "*`, append(first, "help", "--help", "--version"), false)
	bashCase(&b, `"2 help "*`, first, false)
	for _, family := range families(all) {
		bashCase(&b, fmt.Sprintf(`"2 %s "*`, family), secondWords(all, family), false)
		bashCase(&b, fmt.Sprintf(`"3 help %s "*`, family), secondWords(all, family), false)
	}
	for _, v := range all {
		fmt.Fprintf(&b, "\t*\" %s \"*)\n\t\tcase $prev in\n", strings.Join(v.words, " "))
		var spellings []string
		for _, f := range v.flags {
			spellings = append(spellings, f.spellings()...)
			if !f.bare {
				fmt.Fprintf(&b, "\t\t%s)%s ;;\n", strings.Join(f.spellings(), " | "), bashReply(f.values, f.files))
			}
		}
		fmt.Fprintf(&b, "\t\t*) if [[ $cur == -* ]]; then%s; else%s; fi ;;\n\t\tesac ;;\n",
			bashReply(spellings, false), bashReply(v.operands, v.operands == nil))
	}
	b.WriteString(bashTail)
	_, err := io.WriteString(w, b.String())
	return err
}

func bashCase(b *strings.Builder, pattern string, words []string, files bool) {
	fmt.Fprintf(b, "\t%s)%s ;;\n", pattern, bashReply(words, files))
}

// bashReply says what may be written: words, files, or nothing that is known.
func bashReply(words []string, files bool) string {
	reply := ""
	if len(words) > 0 {
		reply += fmt.Sprintf(" words='%s'", strings.Join(words, " "))
	}
	if files {
		reply += " files=yes"
	}
	if reply == "" {
		return " words="
	}
	return reply
}
