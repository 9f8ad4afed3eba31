package tree

import (
	"fmt"
	"path/filepath"
	"strings"
)

// isGlob tells whether an operand holds a wildcard.
func isGlob(operand string) bool { return strings.ContainsAny(operand, "*?[") }

// addGlob appends what a glob stands for: files of any format that is text, and
// folders with the documents below them. Names that begin with a point must be
// spelled with it.
func (f *Finder) addGlob(operand string) {
	spelled := filepath.ToSlash(operand)
	fixed := spelled[:strings.IndexAny(spelled, "*?[")]
	fixed = fixed[:strings.LastIndexByte(fixed, '/')+1]
	base := filepath.FromSlash(fixed)
	if base == "" {
		base = "."
	}
	w, dir, err := f.newWalk(base)
	if err != nil {
		f.fail(operand, err)
		return
	}
	p := compilePattern(strings.TrimSuffix(spelled[len(fixed):], "/"))
	w.wanted = func(path string) bool {
		inside, err := filepath.Rel(base, path)
		return err == nil && p.match(filepath.ToSlash(inside)) && !hidesMore(p, filepath.Base(path))
	}
	w.walk(dir, ignoresOf(w.root))
	w.follow()
	f.found = append(f.found, w.documents...)
	if !w.met {
		f.fail(operand, fmt.Errorf("%s: nothing matches; check the path", operand))
	}
}

// hidesMore tells whether a wildcard would have to stand for the point that a
// hidden name begins with.
func hidesMore(p pattern, name string) bool {
	if !strings.HasPrefix(name, ".") {
		return false
	}
	for i := len(p.tokens) - 1; i >= 0; i-- {
		before := i == 0 || p.tokens[i-1] == token{kind: one, b: '/'}
		if before {
			return p.tokens[i] != token{kind: one, b: '.'}
		}
	}
	return true
}
