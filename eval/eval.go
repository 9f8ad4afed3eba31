// Package eval measures spelling correction: it reads test data, finds in it
// what a corrector should have found, and compares that with what one did find.
//
// The path of a measurement: a reader ([ReadPairs], [ReadIntended], [ReadCSV];
// [ReadSentences], [ReadM2]; [ReadClean]) turns a file into pairs, sentences or
// clean text; [Gold] aligns a sentence with its corrections and gives an [Item]
// whose spans are the errors; a system's answers arrive as [Flag] and [Ranking],
// types of this package, so that any system can be measured; [PairOutcomes] and
// [JudgeAll] say what became of each; from these [ScoreList], [ScoreText] and
// [ScoreClean] give a [Report] of metrics with 95 % bootstrap intervals.
//
// [Inject] puts slips into clean text, of which [Judged.ScoreNoise] reports.
//
// A [Result] is a whole run, items included, as a file; [Compare] holds two
// against each other, a [Gate] says what must be reached, and [WritePage] draws
// them.
//
// Nothing here reads the clock or a global: the same data, answers and seed
// give the same report. Functions may be called from several goroutines.
package eval

// A Kind is what sort of error a span is.
type Kind string

const (
	Nonword  Kind = "nonword"  // the form is no word
	Realword Kind = "realword" // the form is a word, but not the intended one
	Runon    Kind = "runon"    // a space is missing: "alot"
	Split    Kind = "split"    // a space too many: "with in"
	Repeat   Kind = "repeat"   // a word twice: "the the"
)

// Kinds lists the kinds in the order in which they are reported.
var Kinds = [...]Kind{Nonword, Realword, Runon, Split, Repeat}

// A Flag is one place that a system objects to.
type Flag struct {
	Start       int      `json:"start"` // bytes in the item's source
	End         int      `json:"end"`
	Observed    string   `json:"observed"`
	Kind        Kind     `json:"kind"`
	Grade       string   `json:"grade,omitempty"`       // how sure the system is, in its own words
	P           float64  `json:"p"`                     // the system's probability that it is an error
	Corrections []string `json:"corrections,omitempty"` // what should stand at Start:End instead, best first
	// Held tells that the system keeps the finding to itself, being not sure
	// enough: curves count it, reports do not.
	Held bool `json:"held,omitempty"`
}

// A Ranking is a system's list of intended forms for one word, best first.
type Ranking struct {
	Word       string
	Candidates []string
}

// A Pair is one isolated misspelling.
type Pair struct {
	Line               int // in its file, from 1
	Observed, Intended string
	Count              int  // how often it was seen, at least 1
	Spaces             bool // one of the two has a space that the other lacks
}

// A Sentence is a text and its corrections as they were read.
type Sentence struct {
	Line     int    // in its file, from 1
	Document string // the document or writer it comes from; "" when the file does not say
	Source   string
	// References correct the source minimally: every change of a word is an
	// error. Rewrites improve it freely. Full corrects grammar too, beside
	// References that do not. See Gold for what each is taken to say.
	References, Rewrites, Full []string
	// Observed and Intended name the one error of interest, when the file does.
	Observed, Intended string
}

// An Item is a text and the errors in it.
type Item struct {
	Line     int
	Document string
	Source   string
	Spans    []Span // in order, disjoint
}

// A Span is a stretch of the source that is an error, or, when Neutral, one
// that is no matter of spelling: a flag there is neither right nor wrong.
type Span struct {
	Start       int      `json:"start"` // bytes in the source
	End         int      `json:"end"`
	Kind        Kind     `json:"kind,omitempty"`
	Neutral     bool     `json:"neutral,omitempty"`
	Corrections []string `json:"corrections,omitempty"` // what may stand there instead, the most favoured first
}
