package candidates_test

import (
	"math"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/candidates"
)

func TestRunOns(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	for _, test := range []struct{ observed, want string }{
		{"pilotboat", "pilot boat"},
		{"alot", "a lot"},
		{"inthewater", "in the water"},
		{"thetide", "the tide"},
		{"quay", ""},
		{"xthe", ""},
		{"cafétide", "café tide"},
	} {
		var got []string
		for _, r := range s.RunOns(nil, []byte(test.observed), 5, math.MaxFloat32) {
			var parts []string
			for _, id := range r.IDs[:r.N] {
				parts = append(parts, string(lex.AppendForm(nil, id)))
			}
			got = append(got, strings.Join(parts, " "))
			if joined := strings.Join(parts, ""); joined != test.observed || test.observed[:r.Cuts[0]] != parts[0] {
				t.Errorf("%q: read as %v, cut at %v", test.observed, parts, r.Cuts)
			}
			if want := m.Prices().RunOn * float32(r.N-1); r.Channel != want {
				t.Errorf("%q: cost %v, want %v", test.observed, r.Channel, want)
			}
		}
		if test.want == "" && len(got) > 0 || test.want != "" && !slices.Contains(got, test.want) {
			t.Errorf("%q: read as %q, want %q", test.observed, got, test.want)
		}
	}
}

func TestRunOnsKeepTheBest(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	all := s.RunOns(nil, []byte("withinthe"), 100, math.MaxFloat32)
	if !slices.IsSortedFunc(all, func(a, b candidates.RunOn) int {
		return int(math.Copysign(1, float64(a.Score(candidates.DefaultWeights)-b.Score(candidates.DefaultWeights))))
	}) {
		t.Error("readings out of order")
	}
	if one := s.RunOns(nil, []byte("withinthe"), 1, math.MaxFloat32); len(all) < 2 || len(one) != 1 || one[0] != all[0] {
		t.Errorf("the best of %v is not %v", all, one)
	}
}

func TestJoin(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	c, ok := s.Join([]byte("with"), []byte("in"))
	if !ok || string(lex.AppendForm(nil, c.ID)) != "within" || c.Channel != m.Prices().Split {
		t.Errorf("with in: %+v %v", c, ok)
	}
	if c, ok := s.Join([]byte("tide"), []byte("pier")); ok {
		t.Errorf("tide pier: %+v", c)
	}
}

func TestPossessives(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	for observed, want := range map[string]string{"harbur's": "harbour", "tugs": "tug", "tug's": "tug", "tugz": "", "s": "", "": ""} {
		got := s.Possessives(nil, []byte(observed), 1, math.MaxFloat32)
		if want == "" {
			if len(got) > 0 {
				t.Errorf("%q: %+v", observed, got)
			}
			continue
		}
		if len(got) != 1 || string(lex.AppendForm(nil, got[0].ID)) != want {
			t.Errorf("%q: %+v, want %s's", observed, got, want)
		}
	}
	// Without the apostrophe the price is that of the whole form.
	tugs := s.Possessives(nil, []byte("tugs"), 1, math.MaxFloat32)
	if got, want := float64(tugs[0].Channel), m.Cost("tugs", "tug's"); math.Abs(got-want) > 1e-6 {
		t.Errorf("tugs for tug's costs %v, want %v", got, want)
	}
}
