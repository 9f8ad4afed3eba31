package channel

import "sync"

// Order is a model's costs for a search that reads words from one end to the
// other: "before" is the neighbour that was read before a letter, "next" the one
// to come. Backwards, the one before stands to the right. What is needed for
// every letter to come lies side by side. It is safe for concurrent use.
//
// Besides the costs it has the least that a step can cost whatever comes next.
type Order struct {
	model  *Model
	back   bool
	keep   []float32 // keep[before][c][next], as are drop and doubt
	drop   []float32
	doubt  []uint8
	insert []float32 // insert[x][before][c]: x added between before and c
	known  []uint8   // known[x][before][c]: x typed for c, seen from the letter before; biased with ahead
	ahead  []uint8   // ahead[x][c][next]: the same, seen from the next

	leastDrop   [square]float32 // leastDrop[before][c]
	leastEmit   []float32       // leastEmit[x][before][c]
	anyDrop     [symbols]float32
	anyEmit     [square]float32 // anyEmit[x][c]
	leastInsert [square]float32 // leastInsert[x][c]: x added before c
}

// Symbols is the number of symbols, Edge included.
const Symbols = symbols

// orders are the two orders of a model, made when first asked for.
type orders struct {
	once sync.Once
	both [2]*Order
}

// Order returns the model's costs in one reading order. The first call takes a
// millisecond or two, and the tables some 800 kB.
func (m *Model) Order(back bool) *Order {
	m.orders.once.Do(func() { m.orders.both = [2]*Order{newOrder(m, false), newOrder(m, true)} })
	if back {
		return m.orders.both[1]
	}
	return m.orders.both[0]
}

func newOrder(m *Model, back bool) *Order {
	o := &Order{
		model: m, back: back,
		keep: make([]float32, cube), drop: make([]float32, cube), insert: make([]float32, cube),
		doubt: m.doubt, known: m.subLeft, ahead: m.subNext, leastEmit: make([]float32, cube),
	}
	if back {
		o.doubt, o.known, o.ahead = make([]uint8, cube), make([]uint8, cube), make([]uint8, cube)
	}
	for a := Symbol(0); a < symbols; a++ {
		for b := Symbol(0); b < symbols; b++ {
			for c := Symbol(0); c < symbols; c++ {
				here, turned, swapped := at3(a, b, c), at3(a, b, c), at3(a, b, c)
				if back {
					turned, swapped = at3(c, b, a), at3(a, c, b)
					o.doubt[here] = m.doubt[turned]
					o.known[here], o.ahead[here] = m.subNext[swapped], m.subLeft[swapped]
				}
				o.keep[here], o.drop[here] = m.keep.at(turned), m.drop.at(turned)
				o.insert[here] = m.insert.at(swapped)
			}
		}
	}
	o.findLeast()
	return o
}

// findLeast fills the tables of least costs.
func (o *Order) findLeast() {
	fill := func(t []float32) {
		for i := range t {
			t[i] = impossible
		}
	}
	fill(o.anyDrop[:])
	fill(o.anyEmit[:])
	fill(o.leastInsert[:])
	for before := Symbol(0); before < symbols; before++ {
		for c := Symbol(0); c < symbols; c++ {
			place := at3(before, c, 0)
			o.leastDrop[at2(before, c)] = least(o.drop[place : place+symbols])
			o.anyDrop[c] = min(o.anyDrop[c], o.leastDrop[at2(before, c)])
			for x := Symbol(0); x < symbols; x++ {
				emit := o.replaceLeast(x, before, c)
				if x == c {
					emit = least(o.keep[place : place+symbols])
				}
				at, pair := at3(x, before, c), at2(x, c)
				o.leastEmit[at] = emit
				o.anyEmit[pair] = min(o.anyEmit[pair], emit)
				o.leastInsert[pair] = min(o.leastInsert[pair], o.insert[at])
			}
		}
	}
}

func least(costs []float32) float32 {
	m := costs[0]
	for _, c := range costs[1:] {
		m = min(m, c)
	}
	return m
}

// replaceLeast is the least cost of typing x for c over all next letters. Half of
// the time that an Order takes to make goes by here.
func (o *Order) replaceLeast(x, before, c Symbol) float32 {
	doubt := (*[symbols]uint8)(o.doubt[at3(before, c, 0):])
	ahead := (*[symbols]uint8)(o.ahead[at3(x, c, 0):])
	least := uint32(2 * 0xff)
	for i := range doubt {
		least = min(least, uint32(doubt[i])+uint32(ahead[i]))
	}
	return replaceCost(int(least) + int(o.known[at3(x, before, c)]))
}

// replaceCost takes the biases off a sum of table entries.
func replaceCost(steps int) float32 { return float32(max(0, steps-2*biasSteps)) * step8 }

// Back reports whether the order is from the end of words.
func (o *Order) Back() bool { return o.back }

// Emit is the cost of typing x for the intended letter c.
func (o *Order) Emit(x Letter, before Symbol, c Letter, next Symbol) float32 {
	if x.Sym != c.Sym {
		return replaceCost(int(o.doubt[at3(before, c.Sym, next)]) + int(o.known[at3(x.Sym, before, c.Sym)]) + int(o.ahead[at3(x.Sym, c.Sym, next)]))
	}
	cost := o.keep[at3(before, c.Sym, next)]
	if x.Rune != c.Rune {
		cost += o.model.unlike(x)
	}
	return cost
}

// Drop is the cost of leaving out c.
func (o *Order) Drop(before, c, next Symbol) float32 { return o.drop[at3(before, c, next)] }

// Insert is the cost of adding x between the letters before and c.
func (o *Order) Insert(x, before, c Symbol) float32 {
	return o.insert[at3(x, before, c)]
}

// Swap is the cost of typing c and next in the other order.
func (o *Order) Swap(c, next Symbol) float32 {
	if o.back {
		c, next = next, c
	}
	return o.model.Swap(c, next)
}

// Stop is the cost of adding nothing where the word ends, due when a search
// comes from its last letter to next: nothing unless that is the end.
func (o *Order) Stop(last, next Symbol) float32 {
	if next == Edge && !o.back {
		return o.model.Stop(last)
	}
	return 0
}

// Begin is the cost due at the first letter read: backwards, that of adding
// nothing behind it.
func (o *Order) Begin(first Symbol) float32 {
	if o.back {
		return o.model.Stop(first)
	}
	return 0
}

// LeastEmit is what typing x for c costs at least, whatever comes next.
func (o *Order) LeastEmit(x, before, c Symbol) float32 { return o.leastEmit[at3(x, before, c)] }

// LeastDrop is what leaving out c costs at least, whatever comes next.
func (o *Order) LeastDrop(before, c Symbol) float32 { return o.leastDrop[at2(before, c)] }

// Lookahead is what the three steps that meet a letter cost at least, by the
// letter. Its arrays are the order's and must not be changed.
type Lookahead struct {
	Emit   *[symbols]float32 // LeastEmit
	Drop   *[symbols]float32 // LeastDrop
	Insert *[symbols]float32 // Insert
}

// Lookahead gives the least costs when x is typed next and the letter meant next
// follows before.
func (o *Order) Lookahead(x, before Symbol) Lookahead {
	at := at3(x, before, 0)
	return Lookahead{
		Emit:   (*[symbols]float32)(o.leastEmit[at:]),
		Drop:   (*[symbols]float32)(o.leastDrop[at2(before, 0):]),
		Insert: (*[symbols]float32)(o.insert[at:]),
	}
}

// AnyEmit, AnyDrop and AnyInsert are the least costs in any surroundings: of
// typing x for c, of leaving out c, of adding x before c.
func (o *Order) AnyEmit(x, c Symbol) float32   { return o.anyEmit[at2(x, c)] }
func (o *Order) AnyDrop(c Symbol) float32      { return o.anyDrop[c] }
func (o *Order) AnyInsert(x, c Symbol) float32 { return o.leastInsert[at2(x, c)] }
