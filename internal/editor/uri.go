package editor

import (
	"path"
	"path/filepath"
	"strings"
)

// pathOf returns the path of a file URI (RFC 8089) as this system writes it; ok is
// false for any other URI, and for a file of another host.
func pathOf(uri string) (name string, ok bool) {
	rest, ok := cutPrefixFold(uri, "file://")
	if !ok {
		return "", false
	}
	if i := strings.IndexAny(rest, "?#"); i >= 0 {
		rest = rest[:i]
	}
	host, rest, _ := strings.Cut(rest, "/")
	name, ok = unescape("/" + rest)
	if !ok || host != "" && !strings.EqualFold(host, "localhost") {
		return "", false
	}
	if isDrive(name[1:]) {
		name = strings.ToUpper(name[1:2]) + name[2:]
	}
	return filepath.FromSlash(name), true
}

// uriOf is the file URI of a path from the root.
func uriOf(name string) string {
	name = filepath.ToSlash(name)
	if !strings.HasPrefix(name, "/") {
		name = "/" + name
	}
	var b strings.Builder
	b.WriteString("file://")
	for i := range len(name) {
		if c := name[i]; isUnreserved(c) {
			b.WriteByte(c)
		} else {
			b.WriteString("%" + string(hexDigits[c>>4]) + string(hexDigits[c&15]))
		}
	}
	return b.String()
}

// nameOf is the last part of any URI: what a user calls the document, and whose
// ending tells of its format.
func nameOf(uri string) string {
	last := path.Base(uri)
	if _, opaque, ok := strings.Cut(uri, ":"); ok && !strings.Contains(uri, "/") {
		last = opaque
	}
	if name, ok := unescape(last); ok {
		last = name
	}
	return path.Base(filepath.ToSlash(last))
}

const hexDigits = "0123456789ABCDEF"

// isUnreserved tells which bytes stand for themselves in a path (RFC 3986).
func isUnreserved(c byte) bool {
	return 'a' <= c && c <= 'z' || 'A' <= c && c <= 'Z' || '0' <= c && c <= '9' || strings.IndexByte("-._~/", c) >= 0
}

func cutPrefixFold(s, prefix string) (string, bool) {
	if len(s) < len(prefix) || !strings.EqualFold(s[:len(prefix)], prefix) {
		return s, false
	}
	return s[len(prefix):], true
}

// isDrive tells a path that begins with a drive of Windows: "c:/".
func isDrive(s string) bool {
	return len(s) >= 2 && s[1] == ':' && (s[0]|0x20 >= 'a' && s[0]|0x20 <= 'z') && (len(s) == 2 || s[2] == '/')
}

// unescape decodes the %XX of a URI; a % that begins none, and %00, are not ok.
func unescape(s string) (string, bool) {
	var b strings.Builder
	for i := 0; i < len(s); i++ {
		if s[i] != '%' {
			b.WriteByte(s[i])
			continue
		}
		if i+2 >= len(s) {
			return "", false
		}
		hi, lo := strings.IndexByte(hexDigits, upper(s[i+1])), strings.IndexByte(hexDigits, upper(s[i+2]))
		if hi < 0 || lo < 0 || hi+lo == 0 {
			return "", false
		}
		b.WriteByte(byte(hi<<4 | lo))
		i += 2
	}
	return b.String(), true
}

func upper(c byte) byte {
	if 'a' <= c && c <= 'z' {
		return c - 'a' + 'A'
	}
	return c
}
