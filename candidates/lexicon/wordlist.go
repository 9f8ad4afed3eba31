package lexicon

import (
	"bufio"
	"errors"
	"fmt"
	"io"
	"iter"
	"strings"
	"unicode"
	"unicode/utf8"

	"example.org/foulcase/internal/text"
)

// maxLine bounds a line of a word list, in bytes.
const maxLine = 64 << 10

// WordList is a list of words as they are written, with their usual capitals.
type WordList struct {
	Name    string  // of the file, for messages
	Variety Variety // of all its words
	Words   []string
}

// ReadWords reads a list in UTF-8, a word a line; what follows a "#" at the
// start of a line or behind white space is a comment, and blank lines are
// skipped. Errors name the list and the line and say what to do.
func ReadWords(r io.Reader, name string) ([]string, error) {
	var words []string
	for line, err := range ReadLines(r, name) {
		if err != nil {
			return nil, err
		}
		words = append(words, line.Text)
	}
	return words, nil
}

// Line is an entry of a list and the number of its line, from 1 on.
type Line struct {
	Number int
	Text   string
}

// ReadLines yields the entries of a list as ReadWords reads it, up to the first error.
func ReadLines(r io.Reader, name string) iter.Seq2[Line, error] {
	return func(yield func(Line, error) bool) {
		lines := bufio.NewScanner(r)
		lines.Buffer(nil, maxLine)
		n := 0
		for lines.Scan() {
			n++
			line := lines.Text()
			if n == 1 {
				line = strings.TrimPrefix(line, "\ufeff")
			}
			if !utf8.ValidString(line) {
				yield(Line{}, fmt.Errorf("%s:%d: the line is not UTF-8: save the list as UTF-8 text, one word a line", name, n))
				return
			}
			if entry := strings.TrimSpace(cutComment(line)); entry != "" && !yield(Line{n, entry}, nil) {
				return
			}
		}
		if err := lines.Err(); errors.Is(err, bufio.ErrTooLong) {
			yield(Line{}, fmt.Errorf("%s:%d: the line is longer than %d bytes: put one word on a line", name, n+1, maxLine))
		} else if err != nil {
			yield(Line{}, fmt.Errorf("%s:%d: %w", name, n+1, err))
		}
	}
}

func cutComment(line string) string {
	for i, r := range line {
		if r == '#' && (i == 0 || unicode.IsSpace(rune(line[i-1]))) {
			return line[:i]
		}
	}
	return line
}

// housePrior is the prior of house words, in nats: one word in a million, a
// guess between the common and the rare words of general English.
const housePrior = -13.8

// FromWords builds a small lexicon of house words in memory. Entries of several
// words or with hyphens enter piece by piece, as the segmenter reads them, and
// possessives as their stems. A word in small letters may be written in any
// case; a word with capitals is met in those alone.
func FromWords(words []string) (*Lexicon, error) {
	var b Builder
	for _, entry := range words {
		for _, word := range strings.FieldsFunc(entry, isWordBreak) {
			form := foldString(word)
			if stem, ok := possessiveStem([]byte(form)); ok {
				form, word = string(stem), spelling([]byte(word))
			}
			if form == "" || len(form) > MaxForm {
				return nil, fmt.Errorf("house word %q has %d bytes; 1 to %d are allowed", word, len(form), MaxForm)
			}
			cases := casesOf(word)
			if old, ok := b.entries[form]; ok {
				cases |= old.Cases
			}
			usual := cases & -cases
			b.Add(form, Entry{Variety: Both, Cases: cases, Usual: usual, Listed: true, Prior: housePrior}, spelling([]byte(word)))
		}
	}
	section, err := b.Section()
	if err != nil {
		return nil, err
	}
	return Open(section)
}

// isWordBreak reports what the segmenter never has inside a word.
func isWordBreak(r rune) bool {
	return unicode.IsSpace(r) || r == '-' || r == '\u2010' || r == '\u2011'
}

// casesOf gives the one pattern of capitals of a word as it is written.
func casesOf(word string) Cases {
	switch text.CaseOf([]byte(word)) {
	case text.Title:
		return TitleCase
	case text.Upper:
		return UpperCase
	case text.Mixed:
		return MixedCase
	}
	return LowerCase
}
