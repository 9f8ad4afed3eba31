package foulcase

import (
	"bytes"
	"cmp"
	"math"
	"slices"
	"strings"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/lm/lattice"
)

const (
	// maxCorrections is how many corrections a mark offers.
	maxCorrections = 10
	// leastShare is the least share of a finding that a correction beyond the
	// first has.
	leastShare = 1e-4
)

// finding is a group of changes to the same slots, with its place in the block.
type finding struct {
	from, to int // slots
	kind     Kind
	p        float64  // the lattice's posterior that the typed reading is wrong
	odds     float64  // log-odds that it is, all evidence weighed, nats, before the document's rate of slips
	changes  []change // best first; none of a preference
	// preferred is what the house has to say here; nil where the models found it.
	preferred *preference
}

// findings weighs a sentence of the block and returns what may be wrong in it, in order,
// without regard to thresholds. The result is the caller's.
func (j *judge) findings(s text.Sentence, block []byte) ([]finding, error) {
	j.read(s, block)
	j.propose()
	if len(j.changes) == 0 {
		return j.prefer(nil, block), nil
	}
	if err := j.weighTogether(); err != nil {
		return nil, err
	}
	found := j.group()
	for i := range found {
		found[i].odds = j.oddsOf(&found[i])
	}
	return j.prefer(found, block), nil
}

// runonFavour is what a missing space gains as the reading of a form that is no word, nats,
// once it is known that something is wrong there: a run-on is priced as one among all
// words, of which most would be names and compounds. Tuned on held-out text with slips put in.
const runonFavour = 6

// favourRunons orders the changes of a finding, whose odds are known, anew.
func (j *judge) favourRunons(f *finding) {
	if j.slots[f.from].status != unknown || !slices.ContainsFunc(f.changes, func(c change) bool { return c.kind == Runon }) {
		return
	}
	sum := 0.0
	for i := range f.changes {
		c := &f.changes[i]
		if c.kind == Runon {
			c.p *= math.Exp(runonFavour)
		}
		sum += c.p
	}
	for i := range f.changes {
		f.changes[i].p *= f.p / sum
	}
	slices.SortStableFunc(f.changes, func(a, b change) int { return cmp.Compare(b.p, a.p) })
	f.kind = f.changes[0].kind
}

// leastWeighed is the posterior under which a finding is not looked at further.
const leastWeighed = 3e-5

// oddsOf weighs all that is known of a finding.
func (j *judge) oddsOf(f *finding) float64 {
	switch {
	case f.p < leastWeighed:
		return math.Inf(-1)
	case j.e.calibration == nil:
		return clampOdds(logit(f.p))
	}
	return j.e.calibration.logOdds(f.kind, j.collect(f))
}

// weighTogether builds the lattice around the changes and gives each its
// posterior. Outside [first, last) all readings agree, so it is left out.
func (j *judge) weighTogether() error {
	first, last := len(j.slots), 0
	for _, c := range j.changes {
		first, last = min(first, c.from), max(last, c.to)
	}
	ids := len(j.ids)
	if last < len(j.slots) { // the context that the last change reaches into
		ids = min(ids, j.slots[last].from+j.e.lm.Order()-1)
	}
	tail := j.ids[j.slots[last-1].to:ids]

	nodes := last - first
	j.lattice.Reset(nodes + len(tail))
	for i := first; i < last; i++ {
		sl := &j.slots[i]
		j.addEdge(i-first, i+1-first, j.ids[sl.from:sl.to], sl.score)
	}
	for i := range tail {
		j.addEdge(nodes+i, nodes+i+1, tail[i:i+1], 0)
	}
	for i := range j.changes {
		c := &j.changes[i]
		c.edge = j.addEdge(c.from-first, c.to-first, j.words[c.lo:c.hi], c.score)
	}
	if err := j.lattice.Run(j.e.lm, j.states[j.slots[first].from], j.e.judgement.LanguageModel); err != nil {
		return err
	}
	for i := range j.changes {
		j.changes[i].p = j.lattice.Posterior(j.changes[i].edge)
	}
	return nil
}

func (j *judge) addEdge(from, to int, words []uint32, score float64) int {
	return j.lattice.Add(lattice.Edge{From: from, To: to, Words: words, Score: score})
}

// group collects the changes of the same slots, and of overlapping groups
// keeps the likelier.
func (j *judge) group() []finding {
	slices.SortStableFunc(j.changes, func(a, b change) int {
		return cmp.Or(cmp.Compare(a.from, b.from), cmp.Compare(a.to, b.to), cmp.Compare(b.p, a.p))
	})
	var found []finding
	for i := 0; i < len(j.changes); {
		k := i
		p := 0.0
		for ; k < len(j.changes) && j.changes[k].from == j.changes[i].from && j.changes[k].to == j.changes[i].to; k++ {
			p += j.changes[k].p
		}
		f := finding{from: j.changes[i].from, to: j.changes[i].to, kind: j.changes[i].kind, p: min(p, 1), changes: j.changes[i:k]}
		i = k
		if n := len(found); n > 0 && found[n-1].to > f.from {
			if found[n-1].p < f.p {
				found[n-1] = f
			}
			continue
		}
		found = append(found, f)
	}
	return found
}

// corrections writes out the changes of a finding as the text would have them,
// with each one's share of the finding.
func (j *judge) corrections(f finding, block []byte) []Correction {
	if f.preferred != nil {
		return []Correction{{Text: j.writePreferred(&f, block), P: 1}}
	}
	out := make([]Correction, 0, min(len(f.changes), maxCorrections))
	observed := string(block[j.slots[f.from].token.Start:j.slots[f.to-1].token.End])
	for i, c := range f.changes {
		if len(out) == maxCorrections || i > 0 && c.p < leastShare*f.p {
			break
		}
		written := j.write(&c, block)
		same := func(o Correction) bool { return o.Text == written }
		if written != observed && !slices.ContainsFunc(out, same) {
			out = append(out, Correction{Text: written, P: c.p / f.p})
		}
	}
	return out
}

// write spells a change with the capitals and the apostrophe of what it
// replaces.
func (j *judge) write(c *change, block []byte) string {
	first := j.slots[c.from].token
	if c.house != "" {
		return text.ApplyCase(first.Case, c.house)
	}
	written := spell(j.e.lexicon, j.words[c.lo:c.hi])
	if bytes.ContainsRune(block[first.Start:first.End], '’') {
		written = strings.ReplaceAll(written, "'", "’")
	}
	return text.ApplyCase(first.Case, written)
}

// spell joins words with spaces, clitics and hyphens without.
func spell(lex *lexicon.Lexicon, words []uint32) string {
	var b strings.Builder
	glue := true
	for _, id := range words {
		if id == lex.ClassID(lexicon.Hyphen) {
			b.WriteByte('-')
			glue = true
			continue
		}
		form := usual(lex, id)
		if !glue && !strings.HasPrefix(form, "'") {
			b.WriteByte(' ')
		}
		b.WriteString(form)
		glue = false
	}
	return b.String()
}

// usual writes a word as it stands inside a sentence: in small letters if it is
// met so at all ("captain", though "Captain Orme"), else with its own capitals.
func usual(lex *lexicon.Lexicon, id uint32) string {
	if lex.Entry(id).Cases&lexicon.LowerCase != 0 {
		return string(lex.AppendForm(nil, id))
	}
	return lex.Canonical(id)
}
