package foulcase

import (
	"fmt"
	"io"

	"example.org/foulcase/candidates/lexicon"
)

// Variety is the English the text is held to.
type Variety uint8

// The varieties: either spelling, American, British.
const (
	AnyVariety Variety = iota
	American
	British
)

var varietyNames = [...]string{"any", "en-US", "en-GB"}

func (v Variety) String() string { return varietyNames[v] }

// bits is the set of lexicon varieties that a text may mix; 0 is all.
func (v Variety) bits() lexicon.Variety {
	return [...]lexicon.Variety{0, lexicon.US, lexicon.GB}[v]
}

// ParseVariety reads "any", "en-US" or "en-GB".
func ParseVariety(name string) (Variety, error) {
	for v, n := range varietyNames {
		if n == name {
			return Variety(v), nil
		}
	}
	return 0, fmt.Errorf("variety %q: want en-US, en-GB or any", name)
}

// House is the organisation's own vocabulary, read once and shared between
// goroutines.
type House struct {
	words *lexicon.Lexicon
}

// ReadHouse reads a list of house words, one a line, UTF-8, "#" beginning a
// comment. Errors name the list, the line and the remedy.
func ReadHouse(name string, r io.Reader) (*House, error) {
	list, err := lexicon.ReadWords(r, name)
	if err != nil {
		return nil, err
	}
	words, err := lexicon.FromWords(list)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", name, err)
	}
	return &House{words}, nil
}

// Options says how a document is to be judged. The zero value is usable:
// plain text, either variety, no house words, the model's own budget.
type Options struct {
	Format  string  // a name of Formats; "" is plain
	Variety Variety // the spelling asked for
	House   *House  // nil: none
	// Budget is how many false alarms a 1,000 words of good text the reader
	// will bear, marks and queries together; 0 takes the model's default.
	Budget float64
}

// has reports whether the house has the folded form; a nil House has none.
func (h *House) has(form []byte) bool {
	if h == nil {
		return false
	}
	_, ok := h.words.ID(form)
	return ok
}
