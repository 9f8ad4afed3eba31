package report

import (
	"fmt"
	"strings"
	"unicode/utf8"

	"example.org/foulcase"
)

// endOf returns the line and column after a mark. Lines end with LF, CRLF or a
// lone CR.
func endOf(m foulcase.Mark) (line, column int) {
	observed := strings.NewReplacer("\r\n", "\n", "\r", "\n").Replace(m.Observed)
	breaks := strings.Count(observed, "\n")
	if breaks == 0 {
		return m.Line, m.Column + utf8.RuneCountInString(observed)
	}
	last := observed[strings.LastIndexByte(observed, '\n')+1:]
	return m.Line + breaks, 1 + utf8.RuneCountInString(last)
}

// wording says what a mark says in a sentence.
func wording(m foulcase.Mark) string {
	how := "perhaps"
	if m.Grade == foulcase.GradeMark {
		how = "probably"
	}
	var texts []string
	for _, c := range m.Corrections[:min(len(m.Corrections), shownCorrections)] {
		texts = append(texts, Quoted(c.Text))
	}
	if len(texts) == 0 {
		return fmt.Sprintf("%s is %s wrong (p %s)", Quoted(m.Observed), how, Probability(m.P))
	}
	return fmt.Sprintf("%s: %s %s (p %s)", Quoted(m.Observed), how, strings.Join(texts, ", "), Probability(m.P))
}

// kindAbout says what is wrong with a mark of each kind.
var kindAbout = [...]string{
	foulcase.Nonword:  "A form that is no word.",
	foulcase.Realword: "A word, but not the one meant.",
	foulcase.Runon:    "A space is missing between words.",
	foulcase.Split:    "A space stands inside a word.",
	foulcase.Repeat:   "A word is written twice.",
}
