// Package lexicon holds the known word forms of a model: a minimal acyclic
// automaton over the UTF-8 bytes of the folded forms, in which the number of a
// form (its id) is its rank in byte order, with packed attributes for each form,
// all read in place. It also builds that section from word lists and corpus
// counts (CountDocuments, Build), and turns tokens into the id stream that the language
// model reads.
//
// # Section
//
// All numbers are little-endian; n is the number of forms.
//
//	magic       4 bytes  "FCX1"
//	forms       uint32   n
//	automaton   uint32   its size in bytes
//	spelled     uint32   number of entries in the table of mixed capitals
//	automaton            see automaton.go
//	priors      n bytes  -12 log p, rounded down: twelfths of a nat
//	attributes  n bytes  variety (2 bits), usual case (2), cases seen (4)
//	spelled     8 bytes each: id uint32, capitals uint32 (bit i: code point i
//	            of the form is a capital), ascending ids
package lexicon

import (
	"encoding/binary"
	"errors"
	"fmt"
)

// MaxForm is the longest form in bytes.
const MaxForm = 96

const (
	magic      = "FCX1"
	headerSize = 16
	spelledLen = 8 // bytes of an entry of the table of mixed capitals
)

// ErrFormat is wrapped by the errors of Open: the bytes are no lexicon section.
var ErrFormat = errors.New("lexicon: not a lexicon section (rebuild the model file)")

// Lexicon reads a section in place; it keeps the section's bytes, which must
// not change. It is safe for concurrent use.
type Lexicon struct {
	forms   uint32
	states  automaton
	priors  []byte
	attrs   []byte
	spelled []byte
	root    [256]rootEdge
	best    rangeMin
	clitics []clitic
}

// rootEdge is the root's edge for a label, read once at opening.
type rootEdge struct {
	target, skip uint32
	ok           bool
}

// Open reads a section. It checks the sizes and reads the priors once (their
// range maxima are built, in less than a millisecond); everything else is
// checked where it is read, so that no bytes make a later call panic or loop.
func Open(section []byte) (*Lexicon, error) {
	if len(section) < headerSize || string(section[:4]) != magic {
		return nil, fmt.Errorf("%w: magic missing", ErrFormat)
	}
	word := func(i int) uint64 { return uint64(binary.LittleEndian.Uint32(section[4*i:])) }
	n, size, spelled := word(1), word(2), word(3)
	if want := headerSize + size + 2*n + spelledLen*spelled; uint64(len(section)) != want {
		return nil, fmt.Errorf("%w: %d bytes, want %d", ErrFormat, len(section), want)
	}
	if size < 1+sparePadding {
		return nil, fmt.Errorf("%w: automaton of %d bytes", ErrFormat, size)
	}
	cut := func(size uint64) []byte {
		part := section[:size:size]
		section = section[size:]
		return part
	}
	cut(headerSize)
	l := &Lexicon{forms: uint32(n), states: cut(size), priors: cut(n), attrs: cut(n), spelled: cut(spelledLen * spelled)}
	l.best = newRangeMin(l.priors)
	nd := l.states.at(0)
	for i := range nd.n {
		if target, ok := l.states.target(&nd, i); ok {
			l.root[l.states[nd.labels+i]] = rootEdge{target, l.states.skip(&nd, i), true}
		}
	}
	l.clitics = l.findClitics()
	return l, nil
}

// Len is the number of forms; their ids are 0 .. Len-1.
func (l *Lexicon) Len() int { return int(l.forms) }

// ID gives the id of a form in normal form (folded, NFC, apostrophe U+0027).
func (l *Lexicon) ID(form []byte) (uint32, bool) {
	if len(form) == 0 {
		return 0, false
	}
	first := &l.root[form[0]]
	if !first.ok {
		return 0, false
	}
	pos, id := first.target, first.skip
	for _, b := range form[1:] {
		target, skip, ok := l.states.step(pos, b)
		if !ok {
			return 0, false
		}
		pos, id = target, id+skip
	}
	return id, l.states.final(pos) && id < l.forms
}

// AppendForm appends the folded form of an id; nothing for ids from Len on.
func (l *Lexicon) AppendForm(dst []byte, id uint32) []byte {
	if id >= l.forms {
		return dst
	}
	pos := uint32(0)
	for range MaxForm {
		nd := l.states.at(pos)
		if nd.own == 1 && id == 0 || nd.n == 0 {
			break
		}
		i := l.states.edgeOf(&nd, id)
		id -= min(id, l.states.skip(&nd, i))
		dst = append(dst, l.states[nd.labels+i])
		var ok bool
		if pos, ok = l.states.target(&nd, i); !ok {
			break
		}
	}
	return dst
}
