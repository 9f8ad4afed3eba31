package candidates

import (
	"cmp"
	"slices"
	"unicode/utf8"
)

// MaxParts is the most words a run-on is read as.
const MaxParts = 3

// RunOn is a reading of one observed token as two or three words between which
// a space was left out.
type RunOn struct {
	IDs     [MaxParts]uint32
	N       int     // number of words
	Cuts    [2]int  // byte offsets in the observed form where the second and third word begin
	Channel float32 // nats
	Prior   float32 // sum of the log priors of the words, nats
}

// Score is comparable to that of a Candidate.
func (r RunOn) Score(w Weights) float32 { return w.Channel*r.Channel - w.Prior*r.Prior }

const (
	// commonPart is the least log prior of each of three words run together:
	// with rarer ones chance would find three words in almost anything.
	commonPart = -11
	// commonShort is the same for a part of one or two letters: the lists know
	// most pairs of letters as some rare word.
	commonShort = -9
)

// RunOns appends the best k readings of an observed form as two or three known
// words, best first, with scores of at most bound.
func (s *Searcher) RunOns(dst []RunOn, observed []byte, k int, bound float32) []RunOn {
	from := len(dst)
	if k <= 0 || len(observed) > utf8.UTFMax*longest {
		return dst
	}
	space := s.channel.Prices().RunOn
	s.eachCut(observed, func(cut int, first, second part) {
		r := RunOn{IDs: [MaxParts]uint32{first.id}, N: 2, Cuts: [2]int{cut}, Channel: space, Prior: first.prior + second.prior}
		if second.known {
			r.IDs[1] = second.id
			dst = s.keepRunOn(dst, from, r, k, bound)
		}
		if first.prior < commonPart {
			return
		}
		s.eachCut(observed[cut:], func(next int, middle, last part) {
			if !last.known || min(middle.prior, last.prior) < commonPart {
				return
			}
			dst = s.keepRunOn(dst, from, RunOn{
				IDs: [MaxParts]uint32{first.id, middle.id, last.id}, N: 3, Cuts: [2]int{cut, cut + next},
				Channel: 2 * space, Prior: first.prior + middle.prior + last.prior,
			}, k, bound)
		})
	})
	return dst
}

// part is one word of a run-on.
type part struct {
	id    uint32
	prior float32
	known bool
}

func (s *Searcher) part(form []byte) part {
	id, ok := s.lex.ID(form)
	if !ok || !s.allowed(s.lex, id) {
		return part{}
	}
	prior := s.lex.Prior(id)
	short := utf8.RuneCount(form) <= 2
	return part{id, prior, !short || prior >= commonShort}
}

// eachCut visits every way of cutting a form in two of which the first is a word.
func (s *Searcher) eachCut(form []byte, visit func(cut int, first, second part)) {
	for cut := 1; cut < len(form); cut++ {
		if !utf8.RuneStart(form[cut]) {
			continue
		}
		if first := s.part(form[:cut]); first.known {
			visit(cut, first, s.part(form[cut:]))
		}
	}
}

// keepRunOn inserts a reading among the best k of dst[from:].
func (s *Searcher) keepRunOn(dst []RunOn, from int, r RunOn, k int, bound float32) []RunOn {
	if r.Score(s.weights) > bound {
		return dst
	}
	at, _ := slices.BinarySearchFunc(dst[from:], r, func(a, b RunOn) int {
		return cmp.Compare(a.Score(s.weights), b.Score(s.weights))
	})
	dst = slices.Insert(dst, from+at, r)
	return dst[:min(len(dst), from+k)]
}

// Join reads two observed tokens as one word into which a space was put; false
// if together they are no word.
func (s *Searcher) Join(first, second []byte) (Candidate, bool) {
	s.joined = append(append(s.joined[:0], first...), second...)
	id, ok := s.lex.ID(s.joined)
	if !ok || !s.allowed(s.lex, id) {
		return Candidate{}, false
	}
	return Candidate{ID: id, Channel: s.channel.Prices().Split, Prior: s.lex.Prior(id)}, true
}
