package candidates

// state is a place in the search: the observed letters before i are explained
// by the path without its last letter.
type state struct {
	score float32 // floor under the score of every word reached from here
	cost  float32 // channel cost so far
	half  float32
	path  int32
	i     int32
}

// heap is a queue of states, least score first: four children a node, which
// keeps the children of a node in one cache line.
type heap []state

func (h *heap) push(s state) {
	*h = append(*h, s)
	q := *h
	at := len(q) - 1
	for at > 0 {
		parent := (at - 1) / 4
		if q[parent].score <= s.score {
			break
		}
		q[at] = q[parent]
		at = parent
	}
	q[at] = s
}

// pop takes the least state off a heap that is not empty.
func (h *heap) pop() state {
	q := *h
	top, last := q[0], q[len(q)-1]
	q = q[:len(q)-1]
	*h = q
	at := 0
	for {
		least, from := -1, 4*at+1
		for c := from; c < min(from+4, len(q)); c++ {
			if least < 0 || q[c].score < q[least].score {
				least = c
			}
		}
		if least < 0 || q[least].score >= last.score {
			break
		}
		q[at] = q[least]
		at = least
	}
	if len(q) > 0 {
		q[at] = last
	}
	return top
}
