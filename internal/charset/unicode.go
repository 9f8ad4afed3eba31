package charset

import (
	"encoding/binary"
	"unicode/utf16"
	"unicode/utf8"
)

// The encodings of Unicode in units of two or four bytes.
var (
	utf16LE = &Encoding{"utf-16le", units{2, binary.LittleEndian}}
	utf16BE = &Encoding{"utf-16be", units{2, binary.BigEndian}}
	utf32LE = &Encoding{"utf-32le", units{4, binary.LittleEndian}}
	utf32BE = &Encoding{"utf-32be", units{4, binary.BigEndian}}
)

// byteOrder is what encoding/binary's two orders are.
type byteOrder interface {
	binary.ByteOrder
	binary.AppendByteOrder
}

// units is UTF-16 or UTF-32.
type units struct {
	size  int // bytes of a unit
	order byteOrder
}

func (u units) reader() func(dst, source []byte) ([]byte, int) {
	return func(dst, source []byte) ([]byte, int) {
		if len(source) < u.size { // half a unit at the end
			return utf8.AppendRune(dst, utf8.RuneError), len(source)
		}
		if u.size == 4 {
			return utf8.AppendRune(dst, scalar(u.order.Uint32(source))), 4
		}
		r := rune(u.order.Uint16(source))
		if utf16.IsSurrogate(r) && len(source) >= 4 {
			if pair := utf16.DecodeRune(r, rune(u.order.Uint16(source[2:]))); pair != utf8.RuneError {
				return utf8.AppendRune(dst, pair), 4
			}
		}
		return utf8.AppendRune(dst, r), 2 // a lone surrogate becomes U+FFFD
	}
}

// scalar is the character of a number, U+FFFD when it has none.
func scalar(n uint32) rune {
	if n > utf8.MaxRune {
		return utf8.RuneError
	}
	return rune(n)
}

func (u units) encode(dst []byte, r rune) ([]byte, bool) {
	if r == utf8.RuneError {
		return dst, false // it stands for bytes that are no text
	}
	if u.size == 4 {
		return u.order.AppendUint32(dst, uint32(r)), true
	}
	for _, unit := range utf16.AppendRune(nil, r) {
		dst = u.order.AppendUint16(dst, unit)
	}
	return dst, true
}
