package text

import (
	"bytes"
	"unicode/utf8"
)

// This file says what is left alone. Nothing is looked up: the shape decides, in
// this order.
//
//  1. Code between back quotes, tags, <placeholders>, {placeholders}: enclosed.
//  2. URLs: url.
//  3. The table below, first match first.
//  4. What is left are words, with a kind by their letters alone: single letters,
//     camelCase and brands, acronyms, roman numerals, units after a number are
//     told by wordKind; words with digits, letters of other scripts or bytes that
//     are not UTF-8 by addWord.
//
// A rule of the table sees the core of a run of characters without white space:
// the run from its start, or from after a mark inside it, to the first bracket
// ("()" and what "<" and "{" open stay inside), dash, double quotation mark,
// ellipsis, semicolon or comma (one between digits stays inside), less the
// punctuation that ends it. What the rule matches becomes one token.

// rule is one line of the table.
type rule struct {
	kind  Kind
	needs class                 // the core must hold one of these
	match func(core []byte) int // bytes of the core that the rule takes, 0 for none
}

var rules = [...]rule{
	{Number, cDigit | cHigh, number},             // 3.14 $5 10km 3rd 1980s 10:30 12/05/2021 -5
	{Literal, cDigit, version},                   // 1.2.3 v2.0 192.168.0.1
	{Literal, cCode, whole(sigil)},               // @handle #tag $VARIABLE %s
	{Literal, cHyphen, whole(flag)},              // -x --like-this
	{Literal, cCode, whole(languageName)},        // C++ F#
	{Literal, cCode | cPunct, whole(codeInside)}, // mail@host x=5 a+b std::vector
	{Literal, cParen, whole(call)},               // call()
	{Literal, cCode, whole(path)},                // /etc ~/x ./x C:\x \\host x/ a1/b.c I/O
	{Literal, cCode, whole(snake)},               // snake_case __name
	{Acronym, cCode, whole(ampersand)},           // R&D
	{Acronym, cPoint, dottedAcronym},             // U.S. e.g. Ph.D.
	{Literal, cPoint, whole(dotted)},             // host.name file.ext dotted.name
	{Literal, cDigit, whole(mixed)},              // H2O COVID-19 deadbeef01 and other letters with digits
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
