package foulcase

// Kind says in which way the text is wrong.
type Kind uint8

// The kinds of error.
const (
	Nonword  Kind = iota // a form that is no word: "teh"
	Realword             // a word, but not the one meant: "a quite berth"
	Runon                // a space is missing: "alot"
	Split                // a space too many: "with in"
	Repeat               // a word twice: "the the"
)

var kindNames = [...]string{"nonword", "realword", "runon", "split", "repeat"}

// Kinds lists every kind, in the order of their values.
func Kinds() []Kind { return []Kind{Nonword, Realword, Runon, Split, Repeat} }

func (k Kind) String() string { return kindNames[k] }

// MarshalText writes the kind's name, so that JSON carries words.
func (k Kind) MarshalText() ([]byte, error) { return []byte(k.String()), nil }

// Grade says how sure a finding is.
type Grade uint8

const (
	// GradeQuery is a doubt put to the author.
	GradeQuery Grade = iota
	// GradeMark is a correction sure enough to act on.
	GradeMark
	// GradeDoubt is less sure than the budget allows; see Options.Doubts.
	GradeDoubt
)

func (g Grade) String() string { return [...]string{"query", "mark", "doubt"}[g] }

// MarshalText writes the grade's name.
func (g Grade) MarshalText() ([]byte, error) { return []byte(g.String()), nil }

// Correction is one proposed text for what a Mark covers.
type Correction struct {
	Text string  `json:"text"`
	P    float64 `json:"p"` // posterior probability that this was intended
	// Source is how the document must spell Text in the place of the mark, UTF-8;
	// "" when it is spelled the same.
	Source string `json:"source,omitempty"`
}

// Spelled returns the correction as the document must spell it, UTF-8.
func (c Correction) Spelled() string {
	if c.Source != "" {
		return c.Source
	}
	return c.Text
}

// Mark is one finding in a document, of either grade.
type Mark struct {
	Part        string       `json:"part,omitempty"` // of a packed document; "" in all others
	Line        int          `json:"line"`           // 1-based; in a packed document the paragraph of the part
	Column      int          `json:"column"`         // 1-based, in code points
	Offset      int64        `json:"offset"`         // bytes into the document, or into its part
	Length      int64        `json:"length"`         // bytes
	Observed    string       `json:"observed"`
	Kind        Kind         `json:"kind"`
	Grade       Grade        `json:"grade"`
	P           float64      `json:"p"`           // probability that this is an error
	Corrections []Correction `json:"corrections"` // best first; never nil
	Context     string       `json:"context"`     // the words around it, on one line
	// ByHand says that no program should put a correction in its place: markup stands
	// inside the mark, or the document has no spelling for it there.
	ByHand bool `json:"by_hand,omitempty"`
	// Rule is RuleHouse when a list of house words has it written otherwise, whatever the
	// models say; "" else.
	Rule string `json:"rule,omitempty"`
}

// RuleHouse is the Mark.Rule of what the house always writes otherwise.
const RuleHouse = "house"
