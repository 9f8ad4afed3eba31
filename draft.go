package foulcase

import (
	"context"
	"fmt"
	"slices"

	"example.org/foulcase/internal/text"
)

// Draft is a document under its writer's hands: it takes edits and, asked for
// its marks, judges again what they touched and nothing else. What an edit
// changes in the evidence for sentences elsewhere (how often a word is used, say)
// counts there after Settle, which makes the marks those of Engine.Proof for a
// document of up to a mebibyte; in a longer one Proof looks a mebibyte ahead, and a
// draft is known whole. One goroutine uses a draft at a time.
type Draft struct {
	*document // nil while the draft rests
	engine    *Engine
	asked     Options
	format    text.Format
	source    []byte
	blocks    []*draftBlock
	near      vicinity   // around edits not read yet
	unread    bool       // the blocks are not those of source
	fault     error      // of reading source
	named     text.Names // outside the prose, when the whole was read last
	drifted   bool       // there were edits since everything was judged together
}

// NewDraft begins a draft with a copy of source, UTF-8. Errors are ErrFormat, and
// ErrUnreadable for a packed format, whose documents are no text. Close the draft
// when done.
func (e *Engine) NewDraft(source []byte, o Options) (*Draft, error) {
	format, err := text.ParseFormat(o.formatName())
	if err != nil {
		return nil, err
	}
	if format.Packed() {
		return nil, fmt.Errorf("a %s is packed and cannot be judged while it is edited; proofread its file: %w", format, ErrUnreadable)
	}
	return &Draft{
		engine: e,
		asked:  o,
		format: format,
		source: slices.Clone(source),
		unread: true,
	}, nil
}

// Rest gives back what judging takes, some megabytes whatever the document; what was
// judged is kept. The next Marks or Settle takes that again, so it is for a draft that
// was left alone for a while.
func (d *Draft) Rest() {
	if d.document != nil {
		d.engine.give(d.judge)
	}
	d.document = nil
}

// wake makes the draft ready to judge.
func (d *Draft) wake() {
	if d.document == nil {
		d.document = d.engine.newDocument(d.asked)
		d.countAll()
	}
}

// Close gives back what the draft holds; it must not be used afterwards.
func (d *Draft) Close() { d.Rest() }

// Source is the document as it stands. It is the draft's, to be read until the
// next Edit.
func (d *Draft) Source() []byte { return d.source }

// Edit replaces source[start:end], in bytes. An edit outside the source is an
// error and changes nothing.
func (d *Draft) Edit(start, end int, replacement []byte) error {
	if start < 0 || end < start || end > len(d.source) {
		return fmt.Errorf("an edit of bytes %d to %d in a document of %d", start, end, len(d.source))
	}
	if !d.unread && !d.widen(start, end) {
		d.unread = true
	}
	d.source = slices.Replace(d.source, start, end, replacement...)
	d.drifted = true
	return nil
}

// SetOptions changes the options under which the draft is judged, its format and
// fields aside. Sentences with marks are judged anew by the next Marks, all others
// by the next Settle.
func (d *Draft) SetOptions(o Options) {
	d.Rest()
	d.asked, d.drifted = o, true
	d.distrust(unjudged, func(s *draftSentence) bool { return len(s.kept) > 0 })
}

// Marks returns the marks of the document as it stands, in order. If ctx ends
// before everything new is judged, the error is that of ctx, and what was judged
// is kept for the next call. A document that cannot be read to its end has the
// marks of what was read, and an error. Progress, when not nil, is told after
// each sentence how many of how many are judged.
func (d *Draft) Marks(ctx context.Context, progress func(done, total int)) ([]Mark, error) {
	d.wake()
	d.read()
	if err := d.judgeAll(ctx, unjudged, progress); err != nil {
		return nil, err
	}
	return d.decided(), d.fault
}

// Settle is Marks after everything was read anew and judged together. Where it
// is cut short by ctx, the next call goes on.
func (d *Draft) Settle(ctx context.Context, progress func(done, total int)) ([]Mark, error) {
	d.wake()
	if d.drifted {
		d.unread = true
		d.read()
		d.recount()
		d.drifted = false
	}
	if err := d.judgeAll(ctx, drifted, progress); err != nil {
		return nil, err
	}
	return d.Marks(ctx, progress)
}
