package main

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"example.org/foulcase/eval"
	"github.com/spf13/pflag"
)

func evalNoiseVerb() verb {
	return verb{
		name:     "eval noise",
		operands: "FILE...",
		summary:  "measure the marks in good text that slips are put into",
		about: `
Reads good text, a paragraph a line and blank lines between documents, puts a
slip into one word in every so many, proofreads it, and reports what eval text
does; and in 1,000 words without a slip how many are flagged (good.flagged) and
how many the first correction would change (harmed), for all findings, by kind
and by grade; and how far probabilities are from the truth, of all findings
(calibration.error) and of those that the budget reports (calibration.reported).

--slips channel draws what is typed from the model's own account of how writers
mis-write, words that are not long being mistyped in proportion to their length,
and the kinds by the weights of --mix. It flatters a model a little, since it
slips as the model expects. --slips swap puts in words one edit away, drawn
evenly (Budanitsky and Hirst 2006). Words that the model does not know, names,
figures and codes stay as they are; --names has slips put into known words with
capitals too.

The same --seed puts in the same slips. --results keeps what became of each.
--emit jsonl prints an object a metric: task, data, model, metric, class, value,
low, high, n and, when the model says what it was fitted on, fitted (the share
of the slips).`,
		examples: `
			foulcase eval noise --every 20 testdata/tiny/corpus.txt
			foulcase eval noise --slips swap --seed 7 testdata/tiny/corpus.txt
			foulcase eval noise --every 30 --mix nonword=2,runon=1 testdata/tiny/corpus.txt`,
		declare: declareEvalNoise,
	}
}

// evalNoiseFlags are what the user asked of eval noise.
type evalNoiseFlags struct {
	measureFlags
	slips   *choice
	mix     mix
	every   count
	names   bool
	seed    uint64
	heldOut bool
	proof   judgedFlags
}

func declareEvalNoise(fs *pflag.FlagSet) action {
	f := &evalNoiseFlags{every: 200, mix: mix{eval.Nonword: 6, eval.Realword: 3, eval.Runon: 1, eval.Split: 1, eval.Repeat: 1}}
	f.slips = choiceFlag(fs, "slips", "what is typed for a word", "channel", "swap")
	fs.Var(f.mix, "mix", "weights of the kinds of slip")
	fs.Var(&f.every, "every", "how many words come to one slip")
	fs.BoolVar(&f.names, "names", false, "put slips into words with capitals too")
	fs.Uint64Var(&f.seed, "seed", 1, "`N` that the slips are drawn by")
	heldOutFlag(fs, &f.heldOut)
	f.proof.declare(fs)
	f.declare(fs)
	return f.run
}

func (f *evalNoiseFlags) run(c *console, files []string) (status, error) {
	swap := f.slips.value == "swap"
	if swap && f.set.Changed("mix") {
		return trouble, misusef("--mix goes with --slips channel: swapped words are realword slips all")
	}
	m, o, err := f.start(eval.TaskNoise, files)
	if err != nil {
		return trouble, err
	}
	defer m.engine.Close()
	source, err := openSlipSource(f.engine.model)
	if err != nil {
		return trouble, err
	}
	defer source.close()
	slips := eval.Slips{Every: int(f.every), Mix: f.mix, Mistype: source.mistype, Names: f.names, Seed: f.seed}
	if swap {
		slips.Mix, slips.Mistype = nil, eval.Neighbours(source.neighbours)
	}
	if err := f.proof.apply(&o); err != nil {
		return trouble, err
	}
	for _, path := range files {
		items, file, err := readData(c, path, cleanReader(f.heldOut))
		if err != nil {
			return trouble, err
		}
		file.Read = "clean"
		if err := m.proofItems(file, eval.Inject(items, slips), o); err != nil {
			return trouble, err
		}
	}
	return m.finish(c)
}

// mix is a flag that takes weights of kinds: "nonword=6,realword=3". Kinds that
// it does not name have none.
type mix map[eval.Kind]float64

func (m mix) Type() string { return "KIND=N,..." }

func (m mix) String() string {
	var parts []string
	for _, kind := range eval.Kinds {
		if w := m[kind]; w > 0 {
			parts = append(parts, fmt.Sprintf("%s=%g", kind, w))
		}
	}
	return strings.Join(parts, ", ") // with spaces, where the help can break the line
}

func (m mix) Set(s string) error {
	var all float64
	set := mix{}
	for part := range strings.SplitSeq(s, ",") {
		name, weight, ok := strings.Cut(strings.TrimSpace(part), "=")
		kind := eval.Kind(name)
		w, err := strconv.ParseFloat(weight, 64)
		if !ok || err != nil || !slices.Contains(eval.Kinds[:], kind) || !(w >= 0) || math.IsInf(w, 0) {
			return fmt.Errorf("want weights of %s, such as nonword=2,realword=1", orList(kindNames()))
		}
		set[kind] = w
		all += w
	}
	if all == 0 {
		return fmt.Errorf("want a weight above 0")
	}
	clear(m)
	for kind, w := range set {
		m[kind] = w
	}
	return nil
}

func kindNames() []string {
	var names []string
	for _, kind := range eval.Kinds {
		names = append(names, string(kind))
	}
	return names
}
