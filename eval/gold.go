package eval

import (
	"cmp"
	"slices"
	"strings"
)

// Gold aligns a sentence with its corrections and returns the errors in it.
// known says whether a form, as it stands in a text, is a word.
//
// What counts as an error:
//
//   - a word replaced by another in a Reference: nonword when known says no of
//     the observed form, and otherwise realword, if the two have a letter in
//     five in common or Observed names it; a missing space (runon), a space
//     too many or in the wrong place (split), and a word written twice (repeat);
//   - in a Rewrite the same, but of these only words written twice and what
//     holds a form that is not known and is answered by one not too unlike it:
//     a rewrite that changes known words may be mending grammar or style;
//   - with several references and rewrites, only what at least half of them
//     change. The corrections of all of them are accepted.
//
// What is neutral: every other change to the source, be it of punctuation,
// case, figures, hyphens, of words left out, by a minority of the references,
// or in Full alone; and, when Observed is set, every error but that one.
// Words put in have no place in the source and say nothing.
func Gold(s Sentence, known func(string) bool) Item {
	source := tokenize(s.Source)
	var changes []change
	texts := len(s.References) + len(s.Rewrites)
	for i, text := range slices.Concat(s.References, s.Rewrites, s.Full) {
		corrected := tokenize(text)
		for _, e := range align(source, corrected) {
			if e.i == e.i2 {
				continue
			}
			c := describe(s.Source, source, text, corrected, e, known)
			c.text = i
			switch {
			case i >= texts:
				c.neutral = true
			case i >= len(s.References):
				c.neutral = c.neutral || c.kind != Repeat && (!c.unknown || c.unlike > unlikeRewrite)
			case c.kind == Realword && s.Observed == "":
				c.neutral = c.unlike > unlikeSlip
			}
			changes = append(changes, c)
		}
	}
	item := Item{Line: s.Line, Document: s.Document, Source: s.Source}
	item.Spans = settle(source, changes, texts)
	if s.Observed != "" {
		only(item.Spans, s)
	}
	return item
}

// unlikeRewrite is the greatest share of letters by which a rewrite may differ
// from an unknown form and still be taken for its correction.
const unlikeRewrite = .5

// unlikeSlip is the greatest share of letters by which a known word may differ
// from another known word and still be taken for a slip of it.
const unlikeSlip = .8

// change is an edit that touches the source, and what it means.
type change struct {
	edit
	text       int // which corrected text makes it
	kind       Kind
	neutral    bool
	correction string
	unknown    bool    // the source side has a form that is not known
	unlike     float64 // share of letters changed
}

// describe decides what an edit means.
func describe(sourceText string, source []token, text string, corrected []token, e edit, known func(string) bool) change {
	from, to := source[e.i:e.i2], corrected[e.j:e.j2]
	c := change{edit: e}
	if len(to) > 0 {
		c.correction = text[to[0].start:to[len(to)-1].end]
	}
	for i := range from {
		c.unknown = c.unknown || from[i].word && !known(from[i].text)
	}
	x, words := together(from)
	y, ok := together(to)
	c.unlike = unlike(x, y)
	switch {
	case len(to) == 0:
		c.repeat(sourceText, source)
	case !words || !ok || hasDigits(from) || hasDigits(to), e.unaligned(), len(from) == 1 && len(to) == 1 && x == y:
		c.neutral = true
	case len(from) == 1 && len(to) > 1:
		c.kind = Runon
	case len(from) > 1:
		c.kind = Split
		c.neutral = hasSign(from) // a hyphen taken out
	case c.unknown:
		c.kind = Nonword
	default:
		c.kind = Realword
	}
	return c
}

// repeat looks at a token left out: the second of two equal words is an error,
// and its place is both of them.
func (c *change) repeat(text string, source []token) {
	c.neutral = true
	t := &source[c.i]
	for _, i := range []int{c.i - 1, c.i} {
		if c.i2-c.i == 1 && t.word && i >= 0 && i+1 < len(source) && source[i].fold == source[i+1].fold {
			c.i, c.i2, c.kind, c.neutral = i, i+2, Repeat, false
			c.correction = text[source[i].start:source[i].end]
			return
		}
	}
}

func hasDigits(tokens []token) bool {
	return slices.ContainsFunc(tokens, func(t token) bool { return t.digits })
}

func hasSign(tokens []token) bool {
	return slices.ContainsFunc(tokens, func(t token) bool { return t.sign() })
}

// settle makes the changes of all texts into disjoint spans: of errors that
// overlap, the one that most texts agree on. Whatever else was changed is
// neutral, token by token.
func settle(source []token, changes []change, texts int) []Span {
	taken := make([]bool, len(source))
	var spans []Span
	for _, group := range places(changes) {
		e := group[0]
		if 2*voters(changes, e.edit, texts) < texts || slices.Contains(taken[e.i:e.i2], true) {
			continue
		}
		span := Span{Start: source[e.i].start, End: source[e.i2-1].end, Corrections: byVotes(group)}
		for _, c := range group {
			if c.correction == span.Corrections[0] {
				span.Kind = c.kind
			}
		}
		spans = append(spans, span)
		for i := e.i; i < e.i2; i++ {
			taken[i] = true
		}
	}
	for _, c := range changes {
		for i := c.i; i < c.i2; i++ {
			if !taken[i] {
				spans = append(spans, Span{Start: source[i].start, End: source[i].end, Neutral: true})
				taken[i] = true
			}
		}
	}
	slices.SortFunc(spans, func(a, b Span) int { return cmp.Compare(a.Start, b.Start) })
	return spans
}

// places groups the errors by the stretch of the source that they change, the
// stretch that most texts change first, within a group the likest form first.
func places(changes []change) [][]change {
	var groups [][]change
	for _, c := range changes {
		if c.neutral {
			continue
		}
		i := slices.IndexFunc(groups, func(g []change) bool { return g[0].i == c.i && g[0].i2 == c.i2 })
		if i < 0 {
			i = len(groups)
			groups = append(groups, nil)
		}
		groups[i] = append(groups[i], c)
	}
	for _, g := range groups {
		slices.SortStableFunc(g, func(a, b change) int { return cmp.Compare(a.unlike, b.unlike) })
	}
	slices.SortStableFunc(groups, func(a, b []change) int {
		return cmp.Or(cmp.Compare(len(b), len(a)), cmp.Compare(a[0].unlike, b[0].unlike))
	})
	return groups
}

// byVotes returns the corrections of one place, the most frequent first, and
// of equals the likest.
func byVotes(group []change) []string {
	votes := map[string]int{}
	var unique []string
	for _, c := range group {
		if votes[c.correction]++; votes[c.correction] == 1 {
			unique = append(unique, c.correction)
		}
	}
	slices.SortStableFunc(unique, func(a, b string) int { return votes[b] - votes[a] })
	return unique
}

// voters counts those of the first texts that change anything in the place of
// an edit.
func voters(changes []change, e edit, texts int) int {
	voted := map[int]bool{}
	for _, c := range changes {
		if c.text < texts && c.i < e.i2 && e.i < c.i2 {
			voted[c.text] = true
		}
	}
	return len(voted)
}

// only makes every error neutral but the one that the sentence names: the
// spans that are the observed word, or, when a file names another form of it,
// those that touch it.
func only(spans []Span, s Sentence) {
	word := fold(strings.TrimSpace(s.Observed))
	same := func(span Span) bool { return fold(s.Source[span.Start:span.End]) == word }
	if !slices.ContainsFunc(spans, func(span Span) bool { return !span.Neutral && same(span) }) {
		same = func(span Span) bool {
			text := fold(s.Source[span.Start:span.End])
			return strings.Contains(text, word) || strings.Contains(word, text)
		}
	}
	for i := range spans {
		spans[i].Neutral = spans[i].Neutral || !same(spans[i])
	}
}
