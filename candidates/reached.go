package candidates

// reached notes the least cost at which each path was reached at each place of
// the observed word, and of equals the one with the cheapest half, in an
// open-addressing table. (Were the halves left to chance, the searches from the
// two ends could each keep the alignment that is the other's to follow.)
type reached struct {
	slots []slot // a power of two of them
	spare []slot // room to grow into
	used  int
}

type slot struct {
	key        uint64 // 0 for none
	cost, half float32
}

// leastSlots is what each query begins with, however many the last one took: a
// small table is soon emptied, and stays near the processor.
const leastSlots = 1 << 11

// reset empties the table.
func (r *reached) reset() {
	r.used = 0
	r.slots = resize(r.slots, leastSlots)
	clear(r.slots)
}

// key tells apart what a path of a tree and a place are. Numbers of words have
// 24 bits, places 6 and trees 2, which are never 0.
func key(p *path, i int32) uint64 {
	return uint64(p.base)<<40 | uint64(p.node.Place())<<8 | uint64(i)<<2 | uint64(p.tree+1)
}

// find returns the slot of a key, or the empty one where it would go.
func (r *reached) find(key uint64) *slot {
	const golden = 0x9e3779b97f4a7c15
	mask := uint64(len(r.slots) - 1)
	for at := (key ^ key>>29) * golden >> 32; ; at++ {
		if s := &r.slots[at&mask]; s.key == key || s.key == 0 {
			return s
		}
	}
}

// stale reports whether a state has been overtaken.
func (r *reached) stale(st *state) bool {
	s := r.find(key(&st.path, st.i))
	return s.cost < st.cost || s.cost == st.cost && s.half < st.half
}

// cheaper notes what a key was reached at, unless it is no better than noted.
func (r *reached) cheaper(key uint64, cost, half float32) bool {
	s := r.find(key)
	if s.key == 0 {
		*s = slot{key, cost, half}
		if r.used++; 2*r.used > len(r.slots) {
			r.grow()
		}
		return true
	}
	if s.cost < cost || s.cost == cost && s.half <= half {
		return false
	}
	s.cost, s.half = cost, half
	return true
}

// grow doubles the table.
func (r *reached) grow() {
	old := r.slots
	r.slots = resize(r.spare, 2*len(old))
	r.spare = old
	clear(r.slots)
	for _, s := range old {
		if s.key != 0 {
			*r.find(s.key) = s
		}
	}
}
