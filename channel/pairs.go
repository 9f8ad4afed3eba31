package channel

import (
	"bufio"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Pair is something that was typed and what was meant by it.
type Pair struct {
	Observed string
	Intended string
	Count    float64 // how often the pair was seen, above 0
	Spaced   bool    // one of the two holds a space
}

// ReadPairs reads lines of observed, intended, count and flag, separated by
// tabs; the flag "mw" says that a space is involved. The count and the flag may
// be missing. Errors name the line.
func ReadPairs(r io.Reader) ([]Pair, error) {
	var pairs []Pair
	err := eachLine(r, func(fields []string) error {
		p := Pair{Observed: fields[0], Intended: fields[1], Count: 1}
		if len(fields) > 2 {
			n, err := strconv.ParseFloat(fields[2], 64)
			if err != nil || !(n > 0) || math.IsInf(n, 0) {
				return fmt.Errorf("count %q is not a number above 0", fields[2])
			}
			p.Count = n
		}
		p.Spaced = len(fields) > 3 && fields[3] == "mw" || strings.Contains(p.Observed+p.Intended, " ")
		pairs = append(pairs, p)
		return nil
	})
	return pairs, err
}

// eachLine calls f with the fields of each line, at least two of them.
func eachLine(r io.Reader, f func(fields []string) error) error {
	lines := bufio.NewScanner(r)
	for n := 1; lines.Scan(); n++ {
		line := strings.TrimRight(lines.Text(), "\r")
		if line == "" {
			continue
		}
		fields := strings.Split(line, "\t")
		if len(fields) < 2 {
			return fmt.Errorf("channel: line %d: expected observed TAB intended, found %q", n, line)
		}
		if err := f(fields); err != nil {
			return fmt.Errorf("channel: line %d: %w", n, err)
		}
	}
	if err := lines.Err(); err != nil {
		return fmt.Errorf("channel: reading pairs: %w", err)
	}
	return nil
}

// Clean keeps the pairs of a list of human corrections that are slips of
// spelling. These are dropped:
//   - identifiers and codes: a digit, an underscore, a capital inside a word;
//   - edits of case alone;
//   - words exchanged for other words, which are slips of grammar or of choice:
//     the observed form is known, unless known is nil;
//   - rewrites: more than half of the intended letters, and more than two, have
//     no counterpart.
//
// The words of what is left are in lower case.
func Clean(pairs []Pair, known func(word string) bool) []Pair {
	var kept []Pair
	for _, p := range pairs {
		if identifier(p.Observed) || identifier(p.Intended) {
			continue
		}
		p = lower(p)
		if p.Observed == p.Intended || !p.Spaced && known != nil && known(p.Observed) {
			continue
		}
		if rewrite(p.Observed, p.Intended) {
			continue
		}
		kept = append(kept, p)
	}
	return kept
}

func lower(p Pair) Pair {
	p.Observed = strings.ReplaceAll(strings.ToLower(p.Observed), "’", "'")
	p.Intended = strings.ReplaceAll(strings.ToLower(p.Intended), "’", "'")
	return p
}

// identifier reports whether a word looks like a name in a program.
func identifier(word string) bool {
	capitals, lowers := 0, 0
	for i, r := range word {
		switch {
		case r == '_' || r == '/' || r == '.' || unicode.IsDigit(r):
			return true
		case unicode.IsUpper(r) && i > 0:
			capitals++
		case unicode.IsLower(r):
			lowers++
		}
	}
	return capitals > 0 && lowers > 0
}

// rewrite reports whether two words share too few letters for one to be a slip
// for the other. Counts of letters stand in for an alignment: cheap, and blind
// to order, so that jumbled letters stay.
func rewrite(observed, intended string) bool {
	var left [symbols]int
	for _, r := range intended {
		left[LetterOf(r).Sym]++
	}
	extra := 0
	for _, r := range observed {
		if s := LetterOf(r).Sym; left[s] > 0 {
			left[s]--
		} else {
			extra++
		}
	}
	missing := 0
	for _, n := range left {
		missing += n
	}
	worst := max(extra, missing)
	return worst > 2 && 2*worst > utf8.RuneCountInString(intended)
}
