package editor

import (
	"fmt"
	"strings"

	"example.org/foulcase"
)

// namedCorrections is how many corrections a message has room for. Code actions offer
// the others too.
const namedCorrections = 3

// wording is what a diagnostic says of a mark.
func wording(m foulcase.Mark) string {
	about := map[foulcase.Kind]string{
		foulcase.Nonword:  "is not a word known here",
		foulcase.Realword: "is a word, but hardly the one meant",
		foulcase.Runon:    "seems to lack a space",
		foulcase.Split:    "seems to have a space too many",
		foulcase.Repeat:   "stands there twice",
	}[m.Kind]
	var forms []string
	for _, c := range m.Corrections[:min(len(m.Corrections), namedCorrections)] {
		forms = append(forms, quote(c.Text))
	}
	if m.Rule == foulcase.RuleHouse {
		return fmt.Sprintf("%s is written %s in this house", quote(m.Observed), anyOf(forms))
	}
	return fmt.Sprintf("%s %s: %s? (p %.2f)", quote(m.Observed), about, anyOf(forms), min(m.P, .99))
}

// quote puts a form between quotation marks, on one line.
func quote(form string) string {
	return `"` + strings.Join(strings.Fields(form), " ") + `"`
}

// anyOf joins alternatives as a sentence does.
func anyOf(forms []string) string {
	if len(forms) < 2 {
		return strings.Join(forms, "")
	}
	last := len(forms) - 1
	return strings.Join(forms[:last], ", ") + " or " + forms[last]
}
