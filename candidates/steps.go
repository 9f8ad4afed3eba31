package candidates

import "example.org/foulcase/channel"

// The steps below are written in reading order: "before" is the neighbour
// already read, "next" the one to come. Backwards, the neighbour before is the
// one to the right.

// insert takes the next observed letter for one added before the path's last.
func (s *Searcher) insert(st state, p *path) {
	read := s.trees[p.tree].read
	l, r := p.before, p.letter.Sym
	if read.back {
		l, r = r, l
	}
	s.push(st, st.path, st.i+1, st.cost+s.channel.Insert(read.observed[st.i].Sym, l, r))
}

// leave takes every step that explains the last letter of a path.
func (s *Searcher) leave(st state) {
	first, end := s.children(st.path)
	p := s.paths[st.path]
	read := s.trees[p.tree].read
	observed := read.observed[st.i:]
	if len(observed) > 0 {
		s.insert(st, &p)
	}
	for d := first; d < end; d++ {
		next := s.paths[d].letter
		cost := st.cost + s.stop(read, p.letter.Sym, next.Sym)
		l, r := p.before, next.Sym
		if read.back {
			l, r = r, l
		}
		s.push(st, d, st.i, cost+s.channel.Drop(l, p.letter.Sym, r))
		if len(observed) > 0 {
			s.push(st, d, st.i+1, cost+s.channel.Emit(observed[0], l, p.letter, r))
		}
		if len(observed) > 1 && next == observed[0] && p.letter == observed[1] && p.letter.Sym != next.Sym {
			s.swap(st, d, p.letter.Sym, next.Sym, read.back)
		}
	}
	s.rewrite(st, &p, read)
}

// stop is the cost of adding nothing at the end of the word, due where the
// search forwards gets there.
func (s *Searcher) stop(read *reading, last, next channel.Symbol) float32 {
	if next == channel.Edge && !read.back {
		return s.channel.Stop(last)
	}
	return 0
}

// swap explains the last two letters of a path by each other.
func (s *Searcher) swap(st state, at int32, c, next channel.Symbol, back bool) {
	if back {
		c, next = next, c
	}
	s.after(st, at, st.i+2, st.cost+s.channel.Swap(c, next), false)
}

// after continues behind a path whose last letter is explained, or, if the word
// must end there, at its end alone.
func (s *Searcher) after(st state, at, i int32, cost float32, ends bool) {
	first, end := s.children(at)
	last := s.paths[at]
	read := s.trees[last.tree].read
	for d := first; d < end; d++ {
		next := s.paths[d].letter.Sym
		if next == channel.Edge || !ends {
			s.push(st, d, i, cost+s.stop(read, last.letter.Sym, next))
		}
	}
}

// rewrite applies every rule that begins with the path's last letter.
func (s *Searcher) rewrite(st state, p *path, read *reading) {
	rules := read.rulesAt(int(st.i))
	for k := range rules {
		r := &rules[k]
		if r.Intended[0] == p.letter.Sym && (r.Place&channel.AtStart == 0 || p.before == channel.Edge) {
			s.follow(st, r, 1, st.path)
		}
	}
}

// follow walks the intended letters of a rule from the n-th on.
func (s *Searcher) follow(st state, r *channel.Rule, n int, at int32) {
	if n == int(r.NIntended) {
		s.after(st, at, st.i+int32(r.NObserved), st.cost+r.Cost, r.Place&channel.AtEnd != 0)
		return
	}
	for d, end := s.children(at); d < end; d++ {
		if s.paths[d].letter.Sym == r.Intended[n] {
			s.follow(st, r, n+1, d)
		}
	}
}
