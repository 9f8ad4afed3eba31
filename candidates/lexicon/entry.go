package lexicon

import (
	"encoding/binary"
	"math"
	"sort"
	"unicode"
	"unicode/utf8"

	"example.org/foulcase/internal/text"
)

// Variety says which written varieties of English a form belongs to, in bits.
type Variety uint8

// The varieties.
const (
	US Variety = 1 << iota
	GB
	Both = US | GB
)

// Cases are the capital patterns a form is met in, in bits.
type Cases uint8

// The patterns: house, London, NASA, iPhone.
const (
	LowerCase Cases = 1 << iota
	TitleCase
	UpperCase
	MixedCase
)

// Entry is what the lexicon knows of a form.
type Entry struct {
	Variety Variety // never 0
	Cases   Cases   // seen in a word list or, often enough, amid sentences of the corpus
	Usual   Cases   // the one of Cases to write it in where a sentence does not start
	Listed  bool    // stands in a word list; otherwise it came from the corpus alone
	Prior   float32 // log relative frequency in running text, nats, at most 0
}

// The packed attributes: bits 0-1 variety (0: from the corpus alone, belongs
// to both), bits 2-3 usual case (number of the bit in Cases), bits 4-7 Cases.
const (
	usualShift = 2
	casesShift = 4
)

func (e Entry) pack() byte {
	var b byte
	if e.Listed {
		b = byte(e.Variety & Both)
	}
	for i := range 4 {
		if e.Usual == 1<<i {
			b |= byte(i) << usualShift
		}
	}
	return b | byte(e.Cases)<<casesShift
}

func unpack(attr, cost byte) Entry {
	e := Entry{
		Variety: Variety(attr) & Both,
		Cases:   Cases(attr >> casesShift),
		Usual:   1 << (attr >> usualShift & 3),
		Listed:  attr&byte(Both) != 0,
		Prior:   prior(cost),
	}
	if !e.Listed {
		e.Variety = Both
	}
	return e
}

// priorSteps is the number of steps a nat in the stored priors: a byte then
// reaches down to -21.25 nats, less than one occurrence in a thousand million.
const priorSteps = 12

// priorCost stores a log relative frequency. It rounds towards 0, so that the
// stored prior is never below the true one: as a cost in a best-first search
// it stays admissible. (A thousandth of a step is added, so that a prior read
// from one lexicon is stored the same in another.)
func priorCost(logp float64) byte {
	return byte(min(max(math.Floor(-logp*priorSteps+1e-3), 0), 255))
}

func prior(cost byte) float32 { return -float32(cost) / priorSteps }

// Entry gives the attributes of a form; for ids from Len on the zero Entry.
func (l *Lexicon) Entry(id uint32) Entry {
	if id >= l.forms {
		return Entry{}
	}
	return unpack(l.attrs[id], l.priors[id])
}

// Prior gives Entry(id).Prior alone; for ids from Len on the least there is.
func (l *Lexicon) Prior(id uint32) float32 {
	if id >= l.forms {
		return prior(255)
	}
	return prior(l.priors[id])
}

// BestPrior is the highest Prior of the ids lo .. hi-1, exactly, in time
// independent of their number; the least prior there is when there are none.
func (l *Lexicon) BestPrior(lo, hi uint32) float32 { return prior(l.best.least(lo, hi)) }

// Canonical gives a form with its usual capitals: "London", "NASA", "iPhone",
// "house"; "" for ids from Len on.
func (l *Lexicon) Canonical(id uint32) string {
	form := l.AppendForm(nil, id)
	if len(form) == 0 {
		return ""
	}
	switch unpack(l.attrs[id], 0).Usual {
	case TitleCase:
		return text.ApplyCase(text.Title, string(form))
	case UpperCase:
		return text.ApplyCase(text.Upper, string(form))
	case MixedCase:
		return capitalise(form, l.capitals(id))
	}
	return string(form)
}

// capitals gives the entry of id in the table of mixed capitals, 0 if none.
func (l *Lexicon) capitals(id uint32) uint32 {
	n := len(l.spelled) / spelledLen
	at := func(i int) uint32 { return binary.LittleEndian.Uint32(l.spelled[i*spelledLen:]) }
	i := sort.Search(n, func(i int) bool { return at(i) >= id })
	if i == n || at(i) != id {
		return 0
	}
	return binary.LittleEndian.Uint32(l.spelled[i*spelledLen+4:])
}

// capitalise turns the code points of form whose bits are set in mask into
// capitals; bit 31 stands for all from the 32nd on.
func capitalise(form []byte, mask uint32) string {
	out := make([]byte, 0, len(form)+4)
	for i := 0; len(form) > 0; i++ {
		r, size := utf8.DecodeRune(form)
		if mask>>min(i, 31)&1 != 0 {
			out = utf8.AppendRune(out, unicode.ToUpper(r))
		} else {
			out = append(out, form[:size]...)
		}
		form = form[size:]
	}
	return string(out)
}
