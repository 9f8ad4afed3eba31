package foulcase

import (
	"fmt"
	"regexp"
	"slices"
	"strings"
	"unicode"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
)

// insteadOf stands in an entry of a house list between what is to be written and each
// of what is not.
var insteadOf = regexp.MustCompile(`\s*,\s+not\s+`)

// maxPhrase is the most words of either side of a preference.
const maxPhrase = 4

// maxAlike is the most unwanted forms that begin with the same word: wherever that
// stands in a document, all of them are tried.
const maxAlike = 200

// entries gathers the entries of house lists and holds them against each other.
type entries struct {
	preferred preferences
	words     []entry // that stand, those that preferences write among them
}

// entry is a word of a house list with its place.
type entry struct {
	written, place string
	of             *preference // that writes it; nil when it stands by itself
}

func newEntries() *entries { return &entries{preferred: preferences{}} }

// read takes the entries of a list and returns the words that stand by them.
func (e *entries) read(list HouseList) ([]string, error) {
	var words []string
	for line, err := range lexicon.ReadLines(list.Text, list.Name) {
		if err != nil {
			return nil, err
		}
		place := fmt.Sprintf("%s:%d", list.Name, line.Number)
		sides := insteadOf.Split(line.Text, -1)
		if err := e.add(sides[0], sides[1:], place); err != nil {
			return nil, fmt.Errorf("%s: %w", place, err)
		}
		words = append(words, sides[0])
	}
	return words, nil
}

// add takes one entry: what is written, and instead of what.
func (e *entries) add(written string, instead []string, place string) error {
	if len(instead) == 0 {
		e.words = append(e.words, entry{written, place, nil})
		return nil
	}
	if _, err := phraseOf(written); err != nil {
		return err
	}
	for _, unwanted := range instead {
		p, err := newPreference(written, unwanted, place)
		if err != nil {
			return err
		}
		if first := p.bad[0]; len(e.preferred[first.key]) == maxAlike {
			return fmt.Errorf("more than %d forms not to write begin with %q; leave some out", maxAlike, first.written)
		}
		if other := e.preferred.add(p); other != nil {
			return fmt.Errorf("%q is to be written %q here, but %q by %s; keep one of the two", unwanted, written, other.written, other.place)
		}
		e.words = append(e.words, entry{written, place, p})
	}
	return nil
}

// check finds a word that is to stand and yet to be replaced, by itself or by going
// round in a circle.
func (e *entries) check() error {
	if len(e.preferred) == 0 {
		return nil
	}
	var segmenter text.Segmenter
	for _, w := range e.words {
		block := []byte(w.written)
		for s := range segmenter.Sentences(block) {
			for i := range s.Tokens {
				p, n := e.preferred.at(s.Tokens, i, block)
				if p == nil || p.write(s.Tokens[i:i+n], block, false) == string(block[s.Tokens[i].Start:s.Tokens[i+n-1].End]) {
					continue
				}
				return fmt.Errorf("%s: %q is a house word, but %s has %q written for %q; keep one of the two", w.place, w.written, p.place, p.written, p.unwanted)
			}
		}
	}
	return nil
}

// newPreference reads one pair.
func newPreference(written, unwanted, place string) (*preference, error) {
	p := &preference{written: written, unwanted: unwanted, place: place}
	if written == unwanted {
		return nil, fmt.Errorf("%q is to be written for itself; give the form that is not wanted behind \"not\"", written)
	}
	var err error
	if p.good, err = phraseOf(written); err == nil {
		p.bad, err = phraseOf(unwanted)
	}
	p.exact = strings.ToLower(unwanted) != unwanted
	return p, err
}

// phraseOf cuts one side of a preference into the units that a document is read by.
func phraseOf(s string) (phrase, error) {
	if n := len(strings.Fields(s)); n < 1 || n > maxPhrase {
		return nil, fmt.Errorf("%q is of %d words; write \"FORM, not FORM\" with one to %d on either side", s, n, maxPhrase)
	}
	var units phrase
	var segmenter text.Segmenter
	block, sentences := []byte(s), 0
	for sentence := range segmenter.Sentences(block) {
		sentences++
		for _, t := range sentence.Tokens {
			units = append(units, unit{string(keyOf(t, block)), string(block[t.Start:t.End]), t.Glued})
		}
	}
	hasWord := slices.ContainsFunc(units, func(u unit) bool { return strings.ContainsFunc(u.key, unicode.IsLetter) })
	if sentences != 1 || !hasWord || len(s) > lexicon.MaxForm*maxPhrase {
		return nil, fmt.Errorf("%q cannot be read as words; give one to %d words, without a full stop", s, maxPhrase)
	}
	return units, nil
}
