package tree

import (
	"bufio"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"
)

// Changes are the places of a working tree that differ from a revision.
type Changes struct {
	top   string
	files map[string][]lineRange // by real path; nil stands for the whole file
}

// Changed asks git what differs between the working tree of the folder dir and the
// commit at which what is checked out there parted from a revision. The whole tree is compared, since only so a file that moved is known
// again. A file that git does not know, or takes for binary, has changed entirely;
// one that it ignores has not changed.
func Changed(dir, base string) (*Changes, error) {
	r, err := findRepository(dir)
	if err != nil {
		return nil, err
	}
	if err := r.checkRevision(base); err != nil {
		return nil, err
	}
	if base, err = r.forkPoint(base); err != nil {
		return nil, err
	}
	hunks, err := r.hunks(base)
	if err != nil {
		return nil, err
	}
	binaries, err := r.binaries(base)
	if err != nil {
		return nil, err
	}
	untracked, err := r.untracked()
	if err != nil {
		return nil, err
	}
	c := &Changes{r.top, map[string][]lineRange{}}
	for name, lines := range hunks {
		c.files[c.real(name)] = lines
	}
	for _, name := range append(binaries, untracked...) {
		c.files[c.real(name)] = nil
	}
	return c, nil
}

// real is the path of a file that git names.
func (c *Changes) real(name string) string { return filepath.Join(c.top, filepath.FromSlash(name)) }

// Has tells whether the file at a path has changed. It is an error when the file
// lies outside of the working tree.
func (c *Changes) Has(path string) (bool, error) {
	real, err := realPath(path)
	if err != nil {
		return false, err
	}
	if !below(c.top, real) {
		return false, fmt.Errorf("%s: outside of the working tree %s, where --changed looks; run foulcase there", path, c.top)
	}
	_, ok := c.files[real]
	return ok, nil
}

// Spans returns the places of a file that have changed. The file is read to find
// where its lines begin.
func (c *Changes) Spans(path string) (*Spans, error) {
	real, err := realPath(path)
	if err != nil {
		return nil, err
	}
	lines, changed := c.files[real]
	switch {
	case !changed:
		return &Spans{}, nil
	case lines == nil:
		return &Spans{[]span{{0, math.MaxInt64}}}, nil
	}
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	return spansOf(f, lines)
}

// Spans are places of a document.
type Spans struct{ spans []span }

// span is a run of bytes from start up to end; an empty one is the place of bytes
// that were taken away.
type span struct{ start, end int64 }

// Touch tells whether a run of bytes shares some with a changed place, or reaches
// over the place of lines that were taken away.
func (s *Spans) Touch(offset, length int64) bool {
	for _, p := range s.spans {
		if offset < p.end && p.start < offset+length || p.start == p.end && offset < p.start && p.start < offset+length {
			return true
		}
	}
	return false
}

// spansOf turns runs of lines, in order, into bytes. Lines end with LF, as git has
// them.
func spansOf(r io.Reader, lines []lineRange) (*Spans, error) {
	in := bufio.NewReaderSize(r, 64<<10)
	line, offset := 1, int64(0) // the line that begins at offset
	skipTo := func(n int) error {
		for line < n {
			part, err := in.ReadSlice('\n')
			offset += int64(len(part))
			switch err {
			case nil:
				line++
			case io.EOF:
				return nil
			case bufio.ErrBufferFull:
			default:
				return err
			}
		}
		return nil
	}
	var s Spans
	for _, l := range lines {
		first := l.first
		if l.lines == 0 {
			first++
		}
		if err := skipTo(first); err != nil {
			return nil, err
		}
		start := offset
		if err := skipTo(first + l.lines); err != nil {
			return nil, err
		}
		s.spans = append(s.spans, span{start, offset})
	}
	return &s, nil
}
