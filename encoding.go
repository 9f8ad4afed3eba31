package foulcase

import (
	"bufio"
	"bytes"
	"io"

	"example.org/foulcase/internal/charset"
	"example.org/foulcase/internal/text"
)

// maxDecoded is the most bytes of a document that is not UTF-8: it is held whole,
// in both encodings.
const maxDecoded = 64 << 20

// origin leads from the marks of a text to the document it was decoded from. The
// zero value is that of a text that was not.
type origin struct{ decoded *charset.Text }

// decode returns a document as UTF-8, with its origin. One that is UTF-8, or
// packed, is only looked at the start of, and streams.
func decode(r io.Reader, format text.Format, label string) (io.Reader, origin, error) {
	encoding, err := charset.Find(label)
	if err != nil || format.Packed() {
		return r, origin{}, err
	}
	buffered := bufio.NewReader(r)
	head, _ := buffered.Peek(charset.HeadSize) // an error comes again from Read
	if encoding = encoding.Detect(head); encoding.IsUTF8() {
		return buffered, origin{}, nil
	}
	source, err := io.ReadAll(io.LimitReader(buffered, maxDecoded+1))
	if err != nil {
		return nil, origin{}, err
	}
	if len(source) > maxDecoded {
		return nil, origin{}, text.TooLarge("the document is %s and has more than %d bytes, the most that are decoded; convert it to UTF-8 or split it", encoding.Name(), maxDecoded)
	}
	t := encoding.Decode(source)
	return bytes.NewReader(t.Bytes()), origin{t}, nil
}

// mark places a mark of the decoded text in the document. One whose corrections
// the document's encoding cannot all spell is ByHand.
func (o origin) mark(m Mark) Mark {
	if o.decoded == nil {
		return m
	}
	end := o.decoded.Offset(m.Offset + m.Length)
	m.Offset = o.decoded.Offset(m.Offset)
	m.Length = end - m.Offset
	for _, c := range m.Corrections {
		if _, err := o.decoded.Encode(c.Spelled()); err != nil {
			m.ByHand = true
		}
	}
	return m
}
