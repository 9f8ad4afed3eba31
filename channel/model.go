package channel

import (
	"encoding/binary"
	"math"
)

// Model prices observed forms. It reads its figures in place from the bytes it
// was opened on and is safe for concurrent use.
type Model struct {
	keep    table16 // keep[l][c][r]: c is typed as c
	drop    table16 // drop[l][c][r]: c is left out
	swap    table16 // swap[c][r]: c and r change places
	stop    table16 // stop[l]: nothing is added at the end of a word that ends in l
	floor   table16 // floor[x]: the least cost of typing x, whatever was meant and wherever
	doubt   table8  // doubt[l][c][r]: how hard this place is, added to every replacement; biased
	subLeft table8  // subLeft[x][l][c]: x typed for c, seen from the left
	subNext table8  // subNext[x][c][r]: correction of subLeft for the letter to the right; biased
	insert  table8  // insert[x][l][r]: x added between l and r
	rules   ruleTable
	prices  Prices
	section []byte
	orders  orders
}

// Prices are the costs, in nats, of what is not a matter of single letters.
type Prices struct {
	Accent  float32 // the letter is right, its accent is not
	Foreign float32 // another character of the class Other
	RunOn   float32 // a space is left out
	Split   float32 // a space is put in
}

const (
	cube   = symbols * symbols * symbols
	square = symbols * symbols

	// Costs are kept in steps of a power of two, so that sums of them are exact
	// in float32 and do not depend on the order of addition.
	step16 = 1.0 / 1024
	step8  = 1.0 / 16

	// bias is added to the corrections, which may be below zero, to keep them above.
	bias      = 4.0
	biasSteps = bias / step8

	// impossible is the cost of what no model entry allows.
	impossible = float32(1 << 20)
)

// table16 holds costs in steps of 1/1024 nat, little-endian.
type table16 []byte

func (t table16) at(i int) float32 {
	return float32(binary.LittleEndian.Uint16(t[2*i:])) * step16
}

// table8 holds costs in steps of 1/16 nat.
type table8 []byte

func (t table8) at(i int) float32 { return float32(t[i]) * step8 }

func at2(a, b Symbol) int    { return int(a)*symbols + int(b) }
func at3(a, b, c Symbol) int { return (int(a)*symbols+int(b))*symbols + int(c) }

// Emit is the cost of typing x for the intended letter c, between l and r.
func (m *Model) Emit(x Letter, l Symbol, c Letter, r Symbol) float32 {
	place := at3(l, c.Sym, r)
	if x.Sym != c.Sym {
		return replaceCost(int(m.doubt[place]) + int(m.subLeft[at3(x.Sym, l, c.Sym)]) + int(m.subNext[at3(x.Sym, c.Sym, r)]))
	}
	cost := m.keep.at(place)
	if x.Rune != c.Rune {
		cost += m.unlike(x)
	}
	return cost
}

// unlike is the cost of a different character of the same class.
func (m *Model) unlike(x Letter) float32 {
	if x.Sym == Other {
		return m.prices.Foreign
	}
	return m.prices.Accent
}

// Drop is the cost of leaving out c between l and r.
func (m *Model) Drop(l, c, r Symbol) float32 { return m.drop.at(at3(l, c, r)) }

// Swap is the cost of typing the two intended letters c and r as r and c.
func (m *Model) Swap(c, r Symbol) float32 { return m.swap.at(at2(c, r)) }

// Insert is the cost of adding x between the intended letters l and r.
func (m *Model) Insert(x, l, r Symbol) float32 { return m.insert.at(at3(x, l, r)) }

// Stop is the cost of adding nothing after the last letter l.
func (m *Model) Stop(l Symbol) float32 { return m.stop.at(int(l)) }

// Prices gives the costs of accents and spaces.
func (m *Model) Prices() Prices { return m.prices }

// Section gives the bytes of the model, for Open. The caller must not change them.
func (m *Model) Section() []byte { return m.section }

// nats turns a probability into a cost. Nothing is dearer than 20 nats.
func nats(p float64) float64 {
	return math.Min(20, math.Max(0, -math.Log(p)))
}

// probability is the inverse of nats.
func probability(cost float32) float64 { return math.Exp(-float64(cost)) }
