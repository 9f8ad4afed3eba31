package candidates

import (
	"unicode/utf8"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
)

// The steps below are written in reading order: "before" is the neighbour
// already read, "next" the one to come. Backwards, the neighbour before is the
// one to the right.

// insert takes the next observed letter for one added before the path's last.
func (s *Searcher) insert(st *state, read *reading) {
	cost := read.order.Insert(read.observed[st.i].Sym, st.before, st.letter.Sym)
	s.reach(st, &st.path, st.i+1, st.cost+cost)
}

// leave takes every step that explains the last letter of a path.
func (s *Searcher) leave(st *state) {
	t := &s.trees[st.tree]
	if int(st.i) < len(t.read.observed) {
		s.insert(st, t.read)
	}
	var out exits
	s.findExits(&out, st, t)
	if out.leadTo(channel.Edge) {
		if end, ok := s.end(&st.path); ok {
			s.leaveTo(st, t, &end, &out)
		}
	}
	b := t.lex.Branches(st.node)
	for i, label := range b.Labels {
		if label >= utf8.RuneSelf {
			s.leaveLong(st, t, &b, i, &out)
		} else if out.leadTo(channel.LetterOf(rune(label)).Sym) {
			if next, ok := child(&st.path, &b, i); ok {
				s.leaveTo(st, t, &next, &out)
			}
		}
	}
	s.rewrite(st, t)
}

// exits are the steps that explain the last letter of a path by itself, or with
// the next: leaving it out, typing something for it, typing the two the other
// way round.
type exits struct {
	drop, emit exit
	swap       channel.Symbol // the next letter that it takes, Edge for none
}

// exit tells to which next letters a step may lead within the limit. Judged by the
// least that the step can cost, most paths need not be looked up.
type exit struct {
	rest, toHalf *byLetter // what follows costs at least, by the next letter
	most, half   float32   // what all may cost, and the half read first
	least        float32   // cost of the state and, at least, of the step
}

// leadsTo judges by the least cost.
func (e *exit) leadsTo(next channel.Symbol) bool { return e.allows(next, e.least) }

// allows judges by a cost of the state and the step.
func (e *exit) allows(next channel.Symbol, cost float32) bool {
	return cost+e.rest[next] <= e.most && cost+e.toHalf[next] <= e.half
}

// leadsSomewhere reports whether there is any next letter to lead to.
func (e *exit) leadsSomewhere() bool {
	for next := range channel.Symbol(channel.Symbols) {
		if e.leadsTo(next) {
			return true
		}
	}
	return false
}

func (out *exits) leadTo(next channel.Symbol) bool {
	return out.drop.leadsTo(next) || out.emit.leadsTo(next) || next == out.swap && next != channel.Edge
}

// findExits judges the ways out of a state.
func (s *Searcher) findExits(out *exits, st *state, t *tree) {
	order, c := t.read.order, st.letter.Sym
	observed := t.read.observed[st.i:]
	s.findExit(&out.drop, st, t, c, int(st.i), st.cost+order.LeastDrop(st.before, c))
	if len(observed) == 0 {
		out.emit = exit{rest: &nothing, toHalf: &nothing, most: -1}
		return
	}
	s.findExit(&out.emit, st, t, c, int(st.i)+1, st.cost+order.LeastEmit(observed[0].Sym, st.before, c))
	if len(observed) > 1 && st.letter == observed[1] && c != observed[0].Sym {
		out.swap = observed[0].Sym
	}
}

// findExit judges a step behind the letter last, to place i of the observed word,
// by the cost there.
func (s *Searcher) findExit(e *exit, st *state, t *tree, last channel.Symbol, i int, cost float32) {
	const rounding = 1e-3 // nats; the judgement need not be sharp, but must not be wrong
	e.least = cost
	e.most = (s.limit-st.prior)/s.weights.Channel + rounding
	e.rest = t.read.toEnd.rest(t.read, i, last)
	e.toHalf, e.half = &nothing, never
	if half := t.read.half; t.halved && int(st.i) < half && i <= half {
		e.toHalf, e.half = t.read.toHalf.rest(t.read, i, last), e.most/2
	}
}

// leaveLong steps on to letters of several bytes, if the words that have them
// there are frequent enough to matter.
func (s *Searcher) leaveLong(st *state, t *tree, b *lexicon.Branches, i int, out *exits) {
	node, skip, ok := b.Child(i)
	floor := min(out.drop.least+t.read.toEnd.at[st.i].floor, out.emit.least)
	if !ok || out.swap == channel.Edge && s.weights.Channel*floor+s.priorCost(&path{node: node, base: st.base + skip, tree: st.tree, letter: st.letter}) > s.limit {
		return
	}
	from := len(s.scratch)
	s.scratch = s.appendLong(s.scratch, st.path, b, i)
	for k := from; k < len(s.scratch); k++ {
		next := s.scratch[k] // a copy: the scratch may move
		s.leaveTo(st, t, &next, out)
	}
	s.scratch = s.scratch[:from]
}

// leaveTo takes the steps on to a child.
func (s *Searcher) leaveTo(st *state, t *tree, next *path, out *exits) {
	o, c, to := t.read.order, st.letter, next.letter.Sym
	stop := st.cost + o.Stop(c.Sym, to)
	if out.drop.leadsTo(to) {
		if cost := stop + o.Drop(st.before, c.Sym, to); out.drop.allows(to, cost) {
			s.reach(st, next, st.i, cost)
		}
	}
	if out.emit.leadsTo(to) {
		if cost := stop + o.Emit(t.read.observed[st.i], st.before, c, to); out.emit.allows(to, cost) {
			s.reach(st, next, st.i+1, cost)
		}
	}
	if out.swap != channel.Edge && next.letter == t.read.observed[st.i] {
		s.after(st, *next, st.i+2, st.cost+o.Swap(c.Sym, to), false)
	}
}

// after continues behind a path whose last letter is explained, or, if the word
// must end there, at its end alone.
func (s *Searcher) after(st *state, p path, i int32, cost float32, ends bool) {
	t := &s.trees[p.tree]
	var e exit
	s.findExit(&e, st, t, p.letter.Sym, int(i), cost)
	from := len(s.scratch)
	s.scratch = s.appendChildren(s.scratch, p, func(next channel.Symbol) bool {
		return e.leadsTo(next) && (next == channel.Edge || !ends)
	})
	for k := from; k < len(s.scratch); k++ {
		next := &s.scratch[k]
		s.reach(st, next, i, cost+t.read.order.Stop(p.letter.Sym, next.letter.Sym))
	}
	s.scratch = s.scratch[:from]
}

// rewrite applies every rule that begins with the path's last letter.
func (s *Searcher) rewrite(st *state, t *tree) {
	rules := t.read.rulesAt(int(st.i))
	for k := range rules {
		r := &rules[k]
		if r.Intended[0] != st.letter.Sym || r.Place&channel.AtStart != 0 && st.before != channel.Edge {
			continue
		}
		to := int(st.i) + int(r.NObserved)
		var e exit
		s.findExit(&e, st, t, r.Intended[r.NIntended-1], to, st.cost+r.Cost)
		if e.leadsSomewhere() {
			s.follow(st, r, 1, st.path)
		}
	}
}

// follow walks the intended letters of a rule from the n-th on.
func (s *Searcher) follow(st *state, r *channel.Rule, n int, p path) {
	if n == int(r.NIntended) {
		s.after(st, p, st.i+int32(r.NObserved), st.cost+r.Cost, r.Place&channel.AtEnd != 0)
		return
	}
	from := len(s.scratch)
	s.scratch = s.appendChildren(s.scratch, p, func(next channel.Symbol) bool { return next == r.Intended[n] })
	for k := from; k < len(s.scratch); k++ {
		s.follow(st, r, n+1, s.scratch[k])
	}
	s.scratch = s.scratch[:from]
}
