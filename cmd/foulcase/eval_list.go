package main

import (
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
on the list at all, with 95 % bootstrap intervals, for the whole list and for
classes of slips. A list has lines of misspelling, intended word and, if you
like, a count, parted by tabs.

--emit jsonl prints an object a metric: task, data, model, metric, class, value,
low, high and n.`,
		examples: `
			foulcase eval list testdata/tiny/pairs.tsv`,
		declare: declareEvalList,
	}
}

func declareEvalList(fs *pflag.FlagSet) action {
	var engine engineFlags
	engine.declare(fs)
	k := count(20)
	fs.VarP(&k, "count", "k", "how many candidates at most")
	jobs := jobsFlag(fs)
	emit := emitFlag(fs)
	return func(c *console, files []string) (status, error) {
		if len(files) == 0 {
			return trouble, misusef("no list to measure on")
		}
		e, o, err := engine.open()
		if err != nil {
			return trouble, err
		}
		defer e.Close()
		options := foulcase.RankOptions{K: int(k), Variety: o.Variety, House: o.House}
		for _, file := range files {
			pairs, err := readData(c, file, eval.ReadPairs)
			if err != nil {
				return trouble, err
			}
			report, err := eval.ScoreList(pairs, rankAll(e, pairs, options, int(*jobs)), knownBy(e), eval.Resampling{Seed: seed})
			if err != nil {
				return trouble, err
			}
			if err := printReport(c.out, report, file, e.Hash(), emit.value); err != nil {
				return trouble, err
			}
		}
		return clean, nil
	}
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
