package tree

import (
	"bytes"
	"io"
	"os"
)

// sniffed is how much of a file tells whether it is text.
const sniffed = 8 << 10

// looksBinary tells whether a file found below a folder is no text. A file of a
// format other than plain may be a package, which begins as ZIP files do
// (APPNOTE.TXT 4.3.7, from memory).
func looksBinary(path, format string) (bool, error) {
	f, err := os.Open(path)
	if err != nil {
		return false, err
	}
	defer f.Close()
	head := make([]byte, sniffed)
	n, err := io.ReadFull(f, head)
	if err != nil && err != io.EOF && err != io.ErrUnexpectedEOF {
		return false, err
	}
	head = head[:n]
	if format != "" && format != "plain" && bytes.HasPrefix(head, []byte("PK\x03\x04")) {
		return false, nil
	}
	return isBinary(head), nil
}

// isBinary tells whether bytes from the beginning of a file are no text: they hold
// a NUL, or more than one control character in ten bytes that no text needs, and
// no byte order mark of UTF-16.
func isBinary(head []byte) bool {
	if bytes.HasPrefix(head, []byte{0xff, 0xfe}) || bytes.HasPrefix(head, []byte{0xfe, 0xff}) {
		return false
	}
	controls := 0
	for _, c := range head {
		switch {
		case c == 0:
			return true
		case c < ' ' && !isTextControl(c):
			controls++
		}
	}
	return 10*controls > len(head)
}

// isTextControl tells the control characters that occur in texts: those of layout,
// backspace, escape (ISO 2022, terminal colours) and the end of a file of old.
func isTextControl(c byte) bool {
	return c >= '\b' && c <= '\r' || c == 0x1b || c == 0x1a
}
