package eval_test

import (
	"math/rand/v2"
	"reflect"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

// neighbours is a lexicon of a few words and those one edit away.
func neighbours(word string) []string {
	return map[string][]string{
		"quay": {"quays"}, "bow": {"bows", "row", "low"}, "peer": {"pier", "peers"}, "sheer": {"shear"},
	}[word]
}

// repeated gives items of the same text, longer and shorter.
func repeated(paragraph string) (items []eval.Item, words int) {
	for i := range 40 {
		items = append(items, eval.Item{Line: i + 1, Document: "d", Source: strings.Repeat(paragraph, 1+i%3)})
		words += eval.Words(items[i].Source)
	}
	return items, words
}

func TestInject(t *testing.T) {
	clean, words := repeated("Haul her Bow to the QUAY and let the peer stand at the sheer bow, he's no lubber. ")
	s := eval.Slips{Every: 50, Mistype: eval.Neighbours(neighbours), Names: true, Seed: 3}
	damaged := eval.Inject(clean, s)
	slips, capitals := 0, 0
	for i, item := range damaged {
		if got := corrected(item); got != clean[i].Source {
			t.Errorf("item %d corrected is %q", i, got)
		}
		for _, span := range item.Spans {
			slips++
			typed, meant := item.Source[span.Start:span.End], span.Corrections[0]
			if span.Kind != eval.Realword || typed == meant {
				t.Errorf("%s %q for %q", span.Kind, typed, meant)
			}
			if strings.ToLower(meant) != meant {
				capitals++
				if strings.ToLower(typed) == typed {
					t.Errorf("%q for %q lost its capitals", typed, meant)
				}
			}
		}
	}
	if want := words / 50; slips < want || slips > want+1 || capitals == 0 {
		t.Errorf("%d slips in %d words, %d of them in words with capitals", slips, words, capitals)
	}
	if again := eval.Inject(clean, s); !reflect.DeepEqual(again, damaged) {
		t.Error("one seed, two outcomes")
	}
	s.Seed++
	if other := eval.Inject(clean, s); reflect.DeepEqual(other, damaged) {
		t.Error("two seeds, one outcome")
	}
	s.Mistype = eval.Neighbours(func(string) []string { return nil })
	if none := eval.Inject(clean, s); !reflect.DeepEqual(none, clean) {
		t.Error("slips without neighbours")
	}
}

// Short texts have slips too: the stretches run over their ends.
func TestInjectAcrossItems(t *testing.T) {
	clean := make([]eval.Item, 100)
	for i := range clean {
		clean[i].Source = "Stand by the quay."
	}
	slips := 0
	for _, item := range eval.Inject(clean, eval.Slips{Mistype: eval.Neighbours(neighbours)}) {
		slips += len(item.Spans)
	}
	if slips != 2 {
		t.Errorf("%d slips in 400 words, want 2", slips)
	}
}

// mangle makes a form that is no word of a word, and an anagram for a word.
func mangle(kind eval.Kind, word string, _ *rand.Rand) string {
	if kind == eval.Nonword {
		return word + "q"
	}
	return string(word[len(word)-1]) + word[:len(word)-1]
}

// Each kind looks as it should and comes as often as it weighs.
func TestInjectKinds(t *testing.T) {
	clean, words := repeated("The pilot boards at dawn. Pilots rest “between” tides, and the launch lies ready; don’t wait. ")
	mix := map[eval.Kind]float64{eval.Nonword: 4, eval.Realword: 2, eval.Runon: 1, eval.Split: 1, eval.Repeat: 1}
	every := 6
	counts := map[eval.Kind]int{}
	all := 0
	for i, item := range eval.Inject(clean, eval.Slips{Every: every, Mix: mix, Mistype: mangle, Seed: 2}) {
		if got := corrected(item); got != clean[i].Source {
			t.Fatalf("corrected is %q", got)
		}
		for _, span := range item.Spans {
			counts[span.Kind]++
			all++
			typed, meant := item.Source[span.Start:span.End], span.Corrections[0]
			ok := false
			switch span.Kind {
			case eval.Nonword:
				ok = typed == meant+"q"
			case eval.Realword:
				ok = len(typed) == len(meant) && typed != meant
			case eval.Runon:
				ok = typed == strings.Replace(meant, " ", "", 1) && strings.Count(meant, " ") == 1
			case eval.Split:
				ok = meant == strings.Replace(typed, " ", "", 1) && strings.Count(typed, " ") == 1
			case eval.Repeat:
				ok = strings.EqualFold(typed, meant+" "+meant)
			}
			if !ok {
				t.Errorf("%s %q for %q", span.Kind, typed, meant)
			}
		}
	}
	if all > words/every || all < words/every-3 { // in six words not every kind can be made
		t.Errorf("%d slips in %d words", all, words)
	}
	for kind, weight := range mix {
		if share := float64(counts[kind]) / float64(all); share < .6*weight/9 || share > 1.5*weight/9 {
			t.Errorf("%s: %d of %d", kind, counts[kind], all)
		}
	}
}

// Aligned with the clean text, a slip is an error of its kind in its place.
func TestInjectAgreesWithGold(t *testing.T) {
	clean, _ := repeated("The pilot boards at dawn. Pilots rest “between” tides, and the launch lies ready; don’t wait. ")
	mix := map[eval.Kind]float64{eval.Nonword: 1, eval.Realword: 1, eval.Runon: 1, eval.Split: 1, eval.Repeat: 1}
	mistype := func(kind eval.Kind, word string, _ *rand.Rand) string {
		return word + map[eval.Kind]string{eval.Nonword: "q", eval.Realword: "s"}[kind]
	}
	known := func(word string) bool { return !strings.HasSuffix(word, "q") }
	slips := 0
	for i, item := range eval.Inject(clean, eval.Slips{Every: 30, Mix: mix, Mistype: mistype, Seed: 5}) {
		gold := eval.Gold(eval.Sentence{Source: item.Source, References: []string{clean[i].Source}}, known)
		if !reflect.DeepEqual(gold.Spans, item.Spans) {
			t.Errorf("%q: slips %+v, errors by alignment %+v", item.Source, item.Spans, gold.Spans)
		}
		slips += len(item.Spans)
	}
	if slips < 30 {
		t.Errorf("only %d slips", slips)
	}
}

// What is no plain word stays as it is, and so do names unless asked for.
func TestInjectLeavesAlone(t *testing.T) {
	const text = "Ask Skarrow at pilots@skarrow.example or the 3rd VHF/channel (see www.skarrow.example/log_book), re-moor PV2 and FYI. Skarrow wrote. Ask again, ask twice."
	for _, test := range []struct {
		names bool
		want  string // words that may be touched
	}{
		{false, "again ask at or see the twice wrote and"},
		{true, "Ask Skarrow FYI again ask at or see the twice wrote and"},
	} {
		touched := map[string]bool{}
		s := eval.Slips{Every: 5, Mix: map[eval.Kind]float64{eval.Nonword: 1}, Mistype: mangle, Names: test.names}
		for s.Seed = range 300 {
			for _, item := range eval.Inject([]eval.Item{{Source: text}, {Source: text}}, s) {
				for _, span := range item.Spans {
					touched[span.Corrections[0]] = true
				}
			}
		}
		want := map[string]bool{}
		for word := range strings.FieldsSeq(test.want) {
			want[word] = true
		}
		if !test.names {
			want["Ask"] = true // begins a sentence, and is met in small letters
		}
		if !reflect.DeepEqual(touched, want) {
			t.Errorf("names %v: touched %v, want %v", test.names, touched, want)
		}
	}
}
