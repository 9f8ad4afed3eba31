package candidates_test

import (
	"math"
	"os"
	"slices"
	"strings"
	"testing"
	"time"

	"example.org/foulcase/candidates"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
)

// bigLexicon holds the plain word lists of Debian (wamerican-huge,
// wbritish-huge), all words equally frequent: the harder case for the search,
// which then has no prior to go by.
func bigLexicon(t testing.TB) *lexicon.Lexicon {
	t.Helper()
	var b lexicon.Builder
	for _, list := range []string{"american-english-huge", "british-english-huge"} {
		data, err := os.ReadFile("/usr/share/dict/" + list)
		if err != nil {
			t.Skipf("the word list %s is not installed", list)
		}
		for word := range strings.FieldsSeq(strings.ToLower(string(data))) {
			b.Add(word, lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true, Prior: -12}, "")
		}
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

// sharedPairs reads pairs of single words from the data kept outside the project.
func sharedPairs(t testing.TB, name string) []channel.Pair {
	t.Helper()
	f, err := os.Open("../../shared/data/" + name)
	if err != nil {
		t.Skipf("%s is missing; it is kept outside the project", name)
	}
	defer f.Close()
	pairs, err := channel.ReadPairs(f)
	if err != nil {
		t.Fatal(err)
	}
	pairs = channel.Clean(pairs, nil)
	return slices.DeleteFunc(pairs, func(p channel.Pair) bool { return p.Spaced })
}

func fitShared(t testing.TB) *channel.Model {
	t.Helper()
	pairs := append(sharedPairs(t, "train/wikipedia-common.tsv"), sharedPairs(t, "train/toefl-spell.tsv")...)
	m, _, err := channel.Fit(pairs, channel.FitOptions{})
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// TestBigSearchEqualsScan compares the search with a scan of a whole lexicon
// for real misspellings, as far as the default spread reaches.
func TestBigSearchEqualsScan(t *testing.T) {
	if testing.Short() {
		t.Skip("scans a whole lexicon")
	}
	m, lex := fitShared(t), bigLexicon(t)
	w := candidates.Weights{Channel: 1, Prior: 1}
	s := candidates.NewSearcher(lex, m, w)
	s.SetSpread(6)
	s.SetMirror(buildMirror(t, lex))
	pairs := sharedPairs(t, "dev/toefl-spell.tsv")
	for i := 0; i < len(pairs); i += len(pairs)/6 + 1 {
		observed := pairs[i].Observed
		want := scan(lex, m, observed, w)
		got := s.Search(nil, []byte(observed), 10, math.MaxFloat32)
		for j, c := range got {
			if math.Abs(float64(c.Score(w))-want[j]) > 1e-4 {
				t.Errorf("%q: number %d has score %v, want %v", observed, j, c.Score(w), want[j])
			}
		}
		if len(got) < 10 && want[len(got)] < want[0]+6-1e-4 {
			t.Errorf("%q: %d candidates, but the next has score %v after %v", observed, len(got), want[len(got)], want[0])
		}
	}
}

// BenchmarkSearch reports how often the intended word comes first and in the
// best 20, and the median and 99th percentile of the time of a query.
func BenchmarkSearch(b *testing.B) {
	m, lex := fitShared(b), bigLexicon(b)
	s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	s.SetMirror(buildMirror(b, lex))
	for _, list := range []string{"toefl-spell", "wikipedia-common", "birkbeck"} {
		pairs := sharedPairs(b, "dev/"+list+".tsv")
		b.Run(list, func(b *testing.B) {
			var found []candidates.Candidate
			var form []byte
			var times []time.Duration
			first, among := 0, 0
			for i := 0; b.Loop(); i++ {
				// A step without a common factor visits the list evenly.
				p := pairs[i*7919%len(pairs)]
				start := time.Now()
				found = s.Search(found[:0], []byte(p.Observed), 20, math.MaxFloat32)
				times = append(times, time.Since(start))
				rank := slices.IndexFunc(found, func(c candidates.Candidate) bool {
					form = lex.AppendForm(form[:0], c.ID)
					return string(form) == p.Intended
				})
				if rank == 0 {
					first++
				}
				if rank >= 0 {
					among++
				}
			}
			slices.Sort(times)
			n := float64(len(times))
			b.ReportMetric(100*float64(first)/n, "%first")
			b.ReportMetric(100*float64(among)/n, "%best20")
			b.ReportMetric(float64(times[len(times)/2].Microseconds()), "median-µs")
			b.ReportMetric(float64(times[len(times)*99/100].Microseconds()), "p99-µs")
		})
	}
}

func BenchmarkLookup(b *testing.B) {
	table, err := candidates.OpenConfusables(buildConfusables(b, 1))
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	sum := float32(0)
	for i := uint32(0); b.Loop(); i++ {
		for n := table.Lookup(i % uint32(table.Words())); n.Next(); {
			sum += n.Cost
		}
	}
	if sum < 0 {
		b.Error("costs below zero")
	}
}
