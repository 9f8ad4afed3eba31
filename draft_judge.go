package foulcase

import (
	"bytes"
	"cmp"
	"context"
	"iter"
	"slices"

	"example.org/foulcase/internal/text"
)

// draftBlock is a block of a draft with what its sentences were judged.
type draftBlock struct {
	*text.Block
	sentences []draftSentence
	// Of all sentences together, as of the last sum:
	state draftState // the worst
	words int
	odds  []float64
	kept  int
}

// sum adds up what is known of the block's sentences.
func (b *draftBlock) sum() {
	b.state, b.words, b.odds, b.kept = judged, 0, b.odds[:0], 0
	for i := range b.sentences {
		s := &b.sentences[i]
		b.state = min(b.state, s.state)
		b.words += s.words.count()
		b.odds = append(b.odds, s.odds...)
		b.kept += len(s.kept)
	}
}

// draftSentence is what is remembered of a sentence.
type draftSentence struct {
	start, end int // in the block's text
	words      words
	state      draftState
	odds       []float64 // of all its findings, nats
	kept       []pending // those that may be reported; start and end from the sentence's start
}

// words are those of a sentence, as the document's counts take them.
type words struct {
	known   []uint32 // by lexicon id
	unknown []unknownForm
}

// unknownForm is a form that the lexicon lacks.
type unknownForm struct {
	form    string
	capital bool
}

func (w *words) count() int { return len(w.known) + len(w.unknown) }

// draftState says how much a sentence's judgement is worth, worst first.
type draftState uint8

const (
	unjudged draftState = iota
	drifted             // judged, but with what other sentences said before
	judged
)

// replace puts fresh blocks in the place of blocks [first, last). What is known of
// sentences that stand in both is kept, and the counts of the document follow.
func (d *Draft) replace(first, last int, fresh []*text.Block) {
	old := d.blocks[first:last]
	same := 0
	for same < min(len(old), len(fresh)) && old[same].Same(fresh[same]) {
		old[same].Block = fresh[same]
		same++
	}
	tail := 0
	for tail < min(len(old), len(fresh))-same && old[len(old)-1-tail].Same(fresh[len(fresh)-1-tail]) {
		tail++
		old[len(old)-tail].Block = fresh[len(fresh)-tail]
	}
	dropped := old[same : len(old)-tail]
	var added []*draftBlock
	for _, b := range fresh[same : len(fresh)-tail] {
		added = append(added, d.divide(b))
	}
	keepSentences(dropped, added)
	for _, b := range added { // before any is dropped: no count passes through 0
		b.sum()
		d.countBlock(b, 1)
	}
	for _, b := range dropped {
		d.countBlock(b, -1)
	}
	d.settleWords(added, dropped)
	d.blocks = slices.Replace(d.blocks, first+same, last-tail, added...)
}

// divide cuts a block into sentences, not judged yet.
func (d *Draft) divide(b *text.Block) *draftBlock {
	out := &draftBlock{Block: b}
	for s := range d.segmenter.Sentences(b.Text) {
		out.sentences = append(out.sentences, draftSentence{start: s.Start, end: s.End, words: d.wordsOf(s)})
	}
	return out
}

// wordsOf reads the words of a sentence.
func (d *Draft) wordsOf(s text.Sentence) words {
	w := words{known: make([]uint32, 0, len(s.Tokens))}
	for _, t := range s.Tokens {
		if t.Kind != text.Word {
			continue
		}
		if id, ok := d.wordOf(t); ok {
			w.known = append(w.known, id)
		} else {
			w.unknown = append(w.unknown, unknownForm{string(t.Norm), t.Case != text.Lower})
		}
	}
	return w
}

// keepSentences hands on what is known of the sentences that dropped blocks and
// added ones have in common at their beginning and at their end.
func keepSentences(dropped, added []*draftBlock) {
	from, to := placesOf(dropped), placesOf(added)
	for len(from) > 0 && len(to) > 0 && from[0].handOn(to[0]) {
		from, to = from[1:], to[1:]
	}
	for len(from) > 0 && len(to) > 0 && from[len(from)-1].handOn(to[len(to)-1]) {
		from, to = from[:len(from)-1], to[:len(to)-1]
	}
}

// sentencePlace is a sentence with its block.
type sentencePlace struct {
	block *draftBlock
	*draftSentence
}

func placesOf(blocks []*draftBlock) []sentencePlace {
	var all []sentencePlace
	for _, b := range blocks {
		for i := range b.sentences {
			all = append(all, sentencePlace{b, &b.sentences[i]})
		}
	}
	return all
}

// handOn gives what is known of p to q, if both are the same text from the same
// source.
func (p sentencePlace) handOn(q sentencePlace) bool {
	if !bytes.Equal(p.block.Text[p.start:p.end], q.block.Text[q.start:q.end]) ||
		!bytes.Equal(p.block.Raw(p.start, p.end), q.block.Raw(q.start, q.end)) {
		return false
	}
	q.state, q.odds, q.kept = p.state, p.odds, p.kept
	return true
}

// countBlock adds the words of a block to the document's counts, or takes them out:
// times is 1 or -1.
func (d *Draft) countBlock(b *draftBlock, times int) {
	for i := range b.sentences {
		w := &b.sentences[i].words
		for _, id := range w.known {
			d.recurring.addWord(id, times)
		}
		for _, u := range w.unknown {
			d.recurring.addForm([]byte(u.form), u.capital, times)
		}
	}
}

// settleWords works out what the counts say of the words of these blocks. Of the other
// words they say a trifle more or less; that waits for recount.
func (d *Draft) settleWords(changed ...[]*draftBlock) {
	for _, blocks := range changed {
		for _, b := range blocks {
			for i := range b.sentences {
				for _, id := range b.sentences[i].words.known {
					d.recurring.settleWord(id, d.e.lexicon)
				}
			}
		}
	}
}

// recount counts the words of the whole document anew, and notes that every judgement
// is of before.
func (d *Draft) recount() {
	d.recurring.reset()
	d.countAll()
	d.distrust(drifted, func(*draftSentence) bool { return true })
}

// countAll counts the words of all blocks.
func (d *Draft) countAll() {
	for _, b := range d.blocks {
		d.countBlock(b, 1)
	}
	d.recurring.settle(d.e.lexicon)
}

// distrust lowers to a state what the judgements of some sentences are worth.
func (d *Draft) distrust(state draftState, which func(*draftSentence) bool) {
	for _, b := range d.blocks {
		for i := range b.sentences {
			if s := &b.sentences[i]; which(s) {
				s.state = min(s.state, state)
			}
		}
		b.sum()
	}
}

// judgeAll judges the sentences whose state is at most worst.
func (d *Draft) judgeAll(ctx context.Context, worst draftState, progress func(done, total int)) error {
	total, size := 0, 0
	for _, b := range d.blocks {
		if b.state > worst {
			continue
		}
		for i := range b.sentences {
			if s := &b.sentences[i]; s.state <= worst {
				total++
				size += s.end - s.start
			}
		}
	}
	if total == 0 {
		return nil
	}
	d.hasten(size)
	done := 0
	for _, b := range d.blocks {
		if b.state > worst {
			continue
		}
		err := d.judgeBlock(ctx, b, worst, func() {
			if done++; progress != nil {
				progress(done, total)
			}
		})
		if err != nil {
			return err
		}
	}
	return nil
}

// judgeBlock judges the sentences of a block whose state is at most worst, and calls
// next after each.
func (d *Draft) judgeBlock(ctx context.Context, b *draftBlock, worst draftState, next func()) error {
	defer b.sum()
	places := b.Places()
	d.names = d.named
	i := -1
	for sentence := range d.segmenter.Sentences(b.Text) {
		i++
		s := &b.sentences[i]
		if s.state > worst {
			continue
		}
		if err := ctx.Err(); err != nil {
			return err
		}
		found, err := d.findings(sentence, b.Text)
		if err != nil {
			return err
		}
		s.odds, s.kept = d.keep(b.Block, &places, found, nil, nil)
		for k := range s.kept {
			s.kept[k].start -= s.start
			s.kept[k].end -= s.start
		}
		s.state = judged
		next()
	}
	return nil
}

// decided returns what passes the limits, in order.
func (d *Draft) decided() []Mark {
	words := 0
	d.odds = d.odds[:0]
	for _, b := range d.blocks {
		words += b.words
		d.odds = append(d.odds, b.odds...)
	}
	d.rate = d.e.slipRate(d.asked)
	d.rate.settle(words, d.odds)
	d.floor = d.floorOf(words, d.kept())
	d.said = directivesOf(d.source)

	var marks []Mark
	for _, b := range d.blocks {
		if b.kept > 0 {
			marks = d.appendMarks(marks, b)
		}
	}
	slices.SortStableFunc(marks, func(a, b Mark) int { return cmp.Compare(a.Offset, b.Offset) })
	return marks
}

// kept yields every finding that may be reported.
func (d *Draft) kept() iter.Seq[*pending] {
	return func(yield func(*pending) bool) {
		for _, b := range d.blocks {
			if b.kept == 0 {
				continue
			}
			for i := range b.sentences {
				for c := range pointers(b.sentences[i].kept) {
					if !yield(c) {
						return
					}
				}
			}
		}
	}
}

// appendMarks appends the marks of a block that pass the limits.
func (d *Draft) appendMarks(marks []Mark, b *draftBlock) []Mark {
	places := b.Places()
	for i := range b.sentences {
		s := &b.sentences[i]
		for c := range pointers(s.kept) {
			m, ok := d.passed(c)
			if !ok {
				continue
			}
			m.place(b.Block, &places, s.start+c.start, s.start+c.end)
			if !d.said.stand(m.Offset, m.Offset+m.Length, m.Observed) {
				marks = append(marks, m)
			}
		}
	}
	return marks
}
