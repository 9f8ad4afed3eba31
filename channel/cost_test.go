package channel_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/agnivade/levenshtein"

	"example.org/foulcase/channel"
)

func unit(t testing.TB, swaps bool) *channel.Model {
	t.Helper()
	m, err := channel.Unit(swaps)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// The distances are textbook values (Jurafsky & Martin, ch. 2; Schulz & Mihov 2002).
func TestCostIsEditDistance(t *testing.T) {
	for _, test := range []struct {
		a, b  string
		swaps bool
		want  float64
	}{
		{"kitten", "sitting", false, 3},
		{"saturday", "sunday", false, 3},
		{"intention", "execution", false, 5},
		{"ca", "abc", false, 3},
		{"ca", "abc", true, 3},
		{"acress", "caress", false, 2},
		{"acress", "caress", true, 1},
		{"", "tide", true, 4},
		{"tide", "", true, 4},
		{"", "", true, 0},
		{"cafe", "café", true, 1},
		{"n°", "n§", true, 1},
	} {
		if got := unit(t, test.swaps).Cost(test.a, test.b); got != test.want {
			t.Errorf("Cost(%q, %q), swaps %v: %v, want %v", test.a, test.b, test.swaps, got, test.want)
		}
	}
}

func TestCostAgreesWithLevenshtein(t *testing.T) {
	m := unit(t, false)
	random := rand.New(rand.NewPCG(3, 4))
	for range 3000 {
		a, b := randomWord(random, 9), randomWord(random, 9)
		if got, want := m.Cost(a, b), float64(levenshtein.ComputeDistance(a, b)); got != want {
			t.Fatalf("Cost(%q, %q) = %v, want %v", a, b, got, want)
		}
	}
}

// randomWord has few different letters, so that words are near each other.
func randomWord(random *rand.Rand, longest int) string {
	letters := []rune("aehpft'é")
	word := make([]rune, random.IntN(longest+1))
	for i := range word {
		word[i] = letters[random.IntN(len(letters))]
	}
	return string(word)
}

// enumerate is the oracle: it tries every alignment, one step at a time.
func enumerate(m *channel.Model, l channel.Symbol, observed, intended []channel.Letter) float32 {
	at := func(p int) channel.Symbol {
		if p < len(intended) {
			return intended[p].Sym
		}
		return channel.Edge
	}
	best := float32(math.Inf(1))
	if len(observed) > 0 {
		best = m.Insert(observed[0].Sym, l, at(0)) + enumerate(m, l, observed[1:], intended)
	}
	if len(intended) == 0 {
		if len(observed) == 0 {
			best = m.Stop(l)
		}
		return best
	}
	c := intended[0]
	best = min(best, m.Drop(l, c.Sym, at(1))+enumerate(m, c.Sym, observed, intended[1:]))
	if len(observed) > 0 {
		best = min(best, m.Emit(observed[0], l, c, at(1))+enumerate(m, c.Sym, observed[1:], intended[1:]))
	}
	if len(observed) > 1 && len(intended) > 1 && observed[0] == intended[1] && observed[1] == c && at(1) != c.Sym {
		best = min(best, m.Swap(c.Sym, at(1))+enumerate(m, at(1), observed[2:], intended[2:]))
	}
	for _, r := range m.AppendRules(nil, observed) {
		n := int(r.NIntended)
		if n > len(intended) || !r.Fits(l, at(n)) {
			continue
		}
		same := true
		for j := range n {
			same = same && r.Intended[j] == at(j)
		}
		if same {
			best = min(best, r.Cost+enumerate(m, at(n-1), observed[r.NObserved:], intended[n:]))
		}
	}
	return best
}

func TestCostIsTheCheapestAlignment(t *testing.T) {
	m := fitSlips(t)
	random := rand.New(rand.NewPCG(5, 6))
	for range 1500 {
		a, b := randomWord(random, 4), randomWord(random, 4)
		want := enumerate(m, channel.Edge, channel.AppendLetters(nil, []byte(a)), channel.AppendLetters(nil, []byte(b)))
		if got := m.Cost(a, b); got != float64(want) {
			t.Fatalf("Cost(%q, %q) = %v, want %v", a, b, got, want)
		}
	}
}

func TestExplainSumsToCost(t *testing.T) {
	m := fitSlips(t)
	random := rand.New(rand.NewPCG(7, 8))
	for range 500 {
		a, b := randomWord(random, 7), randomWord(random, 7)
		var sum float64
		var observed, intended string
		for _, s := range m.Explain(a, b) {
			sum += s.Cost
			intended += s.Intended
			observed += s.Observed
		}
		if sum != m.Cost(a, b) || observed != a || intended != b {
			t.Fatalf("Explain(%q, %q) spells %q for %q at %v, want cost %v", a, b, observed, intended, sum, m.Cost(a, b))
		}
	}
}

func TestExplainNamesTheSteps(t *testing.T) {
	m := fitSlips(t)
	for _, test := range []struct {
		observed, intended string
		kind               channel.Kind
		typed, meant       string
	}{
		{"stashun", "station", channel.Rewritten, "shu", "tio"},
		{"teh", "the", channel.Swapped, "eh", "he"},
		{"vesel", "vessel", channel.Dropped, "", "s"},
		{"pilott", "pilot", channel.Inserted, "t", ""},
		{"cafe", "café", channel.Replaced, "e", "é"},
	} {
		found := false
		for _, s := range m.Explain(test.observed, test.intended) {
			found = found || s.Kind == test.kind && s.Observed == test.typed && s.Intended == test.meant
		}
		if !found {
			t.Errorf("Explain(%q, %q) = %v lacks %v %q for %q", test.observed, test.intended,
				m.Explain(test.observed, test.intended), test.kind, test.typed, test.meant)
		}
	}
}

func TestAlignerDoesNotAllocate(t *testing.T) {
	m := fitSlips(t)
	var a channel.Aligner
	a.Cost(m, "moorring", "mooring")
	if n := testing.AllocsPerRun(100, func() { a.Cost(m, "moorring", "mooring") }); n != 0 {
		t.Errorf("%v allocations a pair, want none", n)
	}
}
