package eval

import (
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"
)

// token is a word, a number or one sign of a text. The tokens of this package
// are its own, so that a measurement does not share the mistakes of the
// tokeniser it measures; only byte offsets pass between the two.
type token struct {
	start, end int
	text       string // as it stands, less the space inside "do n't"
	fold       string // for comparison, see fold
	word       bool   // has a letter
	digits     bool   // has a digit
}

// tokenize splits a text. Letters, digits and marks make words, with
// apostrophes inside or before them; every other character but space stands
// alone. Clitics that stand apart, as tokenised corpora have them ("do n't",
// "what 's"), are joined to their word.
func tokenize(text string) []token {
	var tokens []token
	for i := 0; i < len(text); {
		r, size := utf8.DecodeRuneInString(text[i:])
		end := wordEnd(text, i)
		switch {
		case end > i:
			tokens = append(tokens, newToken(text, i, end))
		case unicode.IsSpace(r):
			end = i + size
		default:
			end = i + size
			tokens = append(tokens, token{start: i, end: end, text: text[i:end], fold: fold(text[i:end])})
		}
		i = end
	}
	return joinClitics(text, tokens)
}

func newToken(text string, start, end int) token {
	t := token{start: start, end: end, text: text[start:end]}
	t.fold = fold(t.text)
	t.word = strings.ContainsFunc(t.text, unicode.IsLetter)
	t.digits = strings.ContainsFunc(t.text, unicode.IsDigit)
	return t
}

func isApostrophe(r rune) bool { return r == '\'' || r == '’' }

func isWordRune(r rune) bool {
	return unicode.IsLetter(r) || unicode.IsDigit(r) || unicode.IsMark(r)
}

// wordEnd returns the end of the word that starts at i, or i.
func wordEnd(text string, i int) int {
	end := i
	for pos := i; pos < len(text); {
		r, size := utf8.DecodeRuneInString(text[pos:])
		switch {
		case isWordRune(r):
			end = pos + size
		case !isApostrophe(r) || pos > end:
			return end // neither a letter nor the first apostrophe after one
		}
		pos += size
	}
	return end
}

// fold is the form in which tokens are compared: composed, in lower case, with
// straight apostrophes and none at the edges.
func fold(s string) string {
	s = strings.ReplaceAll(strings.ToLower(norm.NFC.String(s)), "’", "'")
	if trimmed := strings.Trim(s, "'"); trimmed != "" {
		return trimmed
	}
	return s
}

// clitics are what tokenised corpora split from the word before.
var clitics = []string{"n't", "'s", "'m", "'re", "'ve", "'ll", "'d"}

func joinClitics(text string, tokens []token) []token {
	joined := tokens[:0]
	for _, t := range tokens {
		if k := len(joined) - 1; k >= 0 && joined[k].word && text[joined[k].end:t.start] == " " && isClitic(t.text) {
			both := newToken(joined[k].text+t.text, 0, len(joined[k].text)+len(t.text))
			both.start, both.end = joined[k].start, t.end
			joined[k] = both
			continue
		}
		joined = append(joined, t)
	}
	return joined
}

func isClitic(text string) bool {
	return slices.Contains(clitics, strings.ReplaceAll(strings.ToLower(text), "’", "'"))
}

// Words counts the words of a text, which false alarms are measured against.
func Words(text string) int {
	n := 0
	for _, t := range tokenize(text) {
		if t.word {
			n++
		}
	}
	return n
}
