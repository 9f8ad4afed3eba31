package candidates

// state is a place of the search: the observed letters before i, in reading
// order, are explained by the path without its last letter.
type state struct {
	path
	score float32 // floor under the score of every word reached from here
	cost  float32 // channel cost so far
	half  float32 // channel cost of the half read first
	prior float32 // the least weighted prior cost of any word below the path
	i     int32
	older int32 // the state below in the same bucket, 0 for none
}

// queue holds the states to come, in buckets by score: the search may take them
// in any order, it is only quicker when the least come first. Scores never fall
// along a path but for rounding, so the buckets are emptied from the left.
type queue struct {
	states []state
	free   int32          // latest state that was taken out, 0 for none
	top    [buckets]int32 // latest state of each bucket, 0 for none
	at     int            // no bucket before is in use
	most   int            // nor any behind
}

const (
	buckets     = 1024 // the last one takes all scores above
	bucketsANat = 8
)

func (q *queue) reset() {
	clear(q.top[:])
	q.states = append(q.states[:0], state{})
	q.free, q.at, q.most = 0, 0, 0
}

// push adds a state and returns it, to be filled in all but older.
func (q *queue) push(score float32) *state {
	b := min(max(int(score*bucketsANat), q.at), buckets-1)
	q.most = max(q.most, b)
	at := q.free
	if at != 0 {
		q.free = q.states[at].older
	} else {
		at = int32(len(q.states))
		q.states = append(q.states, state{})
	}
	s := &q.states[at]
	s.older = q.top[b]
	q.top[b] = at
	return s
}

// pop takes a state out of the lowest bucket in use; false when there is none
// left with a score of at most limit.
func (q *queue) pop(s *state, limit float32) bool {
	for ; q.at <= q.most && float32(q.at) <= limit*bucketsANat; q.at++ {
		if at := q.top[q.at]; at != 0 {
			taken := &q.states[at]
			*s = *taken
			q.top[q.at] = taken.older
			taken.older, q.free = q.free, at
			return true
		}
	}
	return false
}
