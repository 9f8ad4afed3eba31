package lexicon

// Node is a state of the automaton as reached on some path: a small comparable
// value. The words below it, sorted, have the ids base .. base+Count-1, where
// base is the sum of the Skips along the path from the root.
type Node struct {
	pos, count uint32
}

// Root is where every walk starts; its base is 0.
func (l *Lexicon) Root() Node { return Node{0, l.forms} }

// Final reports whether the path to n spells a form; its id is the path's base.
func (l *Lexicon) Final(n Node) bool { return l.states.final(n.pos) }

// Count is the number of forms that start with the path to n, itself included.
func (l *Lexicon) Count(n Node) uint32 { return n.count }

// Edges iterates over the edges of a node in label order, without allocation:
//
//	for e := l.Edges(n); e.Next(); {
//		walk(e.Target, base+e.Skip)
//	}
//
// No walk loops, whatever the section's bytes are; a walk over a section built
// by this package is at most MaxForm edges deep.
type Edges struct {
	Label  byte   // of the current edge
	Target Node   // where it leads
	Skip   uint32 // forms of the node that sort before those of the edge

	states automaton
	nd     node
	i      uint32
	after  uint32 // Skip of the next edge
	count  uint32 // of the node
}

// Edges gives an iterator that stands before the first edge of n.
func (l *Lexicon) Edges(n Node) Edges {
	nd := l.states.at(n.pos)
	return Edges{states: l.states, nd: nd, after: min(uint32(nd.own), n.count), count: n.count}
}

// Next moves to the next edge; it is false behind the last.
func (e *Edges) Next() bool {
	for e.i < e.nd.n {
		i := e.i
		e.i++
		e.Skip, e.after = e.after, e.count
		if e.i < e.nd.n {
			e.after = min(max(e.states.skip(&e.nd, e.i), e.Skip), e.count)
		}
		if target, ok := e.states.target(&e.nd, i); ok {
			e.Label = e.states[e.nd.labels+i]
			e.Target = Node{target, e.after - e.Skip}
			return true
		}
	}
	return false
}

// Step follows the one edge of n with the label.
func (l *Lexicon) Step(n Node, label byte) (target Node, skip uint32, ok bool) {
	nd := l.states.at(n.pos)
	i, ok := l.states.edge(&nd, label)
	if !ok {
		return Node{}, 0, false
	}
	skip = min(l.states.skip(&nd, i), n.count)
	after := n.count
	if i+1 < nd.n {
		after = min(max(l.states.skip(&nd, i+1), skip), n.count)
	}
	pos, ok := l.states.target(&nd, i)
	return Node{pos, after - skip}, skip, ok
}
