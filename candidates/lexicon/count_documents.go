package lexicon

import (
	"iter"
	"sync"

	"example.org/foulcase/internal/text"
)

// A corpus is counted in pieces of whole documents: the pieces are counted side
// by side and merged in order, so that the result does not depend on how many
// workers there are, nor on their speed, pruning included.
const (
	pieceSize = 8 << 20 // bytes of text in a piece, more or less
	maxForms  = 4 << 20 // different forms kept; more are pruned to half of it
)

type piece struct {
	text   []byte
	ends   []int // of the documents in text
	result chan *Counter
}

// CountDocuments counts the documents of a corpus (see text.Documents) but
// those held out of training (text.HeldOut), on jobs goroutines. Memory stays
// bounded, at well under a gigabyte, whatever the corpus; a corpus with more
// than four million different forms loses its rarest. It returns the first
// error of docs.
func CountDocuments(docs iter.Seq2[[]byte, error], jobs int) (*Counter, error) {
	jobs = max(jobs, 1)
	work := make(chan *piece)
	queue := make(chan *piece, jobs) // the same, in order, for merging
	var workers sync.WaitGroup
	for range jobs {
		workers.Go(func() {
			for p := range work {
				p.result <- p.count()
			}
		})
	}
	var failure error
	go func() {
		defer close(queue)
		defer close(work)
		failure = pieces(docs, func(p *piece) {
			queue <- p
			work <- p
		})
	}()
	total := NewCounter()
	for p := range queue {
		total.Merge(<-p.result)
		if total.Len() > maxForms {
			total.prune(maxForms / 2)
		}
	}
	workers.Wait()
	return total, failure
}

// pieces gathers documents until a piece is full.
func pieces(docs iter.Seq2[[]byte, error], emit func(*piece)) error {
	p := &piece{}
	flush := func() {
		if len(p.ends) > 0 {
			p.result = make(chan *Counter, 1)
			emit(p)
			p = &piece{}
		}
	}
	defer flush()
	for doc, err := range docs {
		if err != nil {
			return err
		}
		if text.HeldOut(doc) {
			continue
		}
		p.text = append(p.text, doc...)
		p.ends = append(p.ends, len(p.text))
		if len(p.text) >= pieceSize {
			flush()
		}
	}
	return nil
}

func (p *piece) count() *Counter {
	c := NewCounter()
	start := 0
	for _, end := range p.ends {
		c.Document(p.text[start:end])
		start = end
	}
	return c
}
