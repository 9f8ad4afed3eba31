package channel

import (
	"cmp"
	"encoding/binary"
	"slices"
)

// maxSide is the greatest number of letters on either side of a rule.
const maxSide = 4

// Place says where in the intended word a rule holds.
type Place uint8

// The places. Those of more than one bit hold for a rule that must be the whole word.
const (
	Anywhere Place = 0
	AtStart  Place = 1 // the rule must begin with the word
	AtEnd    Place = 2 // the rule must end with the word
)

// Rule rewrites up to four intended letters as up to four observed ones.
type Rule struct {
	Intended, Observed [maxSide]Symbol // padded with Edge
	NIntended          uint8
	NObserved          uint8
	Place              Place
	Cost               float32 // nats
}

// Fits reports whether the rule may be used where the letters on its two sides
// are l and r.
func (r *Rule) Fits(l, next Symbol) bool {
	return (r.Place&AtStart == 0 || l == Edge) && (r.Place&AtEnd == 0 || next == Edge)
}

// ruleKey is a rule without its cost.
type ruleKey struct {
	intended, observed [maxSide]Symbol
	place              Place
}

func (k ruleKey) rule() Rule {
	r := Rule{Intended: k.intended, Observed: k.observed, Place: k.place}
	_, r.NIntended = unpackSide(packSide(k.intended))
	_, r.NObserved = unpackSide(packSide(k.observed))
	return r
}

// ruleTable holds rules in eight bytes each, sorted by observed side: from the
// top, 20 bits of observed letters, 20 of intended ones, 2 of place and 16 of
// cost in steps of 1/1024 nat.
type ruleTable []byte

const ruleBytes = 8

func (t ruleTable) len() int { return len(t) / ruleBytes }

func (t ruleTable) word(i int) uint64 { return binary.LittleEndian.Uint64(t[i*ruleBytes:]) }

func packRule(r Rule) uint64 {
	return packSide(r.Observed)<<38 | packSide(r.Intended)<<18 | uint64(r.Place)<<16 | uint64(steps16(float64(r.Cost)))
}

func packSide(side [maxSide]Symbol) uint64 {
	var w uint64
	for _, s := range side {
		w = w<<5 | uint64(s)
	}
	return w
}

func unpackSide(w uint64) (side [maxSide]Symbol, n uint8) {
	for i := range side {
		side[i] = Symbol(w >> (5 * (maxSide - 1 - i)) & 31)
		if side[i] != Edge {
			n = uint8(i) + 1
		}
	}
	return side, n
}

func (t ruleTable) at(i int) Rule {
	w := t.word(i)
	r := Rule{Place: Place(w >> 16 & 3), Cost: float32(w&0xffff) * step16}
	r.Observed, r.NObserved = unpackSide(w >> 38)
	r.Intended, r.NIntended = unpackSide(w >> 18)
	return r
}

// AppendRules appends the rules whose observed side begins the letters given,
// in order of the intended side, so that rules with one first letter are
// neighbours.
func (m *Model) AppendRules(dst []Rule, observed []Letter) []Rule {
	from := len(dst)
	var side [maxSide]Symbol
	for n := 0; n <= maxSide && n <= len(observed); n++ {
		if n > 0 {
			side[n-1] = observed[n-1].Sym
		}
		key := packSide(side) << 38
		for i := m.rules.search(key); i < m.rules.len() && m.rules.word(i)>>38 == key>>38; i++ {
			dst = append(dst, m.rules.at(i))
		}
	}
	slices.SortFunc(dst[from:], compareIntended)
	return dst
}

func compareIntended(a, b Rule) int {
	return cmp.Or(
		cmp.Compare(packSide(a.Intended), packSide(b.Intended)),
		cmp.Compare(packSide(a.Observed), packSide(b.Observed)),
		cmp.Compare(a.Place, b.Place),
	)
}

// search gives the first rule not below key.
func (t ruleTable) search(key uint64) int {
	lo, hi := 0, t.len()
	for lo < hi {
		mid := int(uint(lo+hi) / 2)
		if t.word(mid) < key {
			lo = mid + 1
		} else {
			hi = mid
		}
	}
	return lo
}

// Rules lists the rules of the model, sorted by the observed letters.
func (m *Model) Rules() []Rule {
	rules := make([]Rule, m.rules.len())
	for i := range rules {
		rules[i] = m.rules.at(i)
	}
	return rules
}
