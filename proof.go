package foulcase

import (
	"context"
	"io"
	"iter"
	"strings"

	"example.org/foulcase/internal/text"
)

const (
	// window is how much prose is read ahead, in bytes, so that how often a form
	// recurs is known before its first occurrence is judged. Shorter documents
	// are known whole.
	window = 1 << 20
	// contextWidth is the most bytes of text to each side that a mark quotes.
	contextWidth = 40
)

// Proof reads a document and yields its marks, queries among them, in the
// order of the text. Reading stops at the first error, which is yielded with a
// zero Mark. Plain text streams: memory is bounded however long the document
// or its lines. The same document gives the same marks on every run.
func (e *Engine) Proof(ctx context.Context, r io.Reader, o Options) iter.Seq2[Mark, error] {
	return func(yield func(Mark, error) bool) {
		format, err := text.ParseFormat(o.formatName())
		if err != nil {
			yield(Mark{}, err)
			return
		}
		j := e.take(o)
		defer e.give(j)
		limits := e.judgement.thresholdsFor(o.Budget)
		for blocks, err := range windows(text.Blocks(r, format, text.Options{})) {
			j.count(blocks)
			for _, b := range blocks {
				if ctx.Err() != nil {
					yield(Mark{}, ctx.Err())
					return
				}
				for m, err := range j.marks(b, limits) {
					if !yield(m, err) || err != nil {
						return
					}
				}
			}
			if err != nil {
				yield(Mark{}, err)
				return
			}
		}
	}
}

func (o Options) formatName() string {
	if o.Format == "" {
		return "plain"
	}
	return o.Format
}

// windows gathers blocks until they hold a window's worth of prose. A read
// error comes with the blocks before it.
func windows(blocks iter.Seq2[*text.Block, error]) iter.Seq2[[]*text.Block, error] {
	return func(yield func([]*text.Block, error) bool) {
		var gathered []*text.Block
		size := 0
		for b, err := range blocks {
			if err != nil {
				yield(gathered, err)
				return
			}
			gathered = append(gathered, b)
			if size += len(b.Text); size >= window {
				if !yield(gathered, nil) {
					return
				}
				gathered, size = gathered[:0], 0
			}
		}
		if len(gathered) > 0 {
			yield(gathered, nil)
		}
	}
}

// count takes the forms of the blocks into the document's counts.
func (j *judge) count(blocks []*text.Block) {
	for _, b := range blocks {
		for s := range j.segmenter.Sentences(b.Text) {
			for _, t := range s.Tokens {
				if t.Kind != text.Word {
					continue
				}
				j.ids = j.e.lexicon.Read(j.ids[:0], t)
				if len(j.ids) > 0 && int(j.ids[0]) < j.e.lexicon.Len() {
					j.recurring.addWord(j.ids[0])
				} else {
					j.recurring.addForm(t.Norm)
				}
			}
		}
	}
}

// marks judges a block and yields what passes the limits.
func (j *judge) marks(b *text.Block, limits thresholds) iter.Seq2[Mark, error] {
	return func(yield func(Mark, error) bool) {
		for s := range j.segmenter.Sentences(b.Text) {
			found, err := j.findings(s, b.Text)
			if err != nil {
				yield(Mark{}, err)
				return
			}
			for _, f := range found {
				if f.p < limits.query[f.kind] {
					continue
				}
				m := j.mark(b, f)
				if f.p >= limits.mark[f.kind] {
					m.Grade = GradeMark
				}
				if len(m.Corrections) > 0 && !yield(m, nil) {
					return
				}
			}
		}
	}
}

// mark places a finding in the document.
func (j *judge) mark(b *text.Block, f finding) Mark {
	start, end := j.slots[f.from].token.Start, j.slots[f.to-1].token.End
	from, to := b.Source(start, end)
	at := b.Position(start)
	return Mark{
		Line:        at.Line,
		Column:      at.Column,
		Offset:      from,
		Length:      to - from,
		Observed:    string(b.Raw(start, end)),
		Kind:        f.kind,
		P:           f.p,
		Corrections: j.corrections(f, b.Text),
		Context:     contextOf(b.Text, start, end),
	}
}

// contextOf quotes what stands around block[start:end], on one line, cut at
// spaces.
func contextOf(block []byte, start, end int) string {
	lo, hi := max(0, start-contextWidth), min(len(block), end+contextWidth)
	before, after := string(block[lo:start]), string(block[end:hi])
	if lo > 0 {
		_, before, _ = strings.Cut(before, " ")
	}
	if hi < len(block) {
		if i := strings.LastIndexByte(after, ' '); i >= 0 {
			after = after[:i]
		}
	}
	quoted := before + string(block[start:end]) + after
	return strings.Join(strings.Fields(strings.ToValidUTF8(quoted, "�")), " ")
}
