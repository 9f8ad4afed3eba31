package candidates_test

import (
	"bytes"
	"context"
	"encoding/binary"
	"errors"
	"math"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/candidates"
)

func buildConfusables(t testing.TB, jobs int) []byte {
	t.Helper()
	lex, m := buildLexicon(t, words), fitSlips(t)
	homophones, err := candidates.ReadHomophones(strings.NewReader("quay,key\t10,900\nberth,birth\t1,2\nbow,bough\t1,2\nunheard,of\t1,2\n"))
	if err != nil {
		t.Fatal(err)
	}
	section, err := candidates.BuildConfusables(context.Background(), lex, func() *candidates.Searcher {
		s := candidates.NewSearcher(lex, m, candidates.DefaultWeights)
		s.SetSpread(30) // a model of twenty slips finds everything else unlikely
		return s
	}, candidates.ConfusableOptions{Homophones: homophones, MostCost: 18, Jobs: jobs})
	if err != nil {
		t.Fatal(err)
	}
	return section
}

func TestConfusables(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	table, err := candidates.OpenConfusables(buildConfusables(t, 1))
	if err != nil {
		t.Fatal(err)
	}
	neighbours := func(word string) map[string]float32 {
		id, ok := lex.ID([]byte(word))
		if !ok {
			t.Fatalf("%q is no word", word)
		}
		found := map[string]float32{}
		for n := table.Lookup(id); n.Next(); {
			found[string(lex.AppendForm(nil, n.ID))] = n.Cost
		}
		return found
	}
	if got := neighbours("quay")["key"]; got != 4.5 {
		t.Errorf("quay for key costs %v, want the price of homophones", got)
	}
	for typed, meant := range map[string]string{"berth": "birth", "boats": "boat", "tugs": "tug", "pier": "piers"} {
		cost, ok := neighbours(typed)[meant]
		if !ok || float64(cost) > m.Cost(typed, meant)+1.0/16 {
			t.Errorf("%s for %s costs %v, found %v; the channel says %v", typed, meant, cost, ok, m.Cost(typed, meant))
		}
	}
	if cost, ok := neighbours("harbor")["harbour"]; ok {
		t.Errorf("harbour and harbor are one word, but confusable at %v", cost)
	}
	for _, word := range words {
		if cost, ok := neighbours(word)[word]; ok {
			t.Errorf("%s is its own neighbour at %v", word, cost)
		}
	}
}

func TestConfusablesDoNotDependOnJobs(t *testing.T) {
	if !bytes.Equal(buildConfusables(t, 1), buildConfusables(t, 3)) {
		t.Error("one job and three build different tables")
	}
}

func TestConfusablesStopWhenAsked(t *testing.T) {
	lex, m := buildLexicon(t, words), fitSlips(t)
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err := candidates.BuildConfusables(ctx, lex, func() *candidates.Searcher {
		return candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	}, candidates.ConfusableOptions{})
	if !errors.Is(err, context.Canceled) {
		t.Errorf("error %v", err)
	}
}

func TestLookupDoesNotAllocate(t *testing.T) {
	table, err := candidates.OpenConfusables(buildConfusables(t, 1))
	if err != nil {
		t.Fatal(err)
	}
	sum := float32(0)
	allocations := testing.AllocsPerRun(10, func() {
		for id := range uint32(table.Words()) + 20 {
			for n := table.Lookup(id); n.Next(); {
				sum += n.Cost
			}
		}
	})
	if allocations != 0 || sum == 0 {
		t.Errorf("%v allocations, sum %v", allocations, sum)
	}
}

func TestOpenConfusablesRefuses(t *testing.T) {
	section := buildConfusables(t, 1)
	more := slices.Clone(section)
	binary.LittleEndian.PutUint32(more[8:], math.MaxUint32)
	for name, bad := range map[string][]byte{"empty": nil, "header alone": section[:16], "table cut": section[:20], "too many words": more} {
		if _, err := candidates.OpenConfusables(bad); !errors.Is(err, candidates.ErrSection) {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// FuzzOpenConfusables reads any bytes: no panic, no id beyond the words.
func FuzzOpenConfusables(f *testing.F) {
	f.Add(buildConfusables(f, 1), uint32(3))
	f.Add([]byte("fcco0001\x01\x00\x00\x00\x01\x00\x00\x00\x00\x00\x00\x00\x02\x00\x10\xff\xff"), uint32(0))
	f.Fuzz(func(t *testing.T, section []byte, id uint32) {
		table, err := candidates.OpenConfusables(section)
		if err != nil {
			return
		}
		for n := table.Lookup(id); n.Next(); {
			if int(n.ID) >= table.Words() {
				t.Errorf("id %d of %d", n.ID, table.Words())
			}
		}
	})
}
