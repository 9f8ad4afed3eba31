package text

import (
	"strconv"
	"strings"
)

// jsonField says which strings are read: those that are the value of a member
// with the name, or stand in an array that is, wherever it is; or those at the
// pointer.
type jsonField struct {
	name    string
	pointer []string // a JSON Pointer, RFC 6901, split and decoded; nil: by name
}

// jsonStep leads from a value to one inside it.
type jsonStep struct {
	name  string // of the member, when index is negative
	index int    // of the element
}

// newJSONField reads a field as it is asked for: what begins with a slash is a
// pointer.
func newJSONField(s string) jsonField {
	if !strings.HasPrefix(s, "/") {
		return jsonField{name: s}
	}
	steps := strings.Split(s[1:], "/")
	for i, step := range steps {
		steps[i] = strings.NewReplacer("~1", "/", "~0", "~").Replace(step)
	}
	return jsonField{pointer: steps}
}

// matches reports that the string at the end of a path is read.
func (f jsonField) matches(path []jsonStep) bool {
	if f.pointer == nil {
		last := len(path) - 1
		for last >= 0 && path[last].index >= 0 {
			last--
		}
		return last >= 0 && path[last].name == f.name
	}
	if len(path) != len(f.pointer) {
		return false
	}
	for i, step := range path {
		if !step.is(f.pointer[i]) {
			return false
		}
	}
	return true
}

// is reports that a pointer's word leads the same way. "*" stands for any index
// of an array, which RFC 6901 does not know.
func (s jsonStep) is(word string) bool {
	if s.index < 0 {
		return s.name == word
	}
	return word == "*" || word == strconv.Itoa(s.index)
}

// wanted reports that a string at hand is read.
func (j *jsonScan) wanted() bool {
	for _, f := range j.fields {
		if f.matches(j.path) {
			return true
		}
	}
	return len(j.fields) == 0
}
