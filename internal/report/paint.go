package report

import (
	"strconv"
	"strings"
	"unicode"
)

// Colours as SGR parameters (ECMA-48).
const (
	Red    = "31"
	Green  = "32"
	Yellow = "33"
	Bold   = "1"
	Dim    = "2"
)

// Palette paints text for a terminal, or leaves it alone.
type Palette bool

// Paint returns text in a colour.
func (p Palette) Paint(sgr, text string) string {
	if !p {
		return text
	}
	return "\x1b[" + sgr + "m" + text + "\x1b[0m"
}

// Quoted puts text from a document between quotation marks on one line, with
// anything that could drive a terminal escaped.
func Quoted(s string) string {
	if strings.IndexFunc(s, func(r rune) bool { return !unicode.IsPrint(r) }) < 0 {
		return `"` + s + `"`
	}
	return strconv.Quote(s)
}

// Visible is a path as it is, unless it holds what could drive a terminal or
// break the line.
func Visible(path string) string {
	if strings.IndexFunc(path, unicode.IsControl) < 0 {
		return path
	}
	return strconv.Quote(path)
}

// Probability writes p with two decimals and never claims certainty: 0.99
// stands for all that is more.
func Probability(p float64) string {
	return strconv.FormatFloat(min(max(p, 0.01), 0.99), 'f', 2, 64)
}
