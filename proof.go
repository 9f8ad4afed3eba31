package foulcase

import (
	"cmp"
	"context"
	"io"
	"iter"
	"math"
	"slices"
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
// or its lines. The same document gives the same marks on every run. Errors of the
// document are ErrFormat, ErrEncoding, ErrUnreadable and ErrTooLarge; others are
// those of r and of ctx.
func (e *Engine) Proof(ctx context.Context, r io.Reader, o Options) iter.Seq2[Mark, error] {
	return func(yield func(Mark, error) bool) {
		format, err := text.ParseFormat(o.formatName())
		if err != nil {
			yield(Mark{}, err)
			return
		}
		r, origin, err := decode(r, format, o.Encoding)
		if err != nil {
			yield(Mark{}, err)
			return
		}
		d := e.newDocument(o)
		defer e.give(d.judge)
		d.said = newDirectives()
		r = d.said.read(r)
		for blocks, err := range windows(text.Blocks(r, format, o.reading())) {
			d.count(blocks)
			if err := d.weigh(ctx, blocks); err != nil {
				yield(Mark{}, err)
				return
			}
			for m := range d.decide() {
				if !yield(origin.mark(m), nil) {
					return
				}
			}
			if err != nil {
				yield(Mark{}, err)
				return
			}
		}
	}
}

// document is the proofreading of one document, a window at a time.
type document struct {
	*judge
	rate   slipRate
	limits thresholds
	doubts bool
	said   *directives // of the source, as far as it was read
	// Of the window at hand:
	words   int
	odds    []float64 // of all findings, nats
	pending []pending // those that may be reported
	floor   float64   // the least probability that the budget grants them together
}

// pending is a finding whose document is not yet known.
type pending struct {
	mark       Mark
	odds       float64
	start, end int // in the block's text
}

func (e *Engine) newDocument(o Options) *document {
	return &document{
		judge:  e.take(o),
		rate:   e.slipRate(o),
		limits: e.thresholdsFor(o.Budget),
		doubts: o.Doubts,
	}
}

// weigh judges the blocks of a window.
func (d *document) weigh(ctx context.Context, blocks []*text.Block) error {
	d.words, d.odds, d.pending = 0, d.odds[:0], d.pending[:0]
	d.hasten(sizeOf(blocks))
	for _, b := range blocks {
		if ctx.Err() != nil {
			return ctx.Err()
		}
		places := b.Places()
		d.names = b.Names
		for s := range d.segmenter.Sentences(b.Text) {
			found, err := d.findings(s, b.Text)
			if err != nil {
				return err
			}
			d.odds, d.pending = d.keep(b, &places, found, d.odds, d.pending)
			d.words += wordsIn(s.Tokens)
		}
	}
	inOrder(d.pending)
	d.rate.settle(d.words, d.odds)
	d.floor = d.floorOf(d.words, pointers(d.pending))
	return nil
}

// inOrder puts findings in the order of the source, part by part: a block that stands inside
// another, such as a footnote, comes after all of that one.
func inOrder(found []pending) {
	for len(found) > 0 {
		n := 1
		for n < len(found) && found[n].mark.Part == found[0].mark.Part {
			n++
		}
		slices.SortStableFunc(found[:n], func(a, b pending) int { return cmp.Compare(a.mark.Offset, b.mark.Offset) })
		found = found[n:]
	}
}

// shortcutSize is how many bytes of prose make the language model's shortcut worth
// its making.
const shortcutSize = 256 << 10

// hasten takes the language model's shortcut where so many bytes of prose are to
// be judged that it pays.
func (d *document) hasten(size int) {
	if d.shortcut == nil && size >= shortcutSize {
		d.shortcut = d.e.shortcut()
	}
}

func sizeOf(blocks []*text.Block) int {
	n := 0
	for _, b := range blocks {
		n += len(b.Text)
	}
	return n
}

// floorOf is the least probability that the budget grants the findings of so many words
// together.
func (d *document) floorOf(words int, all iter.Seq[*pending]) float64 {
	var p []float64
	for c := range all {
		if c.mark.Rule != "" {
			continue
		}
		if v := logistic(c.odds + d.rate.shift); v >= d.limits.query[c.mark.Kind] {
			p = append(p, v)
		}
	}
	return d.limits.leastOf(words, p)
}

// keep appends the log-odds of a sentence's findings to odds, and to kept those
// that may be reported however often the writer slips. What the house has written
// otherwise is no sign of how often that is.
func (d *document) keep(b *text.Block, places *text.Places, found []finding, odds []float64, kept []pending) ([]float64, []pending) {
	for _, f := range found {
		if math.IsInf(f.odds, -1) {
			continue
		}
		d.favourRunons(&f)
		if f.preferred == nil {
			odds = append(odds, f.odds)
		}
		if logistic(f.odds+d.rate.mostShift()) < d.least(f.kind) {
			continue
		}
		if m := d.mark(b, places, f); len(m.Corrections) > 0 {
			start, end := d.extent(f)
			kept = append(kept, pending{m, f.odds, start, end})
		}
	}
	return odds, kept
}

// least is the probability from which findings of a kind are yielded.
func (d *document) least(k Kind) float64 {
	if d.doubts {
		return min(LeastDoubt, d.limits.query[k])
	}
	return d.limits.query[k]
}

// decide yields what passes the limits now that the window is known.
func (d *document) decide() iter.Seq[Mark] {
	return func(yield func(Mark) bool) {
		for c := range pointers(d.pending) {
			m, ok := d.passed(c)
			if ok && !d.said.stand(m.Offset, m.Offset+m.Length, m.Observed) && !yield(m) {
				return
			}
		}
	}
}

// passed returns a finding as a mark, if the limits let it pass.
func (d *document) passed(c *pending) (Mark, bool) {
	p, grade := preferredP, GradeMark
	if kind := c.mark.Kind; c.mark.Rule == "" {
		p = logistic(c.odds + d.rate.shift)
		if grade = d.limits.grade(kind, p); p < d.floor {
			grade = GradeDoubt
		}
		if p < d.least(kind) || grade == GradeDoubt && !d.doubts {
			return Mark{}, false
		}
	}
	m := c.mark
	m.P, m.Grade = p, grade
	m.Corrections = slices.Clone(m.Corrections)
	for i := range m.Corrections {
		m.Corrections[i].P *= p
	}
	return m, true
}

// pointers yields a pointer to each element.
func pointers[T any](all []T) iter.Seq[*T] {
	return func(yield func(*T) bool) {
		for i := range all {
			if !yield(&all[i]) {
				return
			}
		}
	}
}

func wordsIn(tokens []text.Token) int {
	n := 0
	for _, t := range tokens {
		if t.Kind == text.Word {
			n++
		}
	}
	return n
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
			j.countSentence(s)
		}
	}
	j.recurring.settle(j.e.lexicon)
}

// countSentence adds the words of a sentence to the document's counts.
func (j *judge) countSentence(s text.Sentence) {
	for _, t := range s.Tokens {
		if t.Kind != text.Word {
			continue
		}
		if id, ok := j.wordOf(t); ok {
			j.recurring.addWord(id, 1)
		} else {
			j.recurring.addForm(t.Norm, t.Case != text.Lower, 1)
		}
	}
}

// wordOf returns the lexicon word that a token is or begins with.
func (j *judge) wordOf(t text.Token) (id uint32, ok bool) {
	j.ids = j.e.lexicon.Read(j.ids[:0], t)
	if len(j.ids) == 0 || int(j.ids[0]) >= j.e.lexicon.Len() {
		return 0, false
	}
	return j.ids[0], true
}

// extent is the stretch of the block's text that a finding covers.
func (j *judge) extent(f finding) (start, end int) {
	return j.slots[f.from].token.Start, j.slots[f.to-1].token.End
}

// mark writes out a finding and places it in the document. Its probability is
// settled later.
func (j *judge) mark(b *text.Block, places *text.Places, f finding) Mark {
	start, end := j.extent(f)
	m := Mark{
		Part:        b.Part,
		Observed:    string(b.Raw(start, end)),
		Kind:        f.kind,
		Corrections: j.corrections(f, b.Text),
		ByHand:      b.Interrupted(start, end),
	}
	for i := range m.Corrections {
		c := &m.Corrections[i]
		spelled, ok := b.Escape(c.Text)
		if m.ByHand = m.ByHand || !ok; ok && spelled != c.Text {
			c.Source = spelled
		}
	}
	if f.preferred != nil {
		m.Rule = RuleHouse
	}
	m.place(b, places, start, end)
	return m
}

// place notes where in the document the mark stands: at Text[start:end] of a block.
func (m *Mark) place(b *text.Block, places *text.Places, start, end int) {
	from, to := b.Source(start, end)
	at := places.Position(start)
	m.Line, m.Column = at.Line, at.Column
	m.Offset, m.Length = from, to-from
	m.Context = contextOf(b.Text, start, end)
}

// contextOf quotes what stands around block[start:end], on one line, cut at
// spaces.
func contextOf(block []byte, start, end int) string {
	lo, hi := max(0, start-contextWidth), min(len(block), end+contextWidth)
	spaces := strings.NewReplacer("\n", " ") // wherever lines break, the same is quoted
	before, after := spaces.Replace(string(block[lo:start])), spaces.Replace(string(block[end:hi]))
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
