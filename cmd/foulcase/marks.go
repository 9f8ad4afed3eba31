package main

import (
	"encoding/json"
	"fmt"
	"io"
	"strconv"
	"strings"
	"unicode"

	"example.org/foulcase"
)

// shownCorrections is how many corrections a line has room for.
const shownCorrections = 3

// newMarkPrinter returns the function that prints the marks of one document in
// a form of --emit.
func newMarkPrinter(w io.Writer, emit, path string, p palette) func(foulcase.Mark) error {
	if emit == "jsonl" {
		enc := jsonLines(w)
		return func(m foulcase.Mark) error {
			return enc.Encode(markObject{path, m})
		}
	}
	path = visible(path)
	return func(m foulcase.Mark) error {
		_, err := io.WriteString(w, markLine(path, m, p))
		return err
	}
}

// markObject is a mark as --emit jsonl prints it.
type markObject struct {
	Path string `json:"path"`
	foulcase.Mark
}

// jsonLines returns an encoder that writes an object a line, with "<", ">" and
// "&" as they are.
func jsonLines(w io.Writer) *json.Encoder {
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	return enc
}

// markLine prints a mark in the GNU form of compilers' messages, which editors
// can jump by.
func markLine(path string, m foulcase.Mark, p palette) string {
	grade := p.paint(yellow, m.Grade.String())
	if m.Grade == foulcase.GradeMark {
		grade = p.paint(red, m.Grade.String())
	}
	var b strings.Builder
	fmt.Fprintf(&b, "%s %s %s %s", p.paint(bold, fmt.Sprintf("%s:%d:%d:", path, m.Line, m.Column)),
		grade, m.Kind, p.paint(red, quoted(m.Observed)))
	for i, correction := range m.Corrections[:min(len(m.Corrections), shownCorrections)] {
		separator := ", "
		if i == 0 {
			separator = " -> "
		}
		b.WriteString(separator + p.paint(green, quoted(correction.Text)))
	}
	fmt.Fprintf(&b, " %s\n", p.paint(dim, "(p "+probability(m.P)+")"))
	return b.String()
}

// quoted puts text from a document between quotation marks on one line, with
// anything that could drive a terminal escaped.
func quoted(s string) string {
	if strings.IndexFunc(s, func(r rune) bool { return !unicode.IsPrint(r) }) < 0 {
		return `"` + s + `"`
	}
	return strconv.Quote(s)
}

// visible is a path as it is, unless it holds what could drive a terminal or
// break the line.
func visible(path string) string {
	if strings.IndexFunc(path, unicode.IsControl) < 0 {
		return path
	}
	return strconv.Quote(path)
}

// probability writes p with two decimals and never claims certainty: 0.99
// stands for all that is more.
func probability(p float64) string {
	return strconv.FormatFloat(min(max(p, 0.01), 0.99), 'f', 2, 64)
}
