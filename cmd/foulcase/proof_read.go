package main

import (
	"bytes"
	"context"
	"fmt"
	"io"
	"iter"
	"os"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
	"example.org/foulcase/internal/report"
)

// proofreader reads documents and prints their marks. It is safe for
// concurrent use.
type proofreader struct {
	engine    *foulcase.Engine
	settings  *house.Resolver
	flags     *proofFlags
	folders   []string // that the user named
	documents *documents
	form      report.Form
	progress  *progress
}

// optionsOf is how the document at path is judged: by the settings of its folder, flags
// among them.
func (p *proofreader) optionsOf(path string) (foulcase.Options, error) {
	s, err := p.settings.For(path)
	if err != nil {
		return foulcase.Options{}, err
	}
	if model := s.Get("model"); model != "" && model != p.flags.engine.model {
		return foulcase.Options{}, fmt.Errorf("%s: %s is its model, by %s, and not the one of this run; run foulcase in its folder, or give --model",
			path, model, s.Origin("model"))
	}
	o := s.Options(path)
	if format := p.flags.format.value; format != "auto" {
		o.Format = format
	}
	return o, nil
}

// marks yields the marks of a document that are to be shown. An error, which
// names the document, ends them.
func (p *proofreader) marks(ctx context.Context, in input, r io.Reader, o foulcase.Options) iter.Seq2[foulcase.Mark, error] {
	return func(yield func(foulcase.Mark, error) bool) {
		settings, err := p.settings.For(in.path)
		if err != nil {
			yield(foulcase.Mark{}, err)
			return
		}
		s, err := p.documents.sieve(in)
		if err != nil {
			yield(foulcase.Mark{}, err)
			return
		}
		for m, err := range p.engine.Proof(ctx, r, o) {
			if err != nil {
				yield(foulcase.Mark{}, &os.PathError{Op: "read", Path: in.path, Err: cause(err)})
				return
			}
			if !settings.Stands(in.path, m) && s.keep(m) && !yield(m, nil) {
				return
			}
		}
		s.close()
	}
}

// source reads a document whole.
func (p *proofreader) source(in input) ([]byte, error) {
	r, err := in.open()
	if err != nil {
		return nil, err
	}
	defer r.Close()
	source, err := readAtMost(watched{r, p.progress}, maxWhole)
	if err != nil {
		return nil, &os.PathError{Op: "read", Path: in.path, Err: cause(err)}
	}
	return source, nil
}

// maxWhole is the most bytes of a document that is held in memory.
const maxWhole = 256 << 20

func readAtMost(r io.Reader, most int64) ([]byte, error) {
	b, err := io.ReadAll(io.LimitReader(r, most+1))
	if err == nil && int64(len(b)) > most {
		err = fmt.Errorf("the document has more than %s, too much to hold; print its marks with --emit lines or jsonl", formatSize(most))
	}
	return b, err
}

// page prints the marks of one document in the form asked for and returns their
// number. Flush is called after each.
func (p *proofreader) page(ctx context.Context, number int, in input, w io.Writer, flush func() error) (marks int, err error) {
	d := report.Document{Path: in.path, Number: number}
	if d.Options, err = p.optionsOf(in.path); err != nil {
		return 0, err
	}
	var r io.Reader
	if p.form.Whole() {
		if d.Source, err = p.source(in); err != nil {
			return 0, err
		}
		r = bytes.NewReader(d.Source)
	} else {
		file, err := in.open()
		if err != nil {
			return 0, err
		}
		defer file.Close()
		r = watched{file, p.progress}
	}
	page := p.form.Page(w, d)
	for m, markErr := range p.marks(ctx, in, r, d.Options) {
		if markErr != nil {
			err = markErr
			break
		}
		marks++
		if err := page.Mark(m); err != nil {
			return marks, err
		}
		if err := flush(); err != nil {
			return marks, err
		}
	}
	if closeErr := page.Close(err == nil); err == nil {
		err = closeErr
	}
	return marks, err
}
