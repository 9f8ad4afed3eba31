package channel

import (
	"encoding/binary"
	"errors"
	"fmt"
	"math"
	"slices"
)

// ErrSection is wrapped by every error of Open.
var ErrSection = errors.New("channel: not a channel section of this version")

// The section is: magic, number of rules (4 bytes, little-endian), prices (four
// float32), then the tables in the order of layout, then the rules.
const (
	magic       = "fcch0001"
	headerBytes = len(magic) + 4 + 4*4
)

// layout visits the tables in the order of the section with their sizes in bytes.
func (m *Model) layout(visit func(t *[]byte, size int)) {
	for _, t := range []struct {
		table *[]byte
		size  int
	}{
		{(*[]byte)(&m.keep), 2 * cube},
		{(*[]byte)(&m.drop), 2 * cube},
		{(*[]byte)(&m.swap), 2 * square},
		{(*[]byte)(&m.stop), 2 * symbols},
		{(*[]byte)(&m.floor), 2 * symbols},
		{(*[]byte)(&m.doubt), cube},
		{(*[]byte)(&m.subNext), cube},
		{(*[]byte)(&m.subLeft), cube},
		{(*[]byte)(&m.insert), cube},
	} {
		visit(t.table, t.size)
	}
}

// Open reads a section in place; the bytes must not change afterwards. Any
// bytes of the right shape give a model that never panics; whether they are
// the bytes that were written is for the checksum of the file to say.
func Open(section []byte) (*Model, error) {
	if len(section) < headerBytes || string(section[:len(magic)]) != magic {
		return nil, fmt.Errorf("%w: unknown beginning", ErrSection)
	}
	m := &Model{section: section}
	at := headerBytes
	size := at + int(uint64(binary.LittleEndian.Uint32(section[len(magic):])))*ruleBytes
	m.layout(func(_ *[]byte, n int) { size += n })
	if size != len(section) {
		return nil, fmt.Errorf("%w: %d bytes, expected %d", ErrSection, len(section), size)
	}
	if err := m.readPrices(section[len(magic)+4 : headerBytes]); err != nil {
		return nil, err
	}
	m.layout(func(t *[]byte, n int) {
		*t = section[at : at+n : at+n]
		at += n
	})
	m.rules = ruleTable(section[at:])
	return m, m.rules.check()
}

func (m *Model) readPrices(b []byte) error {
	for i, p := range []*float32{&m.prices.Accent, &m.prices.Foreign, &m.prices.RunOn, &m.prices.Split} {
		*p = math.Float32frombits(binary.LittleEndian.Uint32(b[4*i:]))
		if !(*p >= 0 && *p <= 64) {
			return fmt.Errorf("%w: price %d is %v", ErrSection, i, *p)
		}
	}
	return nil
}

// check makes sure that the rules are sorted and hold known letters only, with
// no gaps, so that they can index tables unchecked.
func (t ruleTable) check() error {
	for i := range t.len() {
		r := t.at(i)
		sound := r.NIntended > 0 && t.word(i)>>58 == 0 && (i == 0 || t.word(i-1) < t.word(i))
		sound = sound && soundSide(r.Intended[:r.NIntended]) && soundSide(r.Observed[:r.NObserved])
		if !sound {
			return fmt.Errorf("%w: rule %d of %d", ErrSection, i, t.len())
		}
	}
	return nil
}

func soundSide(side []Symbol) bool {
	for _, s := range side {
		if s == Edge || s >= symbols {
			return false
		}
	}
	return true
}

// steps16 rounds a cost to steps of 1/1024 nat.
func steps16(cost float64) uint16 {
	return uint16(math.Min(math.Round(cost/step16), math.MaxUint16))
}

// steps8 rounds a cost to steps of 1/16 nat.
func steps8(cost float64) uint8 {
	return uint8(math.Max(0, math.Min(math.Round(cost/step8), math.MaxUint8)))
}

// model writes a draft as a section and opens it.
func (d *draft) model() (*Model, error) {
	m, err := Open(d.encode())
	if err != nil {
		return nil, err
	}
	for x, cost := range m.cheapest() {
		binary.LittleEndian.PutUint16(m.floor[2*x:], steps16(float64(cost)))
	}
	return m, nil
}

// encode writes the section of a draft, with floors of zero.
func (d *draft) encode() []byte {
	b := append(make([]byte, 0, 1<<18), magic...)
	b = binary.LittleEndian.AppendUint32(b, uint32(len(d.rules)))
	for _, p := range []float32{d.prices.Accent, d.prices.Foreign, d.prices.RunOn, d.prices.Split} {
		b = binary.LittleEndian.AppendUint32(b, math.Float32bits(p))
	}
	stop := make([]float64, symbols)
	for l := range stop {
		stop[l] = d.stop[l*symbols+int(Edge)]
	}
	for _, t := range [][]float64{d.keep, d.drop, d.swap, stop} {
		for _, p := range t {
			b = binary.LittleEndian.AppendUint16(b, steps16(nats(p)))
		}
	}
	b = append(b, make([]byte, 2*symbols)...)
	for _, t := range [][]float64{d.doubt, d.subNext} {
		for _, p := range t {
			b = append(b, steps8(bias-math.Log(p)))
		}
	}
	for _, t := range [][]float64{d.subLeft, d.insert} {
		for _, p := range t {
			b = append(b, steps8(-math.Log(p)))
		}
	}
	words := make([]uint64, len(d.rules))
	for i, r := range d.rules {
		words[i] = packRule(r)
	}
	slices.Sort(words)
	for _, w := range words {
		b = binary.LittleEndian.AppendUint64(b, w)
	}
	return b
}
