package main

import (
	"bytes"
	"context"
	"fmt"
	"io"

	"example.org/foulcase"
	"example.org/foulcase/internal/report"
	"example.org/foulcase/internal/wholefile"
)

// application is what --apply did with one document.
type application struct {
	told      []byte // a line for each mark
	document  []byte // corrected standard input
	corrected int
	left      int // marks and queries
	err       error
}

// applyAll puts marks right, several documents at a time, tells what was done in
// the order of the documents, and returns the number of marks. What is wrong with
// one document does not stop the others.
func (p *proofreader) applyAll(c *console) (int, error) {
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	inputs := p.documents.inputs
	var told io.Writer = c.out
	palette := choosePalette(p.flags.color.value, c.out.terminal)
	for _, in := range inputs {
		if in.in != nil { // standard output is for the corrected document
			told, palette = c.err, choosePalette(p.flags.color.value, isTerminal(c.err))
		}
	}
	corrected, left, files := 0, 0, 0
	for _, a := range ordered(len(inputs), int(*p.flags.jobs), func(i int) application {
		return p.apply(ctx, inputs[i], palette)
	}) {
		corrected, left = corrected+a.corrected, left+a.left
		if a.corrected > 0 {
			files++
		}
		c.out.Write(a.document)
		told.Write(a.told)
		if err := c.out.Flush(); err != nil {
			cancel()
			return corrected + left, err
		}
		if a.err != nil {
			c.complain(a.err)
		}
	}
	fmt.Fprintf(c.err, "foulcase: %s in %s, %s left to do by hand\n",
		counted(corrected, "correction"), counted(files, "document"), counted(left, "finding"))
	return corrected + left, nil
}

// apply puts the marks of one document right. When that fails, nothing of it is
// written, and all its marks are told as left.
func (p *proofreader) apply(ctx context.Context, in input, palette report.Palette) (a application) {
	source, err := p.source(in)
	if err != nil {
		return application{err: err}
	}
	o, err := p.optionsOf(in.path)
	if err != nil {
		return application{err: err}
	}
	var marks []foulcase.Mark
	for m, err := range p.marks(ctx, in, bytes.NewReader(source), o) {
		if err != nil {
			return application{document: ofInput(in, source), err: err}
		}
		marks = append(marks, m)
	}
	r, revised, err := revise(source, o, marks)
	if err == nil && in.in == nil && len(r.Edits) > 0 {
		err = p.rewrite(in.path, source, revised)
	}
	if err != nil {
		r = foulcase.Revision{Left: marks}
		revised = source
	}
	return application{
		told:      tell(in.path, r, palette),
		document:  ofInput(in, revised),
		corrected: len(r.Corrected),
		left:      len(r.Left),
		err:       err,
	}
}

// ofInput is the document when it came from standard input.
func ofInput(in input, document []byte) []byte {
	if in.in == nil {
		return nil
	}
	return document
}

// revise returns a document with its marks put right.
func revise(source []byte, o foulcase.Options, marks []foulcase.Mark) (foulcase.Revision, []byte, error) {
	r, err := foulcase.Revise(source, o, marks)
	if err != nil {
		return r, nil, err
	}
	revised, err := r.Apply(source)
	return r, revised, err
}

// rewrite puts revised in the place of what was read at path.
func (p *proofreader) rewrite(path string, source, revised []byte) error {
	target, err := rewritable(path, p.folders)
	if err != nil {
		return err
	}
	return wholefile.Replace(target, source, revised)
}

// tell words what was done with the marks of a document: first what was put
// right, then what was left.
func tell(path string, r foulcase.Revision, p report.Palette) []byte {
	var b bytes.Buffer
	for _, m := range r.Corrected {
		fmt.Fprintf(&b, "%s %s %s -> %s\n", p.Paint(report.Green, "applied"), p.Paint(report.Bold, report.Place(path, m)),
			p.Paint(report.Red, report.Quoted(m.Observed)), p.Paint(report.Green, report.Quoted(m.Corrections[0].Text)))
	}
	for _, m := range r.Left {
		b.WriteString(report.Line(path, m, p))
	}
	return b.Bytes()
}
