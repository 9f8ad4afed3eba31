package text

import "bytes"

// enclosed returns the length of what begins text between back quotes (`code`,
// “code“, at most 120 bytes of one line), angle brackets (<tag a="b">, <your
// name>), or braces ({0}, {{ name }}, ${name}), 0 when there is none.
func enclosed(text []byte) int {
	switch text[0] {
	case '`':
		n := 1
		for n < len(text) && n < 3 && text[n] == '`' {
			n++
		}
		return closedBy(text, n, 120, string(text[:n]), "\n\r")
	case '<':
		if len(text) < 3 || classes[text[1]]&cLetter == 0 && text[1] != '/' && text[1] != '!' {
			return 0
		}
		n := closedBy(text, 1, 256, ">", "<\n\r")
		if n > 60 && bytes.IndexByte(text[:n], '=') < 0 {
			return 0
		}
		return n
	case '{':
		if len(text) > 1 && text[1] == '{' {
			return closedBy(text, 2, 80, "}}", "{\n\r")
		}
		return closedBy(text, 1, 80, "}", "{ \t\n\r")
	case '$':
		if len(text) > 1 && text[1] == '{' {
			return closedBy(text, 2, 80, "}", "{\n\r")
		}
	}
	return 0
}

// closedBy returns the end of the first closing mark in text[from:most], 0 when
// there is none before one of the bytes of stop, or nothing before it.
func closedBy(text []byte, from, most int, closing, stop string) int {
	text = text[:min(len(text), most)]
	i := bytes.Index(text[min(from, len(text)):], []byte(closing))
	if i <= 0 || bytes.ContainsAny(text[from:from+i], stop) {
		return 0
	}
	return from + i + len(closing)
}

// url returns the length of the URL that begins a run, 0 when there is none:
// "scheme://", "www." or "mailto:" and all up to a quotation mark, an angle
// bracket or the punctuation that ends the run.
func url(run []byte) int {
	scheme := 0
	for scheme < len(run) && (alnumByte(run[scheme]) || scheme > 0 && bytes.IndexByte([]byte("+-."), run[scheme]) >= 0) {
		scheme++
	}
	rest := run[scheme:]
	switch {
	case scheme > 1 && len(rest) > 3 && bytes.HasPrefix(rest, []byte("://")):
	case len(run) > 6 && bytes.EqualFold(run[:4], []byte("www.")):
	case len(rest) > 1 && bytes.EqualFold(run[:scheme], []byte("mailto")) && rest[0] == ':':
	default:
		return 0
	}
	end := len(run)
	if i := bytes.IndexAny(run, "<>\"\u201C\u201D\u2019\u2014"); i >= 0 {
		end = i
	}
	for end > 0 {
		switch c := run[end-1]; {
		case bytes.IndexByte([]byte(".,;:!?'*"), c) >= 0,
			c == ')' && bytes.Count(run[:end], []byte("(")) < bytes.Count(run[:end], []byte(")")),
			c == ']' && bytes.IndexByte(run[:end], '[') < 0:
			end--
			continue
		}
		break
	}
	return end
}

// sigil: @name #name $NAME %s, and \command.
func sigil(core []byte) bool {
	if len(core) < 2 {
		return false
	}
	switch core[0] {
	case '@', '#', '$', '%', '\\':
		return alnumByte(core[1]) || core[1] == '_' || core[1] == '{'
	}
	return false
}

// flag: "--" and a letter, or "-" and one or two letters. A longer word after
// one hyphen is a suffix ("-ing").
func flag(core []byte) bool {
	body := bytes.TrimLeft(core, "-")
	switch hyphens := len(core) - len(body); {
	case len(body) == 0 || classes[body[0]]&cLetter == 0:
		return false
	case hyphens == 1:
		return len(body) <= 2 || bytes.IndexByte(body, '=') > 0
	default:
		return hyphens == 2
	}
}

// languageName: letters and ++ or #.
func languageName(core []byte) bool {
	stem := bytes.TrimRight(core, "+#")
	return len(stem) > 0 && len(stem) < len(core) && len(stem) < 5 && all(stem, cLetter)
}

// codeInside: one of @ = + < > { } | ^ ~ % # $ \ or "::" with something before
// and after it; * between letters or digits; a backslash anywhere.
func codeInside(core []byte) bool {
	if bytes.IndexByte(core, '\\') >= 0 && len(core) > 1 {
		return true
	}
	for i := 1; i+1 < len(core); i++ {
		switch core[i] {
		case '@', '=', '+', '<', '>', '{', '}', '|', '^', '~', '%', '#', '$', '*':
			if (alnumByte(core[i-1]) || core[i-1] == '-' && i > 1) && core[i+1] != '*' {
				return true
			}
		case ':':
			if core[i+1] == ':' {
				return true
			}
		}
	}
	return false
}

// call: a name with () after it.
func call(core []byte) bool {
	i := bytes.Index(core, []byte("()"))
	return i > 0 && alnumByte(core[i-1])
}

// path: begins like one, ends with a slash, has two slashes together, or has a
// part that is no plain word. Words with slashes between (and/or, he/she) are
// words, but not pairs of one or two letters (I/O, n/a).
func path(core []byte) bool {
	slash := bytes.IndexByte(core, '/')
	if slash < 0 || len(core) == 1 {
		return false
	}
	if slash == 0 && (alnumByte(core[1]) || core[1] == '.' || core[1] == '_') || core[0] == '~' || core[0] == '.' || core[len(core)-1] == '/' ||
		bytes.Contains(core, []byte("//")) || slash == 2 && core[1] == ':' {
		return true
	}
	short := true
	for part := range bytes.SplitSeq(core, []byte("/")) {
		if !plainWord(part) {
			return true
		}
		short = short && len(part) < 3
	}
	return short
}

// plainWord reports letters, hyphens and apostrophes alone.
func plainWord(word []byte) bool { return all(word, cLetter|cHigh|cHyphen|cApos) }

// snake: an underscore between letters or digits, or two before them. One at
// the edge is emphasis.
func snake(core []byte) bool {
	for i := 1; i+1 < len(core); i++ {
		if core[i] == '_' && (alnumByte(core[i-1]) || core[i-1] == '_') && alnumByte(core[i+1]) {
			return true
		}
	}
	return false
}

// mixed: letters and digits, unless hyphens divide it into plain small or
// capitalised words and numbers (mid-1990s, year-2000).
func mixed(core []byte) bool {
	plain, letters, digits := true, false, false
	for part := range bytes.SplitSeq(core, []byte("-")) {
		var m class
		for _, c := range part {
			m |= classes[c]
		}
		letters = letters || m&(cLetter|cHigh) != 0
		digits = digits || m&cDigit != 0
		switch {
		case m&cDigit != 0:
			plain = plain && number(part) == len(part)
		default:
			plain = plain && len(part) > 1 && plainWord(part) && all(part[1:], cLower|cHigh|cApos)
		}
	}
	return letters && digits && !plain
}

func all(b []byte, m class) bool {
	for _, c := range b {
		if classes[c]&m == 0 {
			return false
		}
	}
	return len(b) > 0
}

// alnumByte reports ASCII letters and digits, and any byte above ASCII.
func alnumByte(c byte) bool { return classes[c]&(cAlnum|cHigh) != 0 }

func digitAt(b []byte, i int) bool { return i >= 0 && i < len(b) && classes[b[i]]&cDigit != 0 }
