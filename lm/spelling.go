package lm

import (
	"fmt"
	"unicode/utf8"
)

// Symbol is what a model of new words predicts: a letter or a class of
// characters. The letters a to z are 0 to 25.
type Symbol uint32

// The symbols behind the letters.
const (
	Apostrophe Symbol = 26 + iota
	HyphenMark
	Digit
	OtherLetter // any other character
	WordBegin
	WordEnd
	Symbols // their number
)

// What it costs to say which character of a class is meant, in nats: one of ten
// digits; one of roughly a hundred letters beyond a to z (guessed).
const (
	digitNats = 2.3025851
	otherNats = 4.6051702
)

// SymbolOf returns the symbol of a folded character and the price of singling
// it out within its class, in nats.
func SymbolOf(r rune) (s Symbol, nats float32) {
	switch {
	case 'a' <= r && r <= 'z':
		return Symbol(r - 'a'), 0
	case r == '\'':
		return Apostrophe, 0
	case r == '-':
		return HyphenMark, 0
	case '0' <= r && r <= '9':
		return Digit, digitNats
	}
	return OtherLetter, otherNats
}

// AppendSymbols appends the symbols of a folded form between WordBegin and
// WordEnd, as ids of the model.
func AppendSymbols(dst []uint32, form []byte) []uint32 {
	dst = append(dst, uint32(WordBegin))
	for len(form) > 0 {
		r, size := utf8.DecodeRune(form)
		form = form[size:]
		s, _ := SymbolOf(r)
		dst = append(dst, uint32(s))
	}
	return append(dst, uint32(WordEnd))
}

// Spelling prices words that no lexicon holds by the letters they are made of.
type Spelling struct {
	model *Model
	begin State
}

// OpenSpelling opens a model over symbols. Errors wrap ErrFormat.
func OpenSpelling(section []byte) (*Spelling, error) {
	m, err := Open(section)
	if err != nil {
		return nil, err
	}
	if m.Vocabulary() != int(Symbols) {
		return nil, fmt.Errorf("%w: %d symbols, want %d", ErrFormat, m.Vocabulary(), Symbols)
	}
	return &Spelling{m, m.Begin(uint32(WordBegin))}, nil
}

// Price returns -log P(form) in nats, the end of the word included, for a
// folded form. The prices of all forms are those of one distribution. It
// allocates nothing and may be called from several goroutines.
func (s *Spelling) Price(form []byte) float64 {
	state, next := s.begin, State{}
	price := 0.0
	for len(form) > 0 {
		r, size := utf8.DecodeRune(form)
		form = form[size:]
		symbol, nats := SymbolOf(r)
		price += float64(nats - s.model.Advance(&state, uint32(symbol), &next))
		state = next
	}
	return price - float64(s.model.Advance(&state, uint32(WordEnd), &next))
}
