package eval_test

import (
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

func TestInject(t *testing.T) {
	paragraph := "Haul her Bow to the QUAY and let the peer stand at the sheer bow, he's no lubber. "
	var clean []eval.Item
	for i := range 40 {
		clean = append(clean, eval.Item{Line: i + 1, Document: "d", Source: strings.Repeat(paragraph, 1+i%3)})
	}
	words := 0
	for _, item := range clean {
		words += eval.Words(item.Source)
	}
	s := eval.Slips{Every: 50, Neighbours: neighbours, Seed: 3}
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
	s.Neighbours = func(string) []string { return nil }
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
	for _, item := range eval.Inject(clean, eval.Slips{Neighbours: neighbours}) {
		slips += len(item.Spans)
	}
	if slips != 2 {
		t.Errorf("%d slips in 400 words, want 2", slips)
	}
}
