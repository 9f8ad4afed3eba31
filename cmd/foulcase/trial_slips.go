package main

import (
	"cmp"
	"io"
	"math"
	"math/rand/v2"
	"slices"
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
	heavy          = 1    // in 3: a form that the channel drew is mis-written once more
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
	typed := s.slipSource.mistype(kind, word, random)
	if kind == eval.Nonword && typed != "" && random.IntN(3) < heavy {
		typed = string(s.channel.Draw(nil, []byte(typed), random))
		if _, isWord := s.lexicon.ID([]byte(typed)); isWord {
			return ""
		}
	}
	return typed
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
	ending, ok := strings.CutPrefix(b, a)
	return ok && slices.Contains([]string{"s", "es", "d", "ed", "ing", "ly"}, ending)
}

// trialMix weighs the kinds of slip that a calibration learns from; densities
// are numbers of words to a slip, dealt out in turn. Guessed: some writers slip
// in every second line, most seldom.
var (
	trialMix  = mix{eval.Nonword: 6, eval.Realword: 4, eval.Runon: 1, eval.Split: 1, eval.Repeat: 1}
	densities = []int{40, 100, 100, 300}
)

// trials puts slips into pieces of a text.
func (s *trialSlips) trials(path string, pieces []string, seed uint64) []foulcase.Trial {
	var trials []foulcase.Trial
	for i, p := range pieces {
		items := eval.Inject([]eval.Item{{Source: p}}, eval.Slips{
			Every: densities[i%len(densities)], Mix: trialMix, Mistype: s.mistype, Names: i%nameTurn == 0, Seed: seed + uint64(i)<<16,
		})
		random := rand.New(rand.NewPCG(seed, uint64(i)))
		trials = append(trials, trialOf(path, withHabits(items[0], random)))
	}
	return trials
}

// nameTurn is which piece in so many has slips in names too, and habit the
// chance, one in so many, that a form that is no word is the writer's habit: then
// the word is written so wherever the text has it, unless that is oftener than
// mostHabitual: nobody mis-writes "the" all the time. Guessed.
const nameTurn, habit, mostHabitual = 3, 3, 6

// withHabits makes habits of some of an item's slips.
func withHabits(item eval.Item, random *rand.Rand) eval.Item {
	habits := map[string]string{} // what is typed, by the word that is meant
	for _, s := range item.Spans {
		if s.Kind == eval.Nonword && s.Corrections[0] != item.Source[s.Start:s.End] && random.IntN(habit) == 0 {
			habits[s.Corrections[0]] = item.Source[s.Start:s.End]
		}
	}
	places := slices.Clone(item.Spans)
	for word := range habits {
		if found := occurrences(item, word); len(found) <= mostHabitual {
			places = append(places, found...)
		}
	}
	slices.SortFunc(places, func(a, b eval.Span) int { return cmp.Compare(a.Start, b.Start) })

	out := eval.Item{Line: item.Line, Document: item.Document}
	var b strings.Builder
	at := 0
	for _, s := range places {
		typed := item.Source[s.Start:s.End]
		if typed == s.Corrections[0] {
			typed = habits[typed]
		}
		b.WriteString(item.Source[at:s.Start])
		at = s.End
		s.Start = b.Len()
		b.WriteString(typed)
		s.End = b.Len()
		out.Spans = append(out.Spans, s)
	}
	b.WriteString(item.Source[at:])
	out.Source = b.String()
	return out
}

// occurrences returns where an item has a word outside its spans, as spans of
// forms that are no words.
func occurrences(item eval.Item, word string) []eval.Span {
	var found []eval.Span
	var segmenter text.Segmenter
	for s := range segmenter.Sentences([]byte(item.Source)) {
		for _, t := range s.Tokens {
			inside := func(s eval.Span) bool { return t.Start < s.End && t.End > s.Start }
			if item.Source[t.Start:t.End] == word && !slices.ContainsFunc(item.Spans, inside) {
				found = append(found, eval.Span{Start: t.Start, End: t.End, Kind: eval.Nonword, Corrections: []string{word}})
			}
		}
	}
	return found
}

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
