package text

import (
	"bytes"
	"io"
)

const defaultMaxBytes = 16 << 20

// readWhole is the reader of a format whose documents are read as a whole: parse
// finds the blocks, in the order of the source, and readWhole their places and the names outside
// them. An error of parse comes after the blocks it found.
func readWhole(r io.Reader, o Options, yield func(*Block, error) bool, parse func(source []byte) ([]*Block, error)) {
	source, err := readAll(r, o)
	if err != nil {
		yield(nil, err)
		return
	}
	blocks, err := parse(source)
	names := namesOf(source, blocks)
	for _, b := range blocks {
		b.Names = names
	}
	if placeBlocks(source, blocks, yield) && err != nil {
		yield(nil, err)
	}
}

// readAll reads a document of at most the bytes that the options allow.
func readAll(r io.Reader, o Options) ([]byte, error) {
	most := o.MaxBytes
	if most == 0 {
		most = defaultMaxBytes
	}
	source, err := io.ReadAll(io.LimitReader(r, most+1))
	if err == nil && int64(len(source)) > most {
		err = TooLarge("the document has more than %d bytes, the most that its format is read with; split it or read it as plain text", most)
	}
	return source, err
}

// placeBlocks tells each block its line and column and yields it. It reports
// whether the receiver wants more.
func placeBlocks(source []byte, blocks []*Block, yield func(*Block, error) bool) bool {
	var lines LineMap
	at := bomLen(source)
	for _, b := range blocks {
		lines.Feed(source[at:b.offset])
		at = int(b.offset)
		b.origin = lines.Position()
		if !yield(b, nil) {
			return false
		}
	}
	return true
}

func bomLen(source []byte) int {
	if bytes.HasPrefix(source, byteOrderMark) {
		return len(byteOrderMark)
	}
	return 0
}
