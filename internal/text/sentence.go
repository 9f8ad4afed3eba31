package text

import "unicode/utf8"

// endsSentence reports whether the sentence ends after the tokens so far, the
// last of which ends a run. It may retag the last point: a point that belongs to
// an initial joins it (Acronym), one that belongs to an abbreviation is Other.
//
// "!", "?" and four points end a sentence, unless a lower-case word follows a
// closing quotation mark or bracket ("Help!" he said). A single point ends one
// but for
//   - abbreviations, by their class (abbreviations.go);
//   - dotted acronyms and initials (U.S., a.m., J. Smith), unless the next word
//     is a capitalised function word (opensSentence);
//   - the point of a list mark: a number or letter that begins the sentence.
//
// Numbers hold their own points, and ellipses are never terminals.
func (s *Segmenter) endsSentence() bool {
	last := len(s.tokens) - 1
	i := last
	for i > 0 && (s.tokens[i].Kind == Quote || s.tokens[i].Kind == Close) {
		i -= s.noteLen(i)
	}
	t := &s.tokens[i]
	point := s.text[t.End-1] == '.'
	if t.Kind != Terminal && !(t.Kind == Acronym && point) {
		return false
	}
	next := s.peek()
	if next.closer {
		return false // decided after it
	}
	if i < last && next.lower || next.comma {
		return false
	}
	switch {
	case t.Kind == Acronym:
		return s.dottedEnds(t, next)
	case !point || t.End-t.Start > 1:
		return true
	}
	return s.pointEnds(i, next)
}

// noteLen returns how many tokens a closing mark at token i stands for: three
// when it closes the mark of a note ("so.[3]").
func (s *Segmenter) noteLen(i int) int {
	if i > 2 && s.tokens[i].Kind == Close && s.tokens[i-1].Kind == Number && s.tokens[i-2].Kind == Open && s.tokens[i-2].Glued {
		return 3
	}
	return 1
}

// ahead is what is seen of the next run.
type ahead struct {
	none   bool   // the block or the paragraph ends
	closer bool   // it is nothing but closing quotation marks and brackets
	comma  bool   // it begins with , ; or :
	lower  bool   // its first letter is small
	upper  bool   // its first letter is a capital
	digit  bool   // it begins with a digit
	word   []byte // its first word in ASCII letters
}

// peek looks at the run after the last one scanned.
func (s *Segmenter) peek() (a ahead) {
	p, breaks := s.skipSpace(s.pos)
	if p == len(s.text) || breaks > 1 {
		a.none = true
		return a
	}
	switch s.text[p] {
	case ',', ';', ':':
		a.comma = true
		return a
	}
	if s.closers(p) {
		a.closer = true
		return a
	}
	for p < len(s.text) {
		r, n := utf8.DecodeRune(s.text[p:])
		switch cl := classOf(r, n); {
		case cl == rLatin:
			a.upper, a.lower = isUpper(r), isLower(r)
		case '0' <= r && r <= '9':
			a.digit = true
		case cl == rSymbol && opens(r):
			p += n
			continue
		}
		break
	}
	end := p
	for end < len(s.text) && classes[s.text[end]]&cLetter != 0 {
		end++
	}
	a.word = s.text[p:end]
	return a
}

// closers reports that the run at p is nothing but closing marks.
func (s *Segmenter) closers(p int) bool {
	end, _ := s.run(p)
	straight := s.quotes
	for p < end {
		r, n := utf8.DecodeRune(s.text[p:end])
		switch r {
		case ')', ']', '}', '\'', '\u2019', '\u201D', '\u00BB':
		case '"':
			if straight%2 == 0 {
				return false // it opens
			}
			straight++
		default:
			return false
		}
		p += n
	}
	return true
}

// opens reports characters that may stand before the first word of a sentence.
func opens(r rune) bool {
	switch r {
	case '"', '\'', '`', '(', '[', '{', '*', '_', '\u2018', '\u201C', '\u201E', '\u00AB', '\u00BF', '\u00A1':
		return true
	}
	return false
}

// dottedEnds is endsSentence for a dotted acronym.
func (s *Segmenter) dottedEnds(t *Token, next ahead) bool {
	switch string(t.Norm) {
	case "e.g", "i.e":
		return next.none
	}
	return next.none || opensSentence(next.word)
}

// pointEnds is endsSentence for the single point at token i. The point of an
// initial joins it.
func (s *Segmenter) pointEnds(i int, next ahead) bool {
	point := &s.tokens[i]
	if i == 0 || !point.Glued {
		return true
	}
	before := &s.tokens[i-1]
	letter := before.Norm != nil && before.End-before.Start == 1
	initial := letter && before.Case == Title && i == len(s.tokens)-1
	switch {
	case next.none:
		return true
	case i == 1 && (letter || before.Kind == Number): // a list mark or an initial
	case initial && s.initial(i-1) && !opensSentence(next.word) && !s.labelled(i-1): // J. Smith
	case letter && before.Kind == Literal && next.digit: // p. 12
		initial = false
	case before.Kind == Word && s.abbreviated(before, next):
		initial = false
	default:
		return true
	}
	if initial {
		before.End, before.Kind = point.End, Acronym
		s.tokens = s.tokens[:i]
	} else {
		point.Kind = Other
	}
	return false
}

// initial reports that the capital at token i may be that of a name: not the I
// of "so do I", unless another initial stands before it.
func (s *Segmenter) initial(i int) bool {
	return s.text[s.tokens[i].Start] != 'I' || s.tokens[i-1].Kind == Acronym
}

// labelled reports that the letter at token i names a thing rather than a
// person: "plan B".
func (s *Segmenter) labelled(i int) bool {
	if i == 0 || s.tokens[i-1].Kind != Word {
		return false
	}
	switch string(s.tokens[i-1].Norm) {
	case "vitamin", "plan", "type", "class", "group", "grade", "section", "part", "appendix", "figure", "table",
		"point", "option", "level", "hepatitis", "schedule", "exhibit", "annex", "side", "category", "phase", "note":
		return true
	}
	return false
}

// abbreviated reports that a point after a word marks an abbreviation, and does
// not end the sentence as well.
func (s *Segmenter) abbreviated(word *Token, next ahead) bool {
	switch abbreviationOf(word.Norm) {
	case beforeName:
		return true
	case beforeNumber:
		return next.digit || next.lower || romanStart(next.word)
	case anywhere:
		return !opensSentence(next.word)
	case closing:
		return next.lower || next.digit
	}
	return next.lower && len(word.Norm) > 1 && len(word.Norm) < 5 && vowelless(word.Norm)
}

func romanStart(word []byte) bool { return len(word) > 0 && roman(word) }

// vowelless reports a word that cannot be said, as many abbreviations are.
func vowelless(norm []byte) bool {
	for _, c := range norm {
		switch c {
		case 'a', 'e', 'i', 'o', 'u', 'y', '\'':
			return false
		}
	}
	return true
}
