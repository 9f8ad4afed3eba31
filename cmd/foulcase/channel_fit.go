package main

import (
	"context"
	"errors"
	"fmt"
	"os"
	"os/signal"

	"example.org/foulcase/eval"
	"github.com/spf13/pflag"
)

func channelFitVerb() verb {
	return verb{
		name:     "channel fit",
		operands: "[PATH...]",
		summary:  "teach the error model how a house mis-writes",
		about: `
Writes a model whose channel is blended with a house's own corrections. PATH is
a list of them: observed, intended and a count, parted by tabs, as foulcase stet
--pairs prints them; "$word" blocks; or CSV (see eval list). With --before OLD
--after NEW they come from two versions of a text, files or folders with files
of the same names, read by their formats. Of the words that were replaced only
those are taken that look like slips of spelling: the old form is no known word,
the new one is and is no name, they differ in more than capitals, and the
channel gives the slip at a cost of 14 nats at most.

How much the channel counts against the pairs is chosen on pairs left out, so
that few pairs move it little and many win. A fifth of the pairs, by a hash of
the intended word, is set apart, and the report says how the model does on these
before and after it learned from the others: log likelihood (nats a pair), and
how often the intended word is first, among the first 5, and one over its place
(mrr). The model written has learned from all. Fewer than 50 pairs say too
little; --few-too fits them all the same.

The table of confusable words stays that of the channel before, unless --rebuild
makes it anew, which takes minutes. The calibration stays too; foulcase model
calibrate learns it anew. The card says what was done.

--emit jsonl prints what was read and chosen (pairs, learned, held, left,
strength, rules, and fitted: of those held, how many the model had learned from
before), then an object a metric: model (before, after), metric, value, low,
high and n.`,
		examples: `
			foulcase channel fit --few-too -o house.fcm testdata/tiny/pairs.tsv`,
		declare: declareChannelFit,
	}
}

// channelFitFlags are what the user asked of channel fit.
type channelFitFlags struct {
	from, output  string
	before, after string
	shape         *choice
	columns       string
	fewToo        bool
	rebuild       bool
	homophones    string
	jobs          *count
	emit          *choice
}

func declareChannelFit(fs *pflag.FlagSet) action {
	f := new(channelFitFlags)
	fs.StringVar(&f.from, "from", "", "`FILE` of the model to begin with (default: the English model inside foulcase)")
	fs.StringVarP(&f.output, "output", "o", "", "model `FILE` to write (must be given)")
	fs.StringVar(&f.before, "before", "", "`PATH` of the old version of a text")
	fs.StringVar(&f.after, "after", "", "`PATH` of the new version of a text")
	f.shape = shapeFlag(fs, listShapes)
	fs.StringVar(&f.columns, "columns", "", "what a CSV header calls the columns: `NAMES` such as observed=typed,intended=meant")
	fs.BoolVar(&f.fewToo, "few-too", false, "fit even to few pairs")
	fs.BoolVar(&f.rebuild, "rebuild", false, "make the table of confusable words anew")
	fs.StringVar(&f.homophones, "homophones", "", "with --rebuild: `FILE` of words that sound alike, as for model build")
	f.jobs = jobsFlag(fs)
	f.emit = emitFlag(fs)
	return f.run
}

func (f *channelFitFlags) run(c *console, lists []string) (status, error) {
	columns, err := f.check(lists)
	if err != nil {
		return trouble, err
	}
	ctx, cancel := signal.NotifyContext(context.Background(), os.Interrupt)
	defer cancel()
	base, err := openSlipSource(f.from)
	if err != nil {
		return trouble, err
	}
	defer base.close()
	found := &corrections{base: base}
	for _, path := range lists {
		if err := found.readList(c, path, shapeOf(path, f.shape.value, listShapes), columns); err != nil {
			return trouble, err
		}
	}
	if f.before != "" {
		if err := found.readVersions(f.before, f.after); err != nil {
			return trouble, err
		}
	}
	fit := &houseFit{flags: f, base: base, found: found}
	if err := fit.run(ctx, c); errors.Is(err, context.Canceled) {
		return trouble, fmt.Errorf("interrupted; %s was not written", f.output)
	} else if err != nil {
		return trouble, err
	}
	return clean, fit.print(c.out)
}

func (f *channelFitFlags) check(lists []string) (eval.CSVColumns, error) {
	columns, err := eval.ParseCSVColumns(f.columns)
	switch {
	case err != nil:
		return columns, misusef("--columns: %v", err)
	case f.output == "":
		return columns, misusef("say with -o which file to write")
	case (f.before == "") != (f.after == ""):
		return columns, misusef("two versions of a text are needed: give both --before and --after")
	case len(lists) == 0 && f.before == "":
		return columns, misusef("nothing to fit to: name lists of pairs, or give --before and --after")
	case f.homophones != "" && !f.rebuild:
		return columns, misusef("--homophones are for the table that --rebuild makes")
	}
	return columns, nil
}
