package channel_test

import (
	"bytes"
	"errors"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"example.org/foulcase/channel"
)

// shared finds a file of the data that is not part of the project.
func shared(t testing.TB, name string) string {
	t.Helper()
	path := filepath.Join("..", "..", "shared", filepath.FromSlash(name))
	if _, err := os.Stat(path); err != nil {
		t.Skipf("%s is missing; it is kept outside the project", name)
	}
	return path
}

func readPairs(t testing.TB, name string) []channel.Pair {
	t.Helper()
	f, err := os.Open(shared(t, name))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	pairs, err := channel.ReadPairs(f)
	if err != nil {
		t.Fatal(err)
	}
	return pairs
}

// slips are invented, enough to give a model with rules.
const slips = `recieve	receive	9	-
fone	phone	9	-
foto	photo	9	-
seperate	separate	9	-
morring	mooring	4	-
teh	the	30	-
dont	don't	9	-
harbur	harbour	3	-
vesel	vessel	5	-
pilott	pilot	5	-
stashun	station	9	-
nashun	nation	9	-
moshun	motion	9	-
tidle	tidal	9	-
timmber	timber	9	-
ontoo	onto	9	-
stationn	station	9	-
tinn	tin	9	-
alot	a lot	7	mw
with in	within	2	mw
`

func invented(t testing.TB) []channel.Pair {
	t.Helper()
	pairs, err := channel.ReadPairs(strings.NewReader(slips))
	if err != nil {
		t.Fatal(err)
	}
	return pairs
}

func fitSlips(t testing.TB) *channel.Model {
	t.Helper()
	m, report, err := channel.Fit(invented(t), channel.FitOptions{})
	if err != nil {
		t.Fatal(err)
	}
	if report.Rules == 0 || report.Spaced != 2 || report.Pairs != 18 {
		t.Fatalf("report %+v", report)
	}
	return m
}

func TestFitIsDeterministic(t *testing.T) {
	if !bytes.Equal(fitSlips(t).Section(), fitSlips(t).Section()) {
		t.Error("two fits of the same pairs differ")
	}
}

func TestFitClimbs(t *testing.T) {
	_, report, err := channel.Fit(invented(t), channel.FitOptions{NoRules: true})
	if err != nil {
		t.Fatal(err)
	}
	l := report.LogLikelihood
	for i := 1; i < len(l); i++ {
		if l[i] < l[i-1] {
			t.Errorf("round %d: log likelihood fell from %v to %v", i, l[i-1], l[i])
		}
	}
}

// What was seen must be cheaper than what was not.
func TestFitLearns(t *testing.T) {
	m := fitSlips(t)
	for _, test := range [][4]string{
		{"fare", "phare", "xare", "phare"},
		{"vesels", "vessels", "vssels", "vessels"},
		{"cant", "can't", "cat", "can't"},
		{"portashun", "portation", "portaxun", "portation"},
	} {
		if seen, unseen := m.Cost(test[0], test[1]), m.Cost(test[2], test[3]); seen >= unseen {
			t.Errorf("%s for %s costs %.2f, %s for %s %.2f", test[0], test[1], seen, test[2], test[3], unseen)
		}
	}
	if p := m.Prices(); !(p.RunOn > 0 && p.RunOn < p.Split) {
		t.Errorf("a space left out costs %v and one put in %v", p.RunOn, p.Split)
	}
}

// All that can be observed for a word must share a probability of one.
func TestCostsAreNormalised(t *testing.T) {
	m, _, err := channel.Fit(invented(t), channel.FitOptions{NoRules: true})
	if err != nil {
		t.Fatal(err)
	}
	const alphabet = "abcdefghijklmnopqrstuvwxyz'"
	var a channel.Aligner
	for _, word := range []string{"a", "it", "'s"} {
		sum := 0.0
		var spell func(prefix string)
		spell = func(prefix string) {
			sum += math.Exp(-a.Cost(m, prefix, word))
			if len(prefix) < 3 {
				for _, c := range alphabet {
					spell(prefix + string(c))
				}
			}
		}
		spell("")
		if sum > 1 || sum < .8 {
			t.Errorf("%q: the probabilities of all forms of up to three letters sum to %v", word, sum)
		}
	}
}

func TestFitRefusesNothing(t *testing.T) {
	if _, _, err := channel.Fit(nil, channel.FitOptions{}); !errors.Is(err, channel.ErrNoPairs) {
		t.Errorf("no pairs: %v", err)
	}
}

func TestReadPairsNamesTheLine(t *testing.T) {
	for _, input := range []string{"a\tb\t1\nlonely\n", "a\tb\t1\na\tb\tmany\n", "a\tb\t1\na\tb\t-3\n"} {
		if _, err := channel.ReadPairs(strings.NewReader(input)); err == nil || !strings.Contains(err.Error(), "line 2") {
			t.Errorf("%q: %v", input, err)
		}
	}
}

func TestClean(t *testing.T) {
	known := func(w string) bool { return w == "form" || w == "then" }
	for _, test := range []struct {
		observed, intended string
		kept               bool
	}{
		{"recieve", "receive", true},
		{"Recieve", "Receive", true},
		{"tideHeight", "tideheight", false},
		{"tide_hieght", "tide_height", false},
		{"berth2", "berth", false},
		{"github", "Github", false},
		{"form", "from", false},
		{"frm", "from", true},
		{"im", "is", true},
		{"vessel", "harbour", false},
		{"alot", "a lot", true},
	} {
		kept := channel.Clean([]channel.Pair{{Observed: test.observed, Intended: test.intended, Count: 1}}, known)
		if (len(kept) == 1) != test.kept {
			t.Errorf("%s for %s: kept %v, want %v", test.observed, test.intended, len(kept) == 1, test.kept)
		}
	}
}

func TestReadEdits(t *testing.T) {
	edits, err := channel.ReadEdits(strings.NewReader("e\ti\t917\nt\tte\t478\nea\te\t355\nei\tie\t122\n>s\t>\t21\n_\t-\t102\nan\ta\t1\nabc\ta\t1\n"))
	if err != nil {
		t.Fatal(err)
	}
	kinds := []channel.Kind{channel.Replaced, channel.Dropped, channel.Inserted, channel.Swapped, channel.Inserted, channel.Inserted}
	if len(edits) != len(kinds) {
		t.Fatalf("%d edits, want %d: %+v", len(edits), len(kinds), edits)
	}
	for i, e := range edits {
		if e.Kind != kinds[i] {
			t.Errorf("edit %d is %v, want %v", i, e.Kind, kinds[i])
		}
	}
	if edits[4].Left != channel.Edge {
		t.Errorf("an edit at the start stands after %v", edits[4].Left)
	}
}

// On lists of human slips the fit must price unseen ones better than the
// published matrices do, and rules better than none.
func TestFitGeneralises(t *testing.T) {
	train := channel.Clean(append(readPairs(t, "data/train/wikipedia-common.tsv"), readPairs(t, "data/train/toefl-spell.tsv")...), nil)
	m, report, err := channel.Fit(train, channel.FitOptions{})
	if err != nil {
		t.Fatal(err)
	}
	published, err := channel.FromCounts(readMatrices(t))
	if err != nil {
		t.Fatal(err)
	}
	dev := channel.Clean(readPairs(t, "data/dev/toefl-spell.tsv"), nil)
	var fitted, counted float64
	for _, p := range dev {
		if !p.Spaced {
			fitted += m.Cost(p.Observed, p.Intended)
			counted += published.Cost(p.Observed, p.Intended)
		}
	}
	t.Logf("%+v; nats a pair: fitted %.2f, published counts %.2f", report, fitted/float64(len(dev)), counted/float64(len(dev)))
	if fitted >= counted {
		t.Errorf("fitted %.1f nats, published counts %.1f", fitted, counted)
	}
}
