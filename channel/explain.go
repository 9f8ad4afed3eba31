package channel

import "slices"

// Kind says what a step does to the intended letters.
type Kind uint8

// The kinds of step.
const (
	Kept Kind = iota
	Replaced
	Dropped
	Inserted
	Swapped
	Rewritten // by a rule
	Ended     // nothing is added at the end
)

var kindNames = [...]string{"kept", "replaced", "dropped", "inserted", "swapped", "rewritten", "ended"}

func (k Kind) String() string {
	if int(k) < len(kindNames) {
		return kindNames[k]
	}
	return "unknown"
}

// Step is one step of an alignment.
type Step struct {
	Kind     Kind
	Intended string // the letters meant; empty for Inserted and Ended
	Observed string // the letters typed for them; empty for Dropped and Ended
	Left     rune   // the intended letter to the left, '^' at the start of the word
	Cost     float64
}

// Explain gives the steps of the best alignment in order; their costs sum to Cost.
func (m *Model) Explain(observed, intended string) []Step {
	a := Aligner{
		observed: AppendLetters(nil, []byte(observed)),
		intended: AppendLetters(nil, []byte(intended)),
	}
	a.match(m)
	a.align(m, true)
	last := a.sym(len(a.intended) - 1)
	steps := []Step{{Kind: Ended, Left: last.Rune(), Cost: float64(m.Stop(last))}}
	width := len(a.observed) + 1
	for at := len(a.from) - 1; at > 0; {
		mv := a.from[at]
		p, i := int(mv.position), int(mv.previous)%width
		steps = append(steps, Step{
			Kind:     mv.kind,
			Intended: spell(a.intended[p : p+int(mv.nIntended)]),
			Observed: spell(a.observed[i : i+int(mv.nTyped)]),
			Left:     a.sym(p - 1).Rune(),
			Cost:     float64(mv.cost),
		})
		at = int(mv.previous)
	}
	slices.Reverse(steps)
	return steps
}

func spell(letters []Letter) string {
	runes := make([]rune, len(letters))
	for i, l := range letters {
		runes[i] = l.Rune
	}
	return string(runes)
}
