package eval

import (
	"bufio"
	"errors"
	"fmt"
	"io"
	"iter"
	"strconv"
	"strings"
	"unicode/utf8"
)

// maxLine bounds a line of test data, in bytes.
const maxLine = 1 << 20

// A LineError tells which line of which file could not be read, and why.
type LineError struct {
	File string
	Line int // from 1
	Err  error
}

func (e *LineError) Error() string { return fmt.Sprintf("%s:%d: %v", e.File, e.Line, e.Err) }
func (e *LineError) Unwrap() error { return e.Err }

// lines yields the lines of r with their numbers, freed of line ends and of a
// byte order mark. A line that cannot be used ends the sequence with an error.
func lines(file string, r io.Reader) iter.Seq2[int, lineOrError] {
	return func(yield func(int, lineOrError) bool) {
		s := bufio.NewScanner(r)
		s.Buffer(nil, maxLine)
		n := 0
		for s.Scan() {
			n++
			text := strings.TrimSuffix(s.Text(), "\r")
			if n == 1 {
				text = strings.TrimPrefix(text, "\ufeff")
			}
			if !utf8.ValidString(text) {
				yield(n, lineOrError{err: &LineError{file, n, errors.New("not UTF-8: convert the file first")}})
				return
			}
			if !yield(n, lineOrError{text: text}) {
				return
			}
		}
		if err := s.Err(); err != nil {
			if errors.Is(err, bufio.ErrTooLong) {
				err = fmt.Errorf("longer than %d bytes: not a line of test data", maxLine)
			}
			yield(n+1, lineOrError{err: &LineError{file, n + 1, err}})
		}
	}
}

type lineOrError struct {
	text string
	err  error
}

// ReadPairs reads `observed TAB intended [TAB count [TAB flag]]`, a pair a
// line. Empty lines are passed over. The flag "mw" says that a space is
// involved, which is also seen when it is not said. Errors are of type
// *LineError and name the file as given.
func ReadPairs(file string, r io.Reader) ([]Pair, error) {
	var pairs []Pair
	for n, line := range lines(file, r) {
		if line.err != nil {
			return nil, line.err
		}
		if strings.TrimSpace(line.text) == "" {
			continue
		}
		pair, err := parsePair(line.text)
		if err != nil {
			return nil, &LineError{file, n, err}
		}
		pair.Line = n
		pairs = append(pairs, pair)
	}
	return pairs, nil
}

func parsePair(line string) (Pair, error) {
	columns := strings.Split(line, "\t")
	if len(columns) < 2 || len(columns) > 4 {
		return Pair{}, fmt.Errorf("%d columns: want observed TAB intended [TAB count [TAB flag]]", len(columns))
	}
	p := Pair{Observed: strings.TrimSpace(columns[0]), Intended: strings.TrimSpace(columns[1]), Count: 1}
	if p.Observed == "" || p.Intended == "" {
		return Pair{}, errors.New("empty word")
	}
	if len(columns) > 2 {
		var err error
		if p.Count, err = parseCount(columns[2]); err != nil {
			return Pair{}, err
		}
	}
	p.Spaces = len(columns) > 3 && columns[3] == "mw" || differInSpaces(p.Observed, p.Intended)
	return p, nil
}

func parseCount(text string) (int, error) {
	n, err := strconv.Atoi(text)
	if err != nil || n < 1 {
		return 0, fmt.Errorf("count %q: want a whole number from 1", text)
	}
	return n, nil
}

func differInSpaces(observed, intended string) bool {
	return len(strings.Fields(observed)) != len(strings.Fields(intended))
}

// ReadClean reads text that holds no errors, a paragraph a line, with an empty
// line between documents. Documents are numbered from 1 and blank paragraphs
// dropped.
func ReadClean(file string, r io.Reader) ([]Item, error) {
	var items []Item
	document, open := 0, false
	for n, line := range lines(file, r) {
		if line.err != nil {
			return nil, line.err
		}
		if strings.TrimSpace(line.text) == "" {
			open = false
			continue
		}
		if !open {
			document, open = document+1, true
		}
		items = append(items, Item{Line: n, Document: strconv.Itoa(document), Source: line.text})
	}
	return items, nil
}
