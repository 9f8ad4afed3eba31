package eval

import (
	"errors"
	"fmt"
	"io"
	"strings"
)

// ReadIntended reads blocks of an intended form and how it was mis-written, the
// shape of the Birkbeck corpus (Mitton):
//
//	$harbour
//	harber 3
//	harbuor
//
// A line that begins with "$" is the intended form of the lines below it, each
// an observed form and, if it was seen more than once, a count. Underscores
// stand for spaces. Empty lines are passed over. Errors are of type *LineError
// and name the file as given.
func ReadIntended(file string, r io.Reader) ([]Pair, error) {
	var pairs []Pair
	intended := ""
	for n, line := range lines(file, r) {
		if line.err != nil {
			return nil, line.err
		}
		text := strings.TrimSpace(line.text)
		if text == "" {
			continue
		}
		if word, ok := strings.CutPrefix(text, "$"); ok {
			if intended = spaced(word); intended == "" {
				return nil, &LineError{file, n, errors.New("no word behind $: write the intended form there")}
			}
			continue
		}
		pair, err := parseMiswritten(text, intended)
		if err != nil {
			return nil, &LineError{file, n, err}
		}
		pair.Line = n
		pairs = append(pairs, pair)
	}
	return pairs, nil
}

// parseMiswritten reads a line below the one of its intended form.
func parseMiswritten(line, intended string) (Pair, error) {
	fields := strings.Fields(line)
	switch {
	case intended == "":
		return Pair{}, fmt.Errorf("%q stands before any intended form: begin with a line such as $harbour", line)
	case len(fields) > 2:
		return Pair{}, fmt.Errorf("%d words: want one form and a count; write a space inside a form as an underscore", len(fields))
	}
	p := Pair{Observed: spaced(fields[0]), Intended: intended, Count: 1}
	if p.Observed == "" {
		return Pair{}, errors.New("empty word")
	}
	if len(fields) == 2 {
		var err error
		if p.Count, err = parseCount(fields[1]); err != nil {
			return Pair{}, err
		}
	}
	p.Spaces = differInSpaces(p.Observed, p.Intended)
	return p, nil
}

// spaced writes underscores as spaces.
func spaced(word string) string {
	return strings.Join(strings.Fields(strings.ReplaceAll(word, "_", " ")), " ")
}
