// Package report prints marks in the forms that readers and other programs take:
// lines, JSON Lines, SARIF, unified diff, annotations of a CI run, an HTML page.
//
// A form is written as a head, the pages of documents, and a tail. Pages may be
// made at the same time, each into a buffer of its own, and are joined in the
// order of the documents: see Writer.
package report

import (
	"fmt"
	"io"
	"strings"

	"example.org/foulcase"
)

// Form is a form of output. It is safe for concurrent use.
type Form interface {
	// Head writes what stands before the first page.
	Head(w io.Writer) error
	// Page begins the page of a document; what it writes to w belongs together.
	Page(w io.Writer, d Document) Page
	// Between is what parts two pages that are not empty.
	Between() string
	// Tail writes what stands after the last page; complete tells that every document
	// could be read, to its end.
	Tail(w io.Writer, complete bool) error
	// Whole tells that pages want Document.Source and hold the document in memory.
	Whole() bool
}

// Page takes the marks of one document in their order.
type Page interface {
	Mark(m foulcase.Mark) error
	// Close writes what is left; complete tells that all marks were found. A document
	// that the form cannot show is an error; the others are not touched by it.
	Close(complete bool) error
}

// Document is what a page is of.
type Document struct {
	Path    string
	Number  int              // its place among the documents, from 1
	Options foulcase.Options // that it was proofread with
	Source  []byte           // as it stands in the file, where the form wants it
}

// Settings are what forms need to know of the run.
type Settings struct {
	Palette Palette // of lines
	Version string  // of the program
	// Model gives the hash of the model; it takes some time, and only forms that tell it ask.
	Model func() string
}

// forms lists them by name, in the order that users are shown.
var forms = []struct {
	name string
	make func(Settings) Form
}{
	{"lines", func(s Settings) Form { return lines{palette: s.Palette} }},
	{"jsonl", func(Settings) Form { return jsonl{} }},
	{"sarif", func(s Settings) Form { return sarif{s} }},
	{"diff", func(Settings) Form { return diff{} }},
	{"annotations", func(Settings) Form { return annotations{} }},
	{"html", func(s Settings) Form { return newPage(s) }},
}

// Names are those of the forms.
func Names() []string {
	var names []string
	for _, f := range forms {
		names = append(names, f.name)
	}
	return names
}

// New returns the form of that name.
func New(name string, s Settings) (Form, error) {
	for _, f := range forms {
		if f.name == name {
			return f.make(s), nil
		}
	}
	return nil, fmt.Errorf("no form of output %q: there are %s", name, strings.Join(Names(), ", "))
}

// bare is a form of nothing but pages, made from a stream.
type bare struct{}

func (bare) Head(io.Writer) error       { return nil }
func (bare) Tail(io.Writer, bool) error { return nil }
func (bare) Between() string            { return "" }
func (bare) Whole() bool                { return false }

// pageFunc is a page that prints each mark by itself.
type pageFunc func(m foulcase.Mark) error

func (f pageFunc) Mark(m foulcase.Mark) error { return f(m) }
func (f pageFunc) Close(bool) error           { return nil }
