package modelfile

import (
	"encoding/binary"
	"fmt"
	"hash/crc32"
	"io"

	"example.org/foulcase/internal/wholefile"
)

// Writer collects sections and writes them as one model file. The same
// sections in the same order give the same bytes.
type Writer struct {
	sections []section
}

// NewWriter returns an empty Writer.
func NewWriter() *Writer { return &Writer{} }

// Set adds a section, or replaces the body of one already there. The Writer
// keeps body until the file is written. It fails on a name that is empty,
// longer than 12 bytes or one too many.
func (w *Writer) Set(name string, body []byte) error {
	if name == "" || len(name) > nameSize {
		return fmt.Errorf("section name %q: want 1 to %d bytes", name, nameSize)
	}
	for i := range w.sections {
		if w.sections[i].name == name {
			w.sections[i].body = body
			return nil
		}
	}
	if len(w.sections) == maxSections {
		return fmt.Errorf("section %q: a model holds at most %d sections", name, maxSections)
	}
	w.sections = append(w.sections, section{name, body})
	return nil
}

// WriteTo writes the whole file.
func (w *Writer) WriteTo(out io.Writer) (int64, error) {
	table := make([]byte, headerSize+len(w.sections)*entrySize)
	at := len(table)
	for i, s := range w.sections {
		e := table[headerSize+i*entrySize:]
		at = align(at)
		copy(e[:nameSize], s.name)
		binary.LittleEndian.PutUint32(e[12:], crc32.Checksum(s.body, castagnoli))
		binary.LittleEndian.PutUint64(e[16:], uint64(at))
		binary.LittleEndian.PutUint64(e[24:], uint64(len(s.body)))
		at += len(s.body)
	}
	copy(table, magic)
	binary.LittleEndian.PutUint32(table[8:], Version)
	binary.LittleEndian.PutUint32(table[12:], uint32(len(w.sections)))
	binary.LittleEndian.PutUint64(table[16:], uint64(at))
	binary.LittleEndian.PutUint32(table[24:], tableSum(table))

	c := countingWriter{w: out}
	if _, err := c.Write(table); err != nil {
		return c.n, err
	}
	for _, s := range w.sections {
		if _, err := c.Write(make([]byte, align(int(c.n))-int(c.n))); err != nil {
			return c.n, err
		}
		if _, err := c.Write(s.body); err != nil {
			return c.n, err
		}
	}
	return c.n, nil
}

type countingWriter struct {
	w io.Writer
	n int64
}

func (c *countingWriter) Write(p []byte) (int, error) {
	n, err := c.w.Write(p)
	c.n += int64(n)
	return n, err
}

// WriteFile writes the file to path, whole or not at all.
func (w *Writer) WriteFile(path string) error {
	return wholefile.Write(path, func(to io.Writer) error {
		_, err := w.WriteTo(to)
		return err
	})
}
