package report

import (
	"bytes"
	"fmt"
	"io"
	"path/filepath"
	"strings"

	"example.org/foulcase"
	"github.com/aymanbagabas/go-udiff"
)

// diff is a unified diff that puts the marks right, as git apply and patch -p1
// take it.
type diff struct{ bare }

// Whole is true: a diff quotes the document.
func (diff) Whole() bool { return true }

func (diff) Page(w io.Writer, d Document) Page { return &diffPage{w: w, document: d} }

// diffPage gathers the marks of a document.
type diffPage struct {
	w        io.Writer
	document Document
	marks    []foulcase.Mark
}

func (p *diffPage) Mark(m foulcase.Mark) error {
	p.marks = append(p.marks, m)
	return nil
}

// Close writes nothing of a document that could not be read to its end, as --apply
// writes nothing of it.
func (p *diffPage) Close(complete bool) error {
	if !complete {
		return nil
	}
	d := p.document
	r, err := foulcase.Revise(d.Source, d.Options, p.marks)
	if err != nil || len(r.Edits) == 0 {
		return err
	}
	text, err := Diff(d.Path, d.Source, r.Edits)
	if err != nil {
		return err
	}
	_, err = io.WriteString(p.w, text)
	return err
}

// contextLines is how many lines stand around a change.
const contextLines = 3

// Diff is the unified diff of a document against itself with the edits made. A
// document that is not lines of text has none: that is an error.
func Diff(path string, source []byte, edits []foulcase.Edit) (string, error) {
	if edits[0].Part != "" || bytes.IndexByte(source, 0) >= 0 {
		return "", fmt.Errorf("%s: no diff can be made of it, for it is packed or in wide characters; correct it with --apply", path)
	}
	var all []udiff.Edit
	for _, e := range edits {
		all = append(all, udiff.Edit{Start: int(e.Offset), End: int(e.Offset + e.Length), New: string(e.Text)})
	}
	return udiff.ToUnified(diffName("a/", path), diffName("b/", path), string(source), all, contextLines)
}

// diffName is a path as the head of a diff has it: quoted as git does where it
// has bytes that need it, and with a tab after it where it has spaces, which
// would end it otherwise.
func diffName(prefix, path string) string {
	name := prefix + strings.TrimPrefix(filepath.ToSlash(filepath.Clean(path)), "/")
	if quoted := gitQuoted(name); quoted != name {
		return quoted
	}
	if strings.ContainsRune(name, ' ') {
		return name + "\t"
	}
	return name
}

// gitQuoted puts a name between quotation marks, with C's escapes, where it has
// control characters, quotation marks or backslashes.
func gitQuoted(name string) string {
	const escapes = "\a\b\t\n\v\f\r\"\\"
	var b strings.Builder
	for i := range len(name) {
		switch c := name[i]; {
		case strings.IndexByte(escapes, c) >= 0:
			b.WriteByte('\\')
			b.WriteByte(`abtnvfr"\`[strings.IndexByte(escapes, c)])
		case c < ' ' || c == 0x7f:
			fmt.Fprintf(&b, `\%03o`, c)
		default:
			b.WriteByte(c)
		}
	}
	if b.Len() == len(name) {
		return name
	}
	return `"` + b.String() + `"`
}
