package text

import (
	"bytes"
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"
)

// latexAccents are the combining marks of the accent commands, whose argument is
// the next letter. Source: the LaTeX reference manual ("Accents"), from memory.
var latexAccents = map[string]string{
	"'": "\u0301", "`": "\u0300", "^": "\u0302", `"`: "\u0308", "~": "\u0303", "=": "\u0304", ".": "\u0307",
	"c": "\u0327", "v": "\u030C", "u": "\u0306", "H": "\u030B", "k": "\u0328", "d": "\u0323", "b": "\u0331", "r": "\u030A",
}

// latexLetters are the characters that commands stand for. Source: as above.
var latexLetters = map[string]string{
	"ss": "ß", "SS": "ẞ", "ae": "æ", "AE": "Æ", "oe": "œ", "OE": "Œ", "o": "ø", "O": "Ø", "aa": "å", "AA": "Å", "l": "ł", "L": "Ł",
	"i": "ı", "j": "ȷ", "dh": "ð", "DH": "Ð", "th": "þ", "TH": "Þ", "dj": "đ", "DJ": "Đ", "ng": "ŋ", "NG": "Ŋ",
	"S": "§", "P": "¶", "dag": "†", "ddag": "‡", "copyright": "©", "pounds": "£", "dots": "…", "ldots": "…",
	"textendash": "–", "textemdash": "—", "textquoteleft": "‘", "textquoteright": "’", "textquotedblleft": "“",
	"textquotedblright": "”", "textquotesingle": "'", "textquotedbl": `"`, "textellipsis": "…", "textdegree": "°", "texteuro": "€",
	"euro": "€", "textbackslash": `\`, "textasciitilde": "~", "textasciicircum": "^", "textbar": "|", "textless": "<",
	"textgreater": ">", "textunderscore": "_", "textregistered": "®", "texttrademark": "™", "textbullet": "•", "textperiodcentered": "·",
	"slash": "/", "space": " ", "quad": " ", "qquad": " ", "enspace": " ", "thinspace": " ", "nobreakspace": " ",
	"&": "&", "%": "%", "$": "$", "#": "#", "_": "_", "{": "{", "}": "}",
	" ": " ", ",": " ", ";": " ", ":": " ", "\n": "\n",
}

// latexSymbol reads an accent or the command of a character at the start of b. It
// returns the character and the length, 0 when there is none. White space and the
// empty group that end a command of letters belong to it.
func latexSymbol(b []byte) (text string, n int) {
	command := latexName(b)
	if command == "" {
		return "", 0
	}
	n = 1 + len(command)
	if mark, ok := latexAccents[command]; ok {
		return accented(b, n, mark)
	}
	text, ok := latexLetters[command]
	if !ok {
		return "", 0
	}
	return text, n + commandEnd(b[n:], command)
}

// commandEnd returns the length of what ends a command of letters: an empty group,
// or the white space before a letter.
func commandEnd(b []byte, command string) int {
	if classes[command[0]]&cLetter == 0 {
		return 0
	}
	if bytes.HasPrefix(b, []byte("{}")) {
		return 2
	}
	n := 0
	for n < len(b) && (b[n] == ' ' || b[n] == '\t') {
		n++
	}
	return n
}

// latexName returns the name of the command at the start of b: letters, or one
// other character; "" when there is none.
func latexName(b []byte) string {
	if len(b) < 2 || b[0] != '\\' {
		return ""
	}
	n := 1
	for n < len(b) && (classes[b[n]]&cLetter != 0 || b[n] == '@' && n > 1) {
		n++
	}
	if n == 1 {
		_, size := utf8.DecodeRune(b[1:])
		n += size
	}
	return string(b[1:n])
}

// accented reads the letter from b[n] on and puts a mark over it.
func accented(b []byte, n int, mark string) (text string, length int) {
	for n < len(b) && (b[n] == ' ' || b[n] == '\t') {
		n++
	}
	brace := n < len(b) && b[n] == '{'
	if brace {
		n++
	}
	base, size := "", 0
	switch name := latexName(b[min(n, len(b)):]); {
	case name == "i" || name == "j":
		base, size = name, 2
		if !brace {
			size += commandEnd(b[n+2:], name)
		}
	case n < len(b):
		r, k := utf8.DecodeRune(b[n:])
		if !unicode.IsLetter(r) {
			return "", 0
		}
		base, size = string(r), k
	default:
		return "", 0
	}
	n += size
	if brace {
		if n >= len(b) || b[n] != '}' {
			return "", 0
		}
		n++
	}
	return norm.NFC.String(base + mark), n
}

var latexEscapes = strings.NewReplacer(
	"&", `\&`, "%", `\%`, "$", `\$`, "#", `\#`, "_", `\_`, "{", `\{`, "}", `\}`,
	"~", `\textasciitilde{}`, "^", `\textasciicircum{}`, `\`, `\textbackslash{}`,
	"\u2014", "---", "\u2013", "--", "\u201C", "``", "\u201D", "''", "\u2018", "`", "\u2019", "'",
)

// escapeLaTeX spells words so that LaTeX prints them.
func escapeLaTeX(words string) (string, bool) { return latexEscapes.Replace(words), true }
