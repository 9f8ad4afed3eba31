package candidates

import (
	"bufio"
	"cmp"
	"context"
	"encoding/binary"
	"fmt"
	"io"
	"math"
	"slices"
	"strings"
	"sync"
	"sync/atomic"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
)

// ConfusableOptions steers BuildConfusables. The zero value works.
type ConfusableOptions struct {
	// Homophones are sets of words that sound alike; each counts as meant for
	// each other at HomophoneCost (4.5 nats when zero) at most.
	Homophones    [][]string
	HomophoneCost float32
	// LeastPrior is the least log prior of a word that is typed or meant
	// (-16 nats when zero).
	LeastPrior float32
	// MostCost is the greatest channel cost of an entry (9.5 nats when zero).
	MostCost float32
	// Most is the greatest number of entries a word that the channel's search
	// gives (12 when zero).
	Most int
	// NearCost is the greatest cost of a word a single edit away (8.5 nats when
	// zero): among words any letter is taken for any other oftener than the
	// channel, which has seen misspellings, would have it.
	NearCost float32
	// NearPrior is the least log prior of such words (-14.5 nats when zero).
	NearPrior float32
	// NearRarer is how much rarer than the typed word such a word may be, nats
	// (5 when zero): that "the" was meant as "tee" no context makes likely enough.
	NearRarer float32
	// Jobs is the number of goroutines (1 when zero).
	Jobs int
	// Progress, if set, is told now and then how many of the words are done;
	// calls may come from several goroutines.
	Progress func(done, all int)
}

func (o *ConfusableOptions) complete() {
	o.HomophoneCost = cmp.Or(o.HomophoneCost, 4.5)
	o.LeastPrior = cmp.Or(o.LeastPrior, -16)
	o.MostCost = cmp.Or(o.MostCost, 9.5)
	o.Most = min(cmp.Or(o.Most, 12), math.MaxUint8)
	o.NearCost = cmp.Or(o.NearCost, 8.5)
	o.NearPrior = cmp.Or(o.NearPrior, -14.5)
	o.NearRarer = cmp.Or(o.NearRarer, 5)
	o.Jobs = max(o.Jobs, 1)
}

// ReadHomophones reads sets of words, a line each: words separated by commas,
// up to the first tab.
func ReadHomophones(r io.Reader) ([][]string, error) {
	var sets [][]string
	lines := bufio.NewScanner(r)
	for lines.Scan() {
		words, _, _ := strings.Cut(strings.TrimSpace(lines.Text()), "\t")
		if set := strings.Split(words, ","); len(set) > 1 {
			sets = append(sets, set)
		}
	}
	if err := lines.Err(); err != nil {
		return nil, fmt.Errorf("candidates: reading homophones: %w", err)
	}
	return sets, nil
}

// BuildConfusables writes the section for a lexicon: for every word typed, the
// other words that may have been meant: the best by a search of newSearcher's
// searchers, one for each goroutine, those that sound alike, and those that are a
// single edit away. Spelling variants of one word are not
// confusable. The result does not depend on the number of jobs.
func BuildConfusables(ctx context.Context, lex *lexicon.Lexicon, newSearcher func() *Searcher, o ConfusableOptions) ([]byte, error) {
	o.complete()
	b := confusableBuilder{
		lex:     lex,
		options: o,
		alike:   alike(lex, o.Homophones),
		near:    newNearWords(lex, o.NearPrior),
		blocks:  make([][]byte, (lex.Len()+blockWords-1)/blockWords),
	}
	var workers sync.WaitGroup
	for range o.Jobs {
		workers.Go(func() { b.work(ctx, newSearcher()) })
	}
	workers.Wait()
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	return b.section()
}

// alike turns sets of words into the ids that sound like each id.
func alike(lex *lexicon.Lexicon, sets [][]string) map[uint32][]uint32 {
	m := map[uint32][]uint32{}
	for _, set := range sets {
		for _, a := range set {
			idA, okA := lex.ID([]byte(a))
			for _, b := range set {
				if idB, okB := lex.ID([]byte(b)); okA && okB && idA != idB {
					m[idA] = append(m[idA], idB)
				}
			}
		}
	}
	return m
}

type confusableBuilder struct {
	lex     *lexicon.Lexicon
	options ConfusableOptions
	alike   map[uint32][]uint32
	near    *nearWords
	blocks  [][]byte
	next    atomic.Int64
}

// work fills blocks until none is left.
func (b *confusableBuilder) work(ctx context.Context, s *Searcher) {
	var form []byte
	var found []Candidate
	bound := Candidate{Channel: b.options.MostCost, Prior: b.options.LeastPrior}.Score(s.weights)
	for ctx.Err() == nil {
		block := int(b.next.Add(1)) - 1
		if block >= len(b.blocks) {
			return
		}
		for id := block * blockWords; id < min((block+1)*blockWords, b.lex.Len()); id++ {
			found = found[:0]
			if b.lex.Prior(uint32(id)) >= b.options.LeastPrior {
				form = b.lex.AppendForm(form[:0], uint32(id))
				// Twice as many as are kept: variants and rare words fall away.
				found = s.Search(found, form, 2*b.options.Most+1, bound)
			}
			b.blocks[block] = appendEntries(b.blocks[block], b.entries(uint32(id), found, s))
		}
		if b.options.Progress != nil {
			b.options.Progress(min((block+1)*blockWords, b.lex.Len()), b.lex.Len())
		}
	}
}

// entries chooses the neighbours of a word from what was found, in order of id.
func (b *confusableBuilder) entries(id uint32, found []Candidate, s *Searcher) []Candidate {
	for _, other := range b.alike[id] {
		found = b.cheapen(found, other, b.options.HomophoneCost)
	}
	found = slices.DeleteFunc(found, func(c Candidate) bool {
		return c.House || c.ID == id || c.Channel > b.options.MostCost || c.Prior < b.options.LeastPrior || b.lex.Variants(c.ID, id)
	})
	slices.SortStableFunc(found, func(x, y Candidate) int { return cmp.Compare(x.Score(s.weights), y.Score(s.weights)) })
	found = found[:min(len(found), b.options.Most)]
	if b.lex.Prior(id) >= b.options.NearPrior {
		found = b.addNear(found, id, s.channel)
	}
	slices.SortFunc(found, func(x, y Candidate) int { return cmp.Compare(x.ID, y.ID) })
	return found
}

// cheapen sees to it that a word is among those found, at a cost of at most so
// much.
func (b *confusableBuilder) cheapen(found []Candidate, id uint32, cost float32) []Candidate {
	at := slices.IndexFunc(found, func(c Candidate) bool { return c.ID == id })
	if at < 0 {
		return append(found, Candidate{ID: id, Channel: cost, Prior: b.lex.Prior(id)})
	}
	found[at].Channel = min(found[at].Channel, cost)
	return found
}

// addNear adds the words a single edit away, the likeliest while there is room.
func (b *confusableBuilder) addNear(found []Candidate, id uint32, m *channel.Model) []Candidate {
	near := b.near.of(id)
	slices.SortStableFunc(near, func(x, y uint32) int { return cmp.Compare(b.lex.Prior(y), b.lex.Prior(x)) })
	typed := string(b.lex.AppendForm(nil, id))
	for _, other := range near {
		if b.lex.Prior(other) < b.lex.Prior(id)-b.options.NearRarer {
			break
		}
		if len(found) < math.MaxUint8 && !b.lex.Variants(other, id) {
			cost := float32(m.Cost(typed, string(b.lex.AppendForm(nil, other))))
			found = b.cheapen(found, other, min(cost, b.options.NearCost))
		}
	}
	return found
}

func appendEntries(dst []byte, entries []Candidate) []byte {
	dst = append(dst, byte(len(entries)))
	before := uint32(0)
	for _, e := range entries {
		dst = binary.AppendUvarint(dst, uint64(e.ID-before))
		dst = append(dst, byte(min(math.Round(float64(e.Channel)/costStep), math.MaxUint8)))
		before = e.ID
	}
	return dst
}

func (b *confusableBuilder) section() ([]byte, error) {
	out := append([]byte(nil), confusablesMagic...)
	out = binary.LittleEndian.AppendUint32(out, uint32(b.lex.Len()))
	out = binary.LittleEndian.AppendUint32(out, uint32(len(b.blocks)))
	start := uint64(0)
	for _, block := range b.blocks {
		if start > math.MaxUint32 {
			return nil, fmt.Errorf("candidates: confusables of more than 4 GB")
		}
		out = binary.LittleEndian.AppendUint32(out, uint32(start))
		start += uint64(len(block))
	}
	for _, block := range b.blocks {
		out = append(out, block...)
	}
	return out, nil
}
