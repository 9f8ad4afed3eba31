package foulcase

import (
	"fmt"
	"slices"
	"strings"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
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

// Options says how a document is to be judged. The zero value is usable:
// plain text, either variety, no house words, the model's own budget.
type Options struct {
	Format string // the name of one of Formats; "" is plain
	// Fields are the columns or members to read of a format of records; none means
	// all that hold prose.
	Fields []string
	// Encoding is that of the document, by a name of the WHATWG's Encoding Standard,
	// utf-32le or utf-32be; "" is UTF-8. A byte order mark overrides it.
	Encoding string
	Variety  Variety // the spelling asked for
	House    *House  // nil: none
	// Budget is how many false alarms a 1,000 words of good text the reader
	// will bear, marks and queries together; 0 takes the model's default.
	Budget float64
	// SlipRate fixes how many slips a word the writer makes; 0 estimates it from
	// the document.
	SlipRate float64
	// Without names evidence to do without, for measuring what it is worth.
	Without Evidence
	// Doubts yields findings below the thresholds of the budget too, down to
	// LeastDoubt, so that a measurement can draw its own.
	Doubts bool
}

// reading is what the options say of reading a document.
func (o Options) reading() text.Options { return text.Options{Fields: o.Fields} }

// LeastDoubt is the least probability of a finding that Options.Doubts yields.
const LeastDoubt = .002

// Evidence is a set of what a document tells about itself.
type Evidence uint8

// What a document tells about itself.
const (
	SlipRateEvidence  Evidence = 1 << iota // how often its writer slips
	CacheEvidence                          // which known words it uses oftener than others do
	RecurringEvidence                      // which unknown forms it repeats
	allEvidence       = iota
)

var evidenceNames = [allEvidence]string{"slip-rate", "cache", "recurring"}

// EvidenceNames lists what ParseEvidence reads.
func EvidenceNames() []string { return evidenceNames[:] }

// ParseEvidence reads names of EvidenceNames.
func ParseEvidence(names ...string) (Evidence, error) {
	var set Evidence
	for _, name := range names {
		i := slices.Index(evidenceNames[:], name)
		if i < 0 {
			return 0, fmt.Errorf("evidence %q: want %s", name, strings.Join(evidenceNames[:], ", "))
		}
		set |= 1 << i
	}
	return set, nil
}

func (e Evidence) has(one Evidence) bool { return e&one != 0 }
