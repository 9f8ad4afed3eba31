// Package charset reads documents that are not UTF-8 and knows the way back: from
// a place in the decoded text to the bytes it came from, and from a correction to
// the bytes that spell it.
//
// Only encodings without state are read: those in which a stretch of the source,
// cut between characters, means the same by itself.
package charset

import (
	"errors"
	"fmt"
	"unicode/utf8"

	"golang.org/x/text/encoding"
	"golang.org/x/text/encoding/htmlindex"
	"golang.org/x/text/encoding/japanese"
)

// Encoding is a way to write characters as bytes. It is safe for concurrent use.
type Encoding struct {
	name  string
	codec codec
}

// codec reads and writes one encoding.
type codec interface {
	// reader returns the function that reads the first character of a source that
	// is not empty: it appends it to dst, U+FFFD for bytes that are none, and
	// returns how many bytes it took, at least one.
	reader() func(dst, source []byte) ([]byte, int)
	// encode appends a character; false when the encoding has none.
	encode(dst []byte, r rune) ([]byte, bool)
}

// utf8Encoding is the encoding of the text inside the program: it is never decoded.
var utf8Encoding = &Encoding{name: "utf-8"}

// Find returns the encoding that a label of the WHATWG's Encoding Standard stands
// for ("latin1", "windows-1251", "shift_jis"), or utf-16le, utf-16be, utf-32le,
// utf-32be; "" is UTF-8. All others are errors that are ErrUnknown.
func Find(label string) (*Encoding, error) {
	switch label {
	case "":
		return utf8Encoding, nil
	case "utf-32le":
		return utf32LE, nil
	case "utf-32be":
		return utf32BE, nil
	}
	found, err := htmlindex.Get(label)
	if err != nil {
		return nil, unknown("no encoding %q: give a name such as utf-16le, windows-1252, iso-8859-2 or shift_jis", label)
	}
	name, err := htmlindex.Name(found)
	if err != nil {
		return nil, unknown("encoding %q: %w", label, err)
	}
	switch {
	case name == "utf-8":
		return utf8Encoding, nil
	case name == "utf-16le":
		return utf16LE, nil
	case name == "utf-16be":
		return utf16BE, nil
	case found == japanese.ISO2022JP || found == encoding.Replacement:
		return nil, unknown("encoding %s changes its meaning on the way, so no place in it can be corrected by itself; convert the document to UTF-8 first", label)
	}
	return &Encoding{name, table{found}}, nil
}

// marks are the byte order marks; of two that begin alike the longer comes first.
var marks = []struct {
	bytes    string
	encoding *Encoding
}{
	{"\xEF\xBB\xBF", utf8Encoding},
	{"\xFF\xFE\x00\x00", utf32LE},
	{"\x00\x00\xFE\xFF", utf32BE},
	{"\xFF\xFE", utf16LE},
	{"\xFE\xFF", utf16BE},
}

// HeadSize is how many bytes of a document Detect wants to see.
const HeadSize = 4

// Detect returns the encoding that a byte order mark at the start of a document
// tells, whatever else is said of it, or e where there is none.
func (e *Encoding) Detect(head []byte) *Encoding {
	for _, m := range marks {
		if len(head) >= len(m.bytes) && string(head[:len(m.bytes)]) == m.bytes {
			return m.encoding
		}
	}
	return e
}

// Name is the encoding's name in lower case.
func (e *Encoding) Name() string { return e.name }

// IsUTF8 tells that text of the encoding needs no decoding.
func (e *Encoding) IsUTF8() bool { return e.codec == nil }

// ErrUnknown says that there is no such encoding, or that it is none of those which are
// read.
var ErrUnknown = errors.New("no encoding that is read")

// unknownError is an ErrUnknown that says more.
type unknownError struct{ error }

func (e unknownError) Unwrap() []error { return []error{e.error, ErrUnknown} }

func unknown(format string, args ...any) error {
	return unknownError{fmt.Errorf(format, args...)}
}

// ErrNotEncodable is wrapped by errors of Encode.
var ErrNotEncodable = errors.New("not in this encoding")

// Encode returns s, UTF-8, in the encoding. A character that it lacks is an error
// that names it.
func (e *Encoding) Encode(s string) ([]byte, error) {
	if e.IsUTF8() {
		return []byte(s), nil
	}
	var out []byte
	for i, r := range s {
		size := 1
		if r != utf8.RuneError {
			size = utf8.RuneLen(r)
		}
		next, ok := e.codec.encode(out, r)
		if !ok {
			return nil, fmt.Errorf("%s has no %q (%U): %w", e.name, s[i:i+size], r, ErrNotEncodable)
		}
		out = next
	}
	return out, nil
}
