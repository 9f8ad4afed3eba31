package main

import (
	"fmt"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/eval"
	"github.com/spf13/pflag"
)

func evalListVerb() verb {
	return verb{
		name:     "eval list",
		operands: "FILE...",
		summary:  "measure the candidates for isolated misspellings",
		about: `
Ranks each misspelling of the lists, without context, and reports how often the
word that was meant is the first candidate, among the first 3, 5, 10 and 20, or
on the list at all, with 95 % bootstrap intervals, for each list, for all
together, and for classes of slips.

A list has lines of misspelling, intended word and, if you like, a count, parted
by tabs (pairs); or lines "$word", each with its misspellings on the lines below
and "_" for a space (intended, *.dat); or the columns observed, intended and
count below a header (csv).

A list of which the model was fitted on more than half is refused, for it would
measure what the model remembers; --fitted-too measures it all the same. The
classes "fitted on" and "not fitted on" tell the two apart.

--results keeps the outcome of every pair. --emit jsonl prints an object a
metric: task, data, model, metric, class, value, low, high, n and, when the
model says what it was fitted on, fitted (the share of the data).`,
		examples: `
			foulcase eval list --results before.json testdata/tiny/slips.tsv
			foulcase eval list --variety en-GB --results after.json testdata/tiny/slips.tsv
			foulcase eval list --gate 'accuracy@5>=0.5' testdata/tiny/slips.tsv`,
		declare: declareEvalList,
	}
}

// evalListFlags are what the user asked of eval list.
type evalListFlags struct {
	measureFlags
	shape     *choice
	columns   string
	k         count
	fittedToo bool
}

func declareEvalList(fs *pflag.FlagSet) action {
	f := &evalListFlags{k: 20}
	f.shape = shapeFlag(fs, listShapes)
	fs.StringVar(&f.columns, "columns", "", "what a CSV header calls the columns: `NAMES` such as observed=typed,intended=meant")
	fs.VarP(&f.k, "count", "k", "how many candidates at most")
	fs.BoolVar(&f.fittedToo, "fitted-too", false, "measure even on lists that the model was fitted on")
	f.declare(fs)
	return f.run
}

func (f *evalListFlags) run(c *console, files []string) (status, error) {
	columns, err := eval.ParseCSVColumns(f.columns)
	if err != nil {
		return trouble, misusef("--columns: %v", err)
	}
	m, o, err := f.start(eval.TaskList, files)
	if err != nil {
		return trouble, err
	}
	defer m.engine.Close()
	options := foulcase.RankOptions{K: int(f.k), Variety: o.Variety, House: o.House}
	for _, path := range files {
		shape := shapeOf(path, f.shape.value, listShapes)
		if f.columns != "" && shape != "csv" {
			return trouble, misusef("--columns is for CSV, and %s is read as %s", path, shape)
		}
		pairs, file, err := readData(c, path, pairReader(shape, columns))
		if err != nil {
			return trouble, err
		}
		file.Read = strings.TrimSpace(shape + " " + f.columns)
		fitted := eval.Fitted(m.engine.Fitted)
		file.Measured, file.Overlap = eval.HashPairs(pairs), fitted.OverlapOf(pairs)
		if err := f.refuseFitted(file); err != nil {
			return trouble, err
		}
		rankings := rankAll(m.engine, pairs, options, int(*f.jobs))
		outcomes, err := eval.PairOutcomes(pairs, rankings, knownBy(m.engine), fitted)
		if err != nil {
			return trouble, err
		}
		m.result.AddPairs(file, outcomes, resampling)
	}
	return m.finish(c)
}

// fittedMost is the greatest share of a list that a model may have been fitted
// on. Of the lists behind the English model 62 to 96 % of the pairs were used (the
// rest being no slips of spelling), and of other lists 4 to 31 % are the same
// common slips.
const fittedMost = .5

// refuseFitted is an error when a list holds mostly pairs that the model was
// fitted on, since it would measure what the model remembers.
func (f *evalListFlags) refuseFitted(file eval.DataFile) error {
	if f.fittedToo || file.Overlap.Share() <= fittedMost {
		return nil
	}
	return fmt.Errorf("%s: the model was fitted on %d of these %d pairs, so the figures would flatter it; measure on others, or give --fitted-too",
		file.Name, file.Overlap.Fitted, file.Overlap.Of)
}

// rankAll ranks the observed word of every pair.
func rankAll(e *foulcase.Engine, pairs []eval.Pair, o foulcase.RankOptions, jobs int) []eval.Ranking {
	rankings := make([]eval.Ranking, 0, len(pairs))
	for _, r := range ordered(len(pairs), jobs, func(i int) eval.Ranking {
		r := eval.Ranking{Word: pairs[i].Observed}
		for _, candidate := range e.Rank(r.Word, o).Candidates {
			r.Candidates = append(r.Candidates, candidate.Text)
		}
		return r
	}) {
		rankings = append(rankings, r)
	}
	return rankings
}
