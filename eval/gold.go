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
//     the observed form, realword otherwise; a missing space (runon), a space
//     too many or in the wrong place (split), and a word written twice (repeat);
//   - in a Rewrite the same, but of these only what holds a form that is not
//     known, and is answered by a form not too unlike it: a rewrite that changes
//     known words may be mending grammar or style;
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
				c.neutral = c.neutral || !c.unknown || c.unlike > unlikeRewrite
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
const unlikeRewrite = .6

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
	case !words || !ok || x == y && len(from) == len(to) && len(from) == 1 || hasDigits(from) || hasDigits(to):
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
	for _, g := range group(changes) {
		if g.neutral || 2*voters(changes, g.edit, texts) < texts || slices.Contains(taken[g.i:g.i2], true) {
			continue
		}
		spans = append(spans, Span{
			Start: source[g.i].start, End: source[g.i2-1].end,
			Kind: g.kind, Corrections: g.corrections,
		})
		for i := g.i; i < g.i2; i++ {
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

// grouped are the changes of one stretch of the source that mean one thing.
type grouped struct {
	change
	votes       int
	corrections []string // most votes first
}

// group gathers the changes by place and kind, most votes first.
func group(changes []change) []grouped {
	var groups []grouped
	for _, c := range changes {
		i := slices.IndexFunc(groups, func(g grouped) bool {
			return g.i == c.i && g.i2 == c.i2 && g.kind == c.kind && g.neutral == c.neutral
		})
		if i < 0 {
			i = len(groups)
			groups = append(groups, grouped{change: c})
		}
		groups[i].votes++
		groups[i].corrections = append(groups[i].corrections, c.correction)
	}
	for i := range groups {
		groups[i].corrections = byVotes(groups[i].corrections)
	}
	slices.SortStableFunc(groups, func(a, b grouped) int {
		return cmp.Or(cmp.Compare(b.votes, a.votes), cmp.Compare(a.i, b.i))
	})
	return groups
}

// byVotes returns the different strings, the most frequent first.
func byVotes(all []string) []string {
	votes := map[string]int{}
	var unique []string
	for _, s := range all {
		if votes[s]++; votes[s] == 1 {
			unique = append(unique, s)
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

// only makes every error neutral but the one that the sentence names.
func only(spans []Span, s Sentence) {
	for i := range spans {
		span := &spans[i]
		if !strings.EqualFold(s.Source[span.Start:span.End], strings.TrimSpace(s.Observed)) {
			span.Neutral = true
		}
	}
}
