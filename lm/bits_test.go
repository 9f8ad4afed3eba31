package lm

import (
	"math/rand/v2"
	"testing"
)

func TestSelectBit(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 3))
	words := []uint64{1, 1 << 63, 1<<63 | 1, ^uint64(0), 0x8080808080808080, 0x00ff00ff00ff00ff}
	for range 2000 {
		words = append(words, r.Uint64()&r.Uint64(), r.Uint64()|r.Uint64())
	}
	for _, x := range words {
		n := 0
		for at := range uint64(64) {
			if x>>at&1 == 0 {
				continue
			}
			if got := selectBit(x, n); got != at {
				t.Fatalf("bit number %d of %#x: at %d, want %d", n, x, got, at)
			}
			n++
		}
	}
}
