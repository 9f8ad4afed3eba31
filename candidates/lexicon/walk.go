package lexicon

// Node is a state of the automaton as reached on some path: a small comparable
// value. The words below it, sorted, have the ids base .. base+Count-1, where
// base is the sum of the Skips along the path from the root.
type Node struct {
	pos, count uint32
}

// Place identifies the state itself: paths that end in the same have one right
// language.
func (n Node) Place() uint32 { return n.pos }

// Words is Lexicon.Count of the node.
func (n Node) Words() uint32 { return n.count }

// Root is where every walk starts; its base is 0.
func (l *Lexicon) Root() Node { return Node{0, l.forms} }

// Final reports whether the path to n spells a form; its id is the path's base.
func (l *Lexicon) Final(n Node) bool { return l.states.final(n.pos) }

// Count is the number of forms that start with the path to n, itself included.
func (l *Lexicon) Count(n Node) uint32 { return n.count }

// Branches is a node taken apart: the labels of its edges, ascending, in place,
// and, when asked for, where each edge leads. Its bytes must not be changed.
type Branches struct {
	Labels []byte

	states automaton
	nd     node
	count  uint32 // of the node
}

// Branches takes a node apart.
func (l *Lexicon) Branches(n Node) Branches {
	nd := l.states.at(n.pos)
	return Branches{Labels: l.states[nd.labels:][:nd.n], states: l.states, nd: nd, count: n.count}
}

// Child follows the edge of Labels[i]; skip is the number of forms of the node
// that sort before those of the edge. It is false for an edge that breaks the
// rules of the automaton.
func (b *Branches) Child(i int) (target Node, skip uint32, ok bool) {
	skip = min(b.states.skip(&b.nd, uint32(i)), b.count)
	after := b.count
	if i+1 < len(b.Labels) {
		after = min(max(b.states.skip(&b.nd, uint32(i)+1), skip), b.count)
	}
	pos, ok := b.states.target(&b.nd, uint32(i))
	return Node{pos, after - skip}, skip, ok
}

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

	all Branches
	i   int
}

// Edges gives an iterator that stands before the first edge of n.
func (l *Lexicon) Edges(n Node) Edges { return Edges{all: l.Branches(n)} }

// Next moves to the next edge; it is false behind the last.
func (e *Edges) Next() bool {
	for e.i < len(e.all.Labels) {
		e.i++
		target, skip, ok := e.all.Child(e.i - 1)
		if ok {
			e.Label, e.Target, e.Skip = e.all.Labels[e.i-1], target, skip
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
	b := Branches{Labels: l.states[nd.labels:][:nd.n], states: l.states, nd: nd, count: n.count}
	return b.Child(int(i))
}
