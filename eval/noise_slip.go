package eval

import (
	"math/rand/v2"
	"strings"
	"unicode"
	"unicode/utf8"

	"example.org/foulcase/internal/text"
)

// slipAt makes a slip of a kind at word k of a stretch, if it can.
func (s *Slips) slipAt(kind Kind, source string, stretch []place, k int, random *rand.Rand) (slip, bool) {
	p := &stretch[k]
	if !p.touchable {
		return slip{}, false
	}
	made := slip{start: p.start, end: p.end, kind: kind}
	switch kind {
	case Runon:
		if k+1 == len(stretch) || !follows(source, p, &stretch[k+1]) {
			return slip{}, false
		}
		made.end = stretch[k+1].end
		made.typed = p.text + stretch[k+1].text
	case Split:
		made.typed = splitWord(p.text, random)
	case Repeat:
		made.typed = repeatWord(stretch, k)
	default:
		made.typed = s.mistyped(kind, p, random)
	}
	return made, made.typed != "" && reading(made.typed) != reading(source[made.start:made.end])
}

// follows says whether one space and nothing else parts two words that may be
// touched.
func follows(source string, p, next *place) bool {
	return next.item == p.item && next.touchable && source[p.end:next.start] == " "
}

// splitWord puts a space between two letters of a word, anywhere.
func splitWord(word string, random *rand.Rand) string {
	var gaps []int
	before := ' '
	for i, r := range word {
		if unicode.IsLetter(before) && unicode.IsLetter(r) {
			gaps = append(gaps, i)
		}
		before = r
	}
	if len(gaps) == 0 {
		return ""
	}
	i := gaps[random.IntN(len(gaps))]
	return word[:i] + " " + word[i:]
}

// repeatWord writes word k of a stretch twice, unless the text has it twice
// already.
func repeatWord(stretch []place, k int) string {
	p := &stretch[k]
	for _, i := range []int{k - 1, k + 1} {
		if i >= 0 && i < len(stretch) && stretch[i].fold == p.fold {
			return ""
		}
	}
	again := p.text
	if text.CaseOf([]byte(again)) == text.Title && utf8.RuneCountInString(again) > 1 {
		again = strings.ToLower(again)
	}
	return p.text + " " + again
}

// mistyped asks for a form of a word and writes it as the word stands, with its
// capitals and its kind of apostrophe.
func (s *Slips) mistyped(kind Kind, p *place, random *rand.Rand) string {
	form := s.Mistype(kind, p.fold, random)
	if !utf8.ValidString(form) || form != strings.Trim(form, "' ") {
		return ""
	}
	typed := text.ApplyCase(text.CaseOf([]byte(p.text)), form)
	if strings.Contains(p.text, "’") {
		typed = strings.ReplaceAll(typed, "'", "’")
	}
	return typed
}

// smallWords is the set of words that the items have in small letters, which
// are no names where a sentence begins with them. It is not needed, and nil,
// when names are touched anyhow.
func (s *Slips) smallWords(items []Item) map[string]bool {
	if s.Names {
		return nil
	}
	small := map[string]bool{}
	for _, item := range items {
		for _, t := range tokenize(item.Source) {
			if t.word && text.CaseOf([]byte(t.text)) == text.Lower && standsAlone(item.Source, t) {
				small[t.fold] = true
			}
		}
	}
	return small
}

// touchable says whether a slip may be put into a word: it stands by itself, not
// as a part of a code, an address or a compound, and it is no name that one can
// tell by its capitals.
func (s *Slips) touchable(source string, t token, small map[string]bool) bool {
	if t.text != source[t.start:t.end] || t.text != strings.Trim(t.text, "'’") || !standsAlone(source, t) {
		return false
	}
	switch text.CaseOf([]byte(t.text)) {
	case text.Lower:
		return true
	case text.Title:
		return s.Names || small[t.fold] && beginsSentence(source[:t.start])
	}
	return s.Names
}

// standsAlone says whether nothing but spaces, quotation marks, brackets, dashes
// and the points of a sentence touches a word.
func standsAlone(source string, t token) bool {
	before, _ := utf8.DecodeLastRuneInString(source[:t.start])
	rest := strings.TrimLeft(source[t.end:], ".,;:!?")
	after, _ := utf8.DecodeRuneInString(rest)
	return (t.start == 0 || unicode.IsSpace(before) || strings.ContainsRune("\"'“‘([—–", before)) &&
		(rest == "" || unicode.IsSpace(after) || strings.ContainsRune("\"'”’)]—–", after))
}

// beginsSentence says whether a word that follows such text begins a sentence.
func beginsSentence(before string) bool {
	before = strings.TrimRight(before, "\"'“”‘’([)] \t\n")
	return before == "" || strings.HasSuffix(before, ".") || strings.HasSuffix(before, "!") || strings.HasSuffix(before, "?")
}
