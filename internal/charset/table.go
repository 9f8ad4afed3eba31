package charset

import (
	"errors"
	"unicode/utf8"

	"golang.org/x/text/encoding"
	"golang.org/x/text/transform"
)

// table is an encoding that golang.org/x/text has tables of.
type table struct{ encoding encoding.Encoding }

// longest is the most bytes of a character in these encodings (GB 18030 has four).
const longest = 4

// reader reads a character by showing the decoder one byte more until it is
// content.
func (t table) reader() func(dst, source []byte) ([]byte, int) {
	decoder := t.encoding.NewDecoder()
	var out [2 * utf8.UTFMax]byte // Big5 has pairs of characters in one code
	return func(dst, source []byte) ([]byte, int) {
		for n := 1; n <= min(longest, len(source)); n++ {
			decoder.Reset()
			wrote, read, err := decoder.Transform(out[:], source[:n], n == len(source))
			if errors.Is(err, transform.ErrShortSrc) {
				continue
			}
			if read > 0 {
				return append(dst, out[:wrote]...), read
			}
			break
		}
		return utf8.AppendRune(dst, utf8.RuneError), 1
	}
}

func (t table) encode(dst []byte, r rune) ([]byte, bool) {
	if r == utf8.RuneError {
		return dst, false // it stands for bytes that are no text
	}
	out, err := t.encoding.NewEncoder().Bytes([]byte(string(r)))
	return append(dst, out...), err == nil
}
