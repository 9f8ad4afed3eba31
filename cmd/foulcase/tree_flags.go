package main

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"slices"

	"example.org/foulcase"
	"example.org/foulcase/internal/tree"
	"github.com/spf13/pflag"
)

// treeFlags say which documents a verb reads, and which of their marks count. A verb
// finds its documents, reads each input through a sieve, closes the sieve when the
// document was read to its end, and finishes the documents when all were.
type treeFlags struct {
	filesFrom  string
	null       bool
	noIgnore   bool
	changed    string
	known      string
	writeKnown string
}

func (f *treeFlags) declare(fs *pflag.FlagSet) {
	filled(fs, &f.filesFrom, "files-from", "read the documents that `FILE` lists too, a path a line; - is standard input")
	fs.BoolVar(&f.null, "null", false, "paths in --files-from end with a NUL byte")
	fs.BoolVar(&f.noIgnore, "no-ignore", false, "read what git ignores, too")
	filled(fs, &f.changed, "changed", "only marks that touch lines changed since the git revision `BASE`, or since the branch parted from it")
	filled(fs, &f.known, "known", "do not show the marks that stand in `FILE`")
	filled(fs, &f.writeKnown, "write-known", "write all marks to `FILE` instead of showing them; with --known, only known ones that are still there")
}

// filledValue is a text flag that may not be set to nothing, as a variable that is
// empty would.
type filledValue struct{ text *string }

func (v filledValue) String() string {
	if v.text == nil {
		return ""
	}
	return *v.text
}

func (v filledValue) Type() string { return "TEXT" }

func (v filledValue) Set(s string) error {
	if s == "" {
		return errors.New("it is empty, as an unset variable is")
	}
	*v.text = s
	return nil
}

// filled declares a text flag that may be left out, but not be empty.
func filled(fs *pflag.FlagSet, text *string, name, usage string) {
	fs.Var(filledValue{text}, name, usage)
}

// search says how documents are looked for.
type search struct {
	stdinName string // what standard input goes by
	anyBytes  bool   // take files that look binary, too: an encoding was named
	// format returns the format of a file below a folder; nil stands for
	// foulcase.FormatOf.
	format func(path string) (name string, ok bool)
	// ignored tells which files below a folder are passed over, and known which file
	// of known marks a document has, "" for none, where no flag names one; nil stands
	// for none.
	ignored func(path string) bool
	known   func(path string) (file string, err error)
}

// documents are what a verb has to read. Its methods are safe for concurrent use,
// finish aside.
type documents struct {
	inputs  []input
	skipped tree.Skipped
	changes *tree.Changes // nil: every line counts
	known   *knownFiles
}

// find looks for the documents that operands and flags name. What cannot be found
// is an input with an error; what cannot be done at all is an error. The caller
// reads the inputs in their order, each with a sieve, and calls finish at the end.
func (f *treeFlags) find(c *console, operands []string, s search) (*documents, error) {
	known := &knownFiles{from: f.known, to: f.writeKnown, named: s.known, opened: map[string]openedKnown{}}
	if f.known != "" || f.writeKnown != "" { // what is wrong with it concerns every document
		if _, err := known.of(standardInput); err != nil {
			return nil, err
		}
	}
	listed, err := f.listed(c, operands)
	if err != nil {
		return nil, err
	}
	if len(operands) == 0 && f.filesFrom == "" {
		operands = []string{standardInput}
	}
	if f.changed != "" && slices.Contains(operands, standardInput) {
		return nil, misusef("--changed looks at files; name some, not standard input")
	}
	finder := tree.NewFinder(tree.Options{NoIgnore: f.noIgnore, AnyBytes: s.anyBytes, Format: s.format, Ignored: s.ignored})
	d := &documents{inputs: findWith(finder, operands, c.in, s.stdinName), known: known}
	before := len(finder.Found())
	for _, path := range listed {
		finder.AddPath(path)
	}
	d.inputs = append(d.inputs, inputsOf(finder.Found()[before:])...)
	d.skipped = finder.Skipped()
	if f.changed == "" {
		return d, nil
	}
	return d, d.onlyChanged(f.changed)
}

// listed returns the paths in --files-from.
func (f *treeFlags) listed(c *console, operands []string) ([]string, error) {
	switch {
	case f.filesFrom == "" && f.null:
		return nil, misusef("--null says how --files-from is read; give that too")
	case f.filesFrom == "":
		return nil, nil
	case f.filesFrom != standardInput:
		file, err := os.Open(f.filesFrom)
		if err != nil {
			return nil, fmt.Errorf("--files-from: %w", err)
		}
		defer file.Close()
		return tree.ReadList(file, f.null, f.filesFrom)
	case slices.Contains(operands, standardInput):
		return nil, misusef("standard input holds the list of --files-from and cannot be a document too")
	}
	return tree.ReadList(c.in, f.null, "standard input")
}

// onlyChanged leaves out the documents without a change since a revision.
func (d *documents) onlyChanged(base string) error {
	dir := "."
	if i := slices.IndexFunc(d.inputs, func(in input) bool { return in.err == nil }); i >= 0 {
		dir = filepath.Dir(d.inputs[i].path)
	}
	changes, err := tree.Changed(dir, base)
	if err != nil {
		return err
	}
	d.changes = changes
	d.inputs = slices.DeleteFunc(d.inputs, func(in input) bool {
		changed, err := changes.Has(in.path)
		return in.err == nil && err == nil && !changed
	})
	return nil
}

// sieve lets those marks of one document through that are to be shown. It is for
// one goroutine.
type sieve struct {
	path  string
	known *knownMarks
	spans *tree.Spans // nil: the whole document
}

// sieve returns that of an input. The error is the document's.
func (d *documents) sieve(in input) (*sieve, error) {
	if in.err != nil {
		return nil, in.err
	}
	known, err := d.known.of(in.path)
	if err != nil {
		return nil, err
	}
	s := &sieve{path: in.path, known: known}
	if d.changes == nil {
		return s, nil
	}
	if _, err := d.changes.Has(in.path); err != nil {
		return nil, err
	}
	s.spans, err = d.changes.Spans(in.path)
	return s, err
}

// keep tells whether a mark is to be shown. It must be asked about each mark of the
// document once, in order.
func (s *sieve) keep(m foulcase.Mark) bool {
	touched := s.spans == nil || s.spans.Touch(m.Offset, m.Length)
	return s.known.keep(s.path, m, touched) && touched
}

// close says that the document was read to its end.
func (s *sieve) close() { s.known.read(s.path) }

// finish tells on standard error what was passed over and what was not shown, and
// writes the known marks.
func (d *documents) finish(c *console) error {
	if passed := d.skipped.String(); passed != "" {
		fmt.Fprintf(c.err, "foulcase: passed over: %s\n", passed)
	}
	return d.known.finish(c)
}
