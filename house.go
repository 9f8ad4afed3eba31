package foulcase

import (
	"fmt"
	"io"

	"example.org/foulcase/candidates/lexicon"
)

// House is the organisation's own vocabulary: words that stand, and what is always
// to be written for what. It is read once and shared between goroutines.
type House struct {
	words     *lexicon.Lexicon
	preferred preferences
}

// HouseList is one list of house words.
type HouseList struct {
	Name string // for messages: usually its path
	Text io.Reader
}

// ReadHouse reads one list; see ReadHouseLists.
func ReadHouse(name string, r io.Reader) (*House, error) {
	return ReadHouseLists(HouseList{name, r})
}

// ReadHouseLists reads lists of house words into one: UTF-8, one entry a line, "#" beginning a
// comment. An entry is a word, or what is always to be written and what not:
//
//	Tollgarth
//	pilot boat, not pilotboat
//
// Either side is of one to four words. What is written in small letters matches, and is
// written with, any capitals; capitals are kept to. What is to be written is a house word
// too. Errors name the list, the line and the remedy; two entries that contradict each
// other are one.
func ReadHouseLists(lists ...HouseList) (*House, error) {
	h := &House{}
	var all []string
	entries := newEntries()
	for _, list := range lists {
		words, err := entries.read(list)
		if err != nil {
			return nil, err
		}
		if _, err := lexicon.FromWords(words); err != nil {
			return nil, fmt.Errorf("%s: %w", list.Name, err)
		}
		all = append(all, words...)
	}
	if err := entries.check(); err != nil {
		return nil, err
	}
	h.preferred = entries.preferred
	var err error
	h.words, err = lexicon.FromWords(all)
	return h, err
}

// has reports whether the house has the folded form; a nil House has none.
func (h *House) has(form []byte) bool {
	if h == nil {
		return false
	}
	_, ok := h.words.ID(form)
	return ok
}
