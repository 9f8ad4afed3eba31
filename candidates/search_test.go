package candidates_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"sync"
	"testing"

	"example.org/foulcase/candidates"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
)

// words of the pilot office, with priors that differ.
var words = []string{
	"a", "an", "and", "anchor", "anchorage", "berth", "birth", "berths", "boat", "boats", "bow", "bough",
	"buoy", "boy", "quay", "key", "pier", "peer", "piers", "pilot", "pilots", "pilotage", "plot", "plots", "sheer",
	"shear", "ship", "ships", "shop", "the", "then", "there", "their", "tide", "tied", "tides", "tug", "tugs",
	"watch", "water", "with", "within", "in", "lot", "don't", "café", "naïve", "ïle", "harbour", "harbor",
	"receive", "received", "vessel", "vessels", "wessel", "moor", "mooring", "moorings", "morning", "mourning",
}

func buildLexicon(t testing.TB, forms []string) *lexicon.Lexicon {
	t.Helper()
	var b lexicon.Builder
	for i, w := range forms {
		e := lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true}
		e.Prior = -float32(2 + i*7919%120*12/120)
		b.Add(w, e, "")
	}
	section, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	lex, err := lexicon.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	return lex
}

func buildMirror(t testing.TB, lex *lexicon.Lexicon) *candidates.Mirror {
	t.Helper()
	section, err := candidates.BuildMirror(lex)
	if err != nil {
		t.Fatal(err)
	}
	m, err := candidates.OpenMirror(section)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// slips are invented, enough to give a model with rules.
var slips = []channel.Pair{
	{Observed: "recieve", Intended: "receive", Count: 9},
	{Observed: "beleive", Intended: "believe", Count: 9},
	{Observed: "fone", Intended: "phone", Count: 9},
	{Observed: "foto", Intended: "photo", Count: 9},
	{Observed: "grafic", Intended: "graphic", Count: 9},
	{Observed: "seperate", Intended: "separate", Count: 9},
	{Observed: "morring", Intended: "mooring", Count: 4},
	{Observed: "teh", Intended: "the", Count: 30},
	{Observed: "dont", Intended: "don't", Count: 9},
	{Observed: "harbur", Intended: "harbour", Count: 3},
	{Observed: "vesel", Intended: "vessel", Count: 5},
	{Observed: "pilott", Intended: "pilot", Count: 5},
	{Observed: "enuf", Intended: "enough", Count: 9},
	{Observed: "ruf", Intended: "rough", Count: 9},
	{Observed: "tuf", Intended: "tough", Count: 9},
	{Observed: "stashun", Intended: "station", Count: 9},
	{Observed: "nashun", Intended: "nation", Count: 9},
	{Observed: "moshun", Intended: "motion", Count: 9},
	{Observed: "tidle", Intended: "tidal", Count: 9},
	{Observed: "timmber", Intended: "timber", Count: 9},
	{Observed: "ationn", Intended: "ation", Count: 9},
	{Observed: "tieing", Intended: "tying", Count: 9},
	{Observed: "ontoo", Intended: "onto", Count: 9},
	{Observed: "stationn", Intended: "station", Count: 9},
	{Observed: "tinn", Intended: "tin", Count: 9},
	{Observed: "tip", Intended: "tipp", Count: 9},
}

var fitOnce = sync.OnceValues(func() (*channel.Model, error) {
	m, report, err := channel.Fit(slips, channel.FitOptions{})
	if err == nil && report.Rules == 0 {
		err = errors.New("the slips gave no rules")
	}
	return m, err
})

func fitSlips(t testing.TB) *channel.Model {
	t.Helper()
	m, err := fitOnce()
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// scan is the oracle: the price of every word, sorted.
func scan(lex *lexicon.Lexicon, m *channel.Model, observed string, w candidates.Weights) []float64 {
	var a channel.Aligner
	var scores []float64
	for id := range uint32(lex.Len()) {
		cost := a.Cost(m, observed, string(lex.AppendForm(nil, id)))
		scores = append(scores, cost*float64(w.Channel)-float64(lex.Entry(id).Prior)*float64(w.Prior))
	}
	slices.Sort(scores)
	return scores
}

// agree compares the scores of a search with the oracle's.
func agree(t *testing.T, s *candidates.Searcher, lex *lexicon.Lexicon, m *channel.Model, observed string, w candidates.Weights, k int) {
	t.Helper()
	got := s.Search(nil, []byte(observed), k, math.MaxFloat32)
	want := scan(lex, m, observed, w)
	if len(got) != min(k, len(want)) {
		t.Fatalf("%q: %d candidates, want %d", observed, len(got), min(k, len(want)))
	}
	for i, c := range got {
		form := string(lex.AppendForm(nil, c.ID))
		if cost := m.Cost(observed, form); math.Abs(cost-float64(c.Channel)) > 1e-6 {
			t.Fatalf("%q: %q costs %v, want %v", observed, form, c.Channel, cost)
		}
		if math.Abs(float64(c.Score(w))-want[i]) > 1e-4 {
			t.Fatalf("%q: number %d is %q with score %v, want %v", observed, i, form, c.Score(w), want[i])
		}
	}
}

func TestSearchEqualsScan(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	w := candidates.Weights{Channel: 1, Prior: 0.5}
	alone := candidates.NewSearcher(lex, m, w)
	alone.SetSpread(math.MaxFloat32)
	mirrored := candidates.NewSearcher(lex, m, w)
	mirrored.SetSpread(math.MaxFloat32)
	mirrored.SetMirror(buildMirror(t, lex))
	random := rand.New(rand.NewPCG(1, 2))
	for range 300 {
		observed := garble(random, words[random.IntN(len(words))])
		for _, k := range []int{1, 5, 1000} {
			agree(t, alone, lex, m, observed, w, k)
			agree(t, mirrored, lex, m, observed, w, k)
		}
	}
}

// garble makes up to four slips anywhere in a word.
func garble(random *rand.Rand, word string) string {
	letters := []rune(word)
	const alphabet = "abcdefghijklmnopqrstuvwxyz'é"
	for range random.IntN(5) {
		at := random.IntN(len(letters) + 1)
		x := []rune(alphabet)[random.IntN(28)]
		switch op := random.IntN(4); {
		case op == 0 || at >= len(letters)-1:
			letters = slices.Insert(letters, at, x)
		case op == 1 && len(letters) > 1:
			letters = slices.Delete(letters, at, at+1)
		case op == 2:
			letters[at] = x
		default:
			letters[at], letters[at+1] = letters[at+1], letters[at]
		}
	}
	return string(letters)
}

func TestMirrorKeepsIDs(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	s := candidates.NewSearcher(lex, m, candidates.Weights{Channel: 1})
	s.SetMirror(buildMirror(t, lex))
	for _, w := range words {
		got := s.Search(nil, []byte(w), 1, math.MaxFloat32)
		if len(got) != 1 || m.Cost(w, string(lex.AppendForm(nil, got[0].ID))) > m.Cost(w, w) {
			t.Errorf("%q: %+v", w, got)
		}
	}
}

func TestSearchHouse(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	house := buildLexicon(t, []string{"skarrow", "skarrowman", "tidewaiter"})
	s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	s.SetMirror(buildMirror(t, lex))
	s.SetHouse(house)
	s.SetSpread(math.MaxFloat32)
	for _, observed := range []string{"skarow", "xkhrrow", "skarrno"} {
		got := s.Search(nil, []byte(observed), 1, math.MaxFloat32)
		if len(got) != 1 || !got[0].House || string(house.AppendForm(nil, got[0].ID)) != "skarrow" {
			t.Fatalf("%s: %+v", observed, got)
		}
		if cost := m.Cost(observed, "skarrow"); math.Abs(cost-float64(got[0].Channel)) > 1e-6 {
			t.Errorf("%s for skarrow costs %v, want %v", observed, got[0].Channel, cost)
		}
	}
	got := s.Search(nil, []byte("vesel"), 1, math.MaxFloat32)
	if len(got) != 1 || got[0].House || string(lex.AppendForm(nil, got[0].ID)) != "vessel" {
		t.Errorf("vesel: %+v", got)
	}
}

func TestSearchVariety(t *testing.T) {
	var b lexicon.Builder
	b.Add("harbour", lexicon.Entry{Variety: lexicon.GB, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true, Prior: -9}, "")
	b.Add("harbor", lexicon.Entry{Variety: lexicon.US, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true, Prior: -9}, "")
	section, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	lex, err := lexicon.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	s := candidates.NewSearcher(lex, fitSlips(t), candidates.DefaultWeights)
	s.SetMirror(buildMirror(t, lex))
	s.SetSpread(math.MaxFloat32)
	for variety, want := range map[lexicon.Variety][]string{
		lexicon.US: {"harbor"}, lexicon.GB: {"harbour"}, 0: {"harbor", "harbour"},
	} {
		s.SetVariety(variety)
		var got []string
		for _, c := range s.Search(nil, []byte("harbr"), 5, math.MaxFloat32) {
			got = append(got, string(lex.AppendForm(nil, c.ID)))
		}
		slices.Sort(got)
		if !slices.Equal(got, want) {
			t.Errorf("variety %d: %q, want %q", variety, got, want)
		}
	}
}

func TestSearchKeepsWithinItsBounds(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	w := candidates.DefaultWeights
	s := candidates.NewSearcher(lex, m, w)
	all := s.Search(nil, []byte("mooring"), 20, math.MaxFloat32)
	if len(all) < 2 {
		t.Fatalf("%d candidates", len(all))
	}
	bound := (all[0].Score(w) + all[1].Score(w)) / 2
	if got := s.Search(nil, []byte("mooring"), 20, bound); !slices.Equal(got, all[:1]) {
		t.Errorf("bound %v: %v of %v", bound, got, all)
	}
	s.SetSpread(bound - all[0].Score(w))
	if got := s.Search(nil, []byte("mooring"), 20, math.MaxFloat32); !slices.Equal(got, all[:1]) {
		t.Errorf("spread %v: %v of %v", bound-all[0].Score(w), got, all)
	}
	for _, k := range []int{0, -1} {
		if got := s.Search(nil, []byte("mooring"), k, math.MaxFloat32); len(got) > 0 {
			t.Errorf("k = %d: %v", k, got)
		}
	}
	for _, observed := range []string{"", strings.Repeat("tide", 2500), strings.Repeat("é", 63), "\xff\xfe"} {
		if got := s.Search(nil, []byte(observed), 3, 8); len(got) > 0 {
			t.Errorf("%.10q: %v", observed, got)
		}
	}
}

func TestSearchDoesNotAllocate(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	s.SetMirror(buildMirror(t, lex))
	var dst []candidates.Candidate
	forms := [][]byte{[]byte("moorring"), []byte("cfae"), []byte("nashun"), []byte("naive"), []byte("xq")}
	search := func() {
		for _, form := range forms {
			dst = s.Search(dst[:0], form, 20, math.MaxFloat32)
		}
	}
	search()
	if n := testing.AllocsPerRun(100, search); n != 0 {
		t.Errorf("%v allocations a query, want none", n)
	}
}

func TestOpenMirrorRefuses(t *testing.T) {
	lex := buildLexicon(t, words)
	section, err := candidates.BuildMirror(lex)
	if err != nil {
		t.Fatal(err)
	}
	for _, cut := range []int{0, 7, 15, 16, 100, len(section) - 1} {
		if _, err := candidates.OpenMirror(section[:cut]); !errors.Is(err, candidates.ErrSection) {
			t.Errorf("cut to %d bytes: %v", cut, err)
		}
	}
	if m, err := candidates.OpenMirror(section); err != nil || m.Words() != lex.Len() {
		t.Errorf("a sound mirror: %v", err)
	}
}

// FuzzSearch damages the mirror and searches for anything: no panic, no id
// beyond the words of the lexicon.
func FuzzSearch(f *testing.F) {
	lex, m := buildLexicon(f, words), fitSlips(f)
	section, err := candidates.BuildMirror(lex)
	if err != nil {
		f.Fatal(err)
	}
	f.Add([]byte("harbr"), uint32(0), byte(0))
	f.Add([]byte("h000y"), uint32(81), byte('I')) // a number beyond the words
	f.Add([]byte("caf\xc3"), uint32(len(section)-9), byte(0xff))
	f.Fuzz(func(t *testing.T, observed []byte, at uint32, flip byte) {
		damaged := slices.Clone(section)
		damaged[int(at)%len(damaged)] ^= flip
		s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
		if mirror, err := candidates.OpenMirror(damaged); err == nil {
			s.SetMirror(mirror)
		}
		for _, c := range s.Search(nil, observed, 5, math.MaxFloat32) {
			if int(c.ID) >= lex.Len() {
				t.Errorf("id %d of %d", c.ID, lex.Len())
			}
		}
		s.RunOns(nil, observed, 5, math.MaxFloat32)
		s.Possessives(nil, observed, 5, math.MaxFloat32)
	})
}
