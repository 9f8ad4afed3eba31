package lm

import (
	"encoding/binary"
	"fmt"
	"math"
)

// Codebooks holds the values that codes stand for, by order. The zero value
// stores every value as it is.
type Codebooks struct {
	ProbBits, BackoffBits uint        // 1..12, or 0 for exact values
	Prob                  [][]float32 // ascending, at most 2^ProbBits values
	Backoff               [][]float32 // ascending, at most 2^BackoffBits values
}

// Encode writes a model as a section. The same tables and codebooks give the
// same bytes. The tables must hold the context of each n-gram (see Contexts).
func Encode(t Tables, books Codebooks) ([]byte, error) {
	e := encoder{tables: t, books: books, probBits: uint64(books.ProbBits), backBits: uint64(books.BackoffBits)}
	if e.probBits == 0 {
		e.probBits = exactBits
	}
	if e.backBits == 0 {
		e.backBits = exactBits
	}
	if !validWidth(e.probBits) || !validWidth(e.backBits) {
		return nil, fmt.Errorf("lm: codes of %d and %d bits", e.probBits, e.backBits)
	}
	err := checkValues(t)
	if err != nil {
		return nil, err
	}
	if e.plan, err = newPlan(t, e.probBits, e.backBits); err != nil {
		return nil, err
	}
	e.header()
	for k := range t {
		e.level(k)
	}
	return e.out, e.err
}

// Size returns the bytes of the section that Encode makes of tables with codes
// of the given widths, 32 for exact values. Back-offs may be absent, to stand
// for those that estimating gives: none but contexts have one.
func Size(t Tables, probBits, backBits uint) (int64, error) {
	p, err := newPlan(t, uint64(probBits), uint64(backBits))
	if err != nil {
		return 0, err
	}
	size := uint64(8)
	for k := range p.shapes {
		size += shapeSize + p.shapes[k].bytes()
		if probBits != exactBits {
			size += 4 << probBits
		}
		if k < len(t)-1 && backBits != exactBits {
			size += 4 << backBits
		}
	}
	return int64(size), nil
}

type encoder struct {
	tables             Tables
	books              Codebooks
	plan               *plan
	probBits, backBits uint64
	out                []byte
	err                error
}

func (e *encoder) header() {
	e.out = append(e.out, magic...)
	e.out = append(e.out, version, byte(len(e.tables)), byte(e.probBits), byte(e.backBits))
	for k := range e.plan.shapes {
		e.out = e.plan.shapes[k].append(e.out)
	}
	for k := range e.tables {
		if e.probBits != exactBits {
			e.codebook(e.books.Prob, k, e.probBits)
		}
		if k < len(e.tables)-1 && e.backBits != exactBits {
			e.codebook(e.books.Backoff, k, e.backBits)
		}
	}
}

// codebook writes 2^width values, the last one repeated.
func (e *encoder) codebook(books [][]float32, k int, width uint64) {
	if k >= len(books) || len(books[k]) == 0 || len(books[k]) > 1<<width {
		e.err = fmt.Errorf("lm: no codebook of up to %d values for the %d-grams", 1<<width, k+1)
		return
	}
	for i := range 1 << width {
		v := books[k][min(i, len(books[k])-1)]
		e.out = binary.LittleEndian.AppendUint32(e.out, math.Float32bits(v))
	}
}

func (e *encoder) level(k int) {
	l := level{shape: e.plan.shapes[k]}
	start := len(e.out)
	e.out = append(e.out, make([]byte, l.bytes())...)
	l.over(e.out[start:])
	at, b := uint64(0), uint64(0)
	for c := range e.plan.blocks(k) {
		if e.err != nil {
			return
		}
		entry := l.directory[b*entrySize:]
		binary.LittleEndian.PutUint32(entry, uint32(at))
		binary.LittleEndian.PutUint32(entry[4:], uint32(c.firstBase))
		binary.LittleEndian.PutUint64(entry[8:], c.keyBase)
		at = e.block(l.data, at, k, c)
		b++
	}
}

// block writes one block at a byte offset and returns the offset behind it.
func (e *encoder) block(data []byte, at uint64, k int, c *content) uint64 {
	n := uint64(c.n)
	if len(c.ends) > 0 {
		binary.LittleEndian.PutUint64(data[at:], c.context)
		at += 8
	}
	headers := data[at:]
	at += headerBytes(k+1, k == len(e.tables)-1)
	for _, values := range [][]uint64{c.keys, c.ends} {
		if len(values) == 0 {
			continue
		}
		h := headerFor(n, values[n-1])
		h.put(headers)
		headers = headers[headerSize:]
		r := h.at(at)
		r.put(data, values)
		at += h.bytes(n)
	}
	t := &e.tables[k]
	for i := range c.n {
		code := e.code(t.LogProb[c.start+i], 0, e.books.Prob, k, e.probBits)
		storeBits(data, at*8+uint64(i)*e.probBits, code)
	}
	at += bytesFor(n * e.probBits)
	place := uint64(0)
	for i := range c.n {
		if c.context>>i&1 != 0 {
			code := e.code(t.Backoff[c.start+i], maxNats, e.books.Backoff, k, e.backBits)
			storeBits(data, at*8+place*e.backBits, code)
			place++
		}
	}
	return at + bytesFor(place*e.backBits)
}

// code returns what stands for a value of order k+1.
func (e *encoder) code(v, limit float32, books [][]float32, k int, width uint64) uint64 {
	if !inRange(v, limit) {
		e.err = fmt.Errorf("lm: value %v of a %d-gram", v, k+1)
		return 0
	}
	if width == exactBits {
		return uint64(math.Float32bits(v))
	}
	return uint64(nearest(books[k], v))
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
		return lo - 1
	}
	return lo
}
