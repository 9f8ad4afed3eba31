package tree

import (
	"bytes"
	"strings"
)

const (
	// maxIgnoreFile bounds a file of ignore rules; what is beyond is not read.
	maxIgnoreFile = 1 << 20
	// maxPattern bounds one rule; a longer one is passed over, as no path is so long.
	maxPattern = 8 << 10
)

// rule is a line of an ignore file.
type rule struct {
	pattern pattern
	prefix  string // of an anchored pattern: what stands before its first wildcard
	negated bool   // "!": what matches is read after all
	folders bool   // "/" at the end: folders alone
	base    bool   // without a slash: it is held against the last part of the path
}

// parseIgnore reads the rules of an ignore file as gitignore(5) describes them.
func parseIgnore(data []byte) []rule {
	data = bytes.TrimPrefix(data, []byte("\xef\xbb\xbf"))
	var rules []rule
	for line := range bytes.Lines(data) {
		if r, ok := parseRule(string(line)); ok {
			rules = append(rules, r)
		}
	}
	return rules
}

func parseRule(line string) (r rule, ok bool) {
	line = strings.TrimSuffix(strings.TrimSuffix(line, "\n"), "\r")
	if strings.HasPrefix(line, "#") || len(line) > maxPattern {
		return r, false
	}
	line = trimSpaces(line)
	line, r.negated = strings.CutPrefix(line, "!")
	line, r.folders = strings.CutSuffix(line, "/")
	r.base = !strings.Contains(line, "/")
	if !r.base {
		line = strings.TrimPrefix(line, "/")
		// Git holds what stands before the first wildcard against the path by
		// itself, so that "**" counts as a whole part of the path right after it.
		fixed := strings.IndexAny(line, `*?[\`)
		if fixed < 0 {
			fixed = 0
		}
		r.prefix, line = line[:fixed], line[fixed:]
	}
	r.pattern = compilePattern(line)
	return r, line != "" || r.prefix != ""
}

// trimSpaces removes the spaces at the end of a rule, those after a backslash
// aside.
func trimSpaces(line string) string {
	end := 0
	for i := 0; i < len(line); i++ {
		switch line[i] {
		case ' ':
			continue
		case '\\':
			i++
		}
		end = i + 1
	}
	return line[:min(end, len(line))]
}

// matches holds a rule against a path relative to the folder of its file.
func (r *rule) matches(path string, folder bool) bool {
	if r.folders && !folder {
		return false
	}
	if r.base {
		return r.pattern.match(path[strings.LastIndexByte(path, '/')+1:])
	}
	rest, ok := strings.CutPrefix(path, r.prefix)
	return ok && r.pattern.match(rest)
}

// decide returns what a file's rules say of a path: the last that matches counts.
func decide(rules []rule, path string, folder bool) (ignored, decided bool) {
	for i := len(rules) - 1; i >= 0; i-- {
		if rules[i].matches(path, folder) {
			return !rules[i].negated, true
		}
	}
	return false, false
}
