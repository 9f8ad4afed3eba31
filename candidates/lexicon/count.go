package lexicon

import (
	"bytes"
	"strings"

	"golang.org/x/text/unicode/norm"

	"example.org/foulcase/internal/text"
)

// Count tells how often, and in which capitals, a form stands in a corpus. The
// arrays go by case: lower, title, upper, mixed.
type Count struct {
	Documents uint32    // documents that have it
	Amid      [4]uint32 // occurrences inside sentences, where capitals tell something
	Lead      [4]uint32 // those where they do not: first in a sentence, in headings
	Joined    uint32    // of all these, the ones next to a hyphen

	last uint32 // the last document that had it, from 1
}

// Total is the number of all occurrences.
func (c *Count) Total() uint32 {
	var n uint32
	for i := range c.Amid {
		n += c.Amid[i] + c.Lead[i]
	}
	return n
}

// Counter counts the forms of a corpus. Possessives count for their stems and
// for "'s". One goroutine.
type Counter struct {
	Words     uint64 // words counted, those of pruned forms too
	Documents uint32

	index   map[string]uint32 // form to its place in counts
	counts  []Count
	spelled map[string]uint32 // words in mixed capitals, as they stand
	seg     text.Segmenter
}

// NewCounter gives an empty counter.
func NewCounter() *Counter {
	return &Counter{index: map[string]uint32{}, spelled: map[string]uint32{}}
}

// Get gives the count of a form, zero if the corpus lacks it.
func (c *Counter) Get(form string) Count {
	if i, ok := c.index[form]; ok {
		return c.counts[i]
	}
	return Count{}
}

// Len is the number of different forms.
func (c *Counter) Len() int { return len(c.index) }

// Document counts a document, a paragraph a line.
func (c *Counter) Document(doc []byte) {
	c.Documents++
	for line := range bytes.Lines(doc) {
		for s := range c.seg.Sentences(line) {
			c.sentence(line, s.Tokens)
		}
	}
}

func (c *Counter) sentence(block []byte, tokens []text.Token) {
	heading := isHeading(tokens)
	first := true
	for i := range tokens {
		tok := &tokens[i]
		if !counted(tok) {
			continue
		}
		joined := tok.Glued && i > 0 && tokens[i-1].Kind == text.Hyphen ||
			i+1 < len(tokens) && tokens[i+1].Kind == text.Hyphen && tokens[i+1].Glued
		stem := tok.Norm
		if s, ok := possessiveStem(stem); ok {
			stem = s
			c.add([]byte("'s"), text.Lower, false, false)
		}
		c.add(stem, tok.Case, first || heading, joined)
		if tok.Case == text.Mixed {
			c.spelled[spelling(block[tok.Start:tok.End])]++
		}
		c.Words++
		first = false
	}
}

// counted picks words, and literals that may be names in mixed capitals.
func counted(tok *text.Token) bool {
	switch tok.Kind {
	case text.Word, text.Acronym:
		return len(tok.Norm) > 0 && len(tok.Norm) <= MaxForm
	case text.Literal:
		return tok.Case == text.Mixed && len(tok.Norm) > 0 && len(tok.Norm) <= MaxForm
	}
	return false
}

// isHeading reports a sentence most of whose words behind the first, short ones
// aside, have capitals, as in headings: there they say nothing about a word.
func isHeading(tokens []text.Token) bool {
	words, capitals := 0, 0
	for i := range tokens {
		if tok := &tokens[i]; i > 0 && tok.Kind == text.Word && len(tok.Norm) > 3 {
			words++
			if tok.Case != text.Lower {
				capitals++
			}
		}
	}
	return 2*capitals > words
}

func (c *Counter) add(form []byte, pattern text.Case, lead, joined bool) {
	i, ok := c.index[string(form)]
	if !ok {
		i = uint32(len(c.counts))
		c.index[string(form)] = i
		c.counts = append(c.counts, Count{})
	}
	n := &c.counts[i]
	k := 0
	if pattern > text.Lower {
		k = int(pattern - text.Lower)
	}
	if lead {
		n.Lead[k]++
	} else {
		n.Amid[k]++
	}
	if joined {
		n.Joined++
	}
	if n.last != c.Documents {
		n.last = c.Documents
		n.Documents++
	}
}

// spelling is a word as it stands, but NFC, with U+0027 for apostrophes and
// without a possessive ending.
func spelling(word []byte) string {
	s := strings.ReplaceAll(norm.NFC.String(string(word)), "\u2019", "'")
	if stem, ok := possessiveStem([]byte(s)); ok {
		return string(stem)
	}
	return s
}

// Merge adds the counts of other, which covers other documents.
func (c *Counter) Merge(other *Counter) {
	c.Words += other.Words
	c.Documents += other.Documents
	for form, j := range other.index {
		i, ok := c.index[form]
		if !ok {
			i = uint32(len(c.counts))
			c.index[form] = i
			c.counts = append(c.counts, Count{})
		}
		c.counts[i].merge(&other.counts[j])
	}
	for s, n := range other.spelled {
		c.spelled[s] += n
	}
}

func (c *Count) merge(o *Count) {
	c.Documents += o.Documents
	c.Joined += o.Joined
	for i := range c.Amid {
		c.Amid[i] += o.Amid[i]
		c.Lead[i] += o.Lead[i]
	}
}

// prune drops the rarest forms, first those seen once, then twice and so on,
// until at most limit are left.
func (c *Counter) prune(limit int) {
	for least := uint32(2); len(c.index) > limit; least++ {
		kept := c.counts[:0:0]
		for form, i := range c.index {
			if c.counts[i].Total() < least {
				delete(c.index, form)
				continue
			}
			c.index[form] = uint32(len(kept))
			kept = append(kept, c.counts[i])
		}
		c.counts = kept
		for s, n := range c.spelled {
			if n < least {
				delete(c.spelled, s)
			}
		}
	}
}
