package text

import (
	"bytes"
	"iter"
	"unicode/utf8"
)

// mostTokens bounds a sentence, so that text without sentence ends (tables,
// lists, letters typed at random) cannot ask for unbounded work.
const mostTokens = 1024

// Segmenter cuts blocks into sentences and tokens. Its memory is kept from
// sentence to sentence, so that a warm one does not allocate. The zero value is
// ready. One goroutine may use it at a time.
type Segmenter struct {
	text   []byte
	pos    int // next byte to look at
	last   int // end of the last token, of whatever sentence
	tokens []Token
	arena  []byte // normal forms that differ from the text

	composer composer

	lower  int  // words with lower-case letters in this sentence
	upper  int  // words of six capitals and more in this sentence
	quotes int  // straight double quotation marks in this sentence
	ended  bool // the sentence ends after the last token
}

// Sentences yields the sentences of a block in order. What it yields is valid
// until the next one.
//
// A sentence ends at a terminal (see endsSentence for the exceptions), with the
// closing quotation marks and brackets after it; at a blank line; at the end of
// the block; and after 1,024 tokens. A single line break is white space.
func (s *Segmenter) Sentences(block []byte) iter.Seq[Sentence] {
	return func(yield func(Sentence) bool) {
		s.text, s.pos, s.last = block, 0, -1
		for s.next() {
			if !yield(s.sentence()) {
				return
			}
		}
	}
}

func (s *Segmenter) sentence() Sentence {
	return Sentence{s.tokens[0].Start, s.tokens[len(s.tokens)-1].End, s.tokens}
}

// next collects the tokens of the next sentence and reports whether there is one.
func (s *Segmenter) next() bool {
	s.tokens, s.arena = s.tokens[:0], s.arena[:0]
	s.lower, s.upper, s.quotes, s.ended = 0, 0, 0, false
	for !s.ended && len(s.tokens) < mostTokens {
		start, breaks := s.skipSpace(s.pos)
		s.pos = start
		if start == len(s.text) || breaks > 1 && len(s.tokens) > 0 {
			break
		}
		end, mask := s.run(start)
		s.pos = s.scan(start, end, mask)
		if !s.ended {
			s.ended = s.endsSentence()
		}
	}
	s.lowerHeading()
	return len(s.tokens) > 0
}

// skipSpace returns the first byte from p on that is no white space, and how
// many line ends were passed.
func (s *Segmenter) skipSpace(p int) (next, breaks int) {
	for p < len(s.text) {
		switch c := s.text[p]; {
		case c == ' ':
			p++
		case c == '\n':
			if p == 0 || s.text[p-1] != '\r' {
				breaks++
			}
			p++
		case c == '\r':
			breaks++
			p++
		case classes[c]&cSpace != 0:
			p++
		case c < utf8.RuneSelf:
			return p, breaks
		default:
			r, n := utf8.DecodeRune(s.text[p:])
			if classOf(r, n) != rSpace {
				return p, breaks
			}
			if r == '\u2029' {
				breaks += 2
			}
			p += n
		}
	}
	return p, breaks
}

// run returns the end of the run of characters other than white space that
// begins at p, and the classes of its bytes.
func (s *Segmenter) run(p int) (end int, mask class) {
	for end = p; end < len(s.text); end++ {
		m := classes[s.text[end]]
		if m&cSpace != 0 {
			break
		}
		mask |= m
	}
	if mask&cHigh == 0 {
		return end, mask
	}
	for i := p; i < end; {
		if s.text[i] < utf8.RuneSelf {
			i++
			continue
		}
		r, n := utf8.DecodeRune(s.text[i:end])
		if classOf(r, n) == rSpace {
			return i, mask
		}
		i += n
	}
	return end, mask
}

// add appends a token without a normal form.
func (s *Segmenter) add(kind Kind, start, end int) {
	s.tokens = append(s.tokens, Token{Start: start, End: end, Kind: kind, Glued: start == s.last})
	s.last = end
}

// lowerHeading makes words of the short all-capital tokens of a sentence that
// is all capitals ("NOTICE TO MASTERS"): when no word of it has lower-case
// letters, and one has six capitals or more or there are four without a comma.
func (s *Segmenter) lowerHeading() {
	if s.lower > 0 || s.upper == 0 && (len(s.tokens) < 4 || !s.shouted()) {
		return
	}
	for i := range s.tokens {
		if t := &s.tokens[i]; t.Kind == Acronym && s.allCapitals(t) {
			t.Kind = Word
		}
	}
}

func (s *Segmenter) shouted() bool {
	n := 0
	for i := range s.tokens {
		switch t := &s.tokens[i]; {
		case t.Kind == Comma:
			return false
		case t.Kind == Acronym && s.allCapitals(t):
			n++
		}
	}
	return n > 3
}

// allCapitals reports an acronym without points or ampersands.
func (s *Segmenter) allCapitals(t *Token) bool {
	return t.Case == Upper && !bytes.ContainsAny(s.text[t.Start:t.End], ".&")
}
