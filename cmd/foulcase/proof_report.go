package main

import (
	"bytes"
	"context"

	"example.org/foulcase/internal/report"
)

// stream proofreads one document and hands each mark on as it is found. It
// returns the number of marks; an error is one of standard output.
func (p *proofreader) stream(c *console, in input) (int, error) {
	w, err := report.NewWriter(c.out, p.form)
	if err != nil {
		return 0, err
	}
	n, err := p.page(context.Background(), 1, in, c.out, c.out.Flush)
	if err != nil && c.out.err == nil {
		c.complain(err)
	}
	if c.out.err != nil {
		return n, c.out.err
	}
	return n, w.Close(!c.troubled)
}

// finished is the page of one document.
type finished struct {
	text  []byte
	marks int
	err   error
}

// reportAll proofreads documents several at a time and prints their marks in the
// documents' order. What is wrong with one document is reported there and does
// not stop the others.
func (p *proofreader) reportAll(c *console) (int, error) {
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	w, err := report.NewWriter(c.out, p.form)
	if err != nil {
		return 0, err
	}
	total := 0
	inputs := p.documents.inputs
	pages := ordered(len(inputs), int(*p.flags.jobs), func(i int) finished {
		var text bytes.Buffer
		n, err := p.page(ctx, i+1, inputs[i], &text, func() error { return nil })
		return finished{text.Bytes(), n, err}
	})
	for _, page := range pages {
		total += page.marks
		if err := w.Add(page.text); err != nil {
			cancel()
			return total, err
		}
		if err := c.out.Flush(); err != nil {
			cancel()
			return total, err
		}
		if page.err != nil {
			c.complain(page.err)
		}
	}
	return total, w.Close(!c.troubled)
}
