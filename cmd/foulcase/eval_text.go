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
of interest), document, and "-" for a column to pass over. Further columns are
more references, if the last is one. Sentences of one document are read
together.

Or a file has edit annotations (m2): S lines, A lines for each annotator. Edits
whose type holds SPELL or ORTH are errors of spelling, all others neutral.

What half of the references change counts as an error, and a correction that one
of them makes as right.

With --clean the files hold good text, a paragraph a line and blank lines
between documents; every finding is a false alarm.

--without does without some of what a document tells about itself, to measure
what that is worth: ` + orList(foulcase.EvidenceNames()) + `.

--results keeps what became of every flag and every error, doubts below the
budget's thresholds among them, with ledgers of the surest false alarms and of
what was missed. --emit jsonl prints
an object a metric: task, data, model, metric, class, value, low, high, n and,
when the model says what it was fitted on, fitted (the share of the errors).`,
		examples: `
			foulcase eval text --columns source,reference testdata/tiny/sentences.tsv
			foulcase eval text --clean testdata/tiny/corpus.txt`,
		declare: declareEvalText,
	}
}

// evalTextFlags are what the user asked of eval text.
type evalTextFlags struct {
	measureFlags
	shape   *choice
	columns string
	clean   bool
	heldOut bool
	proof   judgedFlags
}

func declareEvalText(fs *pflag.FlagSet) action {
	f := new(evalTextFlags)
	f.shape = shapeFlag(fs, textShapes)
	fs.StringVar(&f.columns, "columns", "source,reference", "`NAMES` of the columns")
	fs.BoolVar(&f.clean, "clean", false, "the files hold good text")
	heldOutFlag(fs, &f.heldOut)
	f.proof.declare(fs)
	f.declare(fs)
	return f.run
}

func heldOutFlag(fs *pflag.FlagSet, only *bool) {
	fs.BoolVar(only, "held-out-only", false, "of good text read only the documents that training and calibration with this flag leave out")
}

// judgedFlags are the flags of verbs that measure what proofreading finds.
type judgedFlags struct {
	without []string
}

func (f *judgedFlags) declare(fs *pflag.FlagSet) {
	fs.Var(new(rate), "budget", "false alarms to bear in 1,000 words of good text (default: the model's own)")
	withoutFlag(fs, &f.without)
}

// apply puts into the options what the flags ask for.
func (f *judgedFlags) apply(o *foulcase.Options) error {
	var err error
	if o.Without, err = foulcase.ParseEvidence(f.without...); err != nil {
		return misusef("--without: %v", err)
	}
	return nil
}

func (f *evalTextFlags) run(c *console, files []string) (status, error) {
	columns, err := eval.ParseColumns(f.columns)
	if err != nil {
		return trouble, misusef("--columns: %v", err)
	}
	switch {
	case f.heldOut && !f.clean:
		return trouble, misusef("--held-out-only goes with --clean")
	case f.clean && (f.set.Changed("columns") || f.set.Changed("as")):
		return trouble, misusef("--clean text has one shape and no columns")
	}
	task := eval.TaskText
	if f.clean {
		task = eval.TaskClean
	}
	m, o, err := f.start(task, files)
	if err != nil {
		return trouble, err
	}
	defer m.engine.Close()
	if err := f.proof.apply(&o); err != nil {
		return trouble, err
	}
	for _, path := range files {
		items, file, err := f.read(c, path, columns, knownBy(m.engine))
		if err != nil {
			return trouble, err
		}
		if err := m.proofItems(file, items, o); err != nil {
			return trouble, err
		}
	}
	return m.finish(c)
}

// read reads the items of one file, with the errors in them.
func (f *evalTextFlags) read(c *console, path string, columns []eval.Column, known func(string) bool) ([]eval.Item, eval.DataFile, error) {
	if f.clean {
		items, file, err := readData(c, path, cleanReader(f.heldOut))
		file.Read = "clean"
		return items, file, err
	}
	shape := shapeOf(path, f.shape.value, textShapes)
	if f.set.Changed("columns") && shape != "sentences" {
		return nil, eval.DataFile{}, misusef("--columns is for sentences, and %s is read as %s", path, shape)
	}
	sentences, file, err := readData(c, path, sentenceReader(shape, columns))
	if err != nil {
		return nil, file, err
	}
	if file.Read = shape; shape == "sentences" {
		file.Read += " " + f.columns
	}
	items := make([]eval.Item, len(sentences))
	for i, s := range sentences {
		items[i] = eval.Gold(s, known)
	}
	return items, file, nil
}

// cleanReader reads good text, or only those of its documents that neither the
// models nor their calibration learned from.
func cleanReader(heldOut bool) func(file string, r io.Reader) ([]eval.Item, error) {
	if !heldOut {
		return eval.ReadClean
	}
	return func(file string, r io.Reader) ([]eval.Item, error) {
		var kept bytes.Buffer
		for doc, err := range text.Documents(r) {
			if err != nil {
				return nil, err
			}
			if text.Unseen(doc) {
				kept.Write(doc)
				kept.WriteString(paragraphBreak)
			}
		}
		return eval.ReadClean(file, &kept)
	}
}

// proofItems proofreads the items of a file and adds what came out to the result.
func (m *measurement) proofItems(file eval.DataFile, items []eval.Item, o foulcase.Options) error {
	file.Measured = eval.HashItems(items)
	file.Overlap = eval.Fitted(m.engine.Fitted).OverlapOfErrors(items)
	o.Doubts = true // for the curves; reports leave them out
	flags, err := flagAll(m.engine, items, o, int(*m.flags.jobs))
	if err != nil {
		return err
	}
	judged, err := eval.JudgeAll(items, flags)
	if err != nil {
		return err
	}
	if m.flags.results != "" {
		m.addLedgers(items, judged.Places, o)
	}
	m.result.AddTexts(file, judged, resampling)
	return nil
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
		Held:     m.Grade == foulcase.GradeDoubt,
	}
	for _, correction := range m.Corrections {
		f.Corrections = append(f.Corrections, correction.Text)
	}
	return f
}
