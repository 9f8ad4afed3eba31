package foulcase

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"example.org/foulcase/internal/text"
)

// alternative is a word and its channel cost, nats.
type alternative struct {
	id   uint32
	cost float32
}

// TestAlternativesAreThoseWithinReach weighs the alternatives to every known word
// of a text one by one, over all that they bear on, and compares with what the
// stages keep: nothing within reach is dropped, nothing beyond it is kept, and
// gains are the same. Every word of the lexicon is tried, besides those of the
// table of confusable words, and reaches from nothing to everything.
func TestAlternativesAreThoseWithinReach(t *testing.T) {
	e := openTiny(t, nil)
	documents := tinyDocuments(t)[:12]
	documents = append(documents, "The pilot was to late four the tide. Their is a berth at the key, and the Zorbatt lay they're all day.")
	for _, with := range []struct {
		name     string
		shortcut bool
	}{{"the language model", false}, {"the shortcut", true}} {
		for _, of := range []struct {
			name string
			list func(id uint32) []alternative
		}{
			{"neighbours", e.neighboursOf},
			{"every word", e.everyWord},
		} {
			t.Run(with.name+"/"+of.name, func(t *testing.T) {
				j := newJudge(e)
				if with.shortcut {
					j.shortcut = e.shortcut()
				}
				var seen reached
				for _, reach := range []float64{0, hopeless, math.Inf(1)} {
					j.hopeless = reach
					for _, d := range documents {
						eachSentence(t, j, d, func(s text.Sentence, block []byte) { seen.compare(t, j, s, block, of.list) })
					}
				}
				if seen.kept < 1000 || seen.dropped < 1000 {
					t.Errorf("%d kept and %d dropped: too few to tell", seen.kept, seen.dropped)
				}
			})
		}
	}
}

func (e *Engine) neighboursOf(id uint32) []alternative {
	var list []alternative
	for n := e.confusables.Lookup(id); n.Next(); {
		list = append(list, alternative{n.ID, n.Cost})
	}
	return list
}

// everyWord has costs from 0 to 11 nats.
func (e *Engine) everyWord(id uint32) []alternative {
	var list []alternative
	for other := range uint32(e.lexicon.Len()) {
		if other != id {
			list = append(list, alternative{other, float32(other % 12)})
		}
	}
	return list
}

// reached counts the alternatives compared.
type reached struct{ kept, dropped int }

// compare looks at all known words of a sentence.
func (r *reached) compare(t *testing.T, j *judge, s text.Sentence, block []byte, of func(uint32) []alternative) {
	t.Helper()
	const tolerance = 1e-5 // nats; log probabilities are float32, of up to 20 nats
	j.read(s, block)
	w := j.e.judgement
	for i := range j.slots {
		sl := &j.slots[i]
		if sl.status != known || sl.to-sl.from != 1 {
			continue
		}
		list := of(sl.id)
		j.alternatives.reset()
		for _, a := range list {
			j.alternatives.add(a.id, a.cost)
		}
		j.weighAlternatives(sl)
		at := 0
		for _, a := range list {
			score := w.Slip.Realword - w.Channel*float64(a.cost) + w.Recurrence*j.oftener(a.id)
			floor := (sl.score - score - j.hopeless) / w.LanguageModel
			gain := j.gain(sl.from, sl.to, []uint32{a.id}, math.Inf(-1))
			if at < len(j.alternatives.ids) && j.alternatives.ids[at] == a.id {
				if got := j.alternatives.gains[at]; math.Abs(got-gain) > tolerance {
					t.Errorf("%s for %s gains %v, one by one %v", j.name(a.id), j.name(sl.id), got, gain)
				}
				if gain < floor-rounding-tolerance {
					t.Errorf("%s for %s is kept with a gain of %v under %v", j.name(a.id), j.name(sl.id), gain, floor)
				}
				at++
				r.kept++
				continue
			}
			if gain >= floor {
				t.Errorf("%s for %s is dropped with a gain of %v over %v", j.name(a.id), j.name(sl.id), gain, floor)
			}
			r.dropped++
		}
		if at != len(j.alternatives.ids) {
			t.Fatalf("%d alternatives kept that were not given, or out of order", len(j.alternatives.ids)-at)
		}
	}
}

// A judge that was lent a shortcut by a long document keeps it: what it finds in
// the next is the same to the last bit.
func TestShortcutFindsTheSame(t *testing.T) {
	e := openTiny(t, nil)
	plain, short := newJudge(e), newJudge(e)
	short.shortcut = e.shortcut()
	random := rand.New(rand.NewPCG(2, 7))
	seen := 0
	for _, d := range tinyDocuments(t)[:40] {
		d = slipped(d, 12, random).Text
		found := [2][]string{}
		for i, j := range []*judge{plain, short} {
			eachSentence(t, j, d, func(s text.Sentence, block []byte) {
				list, err := j.findings(s, block)
				if err != nil {
					t.Fatal(err)
				}
				for _, f := range list {
					found[i] = append(found[i], fmt.Sprint(f.from, f.to, f.kind, f.p, f.odds, j.corrections(f, block)))
				}
			})
		}
		if !slices.Equal(found[0], found[1]) {
			t.Errorf("with the shortcut %q, without %q", found[1], found[0])
		}
		seen += len(found[0])
	}
	if seen < 100 {
		t.Errorf("%d findings: too few to tell", seen)
	}
}
