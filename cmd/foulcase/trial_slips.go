package main

import (
	"io"
	"math"
	"math/rand/v2"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/channel"
	"example.org/foulcase/eval"
	"example.org/foulcase/internal/text"
)

// trialSlips draws the slips that a calibration learns from: those that people
// made, as far as lists of corrections know a word, and otherwise what the
// channel makes of it, or a word an edit away.
type trialSlips struct {
	*slipSource
	words, forms map[string][]madeSlip // by what was meant: typed words, and forms that are none
}

// madeSlip is what somebody typed, and how often, its square root taken so that
// the commonest slips do not drown the others.
type madeSlip struct {
	typed  string
	weight float64
}

func openTrialSlips(model string, pairs []string) (*trialSlips, error) {
	source, err := openSlipSource(model)
	if err != nil {
		return nil, err
	}
	s := &trialSlips{source, map[string][]madeSlip{}, map[string][]madeSlip{}}
	for _, path := range pairs {
		list, err := readFile(path, func(r io.Reader, name string) ([]channel.Pair, error) {
			p, err := channel.ReadPairs(r)
			return p, nameFile(name, err)
		})
		if err != nil {
			source.close()
			return nil, err
		}
		for _, p := range list {
			s.add(p)
		}
	}
	return s, nil
}

// add notes a pair of single words in small letters.
func (s *trialSlips) add(p channel.Pair) {
	if p.Spaced || p.Observed != strings.ToLower(p.Observed) || strings.Contains(p.Observed+p.Intended, "-") {
		return
	}
	intended := strings.ToLower(p.Intended)
	meant, ok := s.lexicon.ID([]byte(intended))
	if !ok {
		return
	}
	made := madeSlip{p.Observed, math.Sqrt(p.Count)}
	typed, isWord := s.lexicon.ID([]byte(p.Observed))
	switch {
	case !isWord && len(p.Observed) > 2:
		s.forms[intended] = append(s.forms[intended], made)
	case isWord && s.lexicon.Prior(typed) >= leastPrior && !s.lexicon.Variants(meant, typed) && s.channel.Cost(p.Observed, intended) < mostSlipCost:
		s.words[intended] = append(s.words[intended], made)
	}
}

// mostSlipCost is the channel cost, nats, from which a word for a word is a
// change of grammar or of mind rather than a slip.
const mostSlipCost = 14

// Chances, in 4 or in 3, with which slips are drawn. Guessed.
const (
	commonPrior    = -7.5 // log prior from which every second draw of a word is refused: the commonest few hundred would take half of all slips
	listed         = 3    // in 4: from the lists, where they know the word
	keptInflection = 1    // in 4: a listed slip between inflections, most of which are grammar
	fromChannel    = 2    // in 3: by the channel, and else a word an edit away
)

// mistype draws what is typed for a word, for eval.Slips.
func (s *trialSlips) mistype(kind eval.Kind, word string, random *rand.Rand) string {
	id, known := s.lexicon.ID([]byte(word))
	if !known || s.lexicon.Prior(id) > commonPrior && random.IntN(2) == 0 {
		return ""
	}
	lists := s.forms
	if kind == eval.Realword {
		lists = s.words
	}
	if made := lists[word]; len(made) > 0 && random.IntN(4) < listed {
		typed := draw(made, random)
		if kind == eval.Realword && inflected(typed, word) && random.IntN(4) >= keptInflection {
			return ""
		}
		return typed
	}
	if kind == eval.Realword && random.IntN(3) >= fromChannel {
		return eval.Neighbours(s.neighbours)(kind, word, random)
	}
	return s.slipSource.mistype(kind, word, random)
}

// draw draws one of the slips by weight.
func draw(made []madeSlip, random *rand.Rand) string {
	total := 0.0
	for _, m := range made {
		total += m.weight
	}
	at := random.Float64() * total
	for _, m := range made {
		if at -= m.weight; at < 0 {
			return m.typed
		}
	}
	return made[len(made)-1].typed
}

// inflected reports whether one form is the other with a common ending.
func inflected(a, b string) bool {
	if len(a) > len(b) {
		a, b = b, a
	}
	switch strings.TrimPrefix(b, a) {
	case "s", "es", "d", "ed", "ing", "ly":
		return true
	}
	return false
}

// trialMix weighs the kinds of slip that a calibration learns from; densities
// are numbers of words to a slip, dealt out in turn. Guessed: some writers slip
// in every second line, most seldom.
var (
	trialMix  = mix{eval.Nonword: 8, eval.Realword: 8, eval.Runon: 1, eval.Split: 1.4, eval.Repeat: 1.6}
	densities = []int{40, 100, 100, 300}
)

// trials puts slips into pieces of a text.
func (s *trialSlips) trials(path string, pieces []string, seed uint64) []foulcase.Trial {
	var trials []foulcase.Trial
	for i, p := range pieces {
		items := eval.Inject([]eval.Item{{Source: p}}, eval.Slips{
			Every: densities[i%len(densities)], Mix: trialMix, Mistype: s.mistype, Seed: seed + uint64(i)<<16,
		})
		trials = append(trials, trialOf(path, items[0]))
	}
	return trials
}

func isHeldOut(doc []byte) bool { return text.HeldOut(doc) }

// cutDocument cuts a document at paragraphs into pieces of about pieceSize.
func cutDocument(doc string) []string {
	var pieces []string
	for len(doc) > pieceSize*3/2 {
		at := strings.IndexByte(doc[pieceSize:], '\n')
		if at < 0 {
			break
		}
		pieces = append(pieces, doc[:pieceSize+at+1])
		doc = doc[pieceSize+at+1:]
	}
	return append(pieces, doc)
}
