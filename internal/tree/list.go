package tree

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"io"
)

const (
	maxListed = 64 << 10 // bytes of one path in a list
	maxList   = 1 << 20  // paths in a list
)

// ReadList reads a list of paths, one a line, or ended by NUL bytes when null is
// set. Empty ones are passed over. Name is the list's in errors.
func ReadList(r io.Reader, null bool, name string) ([]string, error) {
	end := byte('\n')
	if null {
		end = 0
	}
	lines := bufio.NewScanner(r)
	lines.Buffer(nil, maxListed)
	lines.Split(func(data []byte, atEOF bool) (int, []byte, error) {
		if i := bytes.IndexByte(data, end); i >= 0 {
			return i + 1, data[:i], nil
		}
		if atEOF && len(data) > 0 {
			return len(data), data, nil
		}
		return 0, nil, nil
	})
	var paths []string
	for n := 1; lines.Scan(); n++ {
		path := lines.Bytes()
		if !null {
			path = bytes.TrimSuffix(path, []byte("\r"))
		}
		switch {
		case bytes.IndexByte(path, 0) >= 0:
			return nil, fmt.Errorf("%s:%d: a NUL byte; lists ended by NUL bytes are read with --null", name, n)
		case len(paths) == maxList:
			return nil, fmt.Errorf("%s:%d: more than %d paths; cut the list", name, n, maxList)
		case len(path) > 0:
			paths = append(paths, string(path))
		}
	}
	if err := lines.Err(); errors.Is(err, bufio.ErrTooLong) {
		return nil, fmt.Errorf("%s: path %d: more than %d bytes; is it a list of paths?", name, len(paths)+1, maxListed)
	} else if err != nil {
		return nil, fmt.Errorf("%s: path %d: %w; want a path a line", name, len(paths)+1, err)
	}
	return paths, nil
}
