package lexicon

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"
)

// rightLanguages counts the states of the minimal automaton of a word set
// without building one: by Myhill and Nerode there is a state for each
// different set of continuations of the words' prefixes.
func rightLanguages(words []string) int {
	set := map[string]bool{}
	prefixes := map[string]bool{}
	for _, w := range words {
		for i := range len(w) + 1 {
			prefixes[w[:i]] = true
		}
	}
	for p := range prefixes {
		var rests []string
		for _, w := range words {
			if rest, ok := strings.CutPrefix(w, p); ok {
				rests = append(rests, rest)
			}
		}
		set[strings.Join(rests, " ")] = true
	}
	return len(set)
}

func TestMinimal(t *testing.T) {
	sets := [][]string{
		{"a"},
		{"berth", "berths", "birth", "births"},
		{"moor", "moored", "mooring", "pilot", "piloted", "piloting"},
		{"é", "éa", "ê", "êa"},
	}
	r := rand.New(rand.NewPCG(2, 3))
	for range 20 {
		set := map[string]bool{}
		for range 1 + r.IntN(120) {
			w := make([]byte, 1+r.IntN(6))
			for i := range w {
				w[i] = "abc"[r.IntN(3)]
			}
			set[string(w)] = true
		}
		var words []string
		for w := range set {
			words = append(words, w)
		}
		slices.Sort(words)
		sets = append(sets, words)
	}
	for i, words := range sets {
		t.Run(fmt.Sprint(i), func(t *testing.T) {
			c := newCompiler()
			for _, w := range words {
				if err := c.add([]byte(w)); err != nil {
					t.Fatal(err)
				}
			}
			if got, want := len(c.finish()), rightLanguages(words); got != want {
				t.Errorf("%d states, want %d: %q", got, want, words)
			}
		})
	}
}

func TestCompilerRefuses(t *testing.T) {
	tests := []struct {
		name  string
		words []string
	}{
		{"order", []string{"quay", "pier"}},
		{"prefix after", []string{"quays", "quay"}},
		{"twice", []string{"quay", "quay"}},
		{"empty", []string{""}},
		{"too long", []string{strings.Repeat("a", MaxForm+1)}},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			c := newCompiler()
			var err error
			for _, w := range tt.words {
				err = c.add([]byte(w))
			}
			if err == nil {
				t.Error("no error")
			}
		})
	}
}

// TestPackedNodes reads back node by node what was packed, wide nodes included.
func TestPackedNodes(t *testing.T) {
	c := newCompiler()
	for b := '0'; b <= 'z'; b++ {
		for _, rest := range []string{"", "ed", "ing", "s"} {
			if err := c.add([]byte(string(b) + rest)); err != nil {
				t.Fatal(err)
			}
		}
	}
	states := c.finish()
	a, err := pack(states)
	if err != nil {
		t.Fatal(err)
	}
	root := a.at(0)
	want := states[len(states)-1]
	if int(root.n) != len(want.edges) {
		t.Fatalf("root has %d edges, want %d", root.n, len(want.edges))
	}
	for i, e := range want.edges {
		if a[root.labels+uint32(i)] != e.label {
			t.Errorf("edge %d: label %c, want %c", i, a[root.labels+uint32(i)], e.label)
		}
		if k, ok := a.edge(&root, e.label); !ok || int(k) != i {
			t.Errorf("edge of %c: %d, %v", e.label, k, ok)
		}
	}
	for b := 0; b < 256; b++ {
		if _, ok := a.edge(&root, byte(b)); ok != (b >= '0' && b <= 'z') {
			t.Errorf("edge of %d: %v", b, ok)
		}
	}
}
