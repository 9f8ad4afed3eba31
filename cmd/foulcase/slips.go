package main

import (
	"iter"
	"math/rand/v2"
	"slices"
	"unicode/utf8"

	"example.org/foulcase"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
	"example.org/foulcase/eval"
	"example.org/foulcase/internal/modelfile"
)

// slipSource says what writers type for a word, by the lexicon and the channel of
// a model file.
type slipSource struct {
	file    *modelfile.File
	lexicon *lexicon.Lexicon
	channel *channel.Model
}

// openSlipSource opens the model at path, or the embedded one when path is
// empty. The caller closes it.
func openSlipSource(path string) (*slipSource, error) {
	file, err := openModelFile(path)
	if err != nil {
		return nil, err
	}
	s := &slipSource{file: file}
	if err := s.open(path); err != nil {
		file.Close()
		return nil, err
	}
	return s, nil
}

func (s *slipSource) open(path string) error {
	var err error
	if s.lexicon, _, err = lexiconOf(s.file, path); err != nil {
		return err
	}
	section, err := sectionOf(s.file, path, foulcase.SectionChannel)
	if err != nil {
		return err
	}
	s.channel, err = channel.Open(section)
	return naming(path, err)
}

func (s *slipSource) close() { s.file.Close() }

// longWord is the number of letters from which a longer word is no likelier to be
// mistyped. Below, each letter is one more occasion. Guessed.
const longWord = 12

// mistype draws what the channel makes of a known word, for eval.Slips: a form
// that the lexicon lacks for the kind nonword, another word for the kind realword.
func (s *slipSource) mistype(kind eval.Kind, word string, random *rand.Rand) string {
	id, known := s.lexicon.ID([]byte(word))
	if !known || random.IntN(longWord) >= utf8.RuneCountInString(word) {
		return ""
	}
	form := s.channel.Draw(nil, []byte(word), random)
	typed, isWord := s.lexicon.ID(form)
	if isWord != (kind == eval.Realword) || isWord && !s.another(id, typed) {
		return ""
	}
	return string(form)
}

// Least log priors, in nats, of what counts as another word. Of forms of one or
// two letters a lexicon has many that are abbreviations or names.
const (
	leastPrior      = -15 // three in ten million words
	leastShortPrior = -7.5
)

// another says whether a form of the lexicon is a word in ordinary use, and no
// spelling of the word that was meant.
func (s *slipSource) another(meant, typed uint32) bool {
	e, least := s.lexicon.Entry(typed), float32(leastPrior)
	if len(s.lexicon.AppendForm(nil, typed)) < 3 {
		least = leastShortPrior
	}
	return e.Listed && e.Usual == lexicon.LowerCase && e.Prior >= least && !s.lexicon.Variants(meant, typed)
}

// neighbours lists the words in ordinary use one edit away from a known word: a
// letter dropped, added or replaced, or two neighbours swapped.
func (s *slipSource) neighbours(word string) []string {
	id, known := s.lexicon.ID([]byte(word))
	if !known {
		return nil
	}
	var list []string
	tried := map[string]bool{word: true}
	for form := range edits(word) {
		if tried[form] {
			continue
		}
		tried[form] = true
		if other, ok := s.lexicon.ID([]byte(form)); ok && s.another(id, other) {
			list = append(list, form)
		}
	}
	return list
}

// edits yields the forms one edit away from a word, some more than once.
func edits(word string) iter.Seq[string] {
	const letters = "abcdefghijklmnopqrstuvwxyz'"
	w := []rune(word)
	return func(yield func(string) bool) {
		// with puts something in the place of letters i to j.
		with := func(i, j int, typed ...rune) bool { return yield(string(slices.Concat(w[:i], typed, w[j:]))) }
		for i := range len(w) + 1 {
			for _, r := range letters {
				if !with(i, i, r) || i < len(w) && !with(i, i+1, r) {
					return
				}
			}
			if i < len(w) && !with(i, i+1) || i+1 < len(w) && !with(i, i+2, w[i+1], w[i]) {
				return
			}
		}
	}
}
