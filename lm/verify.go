package lm

import (
	"fmt"
	"math/bits"
)

// Verify reads the whole model and reports the first n-gram that cannot be
// right: values that are no numbers in range, child ranges that overlap or end
// early, keys out of order. It takes time linear in the model.
func (m *Model) Verify() error {
	for k := range m.order {
		if err := m.verifyLevel(k); err != nil {
			return err
		}
	}
	return nil
}

func (m *Model) verifyLevel(k int) error {
	l := &m.levels[k]
	at, key, child := uint64(0), uint64(0), uint64(0)
	for b := range l.blocks() {
		n := min(blockLen, uint64(l.count)-b*blockLen)
		var v block
		l.layOut(&v, b)
		problem := ""
		if l.offset(b) != at || k > 0 && l.keyBase(b) != key || !l.last && l.firstBase(b) != child {
			problem = "directory"
		}
		for i := range n {
			if k > 0 {
				if next := l.keyBase(b) + v.keys.value(l.data, i); next >= key {
					key = next + 1
				} else {
					problem = "key out of order"
				}
			}
			if !inRange(l.prob.value(l.data, v.probs+i*l.prob.width), 0) {
				problem = "log probability is not a number in range"
			}
			if l.last {
				continue
			}
			if back, _ := l.backoff(&v, i); !inRange(back, maxNats) {
				problem = "back-off is not a number in range"
			}
			if end := l.firstBase(b) + v.ends.value(l.data, i); end >= child {
				child = end
			} else {
				problem = "range of children"
			}
		}
		if problem != "" {
			return fmt.Errorf("%w: %d-grams of block %d: %s", ErrFormat, k+1, b, problem)
		}
		at = v.backs / 8
		if !l.last {
			at += bytesFor(uint64(bits.OnesCount64(v.context)) * l.back.width)
		}
	}
	if at+padding != l.size || !l.last && child != uint64(m.levels[k+1].count) {
		return fmt.Errorf("%w: %d-grams: children or bytes left over", ErrFormat, k+1)
	}
	return nil
}
