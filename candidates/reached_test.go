package candidates

import (
	"math/rand/v2"
	"testing"
)

// TestReachedEqualsMap runs the table through several queries, of which the
// larger make it grow, beside a map.
func TestReachedEqualsMap(t *testing.T) {
	type noted struct{ cost, half float32 }
	random := rand.New(rand.NewPCG(5, 5))
	var table reached
	for _, size := range []int{10, 3 * leastSlots, 100, leastSlots, 9 * leastSlots} {
		table.reset()
		want := map[uint64]noted{}
		for range 2 * size {
			p := path{base: uint32(random.IntN(size)), tree: uint8(random.IntN(3))}
			k := key(&p, int32(random.IntN(2)))
			now := noted{float32(random.IntN(5)), float32(random.IntN(3))}
			old, known := want[k]
			better := !known || now.cost < old.cost || now.cost == old.cost && now.half < old.half
			if better {
				want[k] = now
			}
			if got := table.cheaper(k, now.cost, now.half); got != better {
				t.Fatalf("%v after %v (known: %v): cheaper %v, want %v", now, old, known, got, better)
			}
		}
		for k, n := range want {
			if s := table.find(k); s.key != k || s.cost != n.cost || s.half != n.half {
				t.Fatalf("size %d: %+v, want %+v of %d", size, *s, n, k)
			}
		}
	}
}
