package main

import (
	"encoding/json"
	"errors"
	"io"

	"example.org/foulcase"
	"example.org/foulcase/eval"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/internal/wholefile"
	"github.com/spf13/pflag"
)

func modelCalibrateVerb() verb {
	return verb{
		name:     "model calibrate",
		operands: "TEXT...",
		summary:  "learn what a finding's evidence is worth",
		about: `
Writes a calibration, JSON, for foulcase model build --calibration: what each
piece of evidence adds to the odds that a finding is right, and from which
probability on findings are reported for each budget of false alarms.

TEXT is good text in plain files or folders of them, a paragraph a line and
blank lines between documents, that the model did not learn from:
--held-out-only reads only the documents that lm train --hold-out leaves out,
and leaves out a third of those to be measured on. It is cut into pieces. Half
of them teach, once as they are and once with slips put in, some densely and
some rarely; the other half sets the thresholds, so that some three files in
four have no more findings than the budget. --words bounds what is taken of
each file, evenly over its length.

Slips are drawn from lists of corrections (--pairs: observed, intended and
count, parted by tabs), where these know the word, and from the model's channel
and the words an edit away where not. --without does without some of what a
document tells about itself: ` + orList(foulcase.EvidenceNames()) + `.
The same texts and --seed give the same calibration.`,
		examples: `
			foulcase model calibrate --pairs testdata/tiny/pairs.tsv -o calibration.json testdata/tiny/corpus.txt`,
		declare: declareModelCalibrate,
	}
}

// calibrateFlags are what the user asked of model calibrate.
type calibrateFlags struct {
	engine  engineFlags
	pairs   []string
	heldOut bool
	words   count
	without []string
	seed    uint64
	output  string
}

func declareModelCalibrate(fs *pflag.FlagSet) action {
	f := &calibrateFlags{words: 120000}
	f.engine.declare(fs)
	fs.StringArrayVar(&f.pairs, "pairs", nil, "`FILE` of corrections to draw slips from; may be repeated")
	fs.BoolVar(&f.heldOut, "held-out-only", false, "read two thirds of the documents that lm train --hold-out leaves out")
	fs.Var(&f.words, "words", "how many words to take of each file")
	withoutFlag(fs, &f.without)
	fs.Uint64Var(&f.seed, "seed", 1, "`N` that the slips are drawn by")
	fs.StringVarP(&f.output, "output", "o", "", "calibration `FILE` to write (must be given)")
	return f.run
}

func withoutFlag(fs *pflag.FlagSet, names *[]string) {
	fs.StringArrayVar(names, "without", nil, "do without this `EVIDENCE` of a document; may be repeated")
}

func (f *calibrateFlags) run(c *console, operands []string) (status, error) {
	switch {
	case f.output == "":
		return trouble, misusef("say with -o which file to write")
	case len(operands) == 0:
		return trouble, misusef("no text to calibrate on")
	}
	without, err := foulcase.ParseEvidence(f.without...)
	if err != nil {
		return trouble, misusef("--without: %v", err)
	}
	e, o, err := f.engine.open()
	if err != nil {
		return trouble, err
	}
	defer e.Close()
	o.Without = without
	slips, err := openTrialSlips(f.engine.model, f.pairs)
	if err != nil {
		return trouble, err
	}
	defer slips.close()
	texts, err := openCorpus(c, operands)
	if err != nil {
		return trouble, err
	}
	var learn, good []foulcase.Trial
	texts.start("texts")
	for _, in := range texts.inputs {
		pieces, err := readPieces(texts, in, f.heldOut, int(f.words))
		if err != nil {
			return trouble, err
		}
		teaching, measuring := halves(pieces)
		learn = append(learn, cleanTrials(in.path, teaching)...)
		learn = append(learn, slips.trials(in.path, teaching, f.seed)...)
		good = append(good, cleanTrials(in.path, measuring)...)
	}
	if len(learn) == 0 || len(good) == 0 {
		return trouble, errors.New("too little text: give at least two documents that may be read")
	}
	c.progress.Set("weighing", 0)
	calibration, err := e.Calibrate(learn, good, o)
	if err != nil {
		return trouble, err
	}
	return clean, writeJSON(f.output, calibration)
}

func writeJSON(path string, v any) error {
	return wholefile.Write(path, func(w io.Writer) error {
		enc := json.NewEncoder(w)
		enc.SetIndent("", " ")
		return enc.Encode(v)
	})
}

// halves deals pieces out in turn.
func halves(pieces []string) (first, second []string) {
	for i, p := range pieces {
		if i%2 == 0 {
			first = append(first, p)
		} else {
			second = append(second, p)
		}
	}
	return first, second
}

func cleanTrials(path string, pieces []string) []foulcase.Trial {
	var trials []foulcase.Trial
	for _, p := range pieces {
		trials = append(trials, foulcase.Trial{Text: p, Source: path})
	}
	return trials
}

// trialOf is an item of package eval as the engine learns from it.
func trialOf(path string, item eval.Item) foulcase.Trial {
	t := foulcase.Trial{Text: item.Source, Source: path}
	for _, s := range item.Spans {
		t.Slips = append(t.Slips, foulcase.Place{Start: s.Start, End: s.End})
	}
	return t
}

// pieceSize is about how many bytes of a document are judged together: as much
// as a long report has.
const pieceSize = 30 << 10

// readPieces reads the documents of a text, cuts them at paragraphs into pieces,
// and returns some, evenly spread, that together hold about so many words.
func readPieces(texts *corpus, in input, heldOut bool, words int) ([]string, error) {
	var pieces []string
	total := 0
	var err error
	texts.documentsOf(in, func(doc []byte, e error) bool {
		if err = e; e != nil {
			return false
		}
		if !heldOut || text.HeldOut(doc) && !text.Unseen(doc) {
			for _, p := range cutDocument(string(doc)) {
				pieces = append(pieces, p)
				total += eval.Words(p)
			}
		}
		return true
	})
	if err != nil {
		return nil, err
	}
	share := min(1, float64(words)/float64(max(total, 1)))
	var kept []string
	for i, p := range pieces {
		if int(float64(i+1)*share) > int(float64(i)*share) {
			kept = append(kept, p)
		}
	}
	return kept, nil
}
