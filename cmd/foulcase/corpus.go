package main

import (
	"fmt"
	"io"
	"iter"
	"runtime"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/lm/train"
)

// corpus is plain text to learn from or to measure on: one paragraph a line,
// blank lines between documents.
type corpus struct {
	inputs   []input
	progress *progress
}

// openCorpus finds the texts that operands name; a folder stands for the text
// files in it. The first that cannot be found is an error.
func openCorpus(c *console, operands []string) (*corpus, error) {
	inputs := findInputs(operands, c.in, standardInput)
	for _, in := range inputs {
		if in.err != nil {
			return nil, in.err
		}
	}
	return &corpus{inputs, c.progress}, nil
}

// start shows progress over the whole corpus.
func (c *corpus) start(label string) { c.progress.Set(label, totalSize(c.inputs)) }

// documents yields the documents of all texts. A slice is valid until the
// next; an error, which names its file, ends them.
func (c *corpus) documents() iter.Seq2[[]byte, error] {
	return func(yield func([]byte, error) bool) {
		for _, in := range c.inputs {
			if !c.documentsOf(in, yield) {
				return
			}
		}
	}
}

func (c *corpus) documentsOf(in input, yield func([]byte, error) bool) bool {
	r, err := in.open()
	if err != nil {
		yield(nil, err)
		return false
	}
	defer r.Close()
	for doc, err := range text.Documents(watched{r, c.progress}) {
		if err != nil {
			yield(nil, fmt.Errorf("%s: %w", in.path, cause(err)))
			return false
		}
		if !yield(doc, nil) {
			return false
		}
	}
	return true
}

// sentences yields one part of the texts as the ids that the language model
// reads. A slice is valid until the next.
func (c *corpus) sentences(part train.Part, lex *lexicon.Lexicon) train.Sentences {
	return train.Text(c.documents(), lex, part, runtime.GOMAXPROCS(0))
}

// reader reads all texts end to end, each from the start of a line.
func (c *corpus) reader() io.Reader { return &chain{inputs: c.inputs, progress: c.progress} }

// chain reads one input after the other, opening each when its turn comes.
type chain struct {
	inputs   []input
	progress *progress
	open     io.ReadCloser
	last     byte // what was read before; 0 at the start of an input
}

func (c *chain) Read(b []byte) (int, error) {
	for len(b) > 0 {
		if c.open == nil && len(c.inputs) == 0 {
			return 0, io.EOF
		}
		if c.open == nil {
			r, err := c.inputs[0].open()
			if err != nil {
				return 0, err
			}
			c.open, c.last = r, 0
		}
		n, err := c.open.Read(b)
		c.progress.Add(n)
		switch {
		case n > 0:
			c.last = b[n-1]
			return n, nil
		case err == io.EOF:
			if n := c.finish(b); n > 0 {
				return n, nil
			}
		case err != nil:
			return 0, fmt.Errorf("%s: %w", c.inputs[0].path, cause(err))
		}
	}
	return 0, nil
}

// finish closes the open input and ends its last line, if need be.
func (c *chain) finish(b []byte) int {
	c.open.Close()
	c.open, c.inputs = nil, c.inputs[1:]
	if c.last == 0 || c.last == '\n' {
		return 0
	}
	b[0] = '\n'
	return 1
}
