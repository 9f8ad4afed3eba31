package main

import (
	"bytes"
	"context"
	"io"
	"os"
	"slices"

	"example.org/foulcase"
	"github.com/spf13/pflag"
)

func proofVerb() verb {
	return verb{
		name:     "proof",
		operands: "[PATH...]",
		summary:  "mark the misspellings in documents",
		about: `
Reads files, folders (every file of a known format in them) or standard input
("-", or no PATH at all) and prints a line for each finding:

  PATH:LINE:COLUMN: GRADE KIND "observed" -> "correction" (p PROBABILITY)

A mark is sure enough to act on; a query is a doubt to put to the author. The
kinds are nonword, realword (a word, but not the one meant), runon, split and
repeat. Lines and columns count from 1, columns in code points. p is the
probability that this is an error. No file is ever changed.

--emit jsonl prints an object a finding: path, line, column, offset and length
(bytes of the file), observed, kind, grade, p, corrections ({text, p}, best
first) and context.`,
		examples: `
			foulcase proof --house testdata/pilots/house-words.txt testdata/pilots/papers
			foulcase proof --as markdown --emit jsonl < testdata/pilots/papers/defect-report.md`,
		declare: declareProof,
	}
}

// proofFlags are what the user asked of proof.
type proofFlags struct {
	engine engineFlags
	format *choice
	emit   *choice
	budget rate
	jobs   *count
	color  *choice
	name   string
}

func declareProof(fs *pflag.FlagSet) action {
	f := new(proofFlags)
	f.engine.declare(fs)
	f.format = choiceFlag(fs, "as", "format of the documents; auto goes by the extension",
		append([]string{"auto"}, formatNames()...)...)
	f.emit = emitFlag(fs)
	fs.Var(&f.budget, "budget", "false alarms to bear in 1,000 words of good text (default: the model's own)")
	f.jobs = jobsFlag(fs)
	f.color = colorFlag(fs)
	fs.StringVar(&f.name, "name", standardInput, "`PATH` that standard input goes by; its extension tells the format")
	return f.run
}

func (f *proofFlags) run(c *console, operands []string) (status, error) {
	e, o, err := f.engine.open()
	if err != nil {
		return trouble, err
	}
	defer e.Close()
	o.Budget = float64(f.budget)

	inputs := findInputs(operands, c.in, f.name)
	if !slices.ContainsFunc(inputs, input.isTyped) {
		c.progress.Set("proof", totalSize(inputs))
	}
	p := &proofreader{
		engine:   e,
		options:  o,
		flags:    f,
		palette:  choosePalette(f.color.value, c.out.terminal),
		progress: c.progress,
	}
	if len(inputs) == 1 {
		return p.stream(c, inputs[0])
	}
	return p.all(c, inputs)
}

// proofreader reads documents and prints their marks. It is safe for
// concurrent use.
type proofreader struct {
	engine   *foulcase.Engine
	options  foulcase.Options
	flags    *proofFlags
	palette  palette
	progress *progress
}

// stream proofreads one document and hands each mark on as it is found.
func (p *proofreader) stream(c *console, in input) (status, error) {
	n, err := p.proof(context.Background(), in, c.out, c.out.Flush)
	if err != nil && c.out.err == nil {
		c.complain(err)
	}
	return statusOf(n), c.out.err
}

// report is the outcome of one document.
type report struct {
	text  []byte
	marks int
	err   error
}

// all proofreads documents several at a time and prints their marks in the
// documents' order. What is wrong with one document is reported there and does
// not stop the others.
func (p *proofreader) all(c *console, inputs []input) (status, error) {
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	total := 0
	reports := ordered(len(inputs), int(*p.flags.jobs), func(i int) report {
		var text bytes.Buffer
		n, err := p.proof(ctx, inputs[i], &text, func() error { return nil })
		return report{text.Bytes(), n, err}
	})
	for _, r := range reports {
		total += r.marks
		c.out.Write(r.text)
		if err := c.out.Flush(); err != nil {
			cancel()
			return statusOf(total), err
		}
		if r.err != nil {
			c.complain(r.err)
		}
	}
	return statusOf(total), nil
}

// proof prints the marks of one document and returns their number. Flush is
// called after each.
func (p *proofreader) proof(ctx context.Context, in input, w io.Writer, flush func() error) (marks int, err error) {
	r, err := in.open()
	if err != nil {
		return 0, err
	}
	defer r.Close()
	o := p.options
	if o.Format = p.flags.format.value; o.Format == "auto" {
		o.Format, _ = foulcase.FormatOf(in.path)
	}
	print := newMarkPrinter(w, p.flags.emit.value, in.path, p.palette)
	for m, err := range p.engine.Proof(ctx, watched{r, p.progress}, o) {
		if err != nil {
			return marks, &os.PathError{Op: "read", Path: in.path, Err: cause(err)}
		}
		marks++
		if err := print(m); err != nil {
			return marks, err
		}
		if err := flush(); err != nil {
			return marks, err
		}
	}
	return marks, nil
}

func formatNames() []string {
	var names []string
	for _, f := range foulcase.Formats() {
		names = append(names, f.Name)
	}
	return names
}

func statusOf(marks int) status {
	if marks > 0 {
		return marked
	}
	return clean
}
