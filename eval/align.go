package eval

import (
	"strings"
	"unicode/utf8"

	"github.com/agnivade/levenshtein"
)

// edit replaces source tokens [i,i2) by corrected tokens [j,j2). Ranges of more
// than one token are run-ons, splits and moved spaces; all other edits are of
// one token at most on each side.
type edit struct{ i, i2, j, j2 int }

// unaligned says whether the edit stands for texts too long and too unlike to
// be aligned.
func (e edit) unaligned() bool { return e.i2-e.i > 3 || e.j2-e.j > 5 }

// Costs of the alignment, guessed and then looked at on samples of five sets.
// A word left out or put in costs one; a substitution costs by how unlike the
// words are and always less than leaving one out and putting the other in; a
// moved space must be cheaper than a substitution and an insertion, and dearer
// than a difference of case.
const (
	costGap    = 1.0 // one token inserted or deleted
	costCase   = .05 // the same but for case or apostrophes at the edges
	costWord   = .4  // a substitution of words, and
	costLetter = 1.4 // times the share of letters that differ
	costSign   = .8  // a substitution of signs
	costSpace  = .5  // a space moved, in or out, and costLetter likewise
	// unlikeSpace is the greatest share of letters that may differ when a
	// space is moved too.
	unlikeSpace = .3
)

// shapes are the edits that move spaces: source tokens against corrected ones.
var shapes = [...]struct{ p, q int }{{1, 2}, {2, 1}, {2, 2}, {1, 3}, {3, 1}, {1, 5}}

// maxCells bounds the table of one alignment; 32 bytes a cell.
const maxCells = 1 << 22

// align returns the edits that turn the source into the corrected text, in
// order, by least cost. Equal tokens are no edits. Texts so long and so unlike
// that the table would be too large come back as one edit, which is unaligned.
func align(source, corrected []token) []edit {
	head := 0
	for head < min(len(source), len(corrected)) && source[head].text == corrected[head].text {
		head++
	}
	s, c := source[head:], corrected[head:]
	for len(s) > 0 && len(c) > 0 && s[len(s)-1].text == c[len(c)-1].text {
		s, c = s[:len(s)-1], c[:len(c)-1]
	}
	if len(s) == 0 && len(c) == 0 {
		return nil
	}
	if (len(s)+1)*(len(c)+1) > maxCells {
		return []edit{{head, head + len(s), head, head + len(c)}}
	}
	t := newAlignment(s, c)
	t.fill()
	return t.edits(head)
}

// alignment is the dynamic-programming table of one pair of texts.
type alignment struct {
	source, corrected []token
	cost              []float64 // (len(source)+1) rows of len(corrected)+1
	back              []edit    // the last step to each cell
}

func newAlignment(source, corrected []token) *alignment {
	cells := (len(source) + 1) * (len(corrected) + 1)
	return &alignment{source, corrected, make([]float64, cells), make([]edit, cells)}
}

func (t *alignment) cell(i, j int) int { return i*(len(t.corrected)+1) + j }

func (t *alignment) fill() {
	for i := 0; i <= len(t.source); i++ {
		for j := 0; j <= len(t.corrected); j++ {
			if i+j > 0 {
				t.reach(i, j)
			}
		}
	}
}

// reach finds the cheapest step to one cell. Of equals the first tried stays.
func (t *alignment) reach(i, j int) {
	best, from := -1.0, edit{}
	try := func(p, q int, cost float64) {
		if cost += t.cost[t.cell(i-p, j-q)]; best < 0 || cost < best {
			best, from = cost, edit{i - p, i, j - q, j}
		}
	}
	if i > 0 && j > 0 {
		if cost, ok := substitution(&t.source[i-1], &t.corrected[j-1]); ok {
			try(1, 1, cost)
		}
	}
	for _, s := range shapes {
		if i >= s.p && j >= s.q {
			if cost, ok := movedSpace(t.source[i-s.p:i], t.corrected[j-s.q:j]); ok {
				try(s.p, s.q, cost)
			}
		}
	}
	if i > 0 {
		try(1, 0, costGap)
	}
	if j > 0 {
		try(0, 1, costGap)
	}
	t.cost[t.cell(i, j)], t.back[t.cell(i, j)] = best, from
}

// edits reads the table from its end, leaving equal tokens out.
func (t *alignment) edits(offset int) []edit {
	var list []edit
	for i, j := len(t.source), len(t.corrected); i+j > 0; {
		e := t.back[t.cell(i, j)]
		i, j = e.i, e.j
		if e.i2-e.i == 1 && e.j2-e.j == 1 && t.source[i].text == t.corrected[j].text {
			continue
		}
		list = append(list, edit{e.i + offset, e.i2 + offset, e.j + offset, e.j2 + offset})
	}
	for a, b := 0, len(list)-1; a < b; a, b = a+1, b-1 {
		list[a], list[b] = list[b], list[a]
	}
	return list
}

func (t *token) sign() bool { return !t.word && !t.digits }

// substitution is the cost of one token for another; signs do not stand for
// words.
func substitution(a, b *token) (float64, bool) {
	switch {
	case a.text == b.text:
		return 0, true
	case a.fold == b.fold:
		return costCase, true
	case a.sign() != b.sign():
		return 0, false
	case a.sign():
		return costSign, true
	}
	return costWord + costLetter*unlike(a.fold, b.fold), true
}

// movedSpace is the cost of tokens for others that differ in where the spaces
// are and little else. No single word of one side may be nearer to the other
// side than all together: "a girl" for "girl" is a word too many and no space,
// "predetor" for "a predator" a slip and a word left out.
func movedSpace(a, b []token) (float64, bool) {
	x, ok := together(a)
	y, ok2 := together(b)
	if !ok || !ok2 || len(a) == len(b) && x != y {
		return 0, false
	}
	long, short := utf8.RuneCountInString(x), utf8.RuneCountInString(y)
	if long < short {
		long, short = short, long
	}
	if float64(long-short) > unlikeSpace*float64(long) {
		return 0, false
	}
	d := levenshtein.ComputeDistance(x, y)
	if share := float64(d) / float64(long); share <= unlikeSpace && !nearer(a, y, d) && !nearer(b, x, d) {
		return costSpace + costLetter*share, true
	}
	return 0, false
}

// nearer says whether one of the tokens is the word or nearer to it than d.
func nearer(tokens []token, word string, d int) bool {
	for i := range tokens {
		if f := tokens[i].fold; len(tokens) > 1 && (f == word || levenshtein.ComputeDistance(f, word) < d) {
			return true
		}
	}
	return false
}

// together writes words as one, hyphens between them left out.
func together(tokens []token) (string, bool) {
	if len(tokens) == 1 {
		return tokens[0].fold, tokens[0].word
	}
	var b strings.Builder
	for i := range tokens {
		if tokens[i].word {
			b.WriteString(tokens[i].fold)
		} else if i%2 == 0 || i == len(tokens)-1 || tokens[i].text != "-" {
			return "", false
		}
	}
	return b.String(), true
}

// unlike is the share of letters in which two words differ: the Levenshtein
// distance over the length of the longer.
func unlike(a, b string) float64 {
	long := max(utf8.RuneCountInString(a), utf8.RuneCountInString(b))
	if long == 0 {
		return 0
	}
	return float64(levenshtein.ComputeDistance(a, b)) / float64(long)
}
