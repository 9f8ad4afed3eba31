package train

import (
	"bufio"
	"encoding/binary"
	"errors"
	"fmt"
	"io"
	"os"
)

// counted is a key with its number of occurrences.
type counted struct {
	key
	n uint32
}

// recordSize is the length of a spilled record: hi, lo, n.
const recordSize = 20

// stream yields counted keys in ascending order; ok is false after the last.
type stream interface {
	next() (c counted, ok bool, err error)
}

// sliceStream counts equal neighbours of sorted keys.
type sliceStream struct{ keys []key }

func (s *sliceStream) next() (counted, bool, error) {
	if len(s.keys) == 0 {
		return counted{}, false, nil
	}
	n := 1
	for n < len(s.keys) && s.keys[n] == s.keys[0] {
		n++
	}
	c := counted{s.keys[0], uint32(n)}
	s.keys = s.keys[n:]
	return c, true, nil
}

// run is a stream spilled to a file.
type run struct {
	file   *os.File
	reader *bufio.Reader
}

// spill writes a stream to a new file in dir.
func spill(s stream, dir string) (r *run, err error) {
	file, err := os.CreateTemp(dir, "run-")
	if err != nil {
		return nil, err
	}
	defer func() {
		if err != nil {
			err = fmt.Errorf("train: counts could not be spilled: %w", errors.Join(err, file.Close(), os.Remove(file.Name())))
		}
	}()
	w := bufio.NewWriterSize(file, 1<<20)
	var record [recordSize]byte
	for {
		c, ok, err := s.next()
		if err != nil {
			return nil, err
		}
		if !ok {
			break
		}
		binary.LittleEndian.PutUint64(record[0:], c.hi)
		binary.LittleEndian.PutUint64(record[8:], c.lo)
		binary.LittleEndian.PutUint32(record[16:], c.n)
		if _, err := w.Write(record[:]); err != nil {
			return nil, err
		}
	}
	if err := w.Flush(); err != nil {
		return nil, err
	}
	if _, err := file.Seek(0, io.SeekStart); err != nil {
		return nil, err
	}
	return &run{file, bufio.NewReaderSize(file, 1<<20)}, nil
}

func (r *run) next() (counted, bool, error) {
	var record [recordSize]byte
	if _, err := io.ReadFull(r.reader, record[:]); err != nil {
		if err == io.EOF {
			return counted{}, false, nil
		}
		return counted{}, false, fmt.Errorf("train: spilled counts: %w", err)
	}
	return counted{
		key{binary.LittleEndian.Uint64(record[0:]), binary.LittleEndian.Uint64(record[8:])},
		binary.LittleEndian.Uint32(record[16:]),
	}, true, nil
}

// remove closes the run and deletes its file.
func (r *run) remove() error {
	return errors.Join(r.file.Close(), os.Remove(r.file.Name()))
}

// merged sums equal keys over sorted streams.
type merged struct {
	sources []stream
	heads   []counted // a binary heap by key, sources alongside
}

func merge(sources []stream) (*merged, error) {
	m := &merged{}
	for _, s := range sources {
		c, ok, err := s.next()
		if err != nil {
			return nil, err
		}
		if ok {
			m.heads = append(m.heads, c)
			m.sources = append(m.sources, s)
		}
	}
	for i := len(m.heads)/2 - 1; i >= 0; i-- {
		m.sift(i)
	}
	return m, nil
}

func (m *merged) next() (counted, bool, error) {
	if len(m.heads) == 0 {
		return counted{}, false, nil
	}
	c := m.heads[0]
	c.n = 0
	for len(m.heads) > 0 && m.heads[0].key == c.key {
		c.n = addCounts(c.n, m.heads[0].n)
		if err := m.step(); err != nil {
			return c, false, err
		}
	}
	return c, true, nil
}

// step replaces the least head by its stream's next.
func (m *merged) step() error {
	c, ok, err := m.sources[0].next()
	if err != nil {
		return err
	}
	if ok {
		m.heads[0] = c
	} else {
		end := len(m.heads) - 1
		m.heads[0], m.sources[0] = m.heads[end], m.sources[end]
		m.heads, m.sources = m.heads[:end], m.sources[:end]
	}
	m.sift(0)
	return nil
}

func (m *merged) sift(i int) {
	for {
		least := i
		for c := 2*i + 1; c <= 2*i+2 && c < len(m.heads); c++ {
			if m.heads[c].less(m.heads[least].key) {
				least = c
			}
		}
		if least == i {
			return
		}
		m.heads[i], m.heads[least] = m.heads[least], m.heads[i]
		m.sources[i], m.sources[least] = m.sources[least], m.sources[i]
		i = least
	}
}

// addCounts adds and stays at the largest count instead of wrapping.
func addCounts(a, b uint32) uint32 {
	if sum := a + b; sum >= a {
		return sum
	}
	return ^uint32(0)
}
