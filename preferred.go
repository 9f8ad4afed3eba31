package foulcase

import (
	"cmp"
	"slices"
	"strings"
	"unicode"

	"example.org/foulcase/internal/text"
)

// preference is a pair of a house list: what is always to be written for what.
type preference struct {
	written, unwanted string // as the list has them
	good, bad         phrase
	exact             bool   // unwanted has capitals, and stands for those alone
	place             string // list:line
}

// phrase is some words as the segmenter reads them.
type phrase []unit

// unit is one token.
type unit struct {
	key     string // see keyOf
	written string
	glued   bool // to the unit before
}

// keyOf is what makes a token the same as another, capitals aside. It aliases the token or
// the block.
func keyOf(t text.Token, block []byte) []byte {
	switch {
	case t.Norm != nil:
		return t.Norm
	case t.Kind == text.Hyphen:
		return []byte("-")
	}
	return block[t.Start:t.End]
}

// preferences are pairs by the key that their unwanted side begins with, the longest
// first. A look at a token that begins none costs one look-up.
type preferences map[string][]*preference

// add takes a pair up, unless one for the same form that writes another is there, which
// it returns.
func (ps preferences) add(p *preference) (other *preference) {
	key := p.bad[0].key
	for _, q := range ps[key] {
		if p.exact == q.exact && len(p.bad) == len(q.bad) && (p.unwanted == q.unwanted || !p.exact && p.bad.same(q.bad)) {
			if p.written == q.written {
				return nil
			}
			return q
		}
	}
	at := slices.IndexFunc(ps[key], p.goesBefore)
	if at < 0 {
		at = len(ps[key])
	}
	ps[key] = slices.Insert(ps[key], at, p)
	return nil
}

// goesBefore tells whether a preference is tried before another that begins alike: the
// longer is, and of two as long the one for exact capitals.
func (p *preference) goesBefore(q *preference) bool {
	if len(p.bad) != len(q.bad) {
		return len(p.bad) > len(q.bad)
	}
	return p.exact && !q.exact
}

// same reports whether two phrases are read alike, capitals aside.
func (a phrase) same(b phrase) bool {
	return slices.EqualFunc(a, b, func(u, v unit) bool { return u.key == v.key && u.glued == v.glued })
}

// at returns the preference that holds for the n tokens from i on, or nil.
func (ps preferences) at(tokens []text.Token, i int, block []byte) (p *preference, n int) {
	for _, p := range ps[string(keyOf(tokens[i], block))] {
		if p.bad.reads(tokens, i, block, p.exact) && !p.heeded(tokens, i, block) {
			return p, len(p.bad)
		}
	}
	return nil, 0
}

// reads reports whether the tokens from i on are the phrase.
func (a phrase) reads(tokens []text.Token, i int, block []byte, exact bool) bool {
	if i < 0 || i+len(a) > len(tokens) {
		return false
	}
	for k, u := range a {
		t := tokens[i+k]
		if string(keyOf(t, block)) != u.key || k > 0 && t.Glued != u.glued ||
			exact && string(block[t.Start:t.End]) != u.written {
			return false
		}
	}
	return true
}

// heeded reports whether the unwanted form at token i is a piece of the one that is to
// be written: "Sound" in "Skarrow Sound", where that is to be written for "Sound".
func (p *preference) heeded(tokens []text.Token, i int, block []byte) bool {
	for k := range len(p.good) - len(p.bad) + 1 {
		if len(p.good) > len(p.bad) && p.good[k].key == p.bad[0].key && p.good.reads(tokens, i-k, block, false) {
			return true
		}
	}
	return false
}

// write spells what is to be written for the tokens: as the list has it, if it has
// capitals there, else with those of the first token; where all are capitals, in capitals.
func (p *preference) write(tokens []text.Token, block []byte, shouting bool) string {
	observed := block[tokens[0].Start:tokens[len(p.bad)-1].End]
	switch {
	case shouting, !p.exact && text.CaseOf(observed) == text.Upper:
		return strings.ToUpper(p.written)
	case strings.ToLower(p.written) != p.written:
		return p.written
	}
	return text.ApplyCase(text.CaseOf(block[tokens[0].Start:tokens[0].End]), p.written)
}

// preferredP is the probability that the house means what it says, and preferredOdds
// the same as log-odds, nats.
const preferredP, preferredOdds = .999, 6.907

// prefer puts what the house has to say of a sentence among what was found in it, in
// place of what reaches into the same slots.
func (j *judge) prefer(found []finding, block []byte) []finding {
	if j.house == nil || len(j.house.preferred) == 0 {
		return found
	}
	for i := 0; i < len(j.slots); i++ {
		first := j.slots[i].place
		p, n := j.house.preferred.at(j.tokens, first, block)
		if p == nil {
			continue
		}
		to := i + 1
		for to < len(j.slots) && j.slots[to].place < first+n {
			to++
		}
		f := finding{from: i, to: to, p: 1, odds: preferredOdds, preferred: p}
		if f.kind = j.kindOf(p); j.writePreferred(&f, block) == string(block[j.slots[i].token.Start:j.slots[to-1].token.End]) {
			continue
		}
		found = slices.DeleteFunc(found, func(o finding) bool { return o.from < to && o.to > i })
		found = append(found, f)
		i = to - 1
	}
	slices.SortFunc(found, func(a, b finding) int { return cmp.Compare(a.from, b.from) })
	return found
}

func (j *judge) writePreferred(f *finding, block []byte) string {
	return f.preferred.write(j.tokens[j.slots[f.from].place:], block, j.shouting)
}

// preferFirst puts what the house has written for a word, if anything, before its other
// candidates.
func (j *judge) preferFirst(ranked []Candidate, word string) []Candidate {
	if j.house == nil {
		return ranked
	}
	block := []byte(word)
	for s := range j.segmenter.Sentences(block) {
		p, n := j.house.preferred.at(s.Tokens, 0, block)
		if p == nil || n != len(s.Tokens) {
			break
		}
		first := Candidate{Text: p.write(s.Tokens, block, false)}
		ranked = slices.DeleteFunc(ranked, func(c Candidate) bool {
			same := c.Text == first.Text
			if same {
				first = c
			}
			return same
		})
		first.P = preferredP
		for i := range ranked {
			ranked[i].P *= 1 - preferredP
		}
		return slices.Insert(ranked, 0, first)
	}
	return ranked
}

// kindOf is the kind of error that an unwanted form counts as.
func (j *judge) kindOf(p *preference) Kind {
	if p.bad.letters() == p.good.letters() {
		switch bad, good := strings.Count(p.unwanted, " "), strings.Count(p.written, " "); {
		case good > bad:
			return Runon
		case good < bad:
			return Split
		}
	}
	for _, u := range p.bad {
		if strings.ContainsFunc(u.key, unicode.IsLetter) && !j.e.knows([]byte(u.key)) {
			return Nonword
		}
	}
	return Realword
}

// letters is the phrase without what stands between its words.
func (a phrase) letters() string {
	var b strings.Builder
	for _, u := range a {
		b.WriteString(strings.TrimFunc(u.key, func(r rune) bool { return !unicode.IsLetter(r) }))
	}
	return b.String()
}
