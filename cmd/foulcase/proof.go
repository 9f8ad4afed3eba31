package main

import (
	"slices"

	"example.org/foulcase/internal/charset"
	"example.org/foulcase/internal/report"
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
probability that this is an error.

--emit jsonl prints an object a finding: path, line, column, offset and length
(bytes of the file), observed, kind, grade, p, corrections ({text, p}, best
first, and source, as the file must spell it, where that differs), context, and
by_hand where no program should write the correction. In DOCX and ODT, offset
and length are of the part that it names, and line is the paragraph of that.
--emit sarif is SARIF 2.1.0; diff is a unified diff that puts the marks right,
for git apply or patch -p1; annotations are the workflow commands of hosted CI;
html is a page of the documents with their marks.

--apply puts the first correction of each mark into the files and tells so;
queries, and marks with markup inside, are left to do by hand and printed. A
file that was changed meanwhile, or that a link leads to out of its folder, is
not written. Standard input comes out corrected on standard output. The exit
code is 1 when something was marked, put right or not.`,
		examples: `
			foulcase proof --house testdata/pilots/house-words.txt testdata/pilots/papers
			foulcase proof --as markdown --emit jsonl < testdata/pilots/papers/defect-report.md
			foulcase proof --apply --dry-run testdata/pilots/papers/watch-log.txt`,
		declare: declareProof,
	}
}

// proofFlags are what the user asked of proof.
type proofFlags struct {
	engine   engineFlags
	tree     treeFlags
	format   *choice
	encoding string
	name     string
	emit     *choice
	apply    bool
	dryRun   bool
	formats  bool
	// showConfig has the settings printed, and nothing read.
	showConfig bool
	jobs       *count
	color      *choice
}

func declareProof(fs *pflag.FlagSet) action {
	f := new(proofFlags)
	f.engine.declare(fs)
	fs.Var(new(rate), "budget", "false alarms to bear in 1,000 words of good text (default: the model's own)")
	f.tree.declare(fs)
	f.format = namedChoiceFlag(fs, "as", "FORMAT", "format of the documents, one of --formats; auto goes by the file name",
		append([]string{"auto"}, formatNames()...)...)
	fs.StringVar(&f.encoding, "encoding", "", "`NAME` of the documents' encoding, such as windows-1252 (default: UTF-8, or UTF-16 by its mark)")
	fs.StringArray("field", nil, "`NAME` or number of a column or member to read of records; may be repeated")
	fs.StringVar(&f.name, "name", standardInput, "`PATH` that standard input goes by; its extension tells the format")
	f.emit = namedChoiceFlag(fs, "emit", "FORM", "how results are printed: "+orList(report.Names()), report.Names()...)
	fs.BoolVar(&f.apply, "apply", false, "put the marks right in the files")
	fs.BoolVar(&f.dryRun, "dry-run", false, "with --apply: print the diff of what it would do")
	fs.BoolVar(&f.formats, "formats", false, "list the formats of documents")
	fs.BoolVar(&f.showConfig, "show-config", false, "print the settings that hold for each PATH, and who says so")
	f.jobs = jobsFlag(fs)
	f.color = colorFlag(fs)
	return f.run
}

func (f *proofFlags) run(c *console, operands []string) (status, error) {
	switch {
	case f.formats:
		return clean, printFormats(c.out, f.emit.value)
	case f.showConfig:
		return clean, printSettings(c.out, f.emit.value, f.engine.settings(), operands)
	}
	p, err := f.open(c, operands)
	if err != nil {
		return trouble, err
	}
	defer p.engine.Close()
	if !slices.ContainsFunc(p.documents.inputs, input.isTyped) {
		c.progress.Set("proof", totalSize(p.documents.inputs))
	}
	var marks int
	switch {
	case f.apply && !f.dryRun:
		marks, err = p.applyAll(c)
	case len(p.documents.inputs) == 1:
		marks, err = p.stream(c, p.documents.inputs[0])
	default:
		marks, err = p.reportAll(c)
	}
	if err == nil {
		err = p.documents.finish(c)
	}
	return statusOf(marks), err
}

// open readies what proofreading takes. The caller closes the engine.
func (f *proofFlags) open(c *console, operands []string) (*proofreader, error) {
	if err := f.check(); err != nil {
		return nil, err
	}
	e, found, err := f.engine.openFor()
	if err != nil {
		return nil, err
	}
	p := &proofreader{engine: e, settings: found, flags: f, folders: foldersAmong(operands), progress: c.progress}
	if err := p.prepare(c, operands); err != nil {
		e.Close()
		return nil, err
	}
	return p, nil
}

// prepare finds the documents and chooses the form of output.
func (p *proofreader) prepare(c *console, operands []string) (err error) {
	f := p.flags
	p.documents, err = f.tree.find(c, operands, search{
		stdinName: f.name,
		anyBytes:  f.engine.here.Get("encoding") != "",
		format:    documentFormat(p.settings),
		ignored:   ignoredDocuments(p.settings),
		known:     knownFile(p.settings),
	})
	if err != nil {
		return err
	}
	p.form, err = report.New(f.emit.value, report.Settings{
		Palette: choosePalette(f.color.value, c.out.terminal),
		Version: programVersion(),
		Model:   p.engine.Hash,
	})
	return err
}

// check refuses flags that do not go together, and makes a dry run a diff.
func (f *proofFlags) check() error {
	if _, err := charset.Find(f.encoding); err != nil {
		return misusef("--encoding: %v", err)
	}
	switch {
	case f.dryRun && !f.apply:
		return misusef("--dry-run says how --apply is done; give that too")
	case f.apply && f.emit.value != "lines" && !(f.dryRun && f.emit.value == "diff"):
		return misusef("--apply tells what it does in lines; leave --emit %s to another run", f.emit.value)
	case f.apply && f.tree.writeKnown != "":
		return misusef("--apply puts marks right, --write-known writes them down; one in each run")
	case f.dryRun:
		f.emit.value = "diff"
	}
	return nil
}

func statusOf(marks int) status {
	if marks > 0 {
		return marked
	}
	return clean
}
