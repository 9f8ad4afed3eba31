package tree

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"io"
	"slices"
	"strconv"
	"strings"
)

// lineRange is a run of lines, 1-based, of the new side of a diff. When there are
// none it is the place of lines that were taken away: after the line first.
type lineRange struct{ first, lines int }

// maxDiffHeader bounds the lines of a diff that are not of a document's text.
const maxDiffHeader = 64 << 10

// readDiff reads a unified diff without context, as git writes it with the prefixes
// "a/" and "b/", and returns the changed lines of each file in order, under its new
// name. A file that was taken away is not in it. Lines of text may have any length.
func readDiff(r io.Reader) (map[string][]lineRange, error) {
	changed := map[string][]lineRange{}
	in := bufio.NewReaderSize(r, maxDiffHeader)
	file, body := "", 0 // body: how many lines of text are still to come
	for n := 1; ; n++ {
		line, err := readHeader(in)
		if err == io.EOF && len(line) == 0 {
			if body > 0 {
				return nil, fmt.Errorf("diff:%d: cut off, %d lines of a hunk are missing", n, body)
			}
			return changed, nil
		}
		if err != nil && err != io.EOF {
			return nil, fmt.Errorf("diff:%d: %w", n, err)
		}
		switch text := string(line); {
		case strings.HasPrefix(text, `\`): // "\ No newline at end of file"
		case body > 0:
			body--
		case strings.HasPrefix(text, "diff --git "):
			file = ""
		case strings.HasPrefix(text, "+++ "):
			if file, err = diffPath(text[len("+++ "):]); err != nil {
				return nil, fmt.Errorf("diff:%d: %w", n, err)
			}
		case strings.HasPrefix(text, "@@ "):
			var hunk lineRange
			if hunk, body, err = hunkHeader(text); err != nil {
				return nil, fmt.Errorf("diff:%d: %w", n, err)
			}
			if file != "" {
				changed[file] = append(changed[file], hunk)
			}
		}
	}
}

// readHeader reads a line without its end; of one too long for a header it returns
// the beginning, which is enough to tell what it is. The bytes are valid until the
// next call.
func readHeader(in *bufio.Reader) ([]byte, error) {
	line, err := in.ReadSlice('\n')
	if errors.Is(err, bufio.ErrBufferFull) {
		line = slices.Clone(line[:len(`\ `)])
		for errors.Is(err, bufio.ErrBufferFull) {
			_, err = in.ReadSlice('\n')
		}
	}
	return bytes.TrimSuffix(line, []byte("\n")), err
}

// diffPath reads the path of a "+++" line: quoted as C does when it holds odd
// bytes, followed by a tab when it holds spaces, "/dev/null" for no file at all.
func diffPath(s string) (string, error) {
	s = strings.TrimSuffix(s, "\t")
	if s == "/dev/null" {
		return "", nil
	}
	if strings.HasPrefix(s, `"`) {
		var err error
		if s, err = unquotePath(s); err != nil {
			return "", err
		}
	}
	path, ok := strings.CutPrefix(s, "b/")
	if !ok || path == "" {
		return "", fmt.Errorf("the path %q does not begin with b/", s)
	}
	return path, nil
}

// escapes are the letters that git writes after a backslash in a quoted path.
var escapes = map[byte]byte{
	'a': '\a', 'b': '\b', 'f': '\f', 'n': '\n', 'r': '\r', 't': '\t', 'v': '\v', '"': '"', '\\': '\\',
}

// unquotePath reads a path between quotation marks with backslash escapes and
// octal bytes.
func unquotePath(s string) (string, error) {
	if len(s) < 2 || s[len(s)-1] != '"' {
		return "", fmt.Errorf("the path %s has no closing quotation mark", s)
	}
	s = s[1 : len(s)-1]
	var path []byte
	for i := 0; i < len(s); i++ {
		if s[i] != '\\' {
			path = append(path, s[i])
			continue
		}
		i++
		switch {
		case i < len(s) && escapes[s[i]] != 0:
			path = append(path, escapes[s[i]])
		case i+3 <= len(s):
			c, err := strconv.ParseUint(s[i:i+3], 8, 8)
			if err != nil {
				return "", fmt.Errorf("the path %q has an escape that is none", s)
			}
			path = append(path, byte(c))
			i += 2
		default:
			return "", fmt.Errorf("the path %q has an escape that is none", s)
		}
	}
	return string(path), nil
}

// hunkHeader reads "@@ -OLD,N +NEW,N @@" and returns the new lines, and how many
// lines of text the hunk has.
func hunkHeader(s string) (hunk lineRange, body int, err error) {
	bad := fmt.Errorf("the hunk %q is not of a unified diff", s)
	parts := strings.SplitN(s, " ", 5)
	if len(parts) < 4 || !strings.HasPrefix(parts[1], "-") || !strings.HasPrefix(parts[2], "+") || parts[3] != "@@" {
		return hunk, 0, bad
	}
	before, okBefore := parseRange(parts[1][1:])
	hunk, ok := parseRange(parts[2][1:])
	if !ok || !okBefore {
		return hunk, 0, bad
	}
	return hunk, before.lines + hunk.lines, nil
}

// parseRange reads "FIRST" or "FIRST,LINES".
func parseRange(s string) (lineRange, bool) {
	first, lines, many := strings.Cut(s, ",")
	if !many {
		lines = "1"
	}
	a, errA := strconv.ParseUint(first, 10, 31)
	n, errN := strconv.ParseUint(lines, 10, 31)
	return lineRange{int(a), int(n)}, errA == nil && errN == nil
}
