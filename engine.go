// Package foulcase finds misspellings in running text, those that are words
// included, and proposes what was meant.
//
// An Engine is opened from one model file: a lexicon, a channel (how writers
// mis-write), an n-gram language model and the judgement that weighs them.
// Engine.Proof reads a document and yields its marks, Engine.Rank the
// candidates for one word, Engine.Ledger the parts of every score in a
// sentence. Nothing is written to the document, nothing is fetched, and the
// model's bytes are used where they lie.
//
// The embedded English model is package lm/english; a program that brings its
// own model does not link it.
package foulcase

import (
	"bytes"
	"fmt"
	"strings"
	"sync"

	"example.org/foulcase/candidates"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
	"example.org/foulcase/internal/charset"
	"example.org/foulcase/internal/modelfile"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/lm"
)

// Errors of Open and OpenFile, for errors.Is.
var (
	ErrForeign = modelfile.ErrForeign // not a model file
	ErrNewer   = modelfile.ErrNewer   // made for a later version of foulcase
	ErrDamaged = modelfile.ErrDamaged // cut or altered
)

// Errors of reading a document, for errors.Is; others are those of its reader.
var (
	ErrFormat     = text.ErrFormat     // Options.Format names none
	ErrEncoding   = charset.ErrUnknown // Options.Encoding names none that is read
	ErrUnreadable = text.ErrUnreadable // not a document of its format
	ErrTooLarge   = text.ErrTooLarge   // beyond what is read of the format
)

// Names of the sections of a model file.
const (
	SectionCard        = "card"        // the model card, UTF-8 text
	SectionLexicon     = "lexicon"     // candidates/lexicon
	SectionChannel     = "channel"     // channel
	SectionLM          = "lm"          // lm, over lexicon ids
	SectionMirror      = "mirror"      // candidates: the lexicon from the end of its words
	SectionSpelling    = "spelling"    // lm, over characters: the price of a new word
	SectionConfusables = "confusables" // candidates: words taken for one another
	SectionJudgement   = "judgement"   // Judgement, JSON
	SectionCalibration = "calibration" // Calibration, JSON; may be missing
	SectionFitted      = "fitted"      // channel: the pairs it was fitted on; may be missing
)

// Engine is an opened model. It is safe for concurrent use.
type Engine struct {
	file        *modelfile.File
	lexicon     *lexicon.Lexicon
	channel     *channel.Model
	lm          *lm.Model
	spelling    *lm.Spelling
	mirror      *candidates.Mirror
	confusables *candidates.Confusables
	judgement   *Judgement
	calibration *calibrator         // nil: the lattice's posteriors are taken for probabilities
	fitted      *channel.Fitted     // nil: not recorded
	judges      sync.Pool           // *judge
	shortcut    func() *lm.Shortcut // made at the first call
}

// Open opens a model in place. The caller must not change the bytes while the
// Engine is in use. Every section is checksummed first, so a damaged model is
// an error that says so.
func Open(model []byte) (*Engine, error) {
	file, err := modelfile.Open(model)
	if err != nil {
		return nil, err
	}
	return newEngine(file)
}

// OpenFile opens the model at path, memory-mapped where the platform can.
// Close releases it.
func OpenFile(path string) (*Engine, error) {
	file, err := modelfile.OpenPath(path)
	if err != nil {
		return nil, err
	}
	e, err := newEngine(file)
	if err != nil {
		file.Close()
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	return e, nil
}

func newEngine(file *modelfile.File) (*Engine, error) {
	e := &Engine{file: file}
	for _, p := range []struct {
		name     string
		optional bool
		open     func([]byte) error
	}{
		{SectionLexicon, false, opener(&e.lexicon, lexicon.Open)},
		{SectionChannel, false, opener(&e.channel, channel.Open)},
		{SectionFitted, true, opener(&e.fitted, channel.OpenFitted)},
		{SectionLM, false, opener(&e.lm, lm.Open)},
		{SectionSpelling, false, opener(&e.spelling, lm.OpenSpelling)},
		{SectionMirror, false, opener(&e.mirror, candidates.OpenMirror)},
		{SectionConfusables, false, opener(&e.confusables, candidates.OpenConfusables)},
		{SectionJudgement, false, opener(&e.judgement, parseJudgement)},
		{SectionCalibration, true, opener(&e.calibration, parseCalibration)},
	} {
		body, ok := file.Section(p.name)
		if !ok && p.optional {
			continue
		}
		if !ok {
			return nil, fmt.Errorf("model has no section %q; complete it with `foulcase model build`", p.name)
		}
		if err := p.open(body); err != nil {
			return nil, err
		}
	}
	for _, part := range []struct {
		name      string
		got, want int
	}{
		{SectionLM, e.lm.Vocabulary(), e.lexicon.Vocabulary()},
		{SectionMirror, e.mirror.Words(), e.lexicon.Len()},
		{SectionConfusables, e.confusables.Words(), e.lexicon.Len()},
	} {
		if part.got != part.want {
			return nil, fmt.Errorf("section %q counts %d words where the lexicon has %d: they were not built together; rebuild the model", part.name, part.got, part.want)
		}
	}
	e.shortcut = sync.OnceValue(e.lm.NewShortcut)
	e.judges.New = func() any { return newJudge(e) }
	return e, nil
}

// opener makes of a typed open function one that stores what it opened.
func opener[T any](dst *T, open func([]byte) (T, error)) func([]byte) error {
	return func(body []byte) (err error) {
		*dst, err = open(body)
		return err
	}
}

// Close releases a model opened by OpenFile; the Engine must not be used
// afterwards.
func (e *Engine) Close() error { return e.file.Close() }

// Hash identifies the model: 16 hexadecimal digits of its SHA-256.
func (e *Engine) Hash() string { return e.file.Hash() }

// Card returns the model card: sources, licences, recipe and figures.
func (e *Engine) Card() string {
	card, _ := e.file.Section(SectionCard)
	return string(card)
}

// Section is one part of a model file.
type Section struct {
	Name    string `json:"name"`
	Bytes   int    `json:"bytes"`
	Summary string `json:"summary"`
}

// Describe lists the parts of the model in file order.
func (e *Engine) Describe() []Section {
	summaries := map[string]string{
		SectionLexicon: fmt.Sprintf("%d forms", e.lexicon.Len()),
		SectionLM:      describeNGrams(e.lm),
	}
	if e.fitted != nil {
		summaries[SectionFitted] = fmt.Sprintf("%d pairs", e.fitted.Len())
	}
	if c := e.calibration; c != nil {
		summaries[SectionCalibration] = fmt.Sprintf("%d, %d and %d features", len(c.Nonword.Terms), len(c.Realword.Terms), len(c.Spaces.Terms))
	}
	var parts []Section
	for _, name := range e.file.Names() {
		body, _ := e.file.Section(name)
		parts = append(parts, Section{name, len(body), summaries[name]})
	}
	return parts
}

func describeNGrams(m *lm.Model) string {
	var counts []string
	for k := range m.Order() {
		counts = append(counts, fmt.Sprint(m.Count(k+1)))
	}
	return "n-grams by order: " + strings.Join(counts, ", ")
}

// Known reports whether the lexicon has a word, its case aside: as it stands,
// as a possessive, or as a compound of known words.
func (e *Engine) Known(word string) bool {
	return e.knows(text.Fold(nil, []byte(word)))
}

func (e *Engine) knows(form []byte) bool {
	for piece := range bytes.SplitSeq(form, []byte("-")) {
		if _, ok := e.lexicon.ID(piece); ok {
			continue
		}
		stem, possessive := bytes.CutSuffix(piece, []byte("'s"))
		if _, ok := e.lexicon.ID(stem); !possessive || !ok {
			return false
		}
	}
	return true
}
