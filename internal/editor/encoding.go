package editor

import (
	"slices"
	"unicode/utf8"
)

// encoding is the unit in which the client counts the columns of a line. Text is
// UTF-8 throughout.
type encoding string

// The encodings of the protocol, the one preferred first.
const (
	utf8Units  encoding = "utf-8"
	utf32Units encoding = "utf-32" // code points
	utf16Units encoding = "utf-16" // what the protocol assumes
)

// chooseEncoding takes the best of what a client offers.
func chooseEncoding(offered []encoding) encoding {
	for _, e := range []encoding{utf8Units, utf32Units} {
		if slices.Contains(offered, e) {
			return e
		}
	}
	return utf16Units
}

// count is how many units b has.
func (e encoding) count(b []byte) int {
	if e == utf8Units {
		return len(b)
	}
	n := utf8.RuneCount(b)
	if e == utf16Units {
		n += astral(b)
	}
	return n
}

// astral counts the code points beyond U+FFFF, which UTF-16 writes with two units.
func astral(b []byte) int {
	n := 0
	for _, c := range b {
		if c >= 0xF0 {
			n++
		}
	}
	return n
}

// advance is how many bytes the first units of b take. It stops before a code point
// that only part of them reach, and at the end of b.
func (e encoding) advance(b []byte, units int) int {
	at := 0
	for at < len(b) {
		r, size := utf8.DecodeRune(b[at:])
		switch {
		case e == utf8Units:
			units -= size
		case e == utf16Units && r > 0xFFFF:
			units -= 2
		default:
			units--
		}
		if units < 0 {
			break
		}
		at += size
	}
	return at
}
