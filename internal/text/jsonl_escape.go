package text

import (
	"fmt"
	"strconv"
	"strings"
	"unicode/utf16"
	"unicode/utf8"
)

// The escapes of RFC 8259 and what they stand for, \u left out.
const (
	jsonEscapes = `"\/bfnrt`
	jsonEscaped = "\"\\/\b\f\n\r\t"
	jsonUnitLen = len(`\u0000`)
)

// jsonEscapeLen returns the length of the escape at the start of b, 0 when it is
// none.
func jsonEscapeLen(b []byte) int {
	switch {
	case len(b) > 1 && strings.IndexByte(jsonEscapes, b[1]) >= 0:
		return 2
	case jsonUnit(b) >= 0:
		return jsonUnitLen
	}
	return 0
}

// jsonEscape reads the escape at the start of b, which is sound, and returns
// what it stands for and its length. Half a surrogate pair is U+FFFD.
func jsonEscape(b []byte) (text string, n int) {
	if i := strings.IndexByte(jsonEscapes, b[1]); i >= 0 {
		return jsonEscaped[i : i+1], 2
	}
	r := jsonUnit(b)
	if pair := utf16.DecodeRune(r, jsonUnit(b[jsonUnitLen:])); pair != utf8.RuneError {
		return string(pair), 2 * jsonUnitLen
	}
	return string(r), jsonUnitLen
}

// jsonUnit reads the \uXXXX at the start of b; -1 when there is none.
func jsonUnit(b []byte) rune {
	if len(b) < jsonUnitLen || b[0] != '\\' || b[1] != 'u' {
		return -1
	}
	unit, err := strconv.ParseUint(string(b[2:jsonUnitLen]), 16, 16)
	if err != nil {
		return -1
	}
	return rune(unit)
}

// jsonSpelled writes words with the escapes of a JSON string, in ASCII if so
// asked.
func jsonSpelled(words string, ascii bool) string {
	var b strings.Builder
	for _, r := range words {
		switch {
		case r == '"' || r == '\\':
			b.WriteByte('\\')
			b.WriteRune(r)
		case r < ' ', ascii && r >= utf8.RuneSelf && r <= 0xFFFF:
			fmt.Fprintf(&b, `\u%04x`, r)
		case ascii && r > 0xFFFF:
			high, low := utf16.EncodeRune(r)
			fmt.Fprintf(&b, `\u%04x\u%04x`, high, low)
		default:
			b.WriteRune(r)
		}
	}
	return b.String()
}
