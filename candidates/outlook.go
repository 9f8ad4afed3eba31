package candidates

import "example.org/foulcase/channel"

// outlook is what the rest of the observed word must cost at least, up to a
// goal: its end, or the end of the half read first.
type outlook struct {
	goal   int
	end    bool // the goal is the end of the word
	at     []lookout
	behind []glance // by place and letter before
	query  uint32
}

// lookout is the outlook from one place of the observed word, nats.
type lookout struct {
	floor float32 // whatever word is meant
	// ahead is the same if the next letter meant is the one of the index.
	ahead byLetter
	// rewrite is the same if a swap or a rule begins with that letter.
	rewrite byLetter
}

// glance is the outlook from one place when the letter before is known too. It
// is made when first asked for.
type glance struct {
	rest  byLetter // by the next letter meant
	query uint32   // the query it is of
}

// byLetter holds a cost for each letter, nats.
type byLetter [channel.Symbols]float32

// never is above every cost that matters.
const never = 1 << 20

// find fills the outlook, from the goal back. A step that goes past the goal
// counts nothing.
func (o *outlook) find(r *reading, goal int, end bool) {
	o.goal, o.end = goal, end
	o.at = resize(o.at, goal+1)
	o.behind = resize(o.behind, (goal+1)*channel.Symbols)
	o.query++
	o.at[goal] = lookout{}
	if end {
		o.atEnd(r)
	}
	for i := goal - 1; i >= 0; i-- {
		o.rewrites(r, i)
		o.steps(r, i)
		o.skips(r, i)
	}
}

// atEnd fills the last place, where no letter is left to explain.
func (o *outlook) atEnd(r *reading) {
	here := &o.at[o.goal]
	here.floor = 0
	for c := range here.ahead {
		here.ahead[c], here.rewrite[c] = never, never
	}
	here.ahead[channel.Edge] = 0
	o.skips(r, o.goal)
}

// rewrites looks at the swaps and rules that explain letters from i on.
func (o *outlook) rewrites(r *reading, i int) {
	here := &o.at[i]
	for c := range here.rewrite {
		here.rewrite[c] = never
	}
	if i+1 < len(r.observed) {
		x, y := r.observed[i].Sym, r.observed[i+1].Sym
		here.rewrite[y] = o.past(i+2, r.order.Swap(y, x))
	}
	for k := range r.rulesAt(i) {
		if rule := &r.rulesAt(i)[k]; rule.NObserved > 0 {
			least := &here.rewrite[rule.Intended[0]]
			*least = min(*least, o.past(i+int(rule.NObserved), rule.Cost))
		}
	}
}

// steps finds the floor at i over all steps that explain the letter there.
func (o *outlook) steps(r *reading, i int) {
	here, behind := &o.at[i], &o.at[i+1]
	x := r.observed[i].Sym
	here.floor = never
	for c := range channel.Symbol(channel.Symbols) {
		least := min(r.order.AnyInsert(x, c)+behind.ahead[c], here.rewrite[c])
		if c != channel.Edge {
			least = min(least, r.order.AnyEmit(x, c)+behind.floor)
		}
		here.ahead[c] = least
		here.floor = min(here.floor, least)
	}
}

// skips adds the steps that explain no letter: the word meant goes on.
func (o *outlook) skips(r *reading, i int) {
	here := &o.at[i]
	for k := range r.rulesAt(i) {
		if rule := &r.rulesAt(i)[k]; rule.NObserved == 0 {
			least := &here.rewrite[rule.Intended[0]]
			*least = min(*least, rule.Cost+here.floor)
		}
	}
	for c := channel.Edge + 1; c < channel.Symbols; c++ {
		here.ahead[c] = min(here.ahead[c], here.rewrite[c], r.order.AnyDrop(c)+here.floor)
	}
}

// past is the least cost by a step to place i.
func (o *outlook) past(i int, cost float32) float32 {
	if i > o.goal {
		return 0
	}
	return cost + o.at[i].floor
}

// rest is what the observed word must cost at least from i on, by the letter
// meant next, when before is the one before it.
func (o *outlook) rest(r *reading, i int, before channel.Symbol) *byLetter {
	if i >= o.goal {
		if !o.end {
			return &nothing
		}
		return &o.at[i].ahead
	}
	g := &o.behind[i*channel.Symbols+int(before)]
	if g.query != o.query {
		g.query = o.query
		o.look(r, i, before, &g.rest)
	}
	return &g.rest
}

var nothing byLetter // costs of nothing; read only

// look fills in what rest tells.
func (o *outlook) look(r *reading, i int, before channel.Symbol, rest *byLetter) {
	here, behind := &o.at[i], &o.at[i+1]
	next := r.order.Lookahead(r.observed[i].Sym, before)
	for c := range rest {
		rest[c] = min(
			here.rewrite[c],
			next.Drop[c]+here.floor,
			next.Emit[c]+behind.floor,
			next.Insert[c]+behind.ahead[c],
		)
	}
	rest[channel.Edge] = next.Insert[channel.Edge] + behind.ahead[channel.Edge]
}

// resize returns a slice of n elements, in the memory of s if it has room.
func resize[T any](s []T, n int) []T {
	if n > cap(s) {
		return make([]T, n, 2*n)
	}
	return s[:n]
}
