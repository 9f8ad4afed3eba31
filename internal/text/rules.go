package text

import (
	"bytes"
	"unicode/utf8"
)

// This file says what is left alone. Nothing is looked up: the shape decides.
//
// A rule sees the core of a run of characters without white space: the run from
// its start, or from after a mark inside it, to the first bracket ("()" and what
// "<" and "{" open stay inside), dash, double quotation mark, ellipsis,
// semicolon or comma (one between digits stays inside), less the punctuation that
// ends it. The first rule of the table that matches
// makes one token of what it matched.
//
// Words that no rule took have a kind by their letters alone, see wordKind.

// rule is one line of the table.
type rule struct {
	name  string
	kind  Kind
	needs class // the core must hold one of these
	// match returns how many bytes of the core the rule takes, 0 for none.
	match func(core []byte) int
}

var rules = [...]rule{
	{"number, with sign, currency, unit, ordinal or decade", Number, cDigit | cHigh, number},
	{"version, address of a machine: three digit groups and more", Literal, cDigit, version},
	{"@handle, #tag, $VARIABLE, %verb", Literal, cCode, whole(sigil)},
	{"flag: -x --like-this", Literal, cHyphen, whole(flag)},
	{"C++, F#", Literal, cCode, whole(languageName)},
	{"mail address, assignment, operator or other code between letters", Literal, cCode | cPunct, whole(codeInside)},
	{"call()", Literal, cParen, whole(call)},
	{"path: /etc ~/x ./x C:\\x \\\\host x/ a1/b.c", Literal, cCode, whole(path)},
	{"snake_case, __name", Literal, cCode, whole(snake)},
	{"R&D", Acronym, cCode, whole(ampersand)},
	{"U.S., e.g., Ph.D.", Acronym, cPoint, dottedAcronym},
	{"host.name, file.ext, dotted.name", Literal, cPoint, whole(dotted)},
	{"letters with digits: part numbers, hashes, identifiers", Literal, cDigit, whole(mixed)},
}

// whole makes a match of a condition on the whole core.
func whole(holds func([]byte) bool) func([]byte) int {
	return func(core []byte) int {
		if holds(core) {
			return len(core)
		}
		return 0
	}
}

// leftAlone appends the token of what begins at p and is left alone, and returns
// its end; it returns p when no rule holds, and how many bytes it had to look at.
// Code between back quotes, markup tags and placeholders may hold white space,
// and so end beyond the run, which ends at q.
func (s *Segmenter) leftAlone(p, q int) (end, read int) {
	if !beginsCore(s.text[p:q]) {
		return p, 1
	}
	if n := enclosed(s.text[p:]); n > 0 {
		s.add(Literal, p, p+n)
		return p + n, n
	}
	if n := url(s.text[p:q]); n > 0 {
		s.add(Literal, p, p+n)
		return p + n, n
	}
	core, read := coreOf(s.text[p:q])
	var mask class
	for _, c := range core {
		mask |= classes[c]
	}
	for i := range rules {
		r := &rules[i]
		if mask&r.needs == 0 {
			continue
		}
		if n := r.match(core); n > 0 {
			return s.addRuled(r.kind, p, p+n, q), n
		}
	}
	return p, read
}

// addRuled appends the token of a rule. A dotted acronym takes the point after
// it, and all acronyms have a normal form.
func (s *Segmenter) addRuled(kind Kind, start, end, q int) int {
	var form []byte
	if kind == Acronym {
		form = s.fold(s.text[start:end])
		if end < q && s.text[end] == '.' && bytes.IndexByte(form, '.') >= 0 {
			end++
		}
	}
	s.add(kind, start, end)
	t := &s.tokens[len(s.tokens)-1]
	if t.Norm = form; form != nil {
		t.Case = CaseOf(s.text[start:end])
	}
	return end
}

// coreOf returns the part of a run that the rules see, and how many bytes it had
// to look at.
func coreOf(run []byte) (core []byte, read int) {
	end := 1
	for end < len(run) && !cutsCore(run, end) {
		end++
	}
	core = run[:end]
	tag, brace := bytes.IndexByte(core, '<') >= 0, bytes.IndexByte(core, '{') >= 0
	for len(core) > 1 {
		r, n := utf8.DecodeLastRune(core)
		if !trails(r) && (r != '>' || tag) && (r != '}' || brace) {
			break
		}
		core = core[:len(core)-n]
	}
	return core, end
}

// trails reports characters that a core does not end with; > and } are others
// unless they close what it opened.
func trails(r rune) bool {
	switch r {
	case '.', ',', ':', '\'', '*', '`', '|', '\u2019', '\u2018', '\u00BB':
		return true
	}
	return false
}

// beginsCore reports that a rule may hold from here: letters and digits, and the
// marks that rules begin with.
func beginsCore(run []byte) bool {
	switch c := run[0]; c {
	case '/', '\\', '~', '@', '#', '$', '%', '+', '-', '<', '>', '=', '{', '`', '_':
		return true
	case '.':
		return len(run) > 1 && run[1] != '.' || len(run) > 2 && run[2] == '/'
	case 0xE2:
		r, _ := utf8.DecodeRune(run)
		return !('\u2010' <= r && r <= '\u203A')
	default:
		return alnumByte(c)
	}
}

// cutsCore reports that the core ends before run[i].
func cutsCore(run []byte, i int) bool {
	switch run[i] {
	case '"', ';', '!', '?':
		return true
	case ',':
		return !(digitAt(run, i-1) && digitAt(run, i+1))
	case '[', ']':
		return true
	case '(':
		return !bytes.HasPrefix(run[i:], []byte("()"))
	case ')':
		return run[i-1] != '('
	case '-':
		return i > 1 && i+1 < len(run) && run[i+1] == '-' && run[0] != '-'
	case '.':
		return i+1 < len(run) && run[i+1] == '.' && i > 1
	case 0xE2:
		r, _ := utf8.DecodeRune(run[i:])
		return r == '\u2014' || r == '\u2015' || r == '\u201C' || r == '\u201D' || r == '\u2026' || r == '\uFFFC'
	}
	return false
}

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

// ampersand: capitals with & between.
func ampersand(core []byte) bool {
	return len(core) < 8 && bytes.IndexByte(core, '&') > 0 && alnumByte(core[len(core)-1]) &&
		all(bytes.ReplaceAll(core, []byte("&"), nil), cUpper)
}

// dottedAcronym: single letters with points between (a.m, U.S.A), or short
// capitalised parts of which one has one letter (Ph.D, M.Sc). A hyphen may follow
// (U.S.-led), or a possessive, which is taken.
func dottedAcronym(core []byte) int {
	end, single, other := 0, 0, 0
	for {
		n := 0
		for end+n < len(core) && classes[core[end+n]]&cLetter != 0 {
			n++
		}
		switch {
		case n == 0 && end > 0 && (end < len(core) && core[end] != '.'):
			end-- // the point is the acronym's last
			return acronymTail(core, end, single, other)
		case n == 1:
			single++
		case n > 1 && n < 4 && classes[core[end]]&cUpper != 0:
			other++
		default:
			return 0
		}
		if end += n; end == len(core) || core[end] != '.' {
			return acronymTail(core, end, single, other)
		}
		end++
	}
}

// acronymTail checks the parts of a dotted acronym and what follows it.
func acronymTail(core []byte, end, single, other int) int {
	if single+other < 2 || single == 0 || other > 1 {
		return 0
	}
	tail := bytes.TrimPrefix(core[end:], []byte("."))
	switch {
	case len(tail) == 0:
		return end
	case string(tail) == "'s" || string(tail) == "\u2019s":
		return len(core)
	case tail[0] == '-' || bytes.HasPrefix(tail, []byte("\u2013")):
		return len(core) - len(tail)
	}
	return 0
}

// dotted: a point with letters or digits around it. When what follows the one
// point is a capitalised function word after a small one ("end.The"), it is a
// full stop that lacks its space.
func dotted(core []byte) bool {
	if i := bytes.LastIndexByte(core, '-'); i > 0 && dottedAcronym(core[i+1:]) > 0 && plainWord(core[:i]) {
		return false // non-U.S.
	}
	inner := 0
	for i := range core {
		if core[i] != '.' || i+1 == len(core) || !alnumByte(core[i+1]) {
			continue
		}
		if i == 0 {
			return true // .hidden
		}
		inner++
		rest := core[i+1:]
		n := 0
		for n < len(rest) && classes[rest[n]]&cLetter != 0 {
			n++
		}
		if inner == 1 && classes[core[i-1]]&cUpper == 0 && opensSentence(rest[:n]) && !bytes.ContainsAny(rest, "._/") {
			return false
		}
	}
	return inner > 0
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

// wordKind gives a word of Latin letters its kind: a single letter other than a
// and I is left alone; a word of capitals is a number when roman, an acronym up
// to five letters and a word from six on or with an apostrophe inside (DON'T);
// acronyms may have an ending (PCs, NASA's); a capital inside makes an identifier
// or a brand (camelCase, iPhone), left alone, but for names (McDonald, O'Neill).
// A unit after a number (10 kg) is left alone too.
func (s *Segmenter) wordKind(word []byte, w shape, c Case) Kind {
	switch {
	case w.letters() == 1:
		if last := word[len(word)-1] | 0x20; w.inner || w.high || last == 'a' || last == 'i' || len(word) > 1 {
			return Word
		}
		return Literal
	case c == Lower:
		if len(word) < 6 && (roman(word) || s.afterNumber() && spacedUnit(word)) {
			return Literal
		}
	case c == Upper && roman(word):
		return Number
	case c == Upper && w.letters() < longCapitals && (!w.inner || bytes.HasSuffix(word, []byte("S"))):
		return Acronym
	case c == Mixed && acronymEnding(word):
		return Acronym
	case c == Mixed && !nameShape(word):
		return Literal
	}
	return Word
}

// longCapitals is the length in letters from which a word of capitals is a word.
const longCapitals = 6

// afterNumber reports that the last token is a number with a space after it.
func (s *Segmenter) afterNumber() bool {
	n := len(s.tokens)
	return n > 0 && s.tokens[n-1].Kind == Number && classes[s.text[s.last-1]]&cDigit != 0
}

// acronymEnding: capitals and a small s, with or without an apostrophe.
func acronymEnding(word []byte) bool {
	n := 0
	for n < len(word) && classes[word[n]]&cUpper != 0 {
		n++
	}
	switch string(word[n:]) {
	case "s", "'s", "\u2019s", "es":
		return n > 1
	}
	return false
}

// nameShape: Mc, Mac, De, Van and the like before a capital, or a capital after
// an apostrophe, and small letters otherwise.
func nameShape(word []byte) bool {
	rest := word
	for _, prefix := range [...]string{"Mac", "Mc", "Fitz", "De", "Di", "Du", "Da", "Del", "Des", "La", "Le", "Van", "Von", "St"} {
		if n := len(prefix); len(word) > n+2 && string(word[:n]) == prefix && classes[word[n]]&(cUpper|cHigh) != 0 {
			rest = word[n:]
			break
		}
	}
	start := true // of a part
	for i := 0; i < len(rest); {
		r, n := utf8.DecodeRune(rest[i:])
		if isUpper(r) && !start {
			return false
		}
		start = isApostrophe(r)
		i += n
	}
	return true
}

// clipped reports the folded letters of words written with a leading apostrophe,
// of clitics that stand apart in text cut into words, and of decades.
func clipped(norm []byte) bool {
	switch string(norm) {
	case "tis", "twas", "twere", "twill", "twould", "em", "cause", "til", "till", "bout", "round", "cos", "coz", "n",
		"neath", "gainst", "tween", "fraid", "nother", "nuff", "s", "ll", "re", "ve", "d", "m", "t":
		return true
	}
	return len(norm) >= 2 && len(norm) <= 3 && all(norm[:2], cDigit) && (len(norm) == 2 || norm[2] == 's')
}

// roman reports a roman numeral of two letters or more: of I, V and X alone, or
// in capitals of four letters and more, so that MIX, CD and mild are none.
func roman(word []byte) bool {
	if len(word) < 2 || len(word) > 15 {
		return false
	}
	small := true // I, V and X alone
	for _, c := range word {
		switch c {
		case 'I', 'V', 'X', 'i', 'v', 'x':
		case 'L', 'C', 'D', 'M':
			small = false
		default:
			return false
		}
	}
	if !small && len(word) < 4 {
		return false
	}
	return romanOrder(word)
}

// romanOrder checks the digits from thousands to ones.
func romanOrder(word []byte) bool {
	var buf [15]byte
	w := bytes.TrimLeft(Fold(buf[:0], word), "m")
	for _, d := range [...][3]byte{{'c', 'd', 'm'}, {'x', 'l', 'c'}, {'i', 'v', 'x'}} {
		one, five, ten := d[0], d[1], d[2]
		switch {
		case len(w) > 1 && w[0] == one && (w[1] == five || w[1] == ten):
			w = w[2:]
			continue
		case len(w) > 0 && w[0] == five:
			w = w[1:]
		}
		for n := 0; n < 3 && len(w) > 0 && w[0] == one; n++ {
			w = w[1:]
		}
	}
	return len(w) == 0
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
