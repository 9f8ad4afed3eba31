package eval

import (
	"cmp"
	"math/rand/v2"
	"slices"
)

// Slips says how slips are put into clean text: one in every so many words, of
// a kind drawn by weight, where it can be made. The zero value but for Mistype
// follows Budanitsky & Hirst (2006), one word in 200 taken for another.
type Slips struct {
	Every int              // words; 200 when not set
	Mix   map[Kind]float64 // weight of each kind; Realword alone when empty
	// Mistype returns what might be typed when word is meant, for the kinds
	// Nonword and Realword, or "" when this word, or this draw, is to give no
	// slip; the place is drawn anew then. So a Mistype that refuses words with
	// some chance decides which words are mistyped, and one that draws a form
	// and refuses it for being of the other kind keeps the true shares of what
	// it does not refuse. The word and the answer are in lower case with
	// straight apostrophes. It must draw from random alone.
	Mistype func(kind Kind, word string, random *rand.Rand) string
	// Names has slips put into names and other words with capitals too, where
	// often nothing can tell them from a right name. Capitals that begin a
	// sentence are touched in any case, if the word is met in small letters
	// somewhere. Figures, codes and addresses are never touched.
	Names bool
	Seed  uint64
}

// Neighbours is a Mistype that draws evenly among the forms that a function
// gives for a word.
func Neighbours(of func(word string) []string) func(Kind, string, *rand.Rand) string {
	return func(_ Kind, word string, random *rand.Rand) string {
		forms := of(word)
		if len(forms) == 0 {
			return ""
		}
		return forms[random.IntN(len(forms))]
	}
}

// Inject returns the items with slips in them, and a span for each. The words
// of all items run on, so that short items have slips too. A stretch of words
// in which no slip of the kind drawn comes about in many tries gets none, nor
// does a rest at the end shorter than half a stretch. Capitals are carried over.
// The items must have no spans of their own.
func Inject(items []Item, s Slips) []Item {
	s.Every = cmp.Or(max(s.Every, 0), 200)
	random := rand.New(rand.NewPCG(s.Seed, 0x5119))
	damaged := slices.Clone(items)
	slips := map[int][]slip{}
	var stretch []place
	small := s.smallWords(items)
	for i, item := range items {
		for _, t := range tokenize(item.Source) {
			if !t.word || t.digits {
				continue
			}
			p := place{i, t, s.touchable(item.Source, t, small)}
			if stretch = append(stretch, p); len(stretch) == s.Every {
				s.slip(items, stretch, random, slips)
				stretch = stretch[:0]
			}
		}
	}
	if 2*len(stretch) >= s.Every {
		s.slip(items, stretch, random, slips)
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
	touchable bool
}

// slip is a stretch of a source and what is typed there.
type slip struct {
	start, end int
	typed      string
	kind       Kind
}

// triesPerWord is how many places are tried for each word of a stretch. Three
// draws in a hundred or so give another word, so it is seldom too few.
const triesPerWord = 16

// slip makes one slip in a stretch of words, if it can.
func (s *Slips) slip(items []Item, stretch []place, random *rand.Rand, slips map[int][]slip) {
	kind := s.kind(random)
	for range triesPerWord * len(stretch) {
		k := random.IntN(len(stretch))
		item := stretch[k].item
		if made, ok := s.slipAt(kind, items[item].Source, stretch, k, random); ok {
			slips[item] = append(slips[item], made)
			return
		}
	}
}

// kind draws a kind by weight.
func (s *Slips) kind(random *rand.Rand) Kind {
	var all float64
	for _, k := range Kinds {
		all += s.Mix[k]
	}
	at, drawn := random.Float64()*all, Realword
	for _, k := range Kinds {
		if w := s.Mix[k]; w > 0 {
			if drawn = k; at < w {
				break
			}
			at -= w
		}
	}
	return drawn
}

// with returns the item with slips in it; the slips are in order.
func (item Item) with(slips []slip) Item {
	source, copied := make([]byte, 0, len(item.Source)), 0
	item.Spans = nil
	for _, s := range slips {
		source = append(source, item.Source[copied:s.start]...)
		start := len(source)
		source = append(source, s.typed...)
		item.Spans = append(item.Spans, Span{
			Start: start, End: len(source), Kind: s.kind,
			Corrections: []string{item.Source[s.start:s.end]},
		})
		copied = s.end
	}
	item.Source = string(append(source, item.Source[copied:]...))
	return item
}
