package lexicon

import (
	"math/bits"
	"slices"
)

// rangeMin answers "the smallest byte of data[lo:hi]": the best prior of a
// range of ids, because priors are stored as costs. Blocks of blockSize are
// summed up in a sparse table (Bender & Farach-Colton 2000): levels[k][i] is
// the least of the 2^k blocks from block i on. The ragged ends are scanned.
type rangeMin struct {
	data   []byte
	levels [][]byte
}

const blockSize = 16

func newRangeMin(data []byte) rangeMin {
	n := (len(data) + blockSize - 1) / blockSize
	level := make([]byte, 0, n)
	for block := range slices.Chunk(data, blockSize) {
		level = append(level, slices.Min(block))
	}
	r := rangeMin{data: data}
	for width := 1; len(level) > 0; width *= 2 {
		r.levels = append(r.levels, level)
		if len(level) <= width {
			break
		}
		next := make([]byte, len(level)-width)
		for i := range next {
			next[i] = min(level[i], level[i+width])
		}
		level = next
	}
	return r
}

// least gives the smallest byte of data[lo:hi], 255 for an empty range; the
// range is cut to the data.
func (r *rangeMin) least(lo, hi uint32) byte {
	from, to := int(lo), min(int(hi), len(r.data))
	first, last := (from+blockSize-1)/blockSize, to/blockSize // whole blocks
	if first >= last {
		return least(r.data[min(from, to):to], 255)
	}
	k := bits.Len(uint(last-first)) - 1
	m := min(r.levels[k][first], r.levels[k][last-1<<k])
	m = least(r.data[from:first*blockSize], m)
	return least(r.data[last*blockSize:to], m)
}

func least(data []byte, m byte) byte {
	for _, v := range data {
		m = min(m, v)
	}
	return m
}
