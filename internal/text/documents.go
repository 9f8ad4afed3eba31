package text

import (
	"bufio"
	"bytes"
	"hash/fnv"
	"io"
	"iter"
)

// maxDocument bounds the memory of Documents, in bytes: a longer document is
// cut behind the first line that reaches the bound, the same on every run.
const maxDocument = 16 << 20

// Documents splits a training text, one paragraph a line with blank lines
// between documents, into its documents. A document keeps its line ends ("\n";
// a "\r" before it is dropped) and has no blank lines; the last one may lack
// the line end. The slice is valid until the next iteration. The sequence ends
// after the first error of r, which is yielded with a nil document.
func Documents(r io.Reader) iter.Seq2[[]byte, error] {
	return func(yield func([]byte, error) bool) {
		br := bufio.NewReaderSize(r, 1<<16)
		var doc []byte
		start := 0 // where the current line starts in doc
		for {
			part, err := br.ReadSlice('\n')
			doc = append(doc, part...)
			if err == bufio.ErrBufferFull && len(doc) < maxDocument {
				continue
			}
			if err != nil && err != io.EOF && err != bufio.ErrBufferFull {
				yield(nil, err)
				return
			}
			doc = trimCarriageReturn(doc, start)
			blank := len(bytes.TrimSpace(doc[start:])) == 0
			if blank {
				doc = doc[:start]
			}
			if len(doc) > 0 && (blank || err == io.EOF || len(doc) >= maxDocument) {
				if !yield(doc, nil) {
					return
				}
				doc = doc[:0]
			}
			if err == io.EOF {
				return
			}
			start = len(doc)
		}
	}
}

// trimCarriageReturn turns a "\r\n" at the end of doc[start:] into "\n".
func trimCarriageReturn(doc []byte, start int) []byte {
	if bytes.HasSuffix(doc[start:], []byte("\r\n")) {
		doc = append(doc[:len(doc)-2], '\n')
	}
	return doc
}

// HeldOut reports whether a document, as Documents yields it, is kept out of
// every count and estimate so that the models can be measured on it: one
// document in ten, chosen by its FNV-1a 64-bit hash.
func HeldOut(doc []byte) bool { return hash(doc)%10 == 0 }

// Unseen reports whether a document is held out and, besides, kept out of
// calibration: one held-out document in three.
func Unseen(doc []byte) bool { return hash(doc)%30 == 0 }

func hash(doc []byte) uint64 {
	h := fnv.New64a()
	h.Write(doc)
	return h.Sum64()
}
