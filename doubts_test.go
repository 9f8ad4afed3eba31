package foulcase

import (
	"math/rand/v2"
	"slices"
	"strings"
	"testing"
)

// TestDoubtsAreYieldedWhenAsked compares what is found with doubts and without:
// all that is reported is the same, and doubts come on top.
func TestDoubtsAreYieldedWhenAsked(t *testing.T) {
	random := rand.New(rand.NewPCG(6, 6))
	var documents []string
	for _, d := range tinyDocuments(t)[:30] {
		documents = append(documents, slipped(named(d, 15, random), 25, random).Text)
	}
	documents = append(documents, strings.Join(documents, "\n"))
	documents = append(documents, sentences...)
	for name, e := range map[string]*Engine{"calibrated": calibrated(t), "not calibrated": openTiny(t, nil)} {
		doubts, reported := 0, 0
		for _, d := range documents {
			for _, budget := range []float64{.2, 20} {
				want := marksOf(t, e, d, Options{Budget: budget})
				got := marksOf(t, e, d, Options{Budget: budget, Doubts: true})
				if slices.ContainsFunc(want, isDoubt) {
					t.Fatalf("%s: a doubt is yielded that nobody asked for", name)
				}
				least := e.thresholdsFor(budget)
				for _, m := range got {
					if m.P < min(LeastDoubt, least.query[m.Kind]) {
						t.Errorf("%s: a doubt of p %v", name, m.P)
					}
					if isDoubt(m) {
						doubts++
					}
				}
				reported += len(want)
				rest := slices.DeleteFunc(got, isDoubt)
				if !slices.EqualFunc(rest, want, func(a, b Mark) bool {
					return a.Offset == b.Offset && a.Length == b.Length && a.P == b.P && a.Grade == b.Grade && a.Kind == b.Kind
				}) {
					t.Errorf("%s: asked for doubts, %d other findings; %d if not", name, len(rest), len(want))
				}
			}
		}
		if doubts == 0 || reported == 0 {
			t.Errorf("%s: %d doubts and %d findings reported: too few to tell", name, doubts, reported)
		}
	}
}

func isDoubt(m Mark) bool { return m.Grade == GradeDoubt }

func TestParseEvidence(t *testing.T) {
	for _, c := range []struct {
		names []string
		want  Evidence
	}{
		{nil, 0},
		{[]string{"cache"}, CacheEvidence},
		{[]string{"recurring", "slip-rate", "recurring"}, RecurringEvidence | SlipRateEvidence},
		{EvidenceNames(), CacheEvidence | RecurringEvidence | SlipRateEvidence},
	} {
		if got, err := ParseEvidence(c.names...); err != nil || got != c.want {
			t.Errorf("%q: %d, %v; want %d", c.names, got, err, c.want)
		}
	}
	for _, bad := range []string{"", "Cache", "moon"} {
		got, err := ParseEvidence("cache", bad)
		if err == nil || got != 0 {
			t.Errorf("%q is taken for evidence %d", bad, got)
			continue
		}
		for _, name := range append(EvidenceNames(), bad) {
			if !strings.Contains(err.Error(), name) {
				t.Errorf("%q: %v; want it to name %q", bad, err, name)
			}
		}
	}
}
