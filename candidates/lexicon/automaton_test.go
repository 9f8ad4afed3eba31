package lexicon_test

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"testing"

	"example.org/foulcase/candidates/lexicon"
)

// build makes a lexicon of the forms with priors that fall with the rank in
// the given order.
func build(t testing.TB, forms ...string) *lexicon.Lexicon {
	t.Helper()
	var b lexicon.Builder
	for i, f := range forms {
		b.Add(f, lexicon.Entry{
			Variety: lexicon.Both, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase,
			Listed: true, Prior: -float32(i%251) / 12,
		}, "")
	}
	section, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	l, err := lexicon.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// randomForms draws up to n distinct words over an alphabet, sorted.
func randomForms(r *rand.Rand, n int, alphabet []rune, longest int) []string {
	set := map[string]bool{}
	for range n {
		word := make([]rune, 1+r.IntN(longest))
		for i := range word {
			word[i] = alphabet[r.IntN(len(alphabet))]
		}
		set[string(word)] = true
	}
	forms := make([]string, 0, len(set))
	for f := range set {
		forms = append(forms, f)
	}
	slices.Sort(forms)
	return forms
}

// checkForms holds a lexicon to the sorted list it was made of.
func checkForms(t *testing.T, l *lexicon.Lexicon, forms []string) {
	t.Helper()
	if l.Len() != len(forms) {
		t.Fatalf("Len %d, want %d", l.Len(), len(forms))
	}
	for i, f := range forms {
		if id, ok := l.ID([]byte(f)); !ok || id != uint32(i) {
			t.Fatalf("ID(%q) = %d, %v; want %d", f, id, ok, i)
		}
		if got := string(l.AppendForm(nil, uint32(i))); got != f {
			t.Fatalf("AppendForm(%d) = %q, want %q", i, got, f)
		}
	}
	next := uint32(0)
	walk(l, l.Root(), 0, nil, func(path []byte, base uint32) {
		if base != next || string(path) != forms[base] {
			t.Fatalf("walk came to %q as number %d, want %q as %d", path, base, forms[next], next)
		}
		next++
	})
	if int(next) != len(forms) {
		t.Fatalf("walk found %d forms of %d", next, len(forms))
	}
}

// walk visits every form in order.
func walk(l *lexicon.Lexicon, n lexicon.Node, base uint32, path []byte, form func(path []byte, id uint32)) {
	if l.Final(n) {
		form(path, base)
	}
	for e := l.Edges(n); e.Next(); {
		walk(l, e.Target, base+e.Skip, append(path, e.Label), form)
	}
}

func TestRandomForms(t *testing.T) {
	alphabets := [][]rune{[]rune("ab"), []rune("abcdefghijklmnopqrstuvwxyz'"), []rune("aeéèöß中文'")}
	for seed := range uint64(30) {
		r := rand.New(rand.NewPCG(1, seed))
		alphabet := alphabets[seed%3]
		forms := randomForms(r, 1+r.IntN(3000), alphabet, 1+r.IntN(12))
		t.Run(fmt.Sprint(seed), func(t *testing.T) {
			l := build(t, forms...)
			checkForms(t, l, forms)
			for _, word := range randomForms(r, 2000, alphabet, 12) {
				want, in := slices.BinarySearch(forms, word)
				id, ok := l.ID([]byte(word))
				if ok != in || ok && int(id) != want {
					t.Fatalf("ID(%q) = %d, %v; want %d, %v", word, id, ok, want, in)
				}
			}
		})
	}
}
