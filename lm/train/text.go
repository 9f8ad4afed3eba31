package train

import (
	"bytes"
	"iter"
	"sync"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
)

// Part says which documents of a corpus to read. One document in ten, by its
// hash (see text.HeldOut), is never trained on.
type Part uint8

// The parts of a corpus.
const (
	Training Part = iota
	HeldOut
	Whole
)

func (p Part) has(doc []byte) bool {
	return p == Whole || text.HeldOut(doc) == (p == HeldOut)
}

// pieceSize is how much text a worker takes at a time, in bytes.
const pieceSize = 1 << 20

// Text turns the documents of a corpus, a paragraph a line (see
// text.Documents), into sentences of a lexicon's ids, begin and end included.
// Sentences without any id in between are left out. Workers segment pieces of
// the corpus side by side; the order of the sentences is that of the corpus.
func Text(docs iter.Seq2[[]byte, error], lex *lexicon.Lexicon, part Part, workers int) Sentences {
	return func(yield func([]uint32, error) bool) {
		workers = max(workers, 1)
		work, queue := make(chan *piece), make(chan *piece, 2*workers)
		stop := make(chan struct{})
		var running sync.WaitGroup
		defer running.Wait()
		defer close(stop)
		for range workers {
			running.Go(func() {
				s := text.Segmenter{}
				for p := range work {
					p.read(&s, lex)
					close(p.done)
				}
			})
		}
		running.Go(func() {
			defer close(work)
			defer close(queue)
			cut(docs, part, func(p *piece) bool {
				select {
				case queue <- p:
				case <-stop:
					return false
				}
				select {
				case work <- p:
				case <-stop:
					return false
				}
				return true
			})
		})
		for p := range queue {
			<-p.done
			if !p.each(yield) {
				return
			}
		}
	}
}

// piece is some documents of a corpus and the sentences made of them.
type piece struct {
	text []byte
	ids  []uint32
	ends []int // of each sentence in ids
	err  error // of the corpus, behind these documents
	done chan struct{}
}

// cut passes pieces of whole documents on until emit says no.
func cut(docs iter.Seq2[[]byte, error], part Part, emit func(*piece) bool) {
	p := &piece{done: make(chan struct{})}
	for doc, err := range docs {
		if err != nil {
			p.err = err
			break
		}
		if !part.has(doc) {
			continue
		}
		p.text = append(append(p.text, doc...), '\n')
		if len(p.text) >= pieceSize {
			if !emit(p) {
				return
			}
			p = &piece{done: make(chan struct{})}
		}
	}
	emit(p)
}

// read segments the piece's paragraphs.
func (p *piece) read(s *text.Segmenter, lex *lexicon.Lexicon) {
	begin, end := lex.ClassID(lexicon.Begin), lex.ClassID(lexicon.End)
	for line := range bytes.Lines(p.text) {
		for sentence := range s.Sentences(line) {
			start := len(p.ids)
			p.ids = append(p.ids, begin)
			for _, token := range sentence.Tokens {
				p.ids = lex.Read(p.ids, token)
			}
			if len(p.ids) == start+1 {
				p.ids = p.ids[:start]
				continue
			}
			p.ids = append(p.ids, end)
			p.ends = append(p.ends, len(p.ids))
		}
	}
	p.text = nil
}

func (p *piece) each(yield func([]uint32, error) bool) bool {
	start := 0
	for _, end := range p.ends {
		if !yield(p.ids[start:end:end], nil) {
			return false
		}
		start = end
	}
	return p.err == nil || yield(nil, p.err) && false
}

// TextOptions fills in what training on a lexicon's ids needs to know of it.
func TextOptions(lex *lexicon.Lexicon, o Options) Options {
	o.Vocabulary = lex.Vocabulary()
	o.Begin, o.End = lex.ClassID(lexicon.Begin), lex.ClassID(lexicon.End)
	return o
}
