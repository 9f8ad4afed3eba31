package candidates

import (
	"encoding/binary"
	"errors"
	"fmt"
	"math/bits"
	"slices"
	"unicode/utf8"

	"example.org/foulcase/candidates/lexicon"
)

// ErrSection is wrapped by the errors of OpenMirror and OpenConfusables.
var ErrSection = errors.New("candidates: not a section of this version (rebuild the model file)")

// Mirror is a lexicon spelled backwards. With it a word whose beginning is
// badly misspelt is found from its end; the search is exact without it, but
// far slower. It is safe for concurrent use.
//
// The section is: magic, number of words and size of the lexicon section (4
// bytes each, little-endian), a lexicon section of the reversed words, and for
// each of those the id of the word, in as many bits as the greatest id takes
// (from the low bits of each byte up), and 7 spare bytes.
type Mirror struct {
	lex  *lexicon.Lexicon
	ids  []byte
	bits int
}

const (
	mirrorMagic  = "fcmi0001"
	mirrorHeader = len(mirrorMagic) + 8
)

// BuildMirror writes the section for a lexicon.
func BuildMirror(lex *lexicon.Lexicon) ([]byte, error) {
	var b lexicon.Builder
	var form []byte
	for id := range uint32(lex.Len()) {
		e := lex.Entry(id)
		e.Usual = lexicon.LowerCase
		form = lex.AppendForm(form[:0], id)
		reverse(form)
		b.Add(string(form), e, "")
	}
	section, err := b.Section()
	if err != nil {
		return nil, fmt.Errorf("candidates: reversing the lexicon: %w", err)
	}
	reversed, err := lexicon.Open(section)
	if err != nil {
		return nil, fmt.Errorf("candidates: reversing the lexicon: %w", err)
	}
	ids := make([]byte, idsBytes(uint64(lex.Len())))
	width := bits.Len(uint(lex.Len()))
	for number := range uint32(reversed.Len()) {
		form = reversed.AppendForm(form[:0], number)
		reverse(form)
		id, _ := lex.ID(form)
		at := int(number) * width
		word := binary.LittleEndian.Uint64(ids[at/8:])
		binary.LittleEndian.PutUint64(ids[at/8:], word|uint64(id)<<(at%8))
	}
	out := append([]byte(nil), mirrorMagic...)
	out = binary.LittleEndian.AppendUint32(out, uint32(lex.Len()))
	out = binary.LittleEndian.AppendUint32(out, uint32(len(section)))
	out = append(out, section...)
	return append(out, ids...), nil
}

// idsBytes is the size of the table of ids.
func idsBytes(words uint64) uint64 {
	const spare = 7 // so that eight bytes can be read from any place
	return (words*uint64(bits.Len64(words))+7)/8 + spare
}

// reverse turns the order of the code points of a word.
func reverse(word []byte) {
	slices.Reverse(word)
	for from := 0; from < len(word); {
		to := from
		for to < len(word)-1 && !utf8.RuneStart(word[to]) {
			to++
		}
		slices.Reverse(word[from : to+1])
		from = to + 1
	}
}

// OpenMirror reads a section in place; the bytes must not change afterwards. It
// must have been built from the lexicon it is used with; compare Words.
func OpenMirror(section []byte) (*Mirror, error) {
	if len(section) < mirrorHeader || string(section[:len(mirrorMagic)]) != mirrorMagic {
		return nil, fmt.Errorf("%w: unknown beginning", ErrSection)
	}
	words := uint64(binary.LittleEndian.Uint32(section[len(mirrorMagic):]))
	size := uint64(binary.LittleEndian.Uint32(section[len(mirrorMagic)+4:]))
	if want := uint64(mirrorHeader) + size + idsBytes(words); uint64(len(section)) != want {
		return nil, fmt.Errorf("%w: mirror of %d bytes, expected %d", ErrSection, len(section), want)
	}
	body := section[mirrorHeader:]
	reversed, err := lexicon.Open(body[:size])
	if err != nil {
		return nil, fmt.Errorf("%w: mirror: %w", ErrSection, err)
	}
	if uint64(reversed.Len()) != words {
		return nil, fmt.Errorf("%w: mirror of %d words, expected %d", ErrSection, reversed.Len(), words)
	}
	return &Mirror{lex: reversed, ids: body[size:], bits: bits.Len64(words)}, nil
}

// Words is the number of words of the lexicon the mirror was built from.
func (m *Mirror) Words() int { return m.lex.Len() }

// id gives the id of a word by its number among the reversed words.
func (m *Mirror) id(number uint32) uint32 {
	at := int(number) * m.bits
	return uint32(binary.LittleEndian.Uint64(m.ids[at/8:])>>(at%8)) & (1<<m.bits - 1)
}
