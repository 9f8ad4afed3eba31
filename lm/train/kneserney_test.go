package train

import (
	"context"
	"errors"
	"iter"
	"math"
	"math/rand/v2"
	"reflect"
	"strings"
	"testing"

	"example.org/foulcase/lm"
)

// given is a stream of given sentences.
func given(sentences [][]uint32) Sentences {
	return func(yield func([]uint32, error) bool) {
		for _, s := range sentences {
			if !yield(s, nil) {
				return
			}
		}
	}
}

// spell makes ids of words by their place in the vocabulary.
func spell(vocabulary string, sentences ...string) [][]uint32 {
	ids := map[string]uint32{}
	for i, w := range strings.Fields(vocabulary) {
		ids[w] = uint32(i)
	}
	var out [][]uint32
	for _, s := range sentences {
		var sentence []uint32
		for w := range strings.FieldsSeq(s) {
			sentence = append(sentence, ids[w])
		}
		out = append(out, sentence)
	}
	return out
}

// estimated trains with given discounts and without quantising.
func estimated(t *testing.T, sentences [][]uint32, o Options, d []Discounts) *lm.Model {
	t.Helper()
	counts, err := Count(context.Background(), given(sentences), o)
	if err != nil {
		t.Fatal(err)
	}
	o, _ = o.normalise()
	e := newEstimator(counts, o)
	if d != nil {
		e.discounts = d
	}
	if err := e.estimate(context.Background()); err != nil {
		t.Fatal(err)
	}
	e.finish()
	section, err := lm.Encode(e.tables, lm.Codebooks{})
	if err != nil {
		t.Fatal(err)
	}
	m, err := lm.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// p returns P(w | context).
func p(m *lm.Model, w uint32, context ...uint32) float64 {
	var s lm.State
	for _, c := range context {
		_, s = m.Score(s, c)
	}
	logp, _ := m.Score(s, w)
	return math.Exp(float64(logp))
}

// Interpolated Kneser-Ney worked by hand, one discount of a half, no </s>.
// Source: the project's collection of reference values.
func TestKneserNeyByHand(t *testing.T) {
	const vocabulary = "<s> a b c"
	sentences := spell(vocabulary, "<s> a b c", "<s> a b a b", "<s> c a b c")
	half := Discounts{0.5, 0.5, 0.5}
	m := estimated(t, sentences, Options{Order: 2, Begin: 0, End: 3}, []Discounts{half, half})
	for _, c := range []struct {
		context []uint32
		want    [3]float64 // a, b, c
	}{
		{nil, [3]float64{1. / 2, 1. / 6, 1. / 3}},
		{[]uint32{2}, [3]float64{1. / 3, 1. / 18, 11. / 18}},
		{[]uint32{3}, [3]float64{3. / 4, 1. / 12, 1. / 6}},
		{[]uint32{0}, [3]float64{2. / 3, 1. / 18, 5. / 18}},
	} {
		for i, want := range c.want {
			if got := p(m, uint32(i+1), c.context...); math.Abs(got-want) > 1e-6 {
				t.Errorf("p(%d|%v) = %v, want %v", i+1, c.context, got, want)
			}
		}
	}
	if got := p(m, 2, 1); math.Abs(got-43./48) > 1e-6 {
		t.Errorf("p(b|a) = %v, want 43/48", got)
	}
}

// Relative frequencies are Kneser-Ney without discounts. "I am Sam": Jurafsky
// and Martin, Speech and Language Processing, 3rd ed. draft, chapter 3.
func TestRelativeFrequencies(t *testing.T) {
	const vocabulary = "<s> </s> I am Sam do not like green eggs and ham"
	sentences := spell(vocabulary, "<s> I am Sam </s>", "<s> Sam I am </s>", "<s> I do not like green eggs and ham </s>")
	m := estimated(t, sentences, Options{Order: 2, Begin: 0, End: 1}, make([]Discounts, 2))
	const begin, end, i, am, sam, do = 0, 1, 2, 3, 4, 5
	for _, c := range []struct {
		word, context uint32
		want          float64
	}{
		{i, begin, 2. / 3}, {sam, begin, 1. / 3}, {am, i, 2. / 3}, {end, sam, 1. / 2}, {sam, am, 1. / 2}, {do, i, 1. / 3},
	} {
		if got := p(m, c.word, c.context); math.Abs(got-c.want) > 1e-6 {
			t.Errorf("P(%d|%d) = %v, want %v", c.word, c.context, got, c.want)
		}
	}
}

func TestDiscounts(t *testing.T) {
	// Y = 100/(100+2*50) = 1/2: Chen and Goodman 1998, equation 26.
	want := Discounts{1 - 2*.5*50/100, 2 - 3*.5*30/50, 3 - 4*.5*20/30}
	if got := NewDiscounts(100, 50, 30, 20); got != want {
		t.Errorf("%v, want %v", got, want)
	}
	for _, n := range [][4]int64{{0, 5, 5, 5}, {9, 0, 4, 3}, {9, 5, 0, 3}, {100, 1, 5, 1}} {
		if got := NewDiscounts(n[0], n[1], n[2], n[3]); got != fallback {
			t.Errorf("counts of counts %v: %v, want the fallback", n, got)
		}
	}
}

// A discount is what a count loses in as much text again: bigrams seen r times
// in one half are seen some r - D(r) times in the other (the method of Church
// and Gale 1991, "A comparison of the enhanced Good-Turing and deleted
// estimation methods").
func TestDiscountsOfHeldOutCounts(t *testing.T) {
	sentences := randomText(1, 6000, 400)
	half := len(sentences) / 2
	counts, err := Count(context.Background(), given(sentences[:half]), Options{Order: 2, Begin: 0, End: 1})
	if err != nil {
		t.Fatal(err)
	}
	here, there := bigrams(sentences[:half]), bigrams(sentences[half:])
	var seen, again [4]float64
	for gram, r := range here {
		if r < len(seen) {
			seen[r]++
			again[r] += float64(there[gram])
		}
	}
	d := counts.discounts()[1]
	for r := 1; r < len(seen); r++ {
		if got, want := float64(r)-d.of(uint32(r)), again[r]/seen[r]; math.Abs(got-want) > .3*want {
			t.Errorf("count %d is worth %v, held-out text says %v", r, got, want)
		}
	}
}

func bigrams(sentences [][]uint32) map[[2]uint32]int {
	out := map[[2]uint32]int{}
	for _, s := range sentences {
		for i := 1; i < len(s); i++ {
			out[[2]uint32(s[i-1:i+1])]++
		}
	}
	return out
}

// randomText has words of roughly Zipfian frequency that prefer neighbours.
func randomText(seed uint64, sentences, vocabulary int) [][]uint32 {
	r := rand.New(rand.NewPCG(seed, 1))
	out := make([][]uint32, sentences)
	for i := range out {
		s := []uint32{0}
		last := 1
		for range 1 + r.IntN(20) {
			w := int(math.Exp(r.Float64() * math.Log(float64(vocabulary-2))))
			if r.IntN(3) == 0 {
				w = (last*7 + r.IntN(3)) % (vocabulary - 2)
			}
			last = w
			s = append(s, uint32(2+w%(vocabulary-2)))
		}
		out[i] = append(s, 1)
	}
	return out
}

// contextsOf yields every context that the model may meet in a text.
func contextsOf(m *lm.Model, sentences [][]uint32) iter.Seq[lm.State] {
	return func(yield func(lm.State) bool) {
		seen := map[lm.State]bool{}
		for _, sentence := range sentences {
			var s lm.State
			for _, w := range sentence {
				if !seen[s] && !yield(s) {
					return
				}
				seen[s] = true
				_, s = m.Score(s, w)
			}
		}
	}
}

func sumsToOne(t *testing.T, m *lm.Model, sentences [][]uint32, tolerance float64) {
	t.Helper()
	for s := range contextsOf(m, sentences) {
		sum := 0.0
		for w := 1; w < m.Vocabulary(); w++ { // 0 is <s>
			logp, _ := m.Score(s, uint32(w))
			sum += math.Exp(float64(logp))
		}
		if math.Abs(sum-1) > tolerance {
			t.Fatalf("after a context of %d words: sum %v", s.Len(), sum)
		}
	}
}

func TestContextsSumToOne(t *testing.T) {
	sentences := randomText(2, 400, 90)
	for _, o := range []Options{
		{Order: 1},
		{Order: 2},
		{Order: 4},
		{Order: 6},
		{Order: 4, Threshold: 2e-5},
		{Order: 4, Threshold: 2e-5, Prune: Renormalised},
		{Order: 3, MinCounts: []uint32{0, 2, 3}},
		{Order: 4, Size: 9000},
		{Order: 4, Size: 1},
		{Order: 3, Vocabulary: 200}, // words that the text lacks
	} {
		o.Begin, o.End, o.ProbBits, o.BackoffBits = 0, 1, ExactBits, ExactBits
		r, err := Train(context.Background(), given(sentences), o)
		if err != nil {
			t.Fatal(err)
		}
		m, err := lm.Open(r.Section)
		if err != nil {
			t.Fatal(err)
		}
		sumsToOne(t, m, sentences[:100], 1e-4)
		if (o.Threshold > 0 || len(o.MinCounts) > 0 || o.Size > 0) && reflect.DeepEqual(r.Kept, r.Counted) {
			t.Errorf("%+v pruned nothing", o)
		}
	}
}

func TestUnseenWordsShareTheUniform(t *testing.T) {
	m := estimated(t, randomText(3, 200, 50), Options{Order: 3, Begin: 0, End: 1, Vocabulary: 60}, nil)
	first := p(m, 55)
	if first <= 0 || p(m, 59) != first {
		t.Errorf("prices of unseen words: %v and %v", first, p(m, 59))
	}
}

func TestSpilledCountsAreTheSame(t *testing.T) {
	sentences := randomText(4, 3000, 400)
	for order := 1; order <= lm.MaxOrder; order++ {
		o := Options{Order: order, Begin: 0, End: 1, TempDir: t.TempDir()}
		want, err := Count(context.Background(), given(sentences), o)
		if err != nil {
			t.Fatal(err)
		}
		o.Memory = 3 * 16 * 2048 // some fifteen runs
		got, err := Count(context.Background(), given(sentences), o)
		if err != nil {
			t.Fatal(err)
		}
		if !reflect.DeepEqual(got, want) {
			t.Errorf("order %d: counts depend on memory", order)
		}
	}
}

// TestCountsAgainstMap counts raw n-grams and left neighbours the plain way.
func TestCountsAgainstMap(t *testing.T) {
	sentences := randomText(5, 300, 40)
	raw := map[[3]uint32]uint32{}
	left := map[[2]uint32]map[uint32]bool{}
	for _, s := range sentences {
		for i := 2; i < len(s); i++ {
			raw[[3]uint32(s[i-2:i+1])]++
			pair := [2]uint32(s[i-1 : i+1])
			if left[pair] == nil {
				left[pair] = map[uint32]bool{}
			}
			left[pair][s[i-2]] = true
		}
	}
	c, err := Count(context.Background(), given(sentences), Options{Order: 3, Begin: 0, End: 1})
	if err != nil {
		t.Fatal(err)
	}
	seen := 0
	for w := range c.levels[0].raw {
		for i := c.levels[0].first[w]; i < c.levels[0].first[w+1]; i++ {
			middle := c.levels[1].word[i]
			if want := len(left[[2]uint32{middle, uint32(w)}]); middle != 0 && int(c.levels[1].adjusted[i]) != want {
				t.Errorf("%d left neighbours of %d %d, want %d", c.levels[1].adjusted[i], middle, w, want)
			}
			for j := c.levels[1].first[i]; j < c.levels[1].first[i+1]; j++ {
				seen++
				gram := [3]uint32{c.levels[2].word[j], middle, uint32(w)}
				if c.levels[2].raw[j] != raw[gram] {
					t.Errorf("%v counted %d times, want %d", gram, c.levels[2].raw[j], raw[gram])
				}
			}
		}
	}
	if seen != len(raw) {
		t.Errorf("%d trigrams, want %d", seen, len(raw))
	}
}

func TestCountRefuses(t *testing.T) {
	for what, sentence := range map[string][]uint32{
		"an id beyond the vocabulary": {0, 9, 1},
		"a begin within":              {0, 3, 0, 1},
	} {
		if _, err := Count(context.Background(), given([][]uint32{sentence}), Options{Begin: 0, End: 1, Vocabulary: 9}); err == nil {
			t.Errorf("%s: no error", what)
		}
	}
	for _, o := range []Options{{Order: 7, End: 1}, {Order: -1, End: 1}, {Vocabulary: 1 << 21, End: 1}, {Begin: 1, End: 1}, {Vocabulary: 5, End: 5}} {
		if _, err := Count(context.Background(), given(nil), o); err == nil {
			t.Errorf("%+v: no error", o)
		}
	}
	broken := errors.New("broken pipe")
	_, err := Train(context.Background(), func(yield func([]uint32, error) bool) { yield(nil, broken) }, Options{End: 1})
	if !errors.Is(err, broken) {
		t.Errorf("error of the text: %v", err)
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := Train(ctx, given(randomText(1, 3, 9)), Options{End: 1}); !errors.Is(err, context.Canceled) {
		t.Errorf("cancelled: %v", err)
	}
}

func TestEmptyText(t *testing.T) {
	r, err := Train(context.Background(), given(nil), Options{End: 1, Vocabulary: 11})
	if err != nil {
		t.Fatal(err)
	}
	m, err := lm.Open(r.Section)
	if err != nil {
		t.Fatal(err)
	}
	if got := p(m, 7); math.Abs(got-.1) > 1e-6 {
		t.Errorf("probability %v, want the uniform .1", got)
	}
}
