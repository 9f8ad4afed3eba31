package lm

import (
	"encoding/binary"
	"fmt"
	"math"
	"math/bits"
)

// Codebooks holds the values that codes stand for, by order. The zero value
// stores every value as it is.
type Codebooks struct {
	ProbBits, BackoffBits uint        // 1..12, or 0 for exact values
	Prob                  [][]float32 // ascending, at most 2^ProbBits values
	Backoff               [][]float32 // ascending, at most 2^BackoffBits-1 values
}

// Encode writes a model as a section. The same tables and codebooks give the
// same bytes. The tables must hold the context of each n-gram (see Contexts).
func Encode(t Tables, books Codebooks) ([]byte, error) {
	if err := checkShape(t); err != nil {
		return nil, err
	}
	e := encoder{tables: t, books: books, probBits: books.ProbBits, backBits: books.BackoffBits}
	if e.probBits == 0 {
		e.probBits = exactBits
	}
	if e.backBits == 0 {
		e.backBits = exactBits
	}
	if !validWidth(e.probBits) || !validWidth(e.backBits) {
		return nil, fmt.Errorf("lm: codes of %d and %d bits", e.probBits, e.backBits)
	}
	contexts, err := contextSets(t)
	if err != nil {
		return nil, err
	}
	e.header()
	for k := range t {
		e.level(k, contexts[k])
	}
	return e.out, e.err
}

func checkShape(t Tables) error {
	if len(t) < 1 || len(t) > MaxOrder {
		return fmt.Errorf("lm: order %d, want 1 to %d", len(t), MaxOrder)
	}
	if n := t.Len(0); n == 0 || bits.Len(uint(n)) > maxWordBits {
		return fmt.Errorf("lm: vocabulary of %d words", n)
	}
	for k := range t {
		n := t.Len(k)
		if uint64(n) >= 1<<32-1 {
			return fmt.Errorf("lm: %d %d-grams are too many", n, k+1)
		}
		last := k == len(t)-1
		if len(t[k].LogProb) != n || !last && (len(t[k].Backoff) != n || len(t[k].First) != n+1 || int(t[k].First[n]) != t.Len(k+1)) {
			return fmt.Errorf("lm: arrays of the %d-grams differ in length", k+1)
		}
	}
	return nil
}

// contextSets marks, by order, the n-grams that are contexts of longer ones.
func contextSets(t Tables) ([][]bool, error) {
	sets := make([][]bool, len(t))
	var contexts []uint32
	for k := 1; k < len(t); k++ {
		var err error
		if contexts, err = t.Contexts(k, contexts); err != nil {
			return nil, err
		}
		sets[k-1] = make([]bool, t.Len(k-1))
		for _, c := range contexts {
			sets[k-1][c] = true
		}
	}
	return sets, nil
}

type encoder struct {
	tables             Tables
	books              Codebooks
	probBits, backBits uint
	out                []byte
	err                error
}

func (e *encoder) header() {
	e.out = append(e.out, magic...)
	e.out = append(e.out, version, byte(len(e.tables)), byte(e.probBits), byte(e.backBits))
	for k := range e.tables {
		e.out = binary.LittleEndian.AppendUint32(e.out, uint32(e.tables.Len(k)))
	}
	for k := range e.tables {
		if e.probBits != exactBits {
			e.codebook(e.books.Prob[k], e.probBits)
		}
		if k < len(e.tables)-1 && e.backBits != exactBits {
			e.codebook(backoffValues(e.books.Backoff[k]), e.backBits)
		}
	}
}

// backoffValues puts the mark of no context in front of a codebook that must
// not hold it itself.
func backoffValues(values []float32) []float32 {
	out := []float32{notContext}
	for _, v := range values {
		out = append(out, v+0) // minus zero becomes zero
	}
	return out
}

// codebook writes 2^width values, the last one repeated.
func (e *encoder) codebook(values []float32, width uint) {
	if len(values) == 0 || len(values) > 1<<width {
		e.err = fmt.Errorf("lm: %d values for codes of %d bits", len(values), width)
		return
	}
	for i := range 1 << width {
		v := values[min(i, len(values)-1)]
		e.out = binary.LittleEndian.AppendUint32(e.out, math.Float32bits(v))
	}
}

func (e *encoder) level(k int, isContext []bool) {
	t := &e.tables[k]
	last := k == len(e.tables)-1
	l := level{count: uint32(e.tables.Len(k))}
	next := uint32(0)
	if !last {
		next = uint32(e.tables.Len(k + 1))
	}
	l.layout(k+1, uint32(e.tables.Len(0)), next, e.probBits, e.backBits, last)
	data := make([]byte, l.bytes())
	for i := range l.count {
		at := uint64(i) * l.recordBits
		if k > 0 {
			put(data, at, uint64(t.Word[i]))
		}
		put(data, at+l.probAt, e.probCode(k, t.LogProb[i]))
		if !last {
			put(data, at+l.backAt, e.backCode(k, t.Backoff[i], isContext[i]))
			put(data, at+l.childAt, uint64(t.First[i]))
		}
	}
	if !last {
		put(data, uint64(l.count)*l.recordBits+l.childAt, uint64(next))
	}
	e.out = append(e.out, data...)
}

func (e *encoder) probCode(k int, p float32) uint64 {
	if !(p <= 0 && p >= -maxNats) {
		e.err = fmt.Errorf("lm: log probability %v of a %d-gram", p, k+1)
		return 0
	}
	if e.probBits == exactBits {
		return uint64(math.Float32bits(p))
	}
	return uint64(nearest(e.books.Prob[k], p))
}

func (e *encoder) backCode(k int, b float32, isContext bool) uint64 {
	switch {
	case !isContext && e.backBits == exactBits:
		return uint64(math.Float32bits(notContext))
	case !isContext:
		return 0
	case !(b <= maxNats && b >= -maxNats):
		e.err = fmt.Errorf("lm: back-off %v of a %d-gram", b, k+1)
		return 0
	case e.backBits == exactBits:
		return uint64(math.Float32bits(b + 0)) // minus zero becomes zero
	}
	return 1 + uint64(nearest(e.books.Backoff[k], b))
}

// nearest returns the index of the value closest to v in an ascending list.
func nearest(values []float32, v float32) int {
	lo, hi := 0, len(values)
	for lo < hi {
		mid := (lo + hi) / 2
		if values[mid] < v {
			lo = mid + 1
		} else {
			hi = mid
		}
	}
	if lo == len(values) || lo > 0 && v-values[lo-1] <= values[lo]-v {
		return max(lo-1, 0)
	}
	return lo
}

// put adds a field of up to 57 bits to zeroed bytes at bit position at.
func put(data []byte, at, value uint64) {
	b := data[at>>3:]
	binary.LittleEndian.PutUint64(b, binary.LittleEndian.Uint64(b)|value<<(at&7))
}

// Size returns the bytes of a section that holds the given numbers of n-grams,
// by order, with codes of the given widths.
func Size(counts []int, probBits, backoffBits uint) int64 {
	size := 8 + 4*uint64(len(counts))
	for k, n := range counts {
		l := level{count: uint32(n)}
		next, last := 0, k == len(counts)-1
		if probBits != exactBits {
			size += 4 << probBits
		}
		if !last {
			next = counts[k+1]
			if backoffBits != exactBits {
				size += 4 << backoffBits
			}
		}
		l.layout(k+1, uint32(counts[0]), uint32(next), probBits, backoffBits, last)
		size += l.bytes()
	}
	return int64(size)
}
