package report

import (
	"fmt"
	"io"
	"strings"

	"example.org/foulcase"
)

// shownCorrections is how many corrections a line has room for.
const shownCorrections = 3

// lines is a line a mark.
type lines struct {
	bare
	palette Palette
}

func (l lines) Page(w io.Writer, d Document) Page {
	return pageFunc(func(m foulcase.Mark) error {
		_, err := io.WriteString(w, Line(d.Path, m, l.palette))
		return err
	})
}

// Line is a mark in the GNU form of compilers' messages, which editors can jump
// by. In a packed document the part stands after the path, since its lines are
// paragraphs of that.
func Line(path string, m foulcase.Mark, p Palette) string {
	grade := p.Paint(Yellow, m.Grade.String())
	if m.Grade == foulcase.GradeMark {
		grade = p.Paint(Red, m.Grade.String())
	}
	var b strings.Builder
	fmt.Fprintf(&b, "%s %s %s %s", p.Paint(Bold, Place(path, m)+":"), grade, m.Kind, p.Paint(Red, Quoted(m.Observed)))
	for i, correction := range m.Corrections[:min(len(m.Corrections), shownCorrections)] {
		separator := ", "
		if i == 0 {
			separator = " -> "
		}
		b.WriteString(separator + p.Paint(Green, Quoted(correction.Text)))
	}
	fmt.Fprintf(&b, " %s\n", p.Paint(Dim, "(p "+Probability(m.P)+")"))
	return b.String()
}

// Place is where a mark stands: path, line and column.
func Place(path string, m foulcase.Mark) string {
	if m.Part != "" {
		path += "!" + m.Part
	}
	return fmt.Sprintf("%s:%d:%d", Visible(path), m.Line, m.Column)
}
