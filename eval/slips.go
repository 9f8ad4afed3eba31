package eval

import (
	"math/rand/v2"
	"unicode/utf8"

	"example.org/foulcase/internal/text"
)

// Slips says how slips are put into clean text: in every so many words, one
// that has neighbours is replaced by one of them, drawn evenly (Budanitsky &
// Hirst 2006: one word in 200 by a lexicon word one edit away).
type Slips struct {
	Every      int // words; 200 when not set
	Neighbours func(word string) []string
	Seed       uint64
}

// Inject returns the items with slips in them, and a span for each. The words
// of all items run on, so that short items have slips too. A stretch of words
// of which none has neighbours gets none, nor does a rest at the end shorter
// than half a stretch. Capitals are carried over. The items must have no spans
// of their own.
func Inject(items []Item, s Slips) []Item {
	every := s.Every
	if every <= 0 {
		every = 200
	}
	random := rand.New(rand.NewPCG(s.Seed, 0x5119))
	damaged := make([]Item, len(items))
	copy(damaged, items)
	slips := map[int][]slip{}
	var stretch []place
	for i, item := range items {
		for _, t := range tokenize(item.Source) {
			if !t.word || t.digits {
				continue
			}
			if stretch = append(stretch, place{i, t}); len(stretch) == every {
				s.draw(stretch, random, slips)
				stretch = stretch[:0]
			}
		}
	}
	if 2*len(stretch) >= every {
		s.draw(stretch, random, slips)
	}
	for i, list := range slips {
		damaged[i] = items[i].with(list)
	}
	return damaged
}

// place is a word of an item.
type place struct {
	item int
	token
}

// slip is a word and what replaces it.
type slip struct {
	token
	typed string
}

// draw makes one slip in a stretch of words, if any can be made.
func (s Slips) draw(stretch []place, random *rand.Rand, slips map[int][]slip) {
	for _, k := range random.Perm(len(stretch)) {
		p := stretch[k]
		neighbours := s.Neighbours(p.fold)
		if len(neighbours) == 0 {
			continue
		}
		typed := text.ApplyCase(text.CaseOf([]byte(p.text)), neighbours[random.IntN(len(neighbours))])
		if typed != p.text && utf8.ValidString(typed) {
			slips[p.item] = append(slips[p.item], slip{p.token, typed})
			return
		}
	}
}

// with returns the item with words replaced; the slips are in order.
func (item Item) with(slips []slip) Item {
	source, copied := make([]byte, 0, len(item.Source)), 0
	item.Spans = nil
	for _, s := range slips {
		source = append(source, item.Source[copied:s.start]...)
		start := len(source)
		source = append(source, s.typed...)
		item.Spans = append(item.Spans, Span{
			Start: start, End: len(source), Kind: Realword,
			Corrections: []string{item.Source[s.start:s.end]},
		})
		copied = s.end
	}
	item.Source = string(append(source, item.Source[copied:]...))
	return item
}
