package report

import (
	"path/filepath"
	"strings"
)

// uriOf is a path as a URI reference (RFC 3986): relative ones stay relative,
// absolute ones get the scheme "file".
func uriOf(path string) (uri string, absolute bool) {
	absolute = filepath.IsAbs(path)
	slashed := filepath.ToSlash(filepath.Clean(path))
	const plain = "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789-._~/"
	const hex = "0123456789ABCDEF"
	var b strings.Builder
	if absolute {
		b.WriteString("file://")
		if !strings.HasPrefix(slashed, "/") { // a drive
			b.WriteByte('/')
		}
	}
	for i := range len(slashed) {
		c := slashed[i]
		if strings.IndexByte(plain, c) >= 0 {
			b.WriteByte(c)
			continue
		}
		b.WriteByte('%')
		b.WriteByte(hex[c>>4])
		b.WriteByte(hex[c&15])
	}
	return b.String(), absolute
}
