package house

import "example.org/foulcase"

// What was decided about a mark.
const (
	Stet      = "stet"      // let it stand
	Corrected = "corrected" // the mark was right
)

// How far a Stet reaches.
const (
	Here       = "here"       // this mark alone, by its fingerprint
	Everywhere = "everywhere" // the form in all documents
)

// Decision is what someone decided about a mark: a line of a file of decisions,
// an object of JSON.
type Decision struct {
	Decision    string  `json:"decision"`           // Stet or Corrected
	Scope       string  `json:"scope,omitempty"`    // of a Stet: Here or Everywhere
	Observed    string  `json:"observed"`           // the form, as it stood
	Intended    string  `json:"intended,omitempty"` // of Corrected: what was meant
	Kind        string  `json:"kind,omitempty"`
	Context     string  `json:"context,omitempty"`
	P           float64 `json:"p,omitempty"`           // what the mark claimed
	Path        string  `json:"path,omitempty"`        // the document's Name
	Fingerprint string  `json:"fingerprint,omitempty"` // of the mark; Here goes by it
	Date        string  `json:"date,omitempty"`        // RFC 3339, UTC
}

// DecisionOn is a decision on a mark of the document at path. It wants no scope when the
// decision is Corrected; Intended is then the first correction.
func DecisionOn(path string, m foulcase.Mark, decision, scope string) Decision {
	d := Decision{
		Decision: decision, Scope: scope,
		Observed: m.Observed, Kind: m.Kind.String(), Context: m.Context, P: m.P,
		Path: Name(path), Fingerprint: Fingerprint(path, m),
	}
	if decision == Corrected && len(m.Corrections) > 0 {
		d.Intended = m.Corrections[0].Text
	}
	return d
}
