package report

import (
	"fmt"
	"io"
	"path/filepath"
	"strings"

	"example.org/foulcase"
)

// annotations are the workflow commands by which hosted CI runs attach messages
// to lines of files (form and escapes from memory of its documentation).
type annotations struct{ bare }

func (annotations) Page(w io.Writer, d Document) Page {
	return pageFunc(func(m foulcase.Mark) error {
		level := "notice"
		if m.Grade == foulcase.GradeMark {
			level = "warning"
		}
		place := "file=" + property.Replace(filepath.ToSlash(filepath.Clean(d.Path)))
		if m.Part == "" {
			place += linesOf(m)
		}
		_, err := fmt.Fprintf(w, "::%s %s,title=%s::%s\n", level, place,
			property.Replace("foulcase: "+m.Kind.String()), message.Replace(wording(m)))
		return err
	})
}

// linesOf gives the lines of a mark, and its columns where it stands in one line:
// across lines they are not taken.
func linesOf(m foulcase.Mark) string {
	line, column := endOf(m)
	if line != m.Line {
		return fmt.Sprintf(",line=%d,endLine=%d", m.Line, line)
	}
	return fmt.Sprintf(",line=%d,endLine=%d,col=%d,endColumn=%d", m.Line, line, m.Column, column)
}

// Escapes of the message and of the values of properties.
var (
	message  = strings.NewReplacer("%", "%25", "\r", "%0D", "\n", "%0A")
	property = strings.NewReplacer("%", "%25", "\r", "%0D", "\n", "%0A", ":", "%3A", ",", "%2C")
)
