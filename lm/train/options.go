package train

import (
	"fmt"
	"iter"
	"os"
	"runtime"

	"example.org/foulcase/lm"
)

// Sentences is a stream of sentences of word ids, each with its begin and end
// ids. A slice is valid until the next step. The stream ends after an error.
type Sentences = iter.Seq2[[]uint32, error]

// Options say how to train. The zero value of a field means its default;
// Begin and End have none.
type Options struct {
	Vocabulary int    // number of word ids, at most 2^20; default one more than the largest seen
	Begin      uint32 // id that opens a sentence; never predicted
	End        uint32 // id that closes a sentence

	Order     int      // 1..lm.MaxOrder; default 4
	MinCounts []uint32 // n-grams of order i+1 seen less often are pruned; unigrams stay
	Size      int64    // bytes the section may have; 0 does not prune for size
	Threshold float64  // loss in nats a token below which an n-gram is pruned; Size overrides it
	Prune     Method   // how pruned counts are made up for; default Revised

	// Widths of the codes. At eight bits contexts still sum to one within 1e-4;
	// six and four leave room for more n-grams, but let sums exceed one by some
	// 0.5 %, which flatters a measured perplexity by as much.
	ProbBits    uint // codebook of log probabilities; default 8; ExactBits stores float32
	BackoffBits uint // codebook of back-offs; default 8

	Memory   int64          // bytes for counting before runs spill to disk; default 1 GiB
	TempDir  string         // where runs are spilled; default os.TempDir
	Workers  int            // default runtime.NumCPU
	Progress func(Progress) // called from the training goroutine, may be nil
}

// ExactBits asks for values stored as float32 rather than by codebook.
const ExactBits = 32

// Progress reports how far a stage has come.
type Progress struct {
	Stage string // "count", "merge", "estimate", "prune", "encode"
	Order int    // order being worked on, 0 if none
	Done  int64  // tokens counted, or n-grams written
}

// normalise fills in the defaults and checks the rest.
func (o Options) normalise() (Options, error) {
	def := func(p *int, v int) {
		if *p == 0 {
			*p = v
		}
	}
	def(&o.Order, 4)
	def(&o.Workers, runtime.NumCPU())
	if o.ProbBits == 0 {
		o.ProbBits = 8
	}
	if o.BackoffBits == 0 {
		o.BackoffBits = 8
	}
	if o.Memory <= 0 {
		o.Memory = 1 << 30
	}
	if o.TempDir == "" {
		o.TempDir = os.TempDir()
	}
	if o.Progress == nil {
		o.Progress = func(Progress) {}
	}
	switch {
	case o.Order < 1 || o.Order > lm.MaxOrder:
		return o, fmt.Errorf("train: order %d, want 1 to %d", o.Order, lm.MaxOrder)
	case o.Vocabulary < 0 || o.Vocabulary > maxVocabulary:
		return o, fmt.Errorf("train: vocabulary of %d words, want at most %d", o.Vocabulary, maxVocabulary)
	case int(o.Begin) >= o.limit() || int(o.End) >= o.limit() || o.Begin == o.End:
		return o, fmt.Errorf("train: begin %d and end %d in a vocabulary of %d", o.Begin, o.End, o.Vocabulary)
	}
	return o, nil
}

// limit returns the number of ids that a text may use.
func (o *Options) limit() int {
	if o.Vocabulary == 0 {
		return maxVocabulary
	}
	return o.Vocabulary
}
