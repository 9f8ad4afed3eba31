package main

import (
	"bytes"
	"context"
	"fmt"
	"io"
	"iter"
	"os"
	"runtime"

	"example.org/foulcase"
	"example.org/foulcase/candidates"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
	"example.org/foulcase/internal/modelfile"
	"example.org/foulcase/lm/train"
)

// spellingSize is the room for the model of new words, in bytes.
const spellingSize = 640 << 10

// Bounds of the table of words taken for one another, tuned on development
// text: channel cost and spread of scores in nats, and entries a word.
const (
	confusableCost   = 8.5
	confusableSpread = 8
	confusablePrior  = -15 // least log relative frequency of a word in it
	confusablesMost  = 16
)

// builder puts a model file together, part by part, each from the parts
// before it.
type builder struct {
	parts    *modelParts
	progress *progress
	held     map[string][]byte // the sections so far
}

// buildModel makes the parts that were asked for and writes them as one file.
func buildModel(ctx context.Context, c *console, p *modelParts) error {
	b := &builder{p, c.progress, map[string][]byte{}}
	if err := b.takeOver(); err != nil {
		return err
	}
	if len(p.words) > 0 || len(p.texts) > 0 {
		if err := b.learnWords(ctx, c); err != nil {
			return err
		}
	}
	if len(p.pairs) > 0 {
		if err := b.learnSlips(); err != nil {
			return err
		}
	}
	if len(p.fitted) > 0 {
		if err := b.recordFitted(); err != nil {
			return err
		}
	}
	if len(p.words)+len(p.texts)+len(p.pairs) > 0 || p.homophones != "" {
		if err := b.findConfusables(ctx); err != nil {
			return err
		}
	}
	for section, path := range map[string]string{foulcase.SectionJudgement: p.judgement, foulcase.SectionCalibration: p.calibrated, foulcase.SectionCard: p.card} {
		if path == "" {
			continue
		}
		body, err := os.ReadFile(path)
		if err != nil {
			return err
		}
		b.held[section] = body
	}
	return b.write()
}

// sectionOrder is the order of the parts in a file.
var sectionOrder = []string{
	foulcase.SectionCard, foulcase.SectionJudgement, foulcase.SectionCalibration, foulcase.SectionLexicon, foulcase.SectionMirror,
	foulcase.SectionChannel, foulcase.SectionFitted, foulcase.SectionSpelling, foulcase.SectionConfusables, foulcase.SectionLM,
}

func (b *builder) write() error {
	w, err := b.writer()
	if err != nil {
		return err
	}
	return w.WriteFile(b.parts.output)
}

// writer has the parts made so far in order.
func (b *builder) writer() (*modelfile.Writer, error) {
	w := modelfile.NewWriter()
	for _, name := range sectionOrder {
		if body, ok := b.held[name]; ok {
			if err := w.Set(name, body); err != nil {
				return nil, err
			}
		}
	}
	return w, nil
}

// takeOver copies the sections of other model files.
func (b *builder) takeOver() error {
	for _, path := range b.parts.from {
		file, err := openModelFile(path)
		if err != nil {
			return err
		}
		if _, ok := file.Section(foulcase.SectionChannel); ok {
			delete(b.held, foulcase.SectionFitted) // it is of another channel
		}
		for _, name := range file.Names() {
			body, _ := file.Section(name)
			b.held[name] = bytes.Clone(body)
		}
		if err := file.Close(); err != nil {
			return err
		}
	}
	return nil
}

// learnWords makes the lexicon and the model of new words.
func (b *builder) learnWords(ctx context.Context, c *console) error {
	texts := &corpus{progress: b.progress}
	if len(b.parts.texts) > 0 {
		var err error
		if texts, err = openCorpus(c, b.parts.texts); err != nil {
			return err
		}
	}
	texts.start("count words")
	counts, err := lexicon.CountDocuments(texts.documents(), runtime.NumCPU())
	if err != nil {
		return err
	}
	lists, err := readWordLists(b.parts.words)
	if err != nil {
		return err
	}
	b.progress.Set("lexicon", 0)
	evidence, err := lexicon.NewEvidence(lists, counts)
	if err != nil {
		return err
	}
	if b.held[foulcase.SectionLexicon], err = evidence.Builder().Section(); err != nil {
		return err
	}
	lex, err := lexicon.Open(b.held[foulcase.SectionLexicon])
	if err != nil {
		return err
	}
	if b.held[foulcase.SectionMirror], err = candidates.BuildMirror(lex); err != nil {
		return err
	}
	b.progress.Set("spelling of new words", 0)
	b.held[foulcase.SectionSpelling], err = train.Spelling(ctx, rareForms(lex), spellingSize)
	return err
}

func readWordLists(files []wordList) ([]lexicon.WordList, error) {
	varieties := map[foulcase.Variety]lexicon.Variety{
		foulcase.AnyVariety: lexicon.US | lexicon.GB,
		foulcase.American:   lexicon.US,
		foulcase.British:    lexicon.GB,
	}
	var lists []lexicon.WordList
	for _, l := range files {
		words, err := readFile(l.path, lexicon.ReadWords)
		if err != nil {
			return nil, err
		}
		lists = append(lists, lexicon.WordList{Name: l.path, Variety: varieties[l.variety], Words: words})
	}
	return lists, nil
}

// readFile opens a file for a reader that names it in its errors.
func readFile[T any](path string, read func(io.Reader, string) (T, error)) (T, error) {
	f, err := os.Open(path)
	if err != nil {
		var none T
		return none, err
	}
	defer f.Close()
	return read(f, path)
}

// rareForms yields the forms that the corpus has seldom or never, which new
// words look most like, each once.
func rareForms(lex *lexicon.Lexicon) iter.Seq2[string, int] {
	const seldom = -15 // log relative frequency, nats: three in ten million words
	return func(yield func(string, int) bool) {
		var form []byte
		for id := range uint32(lex.Len()) {
			if e := lex.Entry(id); e.Prior > seldom {
				continue
			}
			form = lex.AppendForm(form[:0], id)
			if !yield(string(form), 1) {
				return
			}
		}
	}
}

// learnSlips fits the channel to pairs of observed and intended forms.
func (b *builder) learnSlips() error {
	b.progress.Set("channel", 0)
	pairs, err := b.slips(b.parts.pairs)
	if err != nil {
		return err
	}
	var o channel.FitOptions
	if b.parts.edits != "" {
		o.Edits, err = readFile(b.parts.edits, func(r io.Reader, name string) ([]channel.Edit, error) {
			e, err := channel.ReadEdits(r)
			return e, nameFile(name, err)
		})
		if err != nil {
			return err
		}
	}
	m, _, err := channel.Fit(pairs, o)
	if err != nil {
		return err
	}
	b.held[foulcase.SectionChannel] = m.Section()
	b.held[foulcase.SectionFitted] = channel.FittedSection(pairs)
	return nil
}

// recordFitted notes which pairs the channel taken over was fitted to.
func (b *builder) recordFitted() error {
	if _, ok := b.held[foulcase.SectionChannel]; !ok {
		return fmt.Errorf("--fitted tells of a channel, and there is none: add --from a model that has one")
	}
	pairs, err := b.slips(b.parts.fitted)
	if err != nil {
		return err
	}
	b.held[foulcase.SectionFitted] = channel.FittedSection(pairs)
	return nil
}

// slips reads pairs that a channel is fitted to, those aside whose observed
// form is a word.
func (b *builder) slips(paths []string) ([]channel.Pair, error) {
	lex, err := b.lexicon()
	if err != nil {
		return nil, err
	}
	var pairs []channel.Pair
	for _, path := range paths {
		more, err := readFile(path, func(r io.Reader, name string) ([]channel.Pair, error) {
			p, err := channel.ReadPairs(r)
			return p, nameFile(name, err)
		})
		if err != nil {
			return nil, err
		}
		pairs = append(pairs, more...)
	}
	known := func(word string) bool { _, ok := lex.ID([]byte(word)); return ok }
	return channel.Clean(pairs, known), nil
}

func nameFile(name string, err error) error {
	if err == nil {
		return nil
	}
	return fmt.Errorf("%s: %w", name, err)
}

// lexicon opens the lexicon made or taken over so far.
func (b *builder) lexicon() (*lexicon.Lexicon, error) {
	body, ok := b.held[foulcase.SectionLexicon]
	if !ok {
		return nil, fmt.Errorf("no lexicon to build on: give --words and --text, or --from a model that has one")
	}
	return lexicon.Open(body)
}

// findConfusables tells for every word of the lexicon what else may have been
// meant by it. Without a channel there is nothing to tell it by.
func (b *builder) findConfusables(ctx context.Context) error {
	body, ok := b.held[foulcase.SectionChannel]
	if !ok {
		return nil
	}
	slips, err := channel.Open(body)
	if err != nil {
		return err
	}
	lex, err := b.lexicon()
	if err != nil {
		return err
	}
	mirror, err := candidates.OpenMirror(b.held[foulcase.SectionMirror])
	if err != nil {
		return err
	}
	o := candidates.ConfusableOptions{
		LeastPrior: confusablePrior,
		MostCost:   confusableCost,
		Most:       confusablesMost,
		Jobs:       runtime.NumCPU(),
		Progress: func(done, all int) {
			b.progress.Set(fmt.Sprintf("words taken for one another: %d %%", 100*done/all), 0)
		},
	}
	if b.parts.homophones != "" {
		o.Homophones, err = readFile(b.parts.homophones, func(r io.Reader, name string) ([][]string, error) {
			h, err := candidates.ReadHomophones(r)
			return h, nameFile(name, err)
		})
		if err != nil {
			return err
		}
	}
	newSearcher := func() *candidates.Searcher {
		s := candidates.NewSearcher(lex, slips, candidates.DefaultWeights)
		s.SetMirror(mirror)
		s.SetSpread(confusableSpread)
		return s
	}
	b.held[foulcase.SectionConfusables], err = candidates.BuildConfusables(ctx, lex, newSearcher, o)
	return err
}
