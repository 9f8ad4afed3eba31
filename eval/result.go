package eval

// ResultFormat is the version of the JSON that [Result] is written in. History:
//
//	1  first
const ResultFormat = 1

// A Result is one run of the harness: enough to repeat it, to compare it item
// by item with another, and to draw it. It holds no time of day, so that the
// same run gives the same bytes.
type Result struct {
	Format  int               `json:"format"`
	Task    string            `json:"task"`              // "list", "text", "noise" or "clean"
	Command []string          `json:"command"`           // as it was typed
	Version string            `json:"version"`           // of the program
	Go      string            `json:"go"`                // version of the compiler
	Model   string            `json:"model"`             // hash
	Options map[string]string `json:"options,omitempty"` // flags that were set
	Data    []DataFile        `json:"data"`              // in the order of the run
	Report  *Report           `json:"report"`            // of all data together
	Overlap Overlap           `json:"overlap"`           // of all data together
	Pairs   []PairOutcome     `json:"pairs,omitempty"`   // task list, in the order of the data
	Units   []Unit            `json:"units,omitempty"`   // all other tasks, in the order of the data
	Places  []Place           `json:"places,omitempty"`  // all other tasks, in the order of the text
}

// A DataFile is one file of test data and what was measured on it.
type DataFile struct {
	Name    string  `json:"name"`   // as given
	SHA256  string  `json:"sha256"` // of its bytes, hexadecimal
	Items   int     `json:"items"`
	Report  *Report `json:"report"`
	Overlap Overlap `json:"overlap"`
}

// Overlap says how much of the data the model was fitted on.
type Overlap struct {
	Recorded bool `json:"recorded"` // the model says what it was fitted on
	Of       int  `json:"of"`       // pairs or errors looked up
	Fitted   int  `json:"fitted"`   // of these, fitted on
}

// Share is the part of the pairs that the model was fitted on, 0 where nothing
// is recorded.
func (o Overlap) Share() float64 {
	if o.Of == 0 || !o.Recorded {
		return 0
	}
	return float64(o.Fitted) / float64(o.Of)
}

// A PairOutcome is one isolated misspelling and where its intended form stood.
type PairOutcome struct {
	Data       int      `json:"data"` // index into Result.Data
	Line       int      `json:"line"` // in its file, from 1
	Observed   string   `json:"observed"`
	Intended   string   `json:"intended"`
	Rank       int      `json:"rank"`                 // place of the intended form, from 1; 0 where it is missing
	Candidates []string `json:"candidates,omitempty"` // the first three
	Classes    []string `json:"classes"`              // of ListClasses
}

// A Unit is what intervals and comparisons draw: a document, or an item that
// names none.
type Unit struct {
	Data     int    `json:"data"` // index into Result.Data
	Document string `json:"document,omitempty"`
	Line     int    `json:"line"` // where it begins
	Words    int    `json:"words"`
}

// Outcomes of a Place.
const (
	PlaceRight   = "right"   // the flag finds an error
	PlaceWrong   = "wrong"   // the flag is a false alarm
	PlaceNeither = "neither" // the flag stands on neutral ground, or on an error that another finds
	PlaceMissed  = "missed"  // an error that no flag finds
)

// A Place is a flag, an error, or an error with the flag that finds it. Offsets
// are bytes in the item that begins at Line.
type Place struct {
	Unit     int    `json:"unit"` // index into Result.Units
	Line     int    `json:"line"`
	Observed string `json:"observed"` // what stands there
	Context  string `json:"context"`  // the text around it, on one line
	Outcome  string `json:"outcome"`  // PlaceRight, PlaceWrong, PlaceNeither or PlaceMissed
	// Flag is nil for an error that nothing was said of. A flag without a grade
	// is a finding that the system holds back: curves count it, reports do not.
	Flag  *Flag `json:"flag,omitempty"`
	Error *Span `json:"error,omitempty"` // nil for a false alarm
	// Rank is the place of a right correction among the flag's, from 1; 0 where
	// there is none.
	Rank   int    `json:"rank,omitempty"`
	Ledger string `json:"ledger,omitempty"` // the parts of the scores, for reading
}

// Reported says whether the system said something here.
func (p *Place) Reported() bool { return p.Flag != nil && p.Flag.Grade != "" }

// Missed says whether there is an error here that the system did not report.
func (p *Place) Missed() bool {
	return p.Error != nil && !p.Error.Neutral && !(p.Reported() && p.Outcome == PlaceRight)
}
