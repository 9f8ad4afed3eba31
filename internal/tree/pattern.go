package tree

import "strings"

// pattern matches slash-separated paths as gitignore(5) has it: "*" and "?" stand
// for anything but a slash, "**" as a whole part of the path for any folders, and
// "[a-c]" for one byte of a set. It works on bytes, as git does, and in time linear
// in the path for any pattern.
type pattern struct {
	tokens  []token
	literal string // the whole pattern, when it has no wildcard
	plain   bool   // literal is set
	never   bool   // an unfinished set or escape matches nothing
}

// token is one step of a pattern.
type token struct {
	kind tokenKind
	b    byte
	set  *[256]bool
}

type tokenKind uint8

const (
	one  tokenKind = iota // the byte b
	any1                  // a byte that is no slash
	in                    // a byte of set, never a slash
	star                  // bytes that are no slash, as many as there are
	deep                  // any bytes
	none                  // no byte; the two tokens that follow, deep and a slash, may be missing
)

// compilePattern reads a pattern.
func compilePattern(s string) pattern {
	if !strings.ContainsAny(s, `*?[\`) {
		return pattern{literal: s, plain: true}
	}
	var p pattern
	for i := 0; i < len(s); {
		switch c := s[i]; c {
		case '\\':
			if i+1 == len(s) {
				return pattern{never: true}
			}
			p.tokens = append(p.tokens, token{kind: one, b: s[i+1]})
			i += 2
		case '?':
			p.tokens = append(p.tokens, token{kind: any1})
			i++
		case '[':
			set, n := compileSet(s[i:])
			if n == 0 {
				return pattern{never: true}
			}
			p.tokens = append(p.tokens, token{kind: in, set: set})
			i += n
		case '*':
			n := len(s[i:]) - len(strings.TrimLeft(s[i:], "*"))
			p.tokens = append(p.tokens, compileStars(s, i, n)...)
			i += n
		default:
			p.tokens = append(p.tokens, token{kind: one, b: c})
			i++
		}
	}
	return p
}

// compileStars reads the n stars at s[i]. Two or more that fill a part of the path
// stand for any folders, all others for what is no slash.
func compileStars(s string, i, n int) []token {
	after := s[i+n:]
	begins := i == 0 || s[i-1] == '/'
	slash := strings.HasPrefix(after, "/") || strings.HasPrefix(after, `\/`)
	switch {
	case n < 2 || !begins || after != "" && !slash:
		return []token{{kind: star}}
	case slash:
		return []token{{kind: none}, {kind: deep}}
	}
	return []token{{kind: deep}}
}

// classes are the POSIX character classes, in ASCII.
var classes = map[string]func(c byte) bool{
	"alnum":  func(c byte) bool { return isAlpha(c) || isDigit(c) },
	"alpha":  isAlpha,
	"blank":  func(c byte) bool { return c == ' ' || c == '\t' },
	"cntrl":  func(c byte) bool { return c < ' ' || c == 0x7f },
	"digit":  isDigit,
	"graph":  func(c byte) bool { return c > ' ' && c < 0x7f },
	"lower":  func(c byte) bool { return c >= 'a' && c <= 'z' },
	"print":  func(c byte) bool { return c >= ' ' && c < 0x7f },
	"punct":  func(c byte) bool { return c > ' ' && c < 0x7f && !isAlpha(c) && !isDigit(c) },
	"space":  func(c byte) bool { return c == ' ' || c >= '\t' && c <= '\r' },
	"upper":  func(c byte) bool { return c >= 'A' && c <= 'Z' },
	"xdigit": func(c byte) bool { return isDigit(c) || c|0x20 >= 'a' && c|0x20 <= 'f' },
}

func isAlpha(c byte) bool { return c|0x20 >= 'a' && c|0x20 <= 'z' }
func isDigit(c byte) bool { return c >= '0' && c <= '9' }

// compileSet reads the bracket expression that s begins with and returns how many
// bytes it takes, 0 when it is unfinished.
func compileSet(s string) (*[256]bool, int) {
	set := new([256]bool)
	i := 1
	negated := i < len(s) && (s[i] == '!' || s[i] == '^')
	if negated {
		i++
	}
	for first := true; ; first = false {
		if i >= len(s) {
			return nil, 0
		}
		if s[i] == ']' && !first {
			break
		}
		n, ok := addToSet(set, s[i:])
		if !ok {
			return nil, 0
		}
		i += n
	}
	for c := range set {
		set[c] = set[c] != negated
	}
	set['/'] = false
	return set, i + 1
}

// addToSet adds the class, range or byte that s begins with and returns its length.
func addToSet(set *[256]bool, s string) (n int, ok bool) {
	if strings.HasPrefix(s, "[:") {
		name, _, closed := strings.Cut(s[2:], "]")
		if !closed {
			return 0, false
		}
		if name, isClass := strings.CutSuffix(name, ":"); isClass {
			has := classes[name]
			for c := range set {
				set[c] = set[c] || has != nil && has(byte(c))
			}
			return len("[:") + len(name) + len(":]"), has != nil
		}
	}
	low, n, ok := setByte(s)
	if !ok {
		return 0, false
	}
	set[low] = true // whatever it is the beginning of, as git has it
	high := low
	if rest := s[n:]; len(rest) >= 2 && rest[0] == '-' && rest[1] != ']' {
		var m int
		if high, m, ok = setByte(rest[1:]); !ok {
			return 0, false
		}
		n += 1 + m
	}
	for c := int(low); c <= int(high); c++ {
		set[c] = true
	}
	return n, true
}

// setByte reads one byte inside brackets, escaped or not.
func setByte(s string) (b byte, n int, ok bool) {
	switch {
	case s[0] != '\\':
		return s[0], 1, true
	case len(s) > 1:
		return s[1], 2, true
	}
	return 0, 0, false
}

// match tells whether the pattern stands for the whole of path. It follows all the
// ways through the pattern at once.
func (p pattern) match(path string) bool {
	if p.plain || p.never {
		return p.plain && path == p.literal
	}
	now, next := make([]bool, len(p.tokens)+1), make([]bool, len(p.tokens)+1)
	p.reach(now, 0)
	for i := range len(path) {
		clear(next)
		for at, t := range p.tokens {
			if now[at] && t.takes(path[i]) {
				if t.kind == star || t.kind == deep {
					p.reach(next, at)
				} else {
					p.reach(next, at+1)
				}
			}
		}
		now, next = next, now
	}
	return now[len(p.tokens)]
}

// reach enters the state before token at, and those that follow without a byte.
func (p pattern) reach(states []bool, at int) {
	for !states[at] {
		states[at] = true
		if at == len(p.tokens) {
			return
		}
		switch p.tokens[at].kind {
		case none:
			p.reach(states, at+3)
		case one, any1, in:
			return
		}
		at++
	}
}

// takes tells whether the token may stand for the byte.
func (t token) takes(c byte) bool {
	switch t.kind {
	case one:
		return c == t.b
	case in:
		return t.set[c]
	case deep:
		return true
	case none:
		return false
	}
	return c != '/'
}
