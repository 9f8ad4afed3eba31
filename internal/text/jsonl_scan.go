package text

import (
	"bytes"
	"fmt"
	"slices"
	"unicode/utf8"
)

// mostNested is how deep values may stand in each other.
const mostNested = 1000

// jsonScan walks over JSON values and keeps the offset of each string. Without
// fields every string value that holds prose is read, else the values of the
// fields alone. Names of members are never read.
type jsonScan struct {
	*emitter
	pos, end  int  // where it stands, and where the value must end
	lenient   bool // bears comments and a comma behind the last member
	ascii     bool // the document has no other character
	fields    []jsonField
	path      []jsonStep // to the value at hand; the names are kept when there are fields
	segmenter Segmenter
}

func newJSONScan(e *emitter, fields []string) *jsonScan {
	high := func(c byte) bool { return c >= utf8.RuneSelf }
	j := &jsonScan{emitter: e, ascii: !slices.ContainsFunc(e.source[e.at:], high)}
	for _, f := range fields {
		j.fields = append(j.fields, newJSONField(f))
	}
	return j
}

// document reads the value at j.pos, behind which nothing may stand up to j.end.
func (j *jsonScan) document(rule string) error {
	j.path = j.path[:0]
	if err := j.value(); err != nil || j.stopped {
		return err
	}
	if j.space(); j.pos < j.end {
		return j.fault("something stands behind the value: %s", rule)
	}
	return nil
}

// fault is an error at the place where the scan stands.
func (j *jsonScan) fault(format string, args ...any) error {
	at := j.position(j.pos)
	return unreadable("line %d, column %d: %s; correct the JSON there", at.Line, at.Column, fmt.Sprintf(format, args...))
}

// peek returns the next byte, 0 at the end.
func (j *jsonScan) peek() byte {
	if j.pos < j.end {
		return j.source[j.pos]
	}
	return 0
}

// space moves over white space and, where they are borne, comments.
func (j *jsonScan) space() {
	for j.pos < j.end {
		switch rest := j.source[j.pos:j.end]; {
		case bytes.IndexByte([]byte(" \t\n\r"), rest[0]) >= 0:
			j.pos++
		case j.lenient && bytes.HasPrefix(rest, []byte("//")):
			j.pos += endOr(bytes.IndexAny(rest, "\r\n"), 0, len(rest))
		case j.lenient && bytes.HasPrefix(rest, []byte("/*")):
			j.pos += endOr(bytes.Index(rest, []byte("*/")), 2, len(rest))
		default:
			return
		}
	}
}

// endOr is found + more, or none when nothing was found.
func endOr(found, more, none int) int {
	if found < 0 {
		return none
	}
	return found + more
}

// value reads the value that begins at the next byte which is no white space.
func (j *jsonScan) value() error {
	j.space()
	switch c := j.peek(); {
	case j.stopped:
		return nil
	case c == '{':
		return j.list('}', j.member)
	case c == '[':
		return j.list(']', j.element)
	case c == '"':
		from, to, err := j.quoted()
		if err == nil {
			j.text(from, to)
		}
		return err
	case c == '-' || classes[c]&cDigit != 0:
		return j.number()
	}
	for _, word := range []string{"true", "false", "null"} {
		if bytes.HasPrefix(j.source[j.pos:j.end], []byte(word)) {
			j.pos += len(word)
			return nil
		}
	}
	return j.fault("a value is missing")
}

// list reads the items between the bracket at j.pos and the closing one.
func (j *jsonScan) list(closing byte, item func() error) error {
	if len(j.path) == mostNested {
		return j.fault("more than %d values stand in each other", mostNested)
	}
	j.pos++
	j.path = append(j.path, jsonStep{index: -1})
	defer func() { j.path = j.path[:len(j.path)-1] }()
	for first := true; ; first = false {
		j.space()
		if j.peek() == closing && (first || j.lenient) {
			break
		}
		if err := item(); err != nil || j.stopped {
			return err
		}
		j.space()
		if c := j.peek(); c == closing {
			break
		} else if c != ',' {
			return j.fault("a comma or %q is missing", closing)
		}
		j.pos++
	}
	j.pos++
	return nil
}

// element reads an element of the array at hand.
func (j *jsonScan) element() error {
	j.path[len(j.path)-1].index++
	return j.value()
}

// member reads a member of the object at hand.
func (j *jsonScan) member() error {
	if j.peek() != '"' {
		return j.fault("the name of a member is missing")
	}
	from, to, err := j.quoted()
	if err != nil {
		return err
	}
	if len(j.fields) > 0 {
		name := j.decoded(from, to)
		j.path[len(j.path)-1].name = string(name.text)
	}
	if j.space(); j.peek() != ':' {
		return j.fault("a colon is missing")
	}
	j.pos++
	return j.value()
}

// quoted moves over the string at j.pos and returns the source between its
// quotes.
func (j *jsonScan) quoted() (from, to int, err error) {
	from = j.pos + 1
	for j.pos++; j.pos < j.end; j.pos++ {
		switch c := j.source[j.pos]; {
		case c == '"':
			j.pos++
			return from, j.pos - 1, nil
		case c < ' ':
			return 0, 0, j.fault("a control character stands in a string")
		case c == '\\':
			n := jsonEscapeLen(j.source[j.pos:j.end])
			if n == 0 {
				return 0, 0, j.fault("a backslash begins no escape")
			}
			j.pos += n - 1
		}
	}
	return 0, 0, j.fault("a string has no end")
}

// number moves over a number.
func (j *jsonScan) number() error {
	if j.peek() == '-' {
		j.pos++
	}
	if j.peek() == '0' {
		j.pos++
	} else if !j.digits() {
		return j.fault("a number has no digits")
	}
	if j.peek() == '.' {
		if j.pos++; !j.digits() {
			return j.fault("a number has no digits behind the point")
		}
	}
	if j.peek()|0x20 == 'e' {
		if j.pos++; j.peek() == '+' || j.peek() == '-' {
			j.pos++
		}
		if !j.digits() {
			return j.fault("a number has no exponent")
		}
	}
	return nil
}

// digits moves over digits and reports whether there were any.
func (j *jsonScan) digits() bool {
	from := j.pos
	for classes[j.peek()]&cDigit != 0 {
		j.pos++
	}
	return j.pos > from
}
