package eval_test

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

// knows makes a lexicon of every word but the ones listed.
func knows(unknown ...string) func(string) bool {
	return func(word string) bool { return !slices.Contains(unknown, strings.ToLower(word)) }
}

// show writes spans as "kind observed>first|second", neutral ones as "- text".
func show(item eval.Item) string {
	var parts []string
	for _, s := range item.Spans {
		text := item.Source[s.Start:s.End]
		if s.Neutral {
			parts = append(parts, "- "+text)
			continue
		}
		parts = append(parts, fmt.Sprintf("%s %s>%s", s.Kind, text, strings.Join(s.Corrections, "|")))
	}
	return strings.Join(parts, "; ")
}

func TestGoldOfOneReference(t *testing.T) {
	unknown := knows("launh", "alot", "inthe", "boatthat", "wellknown", "bridgehed", "pilit", "whithin", "dont", "oclock", "berh", "footandbridge")
	for _, c := range []struct{ about, source, reference, want string }{
		{"nothing wrong", "The launch leaves at noon.", "The launch leaves at noon.", ""},
		{"no word", "The launh leaves at noon.", "The launch leaves at noon.", "nonword launh>launch"},
		{"another word", "The launch will birth at noon.", "The launch will berth at noon.", "realword birth>berth"},
		{"two in a row", "Make fast to the key peer.", "Make fast to the quay pier.", "realword key>quay; realword peer>pier"},
		{"missing space", "There is alot of swell.", "There is a lot of swell.", "runon alot>a lot"},
		{"missing space in a known word", "Stand bye and keep along watch.", "Stand bye and keep a long watch.", "runon along>a long"},
		{"two missing spaces", "He stood inthelee of it.", "He stood in the lee of it.", "runon inthelee>in the lee"},
		{"missing space and a slip", "Tell the boatthat tows.", "Tell the boats that tow.", "runon boatthat>boats that; realword tows>tow"},
		{"missing hyphen", "A wellknown shoal.", "A well-known shoal.", "runon wellknown>well-known"},
		{"missing hyphens", "The footandbridge signal.", "The foot-and-bridge signal.", "runon footandbridge>foot-and-bridge"},
		{"space too many", "Moor with in the breakwater.", "Moor within the breakwater.", "split with in>within"},
		{"space too many and a slip", "Sound be for you turn.", "Sound before you turn.", "split be for>before"},
		{"two spaces too many", "None the less she sailed.", "Nonetheless she sailed.", "split None the less>Nonetheless"},
		{"space in the wrong place", "She lay int he roads.", "She lay in the roads.", "split int he>in the"},
		{"word twice", "Hail the the pilot.", "Hail the pilot.", "repeat the the>the"},
		{"word twice, in capitals once", "The the pilot came.", "The pilot came.", "repeat The the>The"},
		{"word left out", "She came the lock.", "She came through the lock.", ""},
		{"word too many", "She came through to the lock.", "She came through the lock.", "- to"},
		{"article left out at a slip", "Send pilit now.", "Send a pilot now.", "nonword pilit>pilot"},
		{"word too many at a slip", "Moor whithin of the pool.", "Moor within the pool.", "nonword whithin>within; - of"},
		{"another word altogether", "The skipper sang.", "The mate sang.", "- skipper"},
		{"capitals", "the skarrow boat", "The Skarrow boat", "- the; - skarrow"},
		{"signs", "Slow, then stop.", "Slow; then stop!", "- ,; - ."},
		{"figures", "Two tugs, 3 lines.", "2 tugs, three lines.", "- Two; - 3"},
		{"hyphen taken out", "Sail to-day.", "Sail today.", "- to; - -; - day"},
		{"apostrophe", "We dont sail at 6 oclock.", "We don't sail at 6 o'clock.", "nonword dont>don't; nonword oclock>o'clock"},
		{"possessive", "The pilots ladder broke.", "The pilot's ladder broke.", "realword pilots>pilot's"},
		{"kind of apostrophe", "The pilot's ladder.", "The pilot’s ladder.", "- pilot's"},
		{"clitics apart", "We dont sail , it 's late .", "We do n't sail , it 's late .", "nonword dont>do n't"},
		{"letters of several bytes", "Über the Café berh.", "Über the Café berth.", "nonword berh>berth"},
		{"slip at both ends", "Launh the bridgehed", "Launch the bridgehead", "nonword Launh>Launch; nonword bridgehed>bridgehead"},
	} {
		got := show(eval.Gold(eval.Sentence{Source: c.source, References: []string{c.reference}}, unknown))
		if got != c.want {
			t.Errorf("%s: %q -> %q\n got %s\nwant %s", c.about, c.source, c.reference, got, c.want)
		}
	}
}

func TestGoldOfSeveralTexts(t *testing.T) {
	known := knows("yestarday", "bosen", "teh", "somewere")
	for _, c := range []struct {
		about string
		s     eval.Sentence
		want  string
	}{
		{"references agree in part", eval.Sentence{
			Source:     "Hail the peer and the bow.",
			References: []string{"Hail the pier and the bow.", "Hail the pear and the bough.", "Hail the pier and the bow."},
		}, "realword peer>pier|pear; - bow"},
		{"half of two is enough", eval.Sentence{
			Source:     "Hail the peer.",
			References: []string{"Hail the pier.", "Hail the peer."},
		}, "realword peer>pier"},
		{"rewrites count for unknown forms alone", eval.Sentence{
			Source:   "Yestarday the ship arrive late.",
			Rewrites: []string{"Yesterday the ship arrived late.", "Yesterday the ship came in late."},
		}, "nonword Yestarday>Yesterday; - arrive"},
		{"a word twice in a rewrite", eval.Sentence{
			Source:   "Hail the the ship.",
			Rewrites: []string{"Call the ship.", "Hail the ship."},
		}, "- Hail; repeat the the>the"},
		{"a rewrite too far from the form", eval.Sentence{
			Source:   "The bosen sang.",
			Rewrites: []string{"The crew sang.", "The crew sang."},
		}, "- bosen"},
		{"rewrites differ in place", eval.Sentence{
			Source:   "Look somewere else.",
			Rewrites: []string{"Look somewhere else.", "Look somewhere else.", "Look some where else."},
		}, "nonword somewere>somewhere|some where"},
		{"grammar is neutral in the full text", eval.Sentence{
			Source:     "Teh boats was late.",
			References: []string{"The boats was late."},
			Full:       []string{"The boats were late."},
		}, "nonword Teh>The; - was"},
		{"one error of interest", eval.Sentence{
			Source:     "Birth at teh peer.",
			References: []string{"Berth at the pier."},
			Observed:   "peer", Intended: "pier",
		}, "- Birth; - teh; realword peer>pier"},
		{"another form of the word of interest", eval.Sentence{
			Source:     "Count the boughs.",
			References: []string{"Count the bows."},
			Observed:   "bough", Intended: "bow",
		}, "realword boughs>bows"},
		{"the word of interest may be any", eval.Sentence{
			Source:     "Where it lay.",
			References: []string{"Where she lay."},
			Observed:   "it", Intended: "she",
		}, "realword it>she"},
	} {
		if got := show(eval.Gold(c.s, known)); got != c.want {
			t.Errorf("%s:\n got %s\nwant %s", c.about, got, c.want)
		}
	}
}

// Of a text that slips were put into, Gold finds what was done: with the
// errors corrected it reads like the reference.
func TestGoldUndoesSlips(t *testing.T) {
	r := rand.New(rand.NewPCG(4, 12))
	words := strings.Fields("harbour launch pilot breakwater signal mooring lighthouse quarterdeck " +
		"anchorage sounding channel stevedore gangway hawser capstan windlass bollard jetty")
	for range 2000 {
		var clean, damaged []string
		for range 3 + r.IntN(12) {
			w := words[r.IntN(len(words))]
			if len(clean) > 0 && clean[len(clean)-1] == w {
				continue
			}
			clean = append(clean, w)
			if r.IntN(4) == 0 {
				w = slipIn(r, w)
			}
			damaged = append(damaged, w)
		}
		s := eval.Sentence{Source: strings.Join(damaged, " "), References: []string{strings.Join(clean, " ")}}
		item := eval.Gold(s, func(w string) bool { return slices.Contains(words, w) })
		if got := corrected(item); got != s.References[0] {
			t.Fatalf("%q -> %q\nspans %s\ncorrected %q", s.Source, s.References[0], show(item), got)
		}
	}
}

// slipIn drops a letter, doubles one, or puts a space in.
func slipIn(r *rand.Rand, w string) string {
	i := 1 + r.IntN(len(w)-1)
	switch r.IntN(3) {
	case 0:
		return w[:i] + w[i+1:]
	case 1:
		return w[:i] + w[i-1:]
	}
	return w[:i] + " " + w[i:]
}

// corrected applies the first correction of every error.
func corrected(item eval.Item) string {
	var b strings.Builder
	at := 0
	for _, s := range item.Spans {
		if !s.Neutral {
			b.WriteString(item.Source[at:s.Start] + s.Corrections[0])
			at = s.End
		}
	}
	return b.String() + item.Source[at:]
}

func FuzzGold(f *testing.F) {
	f.Add("The launh will birth at noon.", "The launch will berth at noon.")
	f.Add("don't 'tis \xff ’’", "do n't 's s 's")
	f.Add("with in the the", "within the")
	f.Fuzz(func(t *testing.T, source, reference string) {
		item := eval.Gold(eval.Sentence{Source: source, References: []string{reference}}, knows())
		end := 0
		for _, s := range item.Spans {
			if s.Start < end || s.End <= s.Start || s.End > len(source) || !s.Neutral && len(s.Corrections) == 0 {
				t.Fatalf("span %+v after byte %d of %q", s, end, source)
			}
			end = s.End
		}
		if same := eval.Gold(eval.Sentence{Source: source, References: []string{source}}, knows()); len(same.Spans) > 0 {
			t.Fatalf("a text differs from itself: %s", show(same))
		}
	})
}
