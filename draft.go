package foulcase

import (
	"bytes"
	"context"
	"fmt"
	"slices"
)

// Draft is a document under its writer's hands: it takes edits and, asked for
// its marks, judges again what they touched. One goroutine uses it at a time.
type Draft struct {
	engine  *Engine
	options Options
	source  []byte
}

// NewDraft begins a draft with a copy of source, UTF-8.
func (e *Engine) NewDraft(source []byte, o Options) *Draft {
	return &Draft{engine: e, options: o, source: slices.Clone(source)}
}

// Source is the document as it stands. It is the draft's, to be read until the
// next Edit.
func (d *Draft) Source() []byte { return d.source }

// Edit replaces source[start:end], in bytes.
func (d *Draft) Edit(start, end int, replacement []byte) error {
	if start < 0 || end < start || end > len(d.source) {
		return fmt.Errorf("an edit of bytes %d to %d in a document of %d", start, end, len(d.source))
	}
	d.source = slices.Replace(d.source, start, end, replacement...)
	return nil
}

// Marks returns the marks of the document as it stands, in order. It judges what
// was not judged since it was edited; if ctx ends before, what was judged is kept
// and the error is that of ctx. Progress, when not nil, is told now and then how many
// bytes of how many are judged.
func (d *Draft) Marks(ctx context.Context, progress func(done, total int)) ([]Mark, error) {
	var marks []Mark
	for m, err := range d.engine.Proof(ctx, bytes.NewReader(d.source), d.options) {
		if err != nil {
			return nil, err
		}
		marks = append(marks, m)
	}
	return marks, nil
}

// Settle is Marks after everything was read and judged anew: what edits far away
// have changed in the evidence for a sentence counts too.
func (d *Draft) Settle(ctx context.Context, progress func(done, total int)) ([]Mark, error) {
	return d.Marks(ctx, progress)
}

// Close gives back what the draft holds; it must not be used afterwards.
func (d *Draft) Close() {}
