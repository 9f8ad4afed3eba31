package main

import (
	"errors"
	"fmt"
	"io"
	"math"

	"example.org/foulcase"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/modelfile"
	"example.org/foulcase/internal/report"
	"example.org/foulcase/lm"
	"example.org/foulcase/lm/train"
	"github.com/spf13/pflag"
)

func lmMeasureVerb() verb {
	return verb{
		name:     "lm measure",
		operands: "TEXT...",
		summary:  "measure the perplexity of text under a language model",
		about: `
Prices every word of plain text (files, folders or "-") and prints the
perplexity with unseen words and without, and how many words each length of
n-gram priced. The ends of sentences count as words. A model trained with --raw
reads a sentence a line. --emit jsonl prints the same as one object, logp in
natural logarithms.`,
		examples: `
			foulcase lm measure testdata/tiny/corpus.txt`,
		declare: declareLMMeasure,
	}
}

func declareLMMeasure(fs *pflag.FlagSet) action {
	var model string
	modelFlag(fs, &model)
	heldOutOnly := fs.Bool("held-out-only", false, "read only the documents that lm train --hold-out leaves out")
	emit := emitFlag(fs)
	return func(c *console, operands []string) (status, error) {
		text, err := openCorpus(c, operands)
		if err != nil {
			return trouble, err
		}
		file, err := openModelFile(model)
		if err != nil {
			return trouble, err
		}
		defer file.Close()
		part := train.Whole
		if *heldOutOnly {
			part = train.HeldOut
		}
		text.start("lm measure")
		m, err := measure(file, model, text, part)
		if err != nil {
			return trouble, err
		}
		if m.Tokens == 0 {
			return trouble, errors.New("no words in the text; name other files, or drop --held-out-only for a short text")
		}
		return clean, printMeasurement(c.out, &m, emit.value)
	}
}

// measure prices text under the language model of a file, over the file's
// lexicon or its own vocabulary.
func measure(file *modelfile.File, name string, text *corpus, part train.Part) (train.Measurement, error) {
	var none train.Measurement
	section, err := sectionOf(file, name, foulcase.SectionLM)
	if err != nil {
		return none, err
	}
	model, err := lm.Open(section)
	if err != nil {
		return none, naming(name, err)
	}
	if words, ok := file.Section(sectionVocabulary); ok {
		v, err := train.OpenVocabulary(words)
		if err != nil {
			return none, naming(name, err)
		}
		return train.Measure(model, train.RawText(text.reader(), v, false), train.BeginID,
			func(id uint32) bool { return id == train.UnknownID })
	}
	lex, _, err := lexiconOf(file, name)
	if err != nil {
		return none, err
	}
	unseen := map[uint32]bool{
		lex.ClassID(lexicon.Unknown): true,
		lex.ClassID(lexicon.Name):    true,
		lex.ClassID(lexicon.Acronym): true,
	}
	return train.Measure(model, text.sentences(part, lex), lex.ClassID(lexicon.Begin),
		func(id uint32) bool { return unseen[id] })
}

// measurementObject is a measurement as --emit jsonl prints it.
type measurementObject struct {
	Sentences      int64   `json:"sentences"`
	Tokens         int64   `json:"tokens"`
	Unseen         int64   `json:"unseen"`
	LogP           float64 `json:"logp"` // nats
	Perplexity     float64 `json:"perplexity"`
	PerplexitySeen float64 `json:"perplexity_seen"`
	Orders         []int64 `json:"orders"` // tokens priced by n-grams of 1, 2, ... words
}

func printMeasurement(w io.Writer, m *train.Measurement, emit string) error {
	orders := m.Orders[1:]
	for len(orders) > 1 && orders[len(orders)-1] == 0 {
		orders = orders[:len(orders)-1]
	}
	if emit == "jsonl" {
		return report.JSONLines(w).Encode(measurementObject{
			m.Sentences, m.Tokens, m.Unseen, m.LogProb, finite(m.Perplexity()), finite(m.PerplexitySeen()), orders,
		})
	}
	_, err := fmt.Fprintf(w, "%d sentences, %d tokens, %d of them unseen\nperplexity %.2f, without the unseen %.2f\n",
		m.Sentences, m.Tokens, m.Unseen, m.Perplexity(), m.PerplexitySeen())
	for i, n := range orders {
		if err == nil {
			_, err = fmt.Fprintf(w, "priced by order %d: %.1f %%\n", i+1, 100*float64(n)/float64(m.Tokens))
		}
	}
	return err
}

// finite makes a number that JSON can carry of one that overflowed, or of the
// mean of nothing.
func finite(x float64) float64 {
	if math.IsNaN(x) {
		return 0
	}
	return min(x, math.MaxFloat64)
}
