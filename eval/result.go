package eval

// ResultFormat is the version of the JSON that [Result] is written in. History:
//
//	1  first
const ResultFormat = 1

// The tasks that are measured.
const (
	TaskList  = "list"  // isolated pairs
	TaskText  = "text"  // text whose errors are known
	TaskNoise = "noise" // text with slips put in
	TaskClean = "clean" // text that holds no errors
)

// A Result is one run of the harness: enough to repeat it, to compare it item
// by item with another, and to draw it. It holds no time of day, so that the
// same run gives the same bytes.
type Result struct {
	Format  int               `json:"format"`
	Task    string            `json:"task"`              // TaskList, TaskText, TaskNoise or TaskClean
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
	Name     string  `json:"name"`     // as given
	SHA256   string  `json:"sha256"`   // of its bytes, hexadecimal
	Read     string  `json:"read"`     // the shape it was read as, and its columns
	Measured string  `json:"measured"` // HashItems or HashPairs of what was measured
	Items    int     `json:"items"`
	Report   *Report `json:"report"`
	Overlap  Overlap `json:"overlap"`
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
	Observed string `json:"observed"`        // what stands in error, or under the flag
	Context  string `json:"context"`         // the text around it, on one line
	Outcome  string `json:"outcome"`         // PlaceRight, PlaceWrong, PlaceNeither or PlaceMissed
	Flag     *Flag  `json:"flag,omitempty"`  // nil for an error that nothing was said of
	Error    *Span  `json:"error,omitempty"` // nil unless the outcome is right or missed; never neutral
	// Rank is the place of a right correction among the flag's, from 1; 0 where
	// there is none.
	Rank int `json:"rank,omitempty"`
	// Again tells that the flag finds several errors, and is counted with another.
	Again  bool   `json:"again,omitempty"`
	Ledger string `json:"ledger,omitempty"` // the parts of the scores, for reading
}

// Reported says whether the system objects to the place, not holding back.
func (p *Place) Reported() bool { return p.Flag != nil && !p.Flag.Held }

// Missed says whether there is an error here that the system does not report.
func (p *Place) Missed() bool { return p.Error != nil && !p.Reported() }
