package text

import "bytes"

// command takes the command at pos.
func (l *latex) command() {
	name := latexName(l.source[l.pos:])
	if text, n := latexSymbol(l.source[l.pos:]); n > 0 {
		l.take(text, l.pos+n)
		return
	}
	end := l.pos + 1 + len(name)
	switch name {
	case "":
		l.pos++
	case "\\", "newline", "linebreak", "tabularnewline", "cr":
		l.lineBreak(end)
	case "(":
		l.take(placeholder, l.behind(`\)`, end))
	case "[":
		l.take(placeholder, l.behind(`\]`, end))
	case "par":
		l.pos = end
		l.flush()
	case "def", "gdef", "edef", "xdef":
		l.definition(end)
	case "begin":
		l.environment(end)
	case "end":
		l.endEnvironment(end)
	case "verb", "lstinline", "mintinline", "Verb":
		l.inlineCode(name, end)
	default:
		l.named(name, end)
	}
}

// lineBreak notes a forced line break, with the space it may ask for.
func (l *latex) lineBreak(end int) {
	if end < len(l.source) && l.source[end] == '*' {
		end++
	}
	at := l.pos
	if end < len(l.source) && l.source[end] == '[' {
		end = l.argument(end)
	}
	l.pos = end
	switch {
	case l.tables > 0:
		l.flush()
	case len(l.prose.text) > 0:
		l.broken = at
	}
}

// definition leaves out a definition of TeX: a name, its parameters and a group.
func (l *latex) definition(end int) {
	l.pos = end
	if i := bytes.IndexAny(l.source[end:min(end+farArgument, len(l.source))], "{\n"); i >= 0 && l.source[end+i] == '{' {
		l.pos = l.argument(end + i)
	}
}

// defineCode notes the name of an environment of code that the document defines.
func (l *latex) defineCode(end int) {
	if name, _ := l.environmentName(end); name != "" {
		if l.code == nil {
			l.code = map[string]bool{}
		}
		l.code[name] = true
	}
}

// inlineCode takes code between two equal characters, or in braces.
func (l *latex) inlineCode(name string, end int) {
	if end < len(l.source) && l.source[end] == '*' {
		end++
	}
	if name != "verb" {
		end = l.options(end)
	}
	if name == "mintinline" {
		end = l.argument(end)
	}
	if end < len(l.source) && l.source[end] == '{' && name != "verb" {
		l.take(placeholder, l.argument(end))
		return
	}
	line := l.source[min(end, len(l.source)):min(end+farArgument, len(l.source))]
	if i := bytes.IndexAny(line, "\r\n"); i >= 0 {
		line = line[:i]
	}
	if len(line) < 2 {
		l.pos = end
		return
	}
	if i := bytes.IndexByte(line[1:], line[0]); i >= 0 {
		l.take(placeholder, end+i+2)
		return
	}
	l.pos = end
}

// environment takes the beginning of one.
func (l *latex) environment(end int) {
	name, end := l.environmentName(end)
	kind := latexEnvironment(name)
	switch {
	case kind == mathEnvironment:
		l.take(placeholder, l.behind(`\end{`+name+`}`, end))
		return
	case kind == codeEnvironment || l.code[name]:
		l.flush()
		l.pos = l.behind(`\end{`+name+`}`, end)
	default:
		l.pos = l.options(end)
		for range latexEnvironmentArguments(name) {
			l.pos = l.options(l.argument(l.pos))
		}
	}
	if name == "document" {
		l.preamble = false
	}
	if latexTable(name) {
		l.tables++
	}
	l.flush()
}

func (l *latex) endEnvironment(end int) {
	name, end := l.environmentName(end)
	l.pos = end
	l.flush()
	if latexTable(name) && l.tables > 0 {
		l.tables--
	}
	if name == "document" {
		l.pos = len(l.source)
	}
}

// environmentName reads the name in braces, and returns the place behind it.
func (l *latex) environmentName(end int) (name string, behind int) {
	rest := l.source[end:min(end+64, len(l.source))]
	i := bytes.IndexByte(rest, '}')
	if len(rest) == 0 || rest[0] != '{' || i < 0 {
		return "", end
	}
	return string(rest[1:i]), end + i + 1
}

// named takes a command by the table of what the arguments of commands are.
func (l *latex) named(name string, end int) {
	if end < len(l.source) && l.source[end] == '*' {
		end++
	}
	if name == "DefineVerbatimEnvironment" || name == "lstnewenvironment" {
		l.defineCode(end)
	}
	switch use := latexCommand(name); use.text {
	case silentText:
		l.skip(end, use.arguments)
		if use.arguments == 0 {
			l.pos += commandEnd(l.source[l.pos:], name)
		}
	case placeholderText:
		at := l.pos
		l.skip(end, use.arguments)
		end, l.pos = l.pos, at
		l.take(placeholder, end)
	case runningText:
		l.skip(end, use.arguments)
		if use.first && l.pos < len(l.source) && l.source[l.pos] == '{' {
			l.pos++
			l.open(group{closer: '}', other: true})
		}
	case apartText, headingText:
		l.apartArgument(end, use)
	default:
		l.unknown(end)
	}
}

// skip leaves out a command, its options and its first arguments.
func (l *latex) skip(end, arguments int) {
	end = l.options(end)
	for range arguments {
		end = l.options(l.argument(end))
	}
	l.pos = end
}

// apartArgument enters the text of a command that is a block of its own.
func (l *latex) apartArgument(end int, use latexUse) {
	if use.text == headingText || use.block {
		l.flush()
	}
	g := group{apart: true, heading: use.text == headingText}
	next := l.blanks(end)
	switch {
	case next < len(l.source) && l.source[next] == '[' && use.optional:
		g.closer = ']'
		l.pos = next + 1
		l.open(g)
		return
	case use.optional:
		l.pos = end
		return
	case next < len(l.source) && l.source[next] == '[':
		next = l.blanks(l.options(next))
	}
	if next >= len(l.source) || l.source[next] != '{' {
		l.pos = end
		return
	}
	l.pos = next + 1
	g.closer = '}'
	l.open(g)
}

// unknown takes a command that no table has: it stands for words of its own. Its
// arguments are read where they hold two words.
func (l *latex) unknown(end int) {
	next := l.options(end)
	words := false
	for next < len(l.source) && l.source[next] == '{' {
		inner := l.argumentWithin(next, min(len(l.source), next+farArgument))
		if words = inner >= next+farArgument || wordy(l.source[next+1:inner]); words {
			break
		}
		next = inner
	}
	if words {
		l.pos = next
		return
	}
	l.take(placeholder, next)
}

// farArgument is the length in bytes from which an argument is taken for text,
// and no longer for code.
const farArgument = 1000

// blanks skips white space up to an argument, over one line end at most.
func (l *latex) blanks(i int) int {
	for n := 0; i < len(l.source) && isSpaceByte(l.source[i]); i++ {
		if l.source[i] == '\n' {
			if n++; n > 1 {
				break
			}
		}
	}
	return i
}

// options returns the place behind the arguments in brackets from i on, i when
// there are none.
func (l *latex) options(i int) int {
	for i < len(l.source) && l.source[i] == '[' {
		i = l.argument(i)
	}
	return i
}

// argument returns the place behind the argument at i: a group or, without one, a
// command or character. One that is not closed goes on to the next blank line.
func (l *latex) argument(i int) int {
	return l.argumentWithin(l.blanks(i), len(l.source))
}

// argumentWithin is argument with a bound on what is looked at.
func (l *latex) argumentWithin(i, bound int) int {
	if i >= bound {
		return bound
	}
	opener := l.source[i]
	switch opener {
	case '\\':
		return i + 1 + len(latexName(l.source[i:]))
	case '%', '}', ']', '&':
		return i
	case '{', '[':
	default:
		return i + 1
	}
	depth := 0
	for ; i < bound; i++ {
		switch c := l.source[i]; {
		case c == '\\':
			i++
		case c == '{' || c == '[' && opener == '[' && depth == 0:
			depth++
		case c == '}' && (opener == '{' || depth > 1) || c == ']' && opener == '[' && depth == 1:
			if depth--; depth == 0 {
				return i + 1
			}
		case c == '\n' && blankLine(l.source, i+1):
			return i
		}
	}
	return bound
}
