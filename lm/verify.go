package lm

import "fmt"

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
	contexts, end := uint32(0), uint64(0)
	for i := range l.shape.count {
		problem := ""
		if !inRange(l.logProb(i), 0) {
			problem = "log probability is not a number in range"
		}
		if k > 0 && i > 0 && l.keys.value(uint64(i)) <= l.keys.value(uint64(i)-1) {
			problem = "key out of order"
		}
		if !l.shape.last {
			back, isContext := l.backoff(i)
			if isContext {
				contexts++
			}
			lo, hi := l.first.pair(uint64(i))
			if !inRange(back, maxNats) {
				problem = "back-off is not a number in range"
			}
			if lo != end || hi < lo {
				problem = "range of children"
			}
			end = hi
		}
		if problem != "" {
			return fmt.Errorf("%w: %d-gram %d: %s", ErrFormat, k+1, i, problem)
		}
	}
	if !l.shape.last && (end != uint64(m.levels[k+1].shape.count) || contexts != l.shape.contexts) {
		return fmt.Errorf("%w: %d-grams: children or contexts left over", ErrFormat, k+1)
	}
	return nil
}
