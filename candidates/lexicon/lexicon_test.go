package lexicon_test

import (
	"bytes"
	"math"
	"math/rand/v2"
	"os"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/candidates/lexicon"
)

// debianList reads a plain word list that a Debian package installs, folded as
// far as ASCII letters go; it skips the test where the list is missing.
func debianList(t testing.TB, name string) []string {
	t.Helper()
	path := "/usr/share/dict/" + name
	data, err := os.ReadFile(path)
	if err != nil {
		t.Skipf("%s is missing: install the Debian package that carries it", path)
	}
	forms := strings.Fields(strings.ToLower(string(data)))
	slices.Sort(forms)
	return slices.Compact(forms)
}

func TestDebianList(t *testing.T) {
	forms := debianList(t, "american-english-huge")
	l := build(t, forms...)
	checkForms(t, l, forms)
	r := rand.New(rand.NewPCG(4, 5))
	letters := []byte("abcdefghijklmnopqrstuvwxyz'")
	for range 200_000 { // slips of forms: mostly no forms, sometimes others
		word := []byte(forms[r.IntN(len(forms))])
		word[r.IntN(len(word))] = letters[r.IntN(len(letters))]
		want, in := slices.BinarySearch(forms, string(word))
		if id, ok := l.ID(word); ok != in || ok && int(id) != want {
			t.Fatalf("ID(%q) = %d, %v; want %d, %v", word, id, ok, want, in)
		}
	}
}

func TestEmpty(t *testing.T) {
	l := build(t)
	if _, ok := l.ID([]byte("quay")); ok || l.Len() != 0 {
		t.Error("an empty lexicon has forms")
	}
	if _, ok := l.ID(nil); ok {
		t.Error("the empty form is known")
	}
	if got := l.AppendForm(nil, 0); len(got) != 0 || l.Canonical(0) != "" {
		t.Errorf("form 0 is %q", got)
	}
	if got := l.BestPrior(0, 10); got > -20 {
		t.Errorf("best prior of nothing: %v", got)
	}
}

func TestEntries(t *testing.T) {
	words := []struct {
		form, spelled string
		entry         lexicon.Entry
	}{
		{"color", "color", lexicon.Entry{Variety: lexicon.US, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true, Prior: -9}},
		{"colour", "colour", lexicon.Entry{Variety: lexicon.GB, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true, Prior: -9.5}},
		{"iphone", "iPhone", lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.MixedCase, Usual: lexicon.MixedCase, Listed: true, Prior: -12}},
		{"élodie", "Élodie", lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.TitleCase, Usual: lexicon.TitleCase, Prior: -15}},
		{"mcdonald", "McDonald", lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.MixedCase | lexicon.TitleCase, Usual: lexicon.MixedCase, Listed: true, Prior: -13}},
		{"nasa", "NASA", lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.UpperCase | lexicon.TitleCase, Usual: lexicon.UpperCase, Listed: true, Prior: -11}},
		{"polish", "polish", lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.LowerCase | lexicon.TitleCase, Usual: lexicon.LowerCase, Listed: true, Prior: -10}},
		{"skarrow", "Skarrow", lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.TitleCase, Usual: lexicon.TitleCase, Prior: -30}},
	}
	var b lexicon.Builder
	for _, w := range words {
		b.Add(w.form, w.entry, w.spelled)
	}
	section, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	l, err := lexicon.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	for _, w := range words {
		id, ok := l.ID([]byte(w.form))
		if !ok {
			t.Fatalf("no %q", w.form)
		}
		got, want := l.Entry(id), w.entry
		if lost := float64(got.Prior - want.Prior); lost < -1e-3 || lost >= 1./12+1e-3 && want.Prior > -21 {
			t.Errorf("%s: prior %v stored as %v", w.form, want.Prior, got.Prior)
		}
		if got.Prior != l.Prior(id) {
			t.Errorf("%s: Prior %v, Entry.Prior %v", w.form, l.Prior(id), got.Prior)
		}
		got.Prior = want.Prior
		if got != want {
			t.Errorf("%s: entry %+v, want %+v", w.form, got, want)
		}
		if got := l.Canonical(id); got != w.spelled {
			t.Errorf("%s: canonical %q, want %q", w.form, got, w.spelled)
		}
	}
	if got := l.Entry(uint32(l.Len())); got != (lexicon.Entry{}) {
		t.Errorf("entry behind the last: %+v", got)
	}
	var again lexicon.Builder
	again.AddLexicon(l)
	if copied, err := again.Section(); err != nil || !bytes.Equal(copied, section) {
		t.Errorf("a copy by AddLexicon differs (%v)", err)
	}
}

func TestBuilderRefuses(t *testing.T) {
	for _, form := range []string{"", "qu\xffay", strings.Repeat("quay", 25)} {
		var b lexicon.Builder
		b.Add(form, lexicon.Entry{}, "")
		if _, err := b.Section(); err == nil {
			t.Errorf("form %q: no error", form)
		}
	}
}

func TestBestPrior(t *testing.T) {
	for _, n := range []int{1, 15, 16, 17, 32, 64, 500, 3000} {
		forms := randomForms(rand.New(rand.NewPCG(6, uint64(n))), n, []rune("abcdefghij"), 9)
		shuffled := slices.Clone(forms)
		r := rand.New(rand.NewPCG(7, uint64(n)))
		r.Shuffle(len(shuffled), func(i, j int) { shuffled[i], shuffled[j] = shuffled[j], shuffled[i] })
		l := build(t, shuffled...)
		for range 3000 {
			lo, hi := uint32(r.IntN(n+5)), uint32(r.IntN(n+40))
			want := l.Prior(math.MaxUint32) // the least there is
			for id := lo; id < hi && int(id) < l.Len(); id++ {
				want = max(want, l.Prior(id))
			}
			if got := l.BestPrior(lo, hi); got != want {
				t.Fatalf("%d forms: BestPrior(%d, %d) = %v, want %v", n, lo, hi, got, want)
			}
		}
	}
}

func TestStep(t *testing.T) {
	forms := randomForms(rand.New(rand.NewPCG(8, 9)), 2000, []rune("abcdé'"), 8)
	l := build(t, forms...)
	var check func(n lexicon.Node)
	check = func(n lexicon.Node) {
		seen := map[byte]bool{}
		for e := l.Edges(n); e.Next(); {
			seen[e.Label] = true
			target, skip, ok := l.Step(n, e.Label)
			if !ok || target != e.Target || skip != e.Skip {
				t.Fatalf("Step(%q) = %v, %d, %v; want %v, %d", e.Label, target, skip, ok, e.Target, e.Skip)
			}
			check(e.Target)
		}
		for b := range 256 {
			if _, _, ok := l.Step(n, byte(b)); ok != seen[byte(b)] {
				t.Fatalf("Step(%#x): %v, want %v", b, ok, seen[byte(b)])
			}
		}
	}
	check(l.Root())
}

func TestNoAllocation(t *testing.T) {
	l := build(t, "berth", "birth", "pilot", "quay", "quays")
	buf := make([]byte, 0, 64)
	form := []byte("quays")
	if n := testing.AllocsPerRun(100, func() {
		id, _ := l.ID(form)
		buf = l.AppendForm(buf[:0], id)
		l.Entry(id)
		l.BestPrior(0, 4)
		for e := l.Edges(l.Root()); e.Next(); {
			l.Step(e.Target, 'u')
		}
	}); n != 0 {
		t.Errorf("%v allocations", n)
	}
}
