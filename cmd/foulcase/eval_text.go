package main

import (
	"bytes"
	"context"
	"io"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/eval"
	"example.org/foulcase/internal/text"
	"github.com/spf13/pflag"
)

func evalTextVerb() verb {
	return verb{
		name:     "eval text",
		operands: "FILE...",
		summary:  "measure the marks in text whose errors are known",
		about: `
Proofreads the sentences of each file and reports precision, recall and F of
what was found (detection) and of what was corrected as intended (correction),
and false alarms in 1,000 words, all with 95 % bootstrap intervals, for all
kinds of error and for each. Marks and queries count alike.

A file has a sentence a line in columns parted by tabs; --columns names them:
source (as written), reference (spelling corrected), rewrite (a free
correction), full (grammar corrected too), observed and intended (the one error
of interest), document, and "-" for a column to pass over. Sentences of one
document are read together.

With --clean the files hold good text, a paragraph a line and blank lines
between documents; every finding is a false alarm.

--emit jsonl prints an object a metric: task, data, model, metric, class, value,
low, high and n.`,
		examples: `
			foulcase eval text --columns source,reference testdata/tiny/sentences.tsv
			foulcase eval text --clean testdata/tiny/corpus.txt`,
		declare: declareEvalText,
	}
}

// evalTextFlags are what the user asked of eval text.
type evalTextFlags struct {
	engine  engineFlags
	columns string
	clean   bool
	heldOut bool
	budget  rate
	jobs    *count
	emit    *choice
}

func declareEvalText(fs *pflag.FlagSet) action {
	f := new(evalTextFlags)
	f.engine.declare(fs)
	fs.StringVar(&f.columns, "columns", "source,reference", "`NAMES` of the columns")
	fs.BoolVar(&f.clean, "clean", false, "the files hold good text")
	fs.BoolVar(&f.heldOut, "held-out-only", false, "of good text read only the documents that lm train --hold-out leaves out")
	fs.Var(&f.budget, "budget", "false alarms to bear in 1,000 words of good text (default: the model's own)")
	f.jobs = jobsFlag(fs)
	f.emit = emitFlag(fs)
	return f.run
}

func (f *evalTextFlags) run(c *console, files []string) (status, error) {
	columns, err := eval.ParseColumns(f.columns)
	if err != nil {
		return trouble, misusef("--columns: %v", err)
	}
	switch {
	case len(files) == 0:
		return trouble, misusef("no file to measure on")
	case f.heldOut && !f.clean:
		return trouble, misusef("--held-out-only goes with --clean")
	}
	e, o, err := f.engine.open()
	if err != nil {
		return trouble, err
	}
	defer e.Close()
	o.Budget = float64(f.budget)
	for _, file := range files {
		items, err := f.read(c, file, columns, knownBy(e))
		if err != nil {
			return trouble, err
		}
		flags, err := flagAll(e, items, o, int(*f.jobs))
		if err != nil {
			return trouble, err
		}
		score := eval.ScoreText
		if f.clean {
			score = eval.ScoreClean
		}
		report, err := score(items, flags, eval.Resampling{Seed: seed})
		if err != nil {
			return trouble, err
		}
		if err := printReport(c.out, report, file, e.Hash(), f.emit.value); err != nil {
			return trouble, err
		}
	}
	return clean, nil
}

// read reads the items of one file, with the errors in them.
func (f *evalTextFlags) read(c *console, file string, columns []eval.Column, known func(string) bool) ([]eval.Item, error) {
	if f.clean {
		return readData(c, file, f.readClean)
	}
	sentences, err := readData(c, file, func(name string, r io.Reader) ([]eval.Sentence, error) {
		return eval.ReadSentences(name, r, columns)
	})
	if err != nil {
		return nil, err
	}
	items := make([]eval.Item, len(sentences))
	for i, s := range sentences {
		items[i] = eval.Gold(s, known)
	}
	return items, nil
}

// readClean reads good text, or those of its documents that no model learned
// from.
func (f *evalTextFlags) readClean(file string, r io.Reader) ([]eval.Item, error) {
	if !f.heldOut {
		return eval.ReadClean(file, r)
	}
	var kept bytes.Buffer
	for doc, err := range text.Documents(r) {
		if err != nil {
			return nil, err
		}
		if text.HeldOut(doc) {
			kept.Write(doc)
			kept.WriteString(paragraphBreak)
		}
	}
	return eval.ReadClean(file, &kept)
}

// flagAll proofreads all items, those of one document that follow one another
// as one text, and returns the flags of each.
func flagAll(e *foulcase.Engine, items []eval.Item, o foulcase.Options, jobs int) ([][]eval.Flag, error) {
	type outcome struct {
		flags [][]eval.Flag
		err   error
	}
	documents := documentsOf(items)
	flags := make([][]eval.Flag, 0, len(items))
	for _, d := range ordered(len(documents), jobs, func(i int) outcome {
		flags, err := flagDocument(e, documents[i], o)
		return outcome{flags, err}
	}) {
		if d.err != nil {
			return nil, d.err
		}
		flags = append(flags, d.flags...)
	}
	return flags, nil
}

// documentsOf cuts items into runs that name the same document; an item that
// names none is a run by itself.
func documentsOf(items []eval.Item) [][]eval.Item {
	var documents [][]eval.Item
	start := 0
	for i := range items {
		if i+1 == len(items) || items[i].Document == "" || items[i+1].Document != items[i].Document {
			documents = append(documents, items[start:i+1])
			start = i + 1
		}
	}
	return documents
}

// paragraphBreak parts the items of a document.
const paragraphBreak = "\n\n"

// flagDocument proofreads items as the paragraphs of one plain text.
func flagDocument(e *foulcase.Engine, items []eval.Item, o foulcase.Options) ([][]eval.Flag, error) {
	var whole strings.Builder
	starts := make([]int, len(items))
	for i, item := range items {
		starts[i] = whole.Len()
		whole.WriteString(item.Source + paragraphBreak)
	}
	flags := make([][]eval.Flag, len(items))
	at := 0
	for m, err := range e.Proof(context.Background(), strings.NewReader(whole.String()), o) {
		if err != nil {
			return nil, err
		}
		for at+1 < len(items) && int(m.Offset) >= starts[at+1] {
			at++
		}
		flags[at] = append(flags[at], flagOf(m, starts[at]))
	}
	return flags, nil
}

// flagOf is a mark as package eval takes it, with offsets from origin.
func flagOf(m foulcase.Mark, origin int) eval.Flag {
	f := eval.Flag{
		Start:    int(m.Offset) - origin,
		End:      int(m.Offset+m.Length) - origin,
		Observed: m.Observed,
		Kind:     eval.Kind(m.Kind.String()),
		Grade:    m.Grade.String(),
		P:        m.P,
	}
	for _, correction := range m.Corrections {
		f.Corrections = append(f.Corrections, correction.Text)
	}
	return f
}
