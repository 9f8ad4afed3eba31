package train

import (
	"context"
	"errors"
	"fmt"
	"os"

	"example.org/foulcase/lm"
)

// Counts holds every n-gram of a text up to an order, in the shape of the
// model to be: an n-gram's parent is the n-gram without its leftmost word.
type Counts struct {
	Order     int
	Sentences int64
	Tokens    int64 // predicted ones: without the begin ids
	levels    []countLevel
}

// countLevel is one order of Counts.
type countLevel struct {
	word     []uint32 // as in lm.Table
	first    []uint32
	raw      []uint32 // occurrences
	adjusted []uint32 // distinct left neighbours; occurrences where there is none or at the highest order
}

// Len returns the number of distinct n-grams of an order, 1..Order.
func (c *Counts) Len(order int) int { return len(c.levels[order-1].raw) }

// tables returns the trie's shape without values.
func (c *Counts) tables() lm.Tables {
	t := make(lm.Tables, len(c.levels))
	for k := range c.levels {
		t[k] = lm.Table{Word: c.levels[k].word, First: c.levels[k].first}
	}
	return t
}

// Count reads all sentences. Memory beyond the distinct n-grams themselves
// stays within o.Memory; what does not fit is sorted, spilled to o.TempDir and
// merged. Temporary files are gone when it returns.
func Count(ctx context.Context, text Sentences, o Options) (_ *Counts, err error) {
	o, err = o.normalise()
	if err != nil {
		return nil, err
	}
	dir, err := os.MkdirTemp(o.TempDir, "counts-")
	if err != nil {
		return nil, fmt.Errorf("train: %w", err)
	}
	c := newCounter(o, dir)
	defer func() { err = errors.Join(err, c.close(), os.RemoveAll(dir)) }()
	for sentence, err := range text {
		if err == nil {
			err = ctx.Err()
		}
		if err == nil {
			err = c.add(sentence)
		}
		if err != nil {
			return nil, err
		}
	}
	sorted, err := c.finish()
	if err != nil {
		return nil, err
	}
	b := newTrieBuilder(c.packer, c.vocabulary, o)
	if err := b.build(ctx, sorted); err != nil {
		return nil, err
	}
	return &Counts{Order: o.Order, Sentences: c.sentences, Tokens: c.tokens, levels: b.levels}, nil
}

// counter fills a buffer with keys; a full one is sorted and spilled in the
// background while another fills.
type counter struct {
	packer     packer
	options    Options
	dir        string
	buffer     []key
	idle       chan [2][]key // a buffer to fill next and scratch to sort with
	spilled    chan error
	runs       []*run
	vocabulary int
	sentences  int64
	tokens     int64
}

func newCounter(o Options, dir string) *counter {
	// Three buffers of 16-byte keys share the budget.
	size := max(int(o.Memory/(3*16)), 1024)
	c := &counter{
		vocabulary: max(o.Vocabulary, int(o.Begin)+1, int(o.End)+1),
		packer:     newPacker(o.Order, o.limit()), options: o, dir: dir,
		buffer: make([]key, 0, size), idle: make(chan [2][]key, 1), spilled: make(chan error, 1),
	}
	c.spilled <- nil
	return c
}

func (c *counter) add(sentence []uint32) error {
	if len(sentence) == 0 {
		return nil
	}
	for _, w := range sentence {
		if int(w) >= c.options.limit() {
			return fmt.Errorf("train: word id %d in a vocabulary of %d", w, c.options.limit())
		}
		c.vocabulary = max(c.vocabulary, int(w)+1)
	}
	c.sentences++
	begin := 0
	if sentence[0] == c.options.Begin {
		begin = 1
	}
	for i := begin; i < len(sentence); i++ {
		if sentence[i] == c.options.Begin {
			return errors.New("train: begin id within a sentence")
		}
		if len(c.buffer) == cap(c.buffer) {
			if err := c.spill(); err != nil {
				return err
			}
		}
		c.buffer = append(c.buffer, c.packer.pack(sentence[max(0, i+1-c.packer.order):i+1]))
		c.tokens++
	}
	if c.sentences%(1<<16) == 0 {
		c.options.Progress(Progress{Stage: "count", Done: c.tokens})
	}
	return nil
}

// spill waits for the run before it and starts on this one.
func (c *counter) spill() error {
	if err := <-c.spilled; err != nil {
		c.spilled <- nil
		return err
	}
	var spare [2][]key
	select {
	case spare = <-c.idle:
	default:
		size := cap(c.buffer)
		spare = [2][]key{make([]key, size), make([]key, size)}
	}
	full := c.buffer
	c.buffer = spare[0][:0]
	go func() {
		sorted, scratch := sortKeys(full, spare[1], c.packer.bits())
		r, err := spill(&sliceStream{sorted}, c.dir)
		if err == nil {
			c.runs = append(c.runs, r)
		}
		c.idle <- [2][]key{sorted, scratch}
		c.spilled <- err
	}()
	return nil
}

// finish returns all keys in order. What never filled a buffer is not spilled.
func (c *counter) finish() (stream, error) {
	err := <-c.spilled
	c.spilled <- nil
	if err != nil {
		return nil, err
	}
	scratch := make([]key, len(c.buffer))
	sorted, _ := sortKeys(c.buffer, scratch, c.packer.bits())
	c.buffer = nil
	if len(c.runs) == 0 {
		return &sliceStream{sorted}, nil
	}
	sources := []stream{&sliceStream{sorted}}
	for _, r := range c.runs {
		sources = append(sources, r)
	}
	return merge(sources)
}

// close waits for work in the background and removes the runs.
func (c *counter) close() error {
	err := <-c.spilled
	for _, r := range c.runs {
		err = errors.Join(err, r.remove())
	}
	return err
}
