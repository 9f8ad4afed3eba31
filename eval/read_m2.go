package eval

import (
	"cmp"
	"errors"
	"fmt"
	"io"
	"slices"
	"strconv"
	"strings"
)

// ReadM2 reads edit annotations in the M2 format (Dahlmeier & Ng 2012):
//
//	S The launh will sails at noon .
//	A 1 2|||R:SPELL|||launch|||REQUIRED|||-NONE-|||0
//	A 3 4|||R:VERB:FORM|||sail|||REQUIRED|||-NONE-|||0
//
// with an empty line between sentences. Edits replace the words from the first
// place up to the second, counted from 0. Each annotator gives a Reference, with
// the edits of spelling alone, and a Full text with all of that annotator's. An
// edit is of spelling when the name of its type holds SPELL or ORTH; one of
// case alone is then found to be neutral by Gold. An edit that corrects nothing
// (type UNK) is neutral. Of corrections parted by "||", the first counts. A
// sentence that nobody annotated is right as it stands; an annotator without
// edits says so with type noop.
//
// Errors are of type *LineError and name the file as given.
func ReadM2(file string, r io.Reader) ([]Sentence, error) {
	var sentences []Sentence
	var open *m2Sentence
	finish := func() {
		if open != nil {
			sentences = append(sentences, open.sentence())
		}
		open = nil
	}
	for n, line := range lines(file, r) {
		if line.err != nil {
			return nil, line.err
		}
		kind, rest, _ := strings.Cut(line.text, " ")
		var err error
		switch {
		case strings.TrimSpace(line.text) == "":
			finish()
		case kind == "S":
			finish()
			open, err = newM2Sentence(rest, n)
		case kind != "A":
			err = errors.New("want a sentence (S ...), an edit (A ...) or an empty line")
		case open == nil:
			err = errors.New("an edit without a sentence: put the line S ... before it")
		default:
			err = open.add(rest)
		}
		if err != nil {
			return nil, &LineError{file, n, err}
		}
	}
	finish()
	return sentences, nil
}

// m2Sentence is a sentence while its edits are read.
type m2Sentence struct {
	line  int
	words []string
	edits map[int][]m2Edit // by annotator
}

// m2Edit replaces words [start, end).
type m2Edit struct {
	start, end int
	spelling   bool
	correction string
}

func newM2Sentence(text string, line int) (*m2Sentence, error) {
	words := strings.Fields(text)
	if len(words) == 0 {
		return nil, errors.New("empty sentence")
	}
	return &m2Sentence{line, words, map[int][]m2Edit{}}, nil
}

// add reads what follows the A of an edit.
func (s *m2Sentence) add(text string) error {
	fields := strings.Split(text, "|||")
	if len(fields) != 6 {
		return fmt.Errorf("%d fields, want 6 parted by |||: FROM TO, type, correction, REQUIRED, -NONE-, annotator", len(fields))
	}
	annotator, err := strconv.Atoi(strings.TrimSpace(fields[5]))
	if err != nil {
		return fmt.Errorf("annotator %q: want a number", fields[5])
	}
	edits := s.edits[annotator]
	if fields[1] == "noop" {
		s.edits[annotator] = edits // an annotator all the same
		return nil
	}
	e, err := s.parseEdit(fields)
	if err != nil {
		return err
	}
	for _, other := range edits {
		if e.start < other.end && other.start < e.end {
			return fmt.Errorf("words %d to %d are edited twice by annotator %d", e.start, e.end, annotator)
		}
	}
	s.edits[annotator] = append(edits, e)
	return nil
}

func (s *m2Sentence) parseEdit(fields []string) (m2Edit, error) {
	from, to, _ := strings.Cut(strings.TrimSpace(fields[0]), " ")
	start, err := strconv.Atoi(from)
	end, err2 := strconv.Atoi(to)
	if err != nil || err2 != nil || start < 0 || end < start || end > len(s.words) {
		return m2Edit{}, fmt.Errorf("places %q: want two numbers from 0 to %d, the first not above the second", fields[0], len(s.words))
	}
	correction, _, _ := strings.Cut(fields[2], "||")
	if correction = strings.TrimSpace(correction); correction == "-NONE-" {
		correction = ""
	}
	kind := strings.ToUpper(fields[1])
	e := m2Edit{start, end, strings.Contains(kind, "SPELL") || strings.Contains(kind, "ORTH"), correction}
	if correction == strings.Join(s.words[start:end], " ") {
		e.spelling, e.correction = false, "" // left out of Full, so that the words are neutral
	}
	return e, nil
}

// sentence gives the texts that the annotators made.
func (s *m2Sentence) sentence() Sentence {
	out := Sentence{Line: s.line, Source: strings.Join(s.words, " ")}
	annotators := make([]int, 0, len(s.edits))
	for a := range s.edits {
		annotators = append(annotators, a)
	}
	slices.Sort(annotators)
	for _, a := range annotators {
		edits := s.edits[a]
		slices.SortStableFunc(edits, func(x, y m2Edit) int {
			return cmp.Or(cmp.Compare(x.start, y.start), cmp.Compare(x.end, y.end))
		})
		reference, full := s.apply(edits, true), s.apply(edits, false)
		out.References = append(out.References, reference)
		if full != reference {
			out.Full = append(out.Full, full)
		}
	}
	if len(annotators) == 0 {
		out.References = []string{out.Source}
	}
	return out
}

// apply writes the sentence with the edits made, or those of spelling alone.
func (s *m2Sentence) apply(edits []m2Edit, spellingOnly bool) string {
	var words []string
	at := 0
	for _, e := range edits {
		if spellingOnly && !e.spelling {
			continue
		}
		words = append(words, s.words[at:e.start]...)
		if e.correction != "" {
			words = append(words, e.correction)
		}
		at = e.end
	}
	return strings.Join(append(words, s.words[at:]...), " ")
}
