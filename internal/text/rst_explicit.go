package text

import (
	"bytes"
	"strings"
)

// explicit reads an explicit markup block at line i: a footnote, directive or
// substitution; targets and comments are left out.
func (d *rst) explicit(i, bound, indent int) int {
	end := max(d.inside(i+1, bound, indent), i+1)
	if len(d.line(i)) == 2 {
		if i+1 < bound && d.lines[i+1].blank() {
			return i + 1 // an empty comment takes no block
		}
		return end
	}
	d.advance(i, 2)
	line := d.line(i)
	switch {
	case line[0] == '[':
		if n := bytes.IndexByte(line, ']'); n > 0 && (n+1 == len(line) || isSpaceByte(line[n+1])) {
			d.advance(i, n+1)
			d.bodyBehind(i, end)
		}
		return end
	case line[0] == '_':
		return end
	case line[0] == '|':
		if n := bytes.Index(line, []byte("| ")); n > 0 {
			d.advance(i, n+1)
		}
	}
	if name, n := directiveName(d.line(i)); n > 0 {
		d.advance(i, n)
		d.directive(name, i, end)
	}
	return end
}

// directiveName reads "name::" at the start of a line; n is 0 when there is none.
func directiveName(line []byte) (name string, n int) {
	n = bytes.Index(line, []byte("::"))
	if n <= 0 || n+2 < len(line) && !isSpaceByte(line[n+2]) || bytes.ContainsAny(line[:n], " \t`") {
		return "", 0
	}
	return strings.ToLower(string(line[:n])), n + 2
}

// directiveUse says what of a directive is prose.
type directiveUse struct {
	argument, body bool
	runOn          bool // the argument is the beginning of the body
}

// directiveUses is the table of directives. Source: reStructuredText Directives of
// docutils and those of Sphinx, from memory. Of others nothing is read but the
// bodies of those that describe objects of a language ("py:function").
func directiveUses(name string) directiveUse {
	switch name {
	case "note", "warning", "tip", "important", "hint", "caution", "danger", "attention", "error", "seealso", "epigraph",
		"highlights", "pull-quote", "compound", "parsed-note", "todo", "replace", "footer", "header", "centered", "rubric",
		"versionadded", "versionchanged", "deprecated":
		return directiveUse{argument: true, body: true, runOn: true}
	case "admonition", "topic", "sidebar", "table", "list-table", "tab", "dropdown":
		return directiveUse{argument: true, body: true}
	case "csv-table":
		return directiveUse{argument: true}
	case "figure", "container", "class", "only", "glossary", "tabs", "tab-set", "tab-item", "card", "line-block", "hlist",
		"function", "method", "data", "attribute", "exception", "option", "envvar", "describe", "object", "confval":
		return directiveUse{body: true}
	}
	return directiveUse{body: strings.Contains(name, ":")}
}

// directive reads what is prose of the directive whose argument is the rest of
// line i and whose body ends before line end.
func (d *rst) directive(name string, i, end int) {
	options, next := d.optionLines(i, end)
	if name == "image" || name == "figure" {
		d.alternative(options, next)
	}
	d.leaveOut(options, next)
	use := directiveUses(name)
	switch {
	case use.runOn:
		if strings.HasPrefix(name, "version") || name == "deprecated" {
			d.advance(i, max(bytes.IndexByte(d.line(i), ' '), 0))
		}
		d.bodyBehind(i, end)
		return
	case use.argument && !d.lines[i].blank():
		d.emit(true, [2]int{d.lines[i].start, d.lines[options-1].end})
	}
	if !use.body {
		return
	}
	for next < end && d.lines[next].blank() {
		next++
	}
	if next < end {
		d.body(next, end, d.lines[next].indent)
	}
}

// optionLines returns where the options of the directive at line i begin and end:
// behind its argument, which may take more lines than that one.
func (d *rst) optionLines(i, bound int) (from, to int) {
	to = d.stretch(i+1, bound)
	for from = i + 1; from < to; from++ {
		if fieldMark(d.line(from)) > 0 {
			return from, to
		}
	}
	return i + 1, i + 1
}

// leaveOut makes lines blank.
func (d *rst) leaveOut(i, end int) {
	for ; i < end; i++ {
		d.lines[i].start = d.lines[i].end
	}
}

// alternative reads the text in place of an image.
func (d *rst) alternative(i, end int) {
	for ; i < end; i++ {
		if bytes.HasPrefix(d.line(i), []byte(":alt: ")) {
			d.emit(false, [2]int{d.lines[i].start + len(":alt: "), d.lines[i].end})
		}
	}
}
