package lm

// What bounds a query is waiting for memory, and a processor can wait for many
// places at once if none depends on another. The functions below therefore walk
// several queries down the model side by side, and touch what all of them are
// about to read before they read any of it.

// lanes is the number of queries that go side by side.
const lanes = 16

// lane is one of the queries that go side by side.
type lane struct {
	place
	search
	left    uint32 // key of the context to descend to
	open    bool   // may be followed further
	touched uint64 // what was read ahead; it makes the reading needed
}

// AdvanceAll scores words each of which could follow s: logp[i] and next[i]
// become what Advance gives for words[i]. It is for the alternatives to one word.
// logp and next must be as long as words, and next must not hold s. It allocates
// nothing.
func (m *Model) AdvanceAll(s *State, words []uint32, logp []float32, next []State) {
	var group [lanes]lane
	for len(words) > 0 {
		n := min(len(words), lanes)
		m.enterWords(group[:n], words, next)
		for k := range min(int(s.n), m.order-1) {
			for i := range group[:n] {
				group[i].left = s.keys[k]
			}
			m.descendAll(group[:n], next)
		}
		for i := range group[:n] {
			logp[i] = m.finish(&group[i], s, &next[i])
		}
		words, logp, next = words[n:], logp[n:], next[n:]
	}
}

// AdvanceEach scores a word after each of several states: logp[i] and next[i]
// become what Advance gives for words[i] after states[i]. It is for what follows
// alternatives. All slices must be of one length; next must not overlap states.
// It allocates nothing.
func (m *Model) AdvanceEach(states []State, words []uint32, logp []float32, next []State) {
	var group [lanes]lane
	for len(words) > 0 {
		n := min(len(words), lanes)
		m.enterWords(group[:n], words, next)
		for k := range m.order - 1 {
			for i := range group[:n] {
				group[i].turnTo(&states[i], k)
			}
			m.descendAll(group[:n], next)
		}
		for i := range group[:n] {
			logp[i] = m.finish(&group[i], &states[i], &next[i])
		}
		states, words, logp, next = states[n:], words[n:], logp[n:], next[n:]
	}
}

// AdvanceText scores words that follow one another: states[0] is the context of
// the first, and logp[i] and states[i+1] become what Advance gives for words[i]
// after states[i]. logp must be as long as words, states one longer. It allocates
// nothing.
//
// To extend an n-gram to the left one has to know the context of the same length,
// which ends one word before, but nothing of longer ones: so all words go up the
// orders together.
func (m *Model) AdvanceText(words []uint32, states []State, logp []float32) {
	var group [lanes]lane
	for len(words) > 0 {
		n := min(len(words), lanes)
		m.enterWords(group[:n], words, states[1:n+1])
		for k := range m.order - 1 {
			for i := range group[:n] {
				// states[i] has so far the contexts that this order needs.
				group[i].turnTo(&states[i], k)
			}
			m.descendAll(group[:n], states[1:n+1])
		}
		for i := range group[:n] {
			logp[i] = m.finish(&group[i], &states[i], &states[i+1])
		}
		words, states, logp = words[n:], states[n:], logp[n:]
	}
}

// turnTo gives an n-gram of order k+1 the context to the left of which it may be
// extended, if s has one.
func (g *lane) turnTo(s *State, k int) {
	g.left = s.keys[k]
	g.open = g.open && int(s.n) > k
}

// enterWords starts the lanes at the unigrams of words and writes these to the
// states.
func (m *Model) enterWords(group []lane, words []uint32, states []State) {
	l := &m.levels[0]
	for i := range group {
		g := &group[i]
		g.open = words[i] < l.count
		g.place = place{key: words[i]}
		if g.open {
			g.touched = l.touchEntry(uint64(g.key) / blockLen)
		}
	}
	for i := range group {
		if g := &group[i]; g.open {
			g.touched = l.touchBlock(uint64(g.key) / blockLen)
		}
	}
	for i := range group {
		states[i] = State{}
		if g := &group[i]; g.open {
			m.word(&g.place, g.key)
			g.enter(&states[i])
		}
	}
}

// descendAll takes every open lane to the next order, if the model has the
// n-gram, and writes it to the lane's state.
func (m *Model) descendAll(group []lane, states []State) {
	for i := range group {
		g := &group[i]
		if !g.open {
			continue
		}
		g.lo, g.hi = m.children(&g.place)
		if g.open = g.lo < g.hi; g.open {
			g.touched = m.levels[g.level+1].touchEntry(g.lo / blockLen)
		}
	}
	for i := range group {
		if g := &group[i]; g.open {
			g.touched = m.levels[g.level+1].touchBlock(g.lo / blockLen)
		}
	}
	for i := range group {
		if g := &group[i]; g.open {
			below := &m.levels[g.level+1]
			g.begin(below, g.lo, g.hi, uint64(g.left))
			if g.turned {
				g.touched = below.touchBlock(g.search.number)
			}
		}
	}
	for i := range group {
		g := &group[i]
		if !g.open {
			continue
		}
		below := &m.levels[g.level+1]
		g.turn(below)
		var at uint64
		if at, g.open = g.find(below); g.open {
			g.move(below, &g.search, at)
			g.enter(&states[i])
		}
	}
}

// finish adds up what a lane found, in the context s.
func (m *Model) finish(g *lane, s, next *State) float32 {
	if g.in == nil {
		return -maxNats
	}
	clear(next.keys[next.n:])
	return s.backOff(g.logProb(), g.level+1, m.order)
}

// touchEntry reads ahead the directory's entry for a block.
func (l *level) touchEntry(b uint64) uint64 { return l.offset(b) }

// touchBlock reads ahead of a block, which takes up some 200 bytes, the lines of
// memory that tell whether it has a key.
func (l *level) touchBlock(b uint64) uint64 {
	const line = 64
	at := l.offset(b)
	return load(l.data, at) + load(l.data, at+line)
}
