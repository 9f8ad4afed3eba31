package main

import (
	"bytes"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"unicode"
	"unicode/utf8"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
	"example.org/foulcase/eval"
	"example.org/foulcase/internal/text"
)

// corrections are the pairs of a house, each once, and why others were left out.
type corrections struct {
	base  *slipSource
	pairs []channel.Pair
	at    map[[2]string]int // in pairs
	left  []leftOut
}

// leftOut is a number of pairs or changes that were not taken, and why.
type leftOut struct {
	Why string `json:"why"`
	N   int    `json:"n"`
}

// Why something is left out.
const (
	notSpelling = "capitals alone, codes, words for words, rewrites"
	otherChange = "put in, taken out, figures, signs"
	caseAlone   = "capitals alone"
	wordForWord = "a word for a word"
	nowUnknown  = "now no known word"
	nowName     = "now a name"
	tooCostly   = "too unlike"
)

func (f *corrections) leave(why string, n int) {
	for i := range f.left {
		if f.left[i].Why == why {
			f.left[i].N += n
			return
		}
	}
	if n > 0 {
		f.left = append(f.left, leftOut{why, n})
	}
}

func (f *corrections) known(word string) bool {
	_, ok := f.base.lexicon.ID([]byte(word))
	return ok
}

// take adds what is a slip of spelling, as model build takes it.
func (f *corrections) take(p channel.Pair) {
	kept := channel.Clean([]channel.Pair{p}, f.known)
	if len(kept) == 0 {
		f.leave(notSpelling, 1)
		return
	}
	p = kept[0]
	if f.at == nil {
		f.at = map[[2]string]int{}
	}
	key := [2]string{p.Observed, p.Intended}
	if i, again := f.at[key]; again {
		f.pairs[i].Count += p.Count
		return
	}
	f.at[key] = len(f.pairs)
	f.pairs = append(f.pairs, p)
}

// readList takes the pairs of a list.
func (f *corrections) readList(c *console, path, shape string, columns eval.CSVColumns) error {
	pairs, _, err := readData(c, path, pairReader(shape, columns))
	if err != nil {
		return err
	}
	for _, p := range pairs {
		f.take(channel.Pair{Observed: p.Observed, Intended: p.Intended, Count: float64(p.Count), Spaced: p.Spaces})
	}
	return nil
}

// readVersions takes what was corrected between two versions of a file, or of the
// files of a folder, by their names below it; a file that only one has is passed over.
func (f *corrections) readVersions(before, after string) error {
	info, err := os.Stat(before)
	if err != nil {
		return err
	}
	if !info.IsDir() {
		return f.readVersion(before, after)
	}
	both := 0
	for _, in := range findInputs([]string{before}, nil, standardInput) {
		if in.err != nil {
			return in.err
		}
		name, err := filepath.Rel(before, in.path)
		if err != nil {
			return err
		}
		now := filepath.Join(after, name)
		if _, err := os.Stat(now); os.IsNotExist(err) {
			continue
		}
		both++
		if err := f.readVersion(in.path, now); err != nil {
			return err
		}
	}
	if both == 0 {
		return fmt.Errorf("%s and %s have no document of the same name; the names below both folders must agree", before, after)
	}
	return nil
}

func (f *corrections) readVersion(before, after string) error {
	old, err := sentencesOf(before)
	if err != nil {
		return err
	}
	now, err := sentencesOf(after)
	if err != nil {
		return err
	}
	replaced, others := eval.Replaced(old, now)
	f.leave(otherChange, others)
	for _, p := range replaced {
		if why := f.refuse(p); why != "" {
			f.leave(why, 1)
			continue
		}
		f.take(channel.Pair{Observed: p.Observed, Intended: p.Intended, Count: 1, Spaced: p.Spaces})
	}
	return nil
}

// sentencesOf reads the sentences of a document's prose by its format.
func sentencesOf(path string) ([]string, error) {
	file, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer file.Close()
	if info, err := file.Stat(); err == nil && info.IsDir() {
		return nil, &fs.PathError{Op: "read", Path: path, Err: fmt.Errorf("a folder, and the other version is a file")}
	}
	format, _ := text.FormatOf(path)
	var segmenter text.Segmenter
	var sentences []string
	for block, err := range text.Blocks(file, format, text.Options{}) {
		if err != nil {
			return nil, &fs.PathError{Op: "read", Path: path, Err: cause(err)}
		}
		prose := bytes.ToValidUTF8(block.Text, nil)
		for s := range segmenter.Sentences(prose) {
			sentences = append(sentences, string(prose[s.Start:s.End]))
		}
	}
	return sentences, nil
}

// refuse says why a replaced word is no slip of spelling; "" when it is one.
func (f *corrections) refuse(p eval.Pair) string {
	observed, intended := normal(p.Observed), normal(p.Intended)
	switch {
	case observed == intended:
		return caseAlone
	case f.allKnown(observed):
		return wordForWord
	case !f.allKnown(intended):
		return nowUnknown
	case f.name(p.Intended):
		return nowName
	case !p.Spaces && f.base.channel.Cost(observed, intended) > mostSlipCost:
		return tooCostly
	}
	return ""
}

func normal(words string) string { return string(text.Fold(nil, []byte(words))) }

func (f *corrections) allKnown(words string) bool {
	for _, w := range strings.Fields(words) {
		if stem, _ := strings.CutSuffix(w, "'s"); !f.known(w) && !f.known(stem) {
			return false
		}
	}
	return true
}

// name reports whether a word with a capital usually has one.
func (f *corrections) name(word string) bool {
	first, _ := utf8.DecodeRuneInString(word)
	id, ok := f.base.lexicon.ID([]byte(normal(word)))
	return ok && unicode.IsUpper(first) && f.base.lexicon.Entry(id).Usual != lexicon.LowerCase
}
