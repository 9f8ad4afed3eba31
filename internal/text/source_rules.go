package text

import (
	"bytes"
	"slices"
	"unicode"
	"unicode/utf8"
)

// This file says which lines of comments are no prose, and which strings are.
//
//   - A rule has no letter or digit.
//   - A directive is meant for a tool; see directive.
//   - A line of code has a sign of code, and at least half of what stands between
//     its blanks is no plain word; or it begins with an assignment.
//   - The head of a list of names with what they mean ("Args:") is no prose.
//   - A tag names what the words behind it are about; see docTag.
//   - A string is prose when it has two plain words or more, these are two thirds
//     of what has letters or digits between its blanks, and it is no query or
//     pattern.
//
// A plain word is letters alone, with apostrophes inside, less quotation marks and
// brackets around it and punctuation behind it.

// ruled reports a line without letters and digits: blank, or drawn.
func ruled(line []byte) bool {
	return bytes.IndexFunc(line, func(r rune) bool { return unicode.IsLetter(r) || unicode.IsDigit(r) }) < 0
}

// directive reports lines that are meant for tools, attached to the comment's
// leader or not: "go:build x", "-*- mode -*-", "vim: set", "check: word",
// "check-disable x", "check disable=x", "!/bin/sh", "+build", "#pragma", a single
// word that is attached or no plain one; licence identifiers and copyright lines,
// which are names.
func directive(line []byte, attached bool) bool {
	fields := bytes.Fields(line[:min(len(line), 256)])
	head := fields[0]
	switch {
	case len(fields) == 1:
		return !plain(head) || head[len(head)-1] == ';' || attached && len(line) > 1 && isLower(rune(line[0]))
	case attached && bytes.IndexByte([]byte("!+#@%"), head[0]) >= 0 && len(head) > 1,
		head[0] == '+' && len(head) > 1 && isLower(rune(head[1])), bytes.HasPrefix(head, []byte("#!")), bytes.HasPrefix(head, []byte("!/")),
		bytes.HasPrefix(line, []byte("-*-")), bytes.HasPrefix(line, []byte(">>>")),
		bytes.HasPrefix(head, []byte("SPDX-")), bytes.EqualFold(head, []byte("copyright")):
		return true
	}
	if i := bytes.IndexByte(head, ':'); i > 1 && i+1 < len(head) && head[i+1] != '/' && isLower(rune(head[0])) && alnumByte(head[i+1]) {
		return true
	}
	tool := isLower(rune(head[0])) && bytes.ContainsAny(head, ":-")
	if len(fields) == 2 && tool && head[len(head)-1] == ':' {
		return true
	}
	return tool && switches(head) || (tool || bytes.IndexByte(fields[1], '=') > 0) && switches(fields[1]) ||
		head[len(head)-1] == ':' && (string(fields[1]) == "set" || bytes.IndexByte(fields[1], '=') > 0)
}

// switches reports a word that turns a tool on or off.
func switches(word []byte) bool {
	for _, name := range []string{"disable", "enable", "ignore", "skip", "off", "on"} {
		i := bytes.Index(word, []byte(name))
		if i < 0 {
			continue
		}
		before, after := word[:i], word[i+len(name):]
		if (len(before) == 0 || before[len(before)-1] == '-') && (len(after) == 0 || bytes.IndexByte([]byte("=:-[("), after[0]) >= 0) {
			return true
		}
	}
	return false
}

// codeLine reports code that was commented out.
func codeLine(line []byte) bool {
	fields := bytes.Fields(line)
	if len(fields) > 2 && isAssignment(fields[1]) && fields[0][0] != '-' {
		return true
	}
	words := 0
	for _, f := range fields {
		if plain(f) {
			words++
		}
	}
	return 2*words <= len(fields) && hasCodeSign(line)
}

func isAssignment(field []byte) bool {
	switch string(field) {
	case "=", ":=", "+=", "-=", "<-", "==", "!=", "=>":
		return true
	}
	return false
}

func hasCodeSign(line []byte) bool {
	switch line[len(line)-1] {
	case ';', '{', '}', '(', '=', '[', ']', '\\':
		return true
	}
	for _, sign := range []string{":=", "==", "!=", "+=", "-=", "&&", "||", "=>", "->", "();", ");", "](", "()", "=\"", " = ", "<-", "::"} {
		if bytes.Contains(line, []byte(sign)) {
			return true
		}
	}
	open := bytes.IndexByte(line, '(')
	return open > 0 && alnumByte(line[open-1]) && line[len(line)-1] == ')'
}

// docTag returns how many bytes at the start of a line are a tag: "@param name",
// "\param[in] name", "@returns {type}", ":param name:", "TODO(name):", "name : type",
// and, among members, "name:" and "name (type):". Whole says that nothing but
// names follows.
func docTag(line []byte, members bool) (n int, whole bool) {
	switch c := line[0]; {
	case (c == '@' || c == '\\') && len(line) > 1 && classes[line[1]]&cLetter != 0 && inlineCode(line) < 2:
		return commandTag(line)
	case c == ':' && len(line) > 1 && classes[line[1]]&cLetter != 0:
		const longest = 80
		if i := bytes.Index(line[:min(len(line), longest)], []byte(": ")); i > 0 {
			return i + 2, false
		}
		return 0, line[len(line)-1] == ':'
	}
	name := 0
	for name < len(line) && (alnumByte(line[name]) || line[name] == '_') {
		name++
	}
	rest := line[name:]
	if name > 2 && len(rest) > 0 && rest[0] == '(' && all(line[:name], cUpper) {
		if i := bytes.IndexByte(rest, ')'); i > 0 {
			return name + i + 1 + len(rest[i+1:]) - len(bytes.TrimLeft(rest[i+1:], ": ")), false
		}
	}
	if name > 0 && bytes.HasPrefix(rest, []byte(" : ")) {
		return 0, true
	}
	if !members || name == 0 {
		return 0, false
	}
	switch i := bytes.Index(rest, []byte(": ")); {
	case i == 0 || i > 0 && bytes.HasPrefix(rest, []byte(" (")) && rest[i-1] == ')':
		return name + i + 2, false
	}
	return 0, false
}

// commandTag is docTag for tags that begin with "@" or a backslash.
func commandTag(line []byte) (n int, whole bool) {
	n = 1
	for n < len(line) && classes[line[n]]&cLetter != 0 {
		n++
	}
	name := string(line[1:n])
	for n < len(line) && !isSpaceByte(line[n]) {
		n++
	}
	n += blanks(line[n:])
	if n < len(line) && line[n] == '{' {
		if i := bytes.IndexByte(line[n:], '}'); i > 0 {
			n += i + 1 + blanks(line[n+i+1:])
		}
	}
	switch name {
	case "param", "arg", "argument", "property", "prop", "tparam", "typeparam", "template", "throws", "throw", "exception", "raises", "retval", "field", "defgroup", "addtogroup", "page", "section", "anchor":
		for n < len(line) && !isSpaceByte(line[n]) {
			n++
		}
		n += blanks(line[n:])
		if bytes.HasPrefix(line[n:], []byte("- ")) {
			n += 2
		}
	case "author", "authors", "copyright", "see", "sa", "since", "version", "license", "file", "link", "type", "typedef", "name", "module", "class", "ingroup", "code", "endcode", "export", "exportMethod", "importFrom", "import":
		return n, true
	}
	return n, n >= len(line)
}

func blanks(b []byte) int { return len(b) - len(bytes.TrimLeft(b, " \t")) }

// namesFollow reports the heads of lists of names with what they mean.
func namesFollow(line []byte) bool {
	switch string(bytes.TrimSuffix(line, []byte(":"))) {
	case "Args", "Arguments", "Parameters", "Params", "Returns", "Raises", "Yields", "Attributes", "Keyword Args", "Other Parameters", "Throws", "Fields":
		return true
	}
	return false
}

// prosy reports text of a string that is prose.
func prosy(text []byte) bool {
	fields := slices.DeleteFunc(bytes.Fields(bytes.ReplaceAll(text, []byte(placeholder), nil)), ruled)
	if len(fields) < 2 || query(fields[0]) {
		return false
	}
	for _, sign := range []string{"(?", "[^", ".*", ".+", "[a-z", "\\"} {
		if bytes.Contains(text, []byte(sign)) {
			return false
		}
	}
	words := 0
	for _, f := range fields {
		if plain(f) {
			words++
		}
	}
	return words >= 2 && 3*words >= 2*len(fields)
}

// query reports a word in capitals that begins a statement of SQL.
func query(word []byte) bool {
	switch string(word) {
	case "SELECT", "INSERT", "UPDATE", "DELETE", "CREATE", "ALTER", "DROP", "WITH", "PRAGMA", "BEGIN", "MERGE", "GRANT", "FROM", "WHERE", "ORDER", "JOIN":
		return true
	}
	return false
}

// plain reports a plain word.
func plain(field []byte) bool {
	field = bytes.TrimRight(bytes.TrimLeft(field, "\"'([\u201C\u2018"), ".,:;!?\"')]\u201D\u2019\u2026")
	for i := 0; i < len(field); {
		r, n := utf8.DecodeRune(field[i:])
		if !unicode.IsLetter(r) && (r != '\'' && r != '\u2019' || i == 0) {
			return false
		}
		i += n
	}
	return len(field) > 0
}
