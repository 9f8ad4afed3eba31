package foulcase

import (
	"bytes"
	"encoding/json"
	"math"
	"math/rand/v2"
	"runtime"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/additive"
	"example.org/foulcase/internal/text"
)

// confused are words of the small corpus that are taken for one another, both
// ways.
var confused = map[string]string{
	"berth": "birth", "quay": "key", "pier": "peer", "lose": "loose", "weather": "whether", "there": "their", "bough": "bow",
}

// rewritten is a document with some words written otherwise, and where.
func rewritten(document string, every int, random *rand.Rand, as func(word string) string) (string, []Place) {
	var out strings.Builder
	var places []Place
	at := 0
	var segmenter text.Segmenter
	for s := range segmenter.Sentences([]byte(document)) {
		for _, tok := range s.Tokens {
			if tok.Kind != text.Word || tok.Case != text.Lower || tok.End-tok.Start < 4 || random.IntN(every) > 0 {
				continue
			}
			word := document[tok.Start:tok.End]
			if typed := as(word); typed != word {
				out.WriteString(document[at:tok.Start])
				start := out.Len()
				out.WriteString(typed)
				places = append(places, Place{start, out.Len()})
				at = tok.End
			}
		}
	}
	out.WriteString(document[at:])
	return out.String(), places
}

// swapped is a word with two letters swapped, not the first.
func swapped(word string, random *rand.Rand) string {
	k := 1 + random.IntN(len(word)-2)
	return word[:k] + word[k+1:k+2] + word[k:k+1] + word[k+2:]
}

// named is a document in which one in so many words is what no slip made: a name
// or term that looks like a slip, or a word that is seldom met there.
func named(document string, every int, random *rand.Rand) string {
	out, _ := rewritten(document, every, random, func(word string) string {
		if unlikely, ok := confused[word]; ok {
			return unlikely
		}
		if name := swapped(word, random); random.IntN(4) > 0 {
			return strings.ToUpper(name[:1]) + name[1:]
		}
		return word[:1] + "z" + word[2:]
	})
	return out
}

// slipped puts a slip into one in so many words: for half of them another word
// where there is one, else two letters swapped.
func slipped(document string, every int, random *rand.Rand) Trial {
	var t Trial
	t.Text, t.Slips = rewritten(document, every, random, func(word string) string {
		if typed, ok := confused[word]; ok && random.IntN(2) == 0 {
			return typed
		}
		return swapped(word, random)
	})
	return t
}

// trials are texts with slips and good ones to learn from, of the even documents
// of the small corpus, and good ones of the odd. All have
// names.
func trials(t testing.TB) (learn, good []Trial) {
	t.Helper()
	random := rand.New(rand.NewPCG(3, 1))
	sources := []string{"log", "notices", "letters"}
	for i, d := range tinyDocuments(t) {
		d = named(d, 20, random)
		source := sources[i/2%len(sources)]
		if i%2 == 1 {
			good = append(good, Trial{Text: d, Source: source})
			continue
		}
		learn = append(learn, Trial{Text: d, Source: source}, slipped(d, 12, random))
	}
	return learn, good
}

// settlingJudgement is that of the small model with a rate of slips that settles.
func settlingJudgement(t testing.TB) []byte {
	t.Helper()
	sections, err := tiny()
	if err != nil {
		t.Fatal(err)
	}
	var j Judgement
	if err := json.Unmarshal(sections[SectionJudgement], &j); err != nil {
		t.Fatal(err)
	}
	j.SlipRate = usualSlips
	body, err := json.Marshal(j)
	if err != nil {
		t.Fatal(err)
	}
	return body
}

// calibrated opens the small model with a calibration that it learned.
func calibrated(t testing.TB) *Engine {
	t.Helper()
	judgement := settlingJudgement(t)
	learn, good := trials(t)
	c, err := openTiny(t, map[string][]byte{SectionJudgement: judgement}).Calibrate(learn, good, Options{})
	if err != nil {
		t.Fatal(err)
	}
	body, err := json.Marshal(c)
	if err != nil {
		t.Fatal(err)
	}
	return openTiny(t, map[string][]byte{SectionJudgement: judgement, SectionCalibration: body})
}

// TestCalibrateTellsSlipsFromGoodText draws new slips and names into the odd
// documents, which taught nothing.
func TestCalibrateTellsSlipsFromGoodText(t *testing.T) {
	e := calibrated(t)
	random := rand.New(rand.NewPCG(8, 8))
	var right, wrong []float64
	for i, d := range tinyDocuments(t) {
		if i%2 == 0 {
			continue
		}
		trial := slipped(named(d, 15, random), 25, random)
		for _, m := range marksOf(t, e, trial.Text, Options{Doubts: true}) {
			if trial.slipped(int(m.Offset), int(m.Offset+m.Length)) {
				right = append(right, m.P)
			} else {
				wrong = append(wrong, m.P)
			}
		}
	}
	if len(right) < 50 || len(wrong) < 20 {
		t.Fatalf("%d findings right and %d wrong: too few to tell", len(right), len(wrong))
	}
	above := 0.0
	for _, r := range right {
		for _, w := range wrong {
			if r > w {
				above++
			} else if r == w {
				above += .5
			}
		}
	}
	if share := above / float64(len(right)*len(wrong)); share < .9 {
		t.Errorf("a right finding is the likelier of a pair in %.3f of %d by %d", share, len(right), len(wrong))
	}
}

func TestCalibrateSetsThresholdsByBudget(t *testing.T) {
	c := calibrated(t).calibration
	if len(c.Budgets) != len(budgets) {
		t.Fatalf("%d budgets, want %d", len(c.Budgets), len(budgets))
	}
	before := 1.0
	for i, row := range c.Budgets {
		for _, k := range Kinds() {
			if p := row.P.Of(k); p > before || p <= 0 || row.Budget != budgets[i] {
				t.Errorf("budget %v: %v from p %v, the smaller one from %v", row.Budget, k, p, before)
			}
		}
		before = row.P.Nonword
	}
	if first, last := c.Budgets[0].P.Nonword, before; first == last {
		t.Errorf("every budget reports from %v", first)
	}
	if c.Rate < .01 || c.Rate > .1 {
		t.Errorf("rate %v of texts half of which have a slip in some twenty words", c.Rate)
	}
}

func TestCalibrateDoesNotDependOnProcessors(t *testing.T) {
	e := openTiny(t, nil)
	learn, good := trials(t)
	learn, good = learn[:40], good[:20]
	before := runtime.GOMAXPROCS(1)
	defer runtime.GOMAXPROCS(before)
	var want []byte
	for _, processors := range []int{1, 3} {
		runtime.GOMAXPROCS(processors)
		c, err := e.Calibrate(learn, good, Options{})
		if err != nil {
			t.Fatal(err)
		}
		got, err := json.Marshal(c)
		if err != nil {
			t.Fatal(err)
		}
		if want == nil {
			want = got
		} else if !bytes.Equal(got, want) {
			t.Error("one processor and three learn other calibrations")
		}
	}
}

func TestCalibrateRefuses(t *testing.T) {
	e := openTiny(t, nil)
	learn, good := trials(t)
	slips := slices.DeleteFunc(slices.Clone(learn), func(t Trial) bool { return len(t.Slips) == 0 })
	for name, c := range map[string]struct {
		learn, good []Trial
		want        string
	}{
		"no text to learn from": {nil, good, "nothing to learn from"},
		"no slips":              {good, good, "nothing to learn from: 0 slips"},
		"nothing but slips":     {[]Trial{{Text: "ancher", Slips: []Place{{0, 6}}}}, good, "nothing to learn from: 1 slips found in 1 words"},
		"no good text":          {slips, nil, "no good text"},
	} {
		if _, err := e.Calibrate(c.learn, c.good, Options{}); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// TestThresholdForHoldsMostSources has one source in four beyond its budget.
func TestThresholdForHoldsMostSources(t *testing.T) {
	var sources []*source
	for i := range 8 {
		s := &source{words: 1000 * (1 + i%3)}
		for k := range 200 {
			s.p = append(s.p, float64(1+(k*(7+i))%199)/(200+40*float64(i)))
		}
		sources = append(sources, s)
	}
	for _, budget := range budgets {
		p := thresholdFor(sources, budget)
		over := 0
		for _, s := range sources {
			n := 0
			for _, v := range s.p {
				if v >= p {
					n++
				}
			}
			if float64(n) > budget*float64(s.words)/1000 {
				over++
			}
		}
		if over > len(sources)/4 {
			t.Errorf("budget %v: from p %v, %d sources of %d have more", budget, p, over, len(sources))
		}
	}
	if p := thresholdFor([]*source{{words: 1000}}, 1); p > 2*leastThreshold {
		t.Errorf("a source without findings asks for p %v", p)
	}
	if p := thresholdFor([]*source{{words: 10, p: []float64{1}}}, 1); p >= 1 {
		t.Errorf("a source with a sure finding asks for p %v", p)
	}
}

// sentences are texts of one sentence, with slips and without.
var sentences = []string{
	"The tug let go her ancher near the pier.",
	"The piolt walked to the end of the peer.",
	"The tug will reach her birth at noon.",
	"We did not want to loose the tide.",
	"The the ferry sailed at noon.",
	"Two tugs towed the tanker to the store.",
	"The harbour master gave the quay of the key to the harbur master.",
	"The Zorbatt lay along side the breakwatter all nihgt.",
}

func TestMarksOfACalibratedModel(t *testing.T) {
	e := calibrated(t)
	marks := 0
	documents := append(slices.Clone(sentences), strings.Join(sentences, " "))
	random := rand.New(rand.NewPCG(5, 5))
	for _, d := range tinyDocuments(t)[:20] {
		documents = append(documents, slipped(named(d, 20, random), 20, random).Text)
	}
	for _, d := range documents {
		for _, m := range marksOf(t, e, d, Options{Doubts: true, Budget: 20}) {
			marks++
			sum := 0.0
			for _, c := range m.Corrections {
				sum += c.P
				if c.P < 0 {
					t.Errorf("%s: %s has p %v", m.Observed, c.Text, c.P)
				}
			}
			if !(m.P > 0 && m.P <= 1) || sum > m.P+1e-9 || len(m.Corrections) == 0 {
				t.Errorf("%s: p %v, its corrections together %v", m.Observed, m.P, sum)
			}
		}
	}
	if marks < 30 {
		t.Errorf("%d findings", marks)
	}
}

// TestLedgerAgreesWithProof compares what a ledger says of a sentence with what
// is found in it, and adds the ledger's account up. One calibration is learned;
// the other counts the changes weighed, of which a ledger shows more than Proof
// weighs.
func TestLedgerAgreesWithProof(t *testing.T) {
	counting := soundCalibration()
	counting.Realword.Terms = append(slices.Clone(counting.Realword.Terms),
		additive.Term{Feature: featureNames[fChanges], Cuts: []float64{2, 3, 4, 6, 8, 12}, Values: []float64{0, 1, 2, 3, 4, 5, 6}})
	body, err := json.Marshal(counting)
	if err != nil {
		t.Fatal(err)
	}
	for name, e := range map[string]*Engine{
		"learned":  calibrated(t),
		"counting": openTiny(t, map[string][]byte{SectionJudgement: settlingJudgement(t), SectionCalibration: body}),
		"none":     openTiny(t, nil),
	} {
		t.Run(name, func(t *testing.T) {
			compared := 0
			for _, s := range sentences {
				compared += compareLedger(t, e, s)
			}
			if compared < 8 {
				t.Errorf("%d findings compared", compared)
			}
		})
	}
}

func compareLedger(t *testing.T, e *Engine, sentence string) (compared int) {
	t.Helper()
	l := e.Ledger(sentence, Options{})
	if e.calibration == nil {
		if l.Rate != 0 || l.Shift != 0 {
			t.Errorf("%q: rate %v and shift %v without a calibration", sentence, l.Rate, l.Shift)
		}
	} else if want := logistic(logit(e.calibration.Rate) + l.Shift); math.Abs(l.Rate-want) > 1e-12 {
		t.Errorf("%q: rate %v, its shift makes %v", sentence, l.Rate, want)
	}
	columns := map[int64]*LedgerColumn{}
	for i := range l.Words {
		c := &l.Words[i]
		columns[int64(c.Offset)] = c
		sum := c.Base + l.Shift
		for _, term := range c.Terms {
			sum += term.Nats
		}
		if c.P > 0 && math.Abs(logistic(sum)-c.P) > 1e-12 {
			t.Errorf("%q: %s has p %v, its account adds up to %v", sentence, c.Observed, c.P, logistic(sum))
		}
	}
	for _, m := range marksOf(t, e, sentence, Options{Doubts: true}) {
		compared++
		c := columns[m.Offset]
		if c == nil {
			t.Errorf("%q: the ledger has nothing of %s", sentence, m.Observed)
			continue
		}
		verdict := "let stand"
		if m.Grade != GradeDoubt {
			verdict = m.Grade.String() + " " + m.Kind.String()
		}
		if math.Abs(c.P-m.P) > 1e-12 || c.Verdict != verdict {
			t.Errorf("%q: %s has p %v and verdict %q, the ledger says %v and %q", sentence, m.Observed, m.P, verdict, c.P, c.Verdict)
		}
	}
	return compared
}
