package candidates

import (
	"slices"

	"example.org/foulcase/candidates/lexicon"
)

// nearWords finds the words of a lexicon that one letter put in, left out or
// replaced, or two swapped, makes of one another, by the forms that remain when
// a letter is left out (Bocek, Hunt & Stiller 2007). Letters are bytes: the few
// words with others are far from everything. Safe for concurrent use.
type nearWords struct {
	lex       *lexicon.Lexicon
	remaining map[string][]uint32
}

// newNearWords indexes the words of at least two letters with log priors of at
// least `least`, clitics aside.
func newNearWords(lex *lexicon.Lexicon, least float32) *nearWords {
	n := &nearWords{lex, map[string][]uint32{}}
	var form []byte
	for id := range uint32(lex.Len()) {
		if lex.Prior(id) < least {
			continue
		}
		if form = lex.AppendForm(form[:0], id); len(form) < 2 || form[0] == '\'' {
			continue
		}
		for rest := range shorter(form) {
			n.remaining[string(rest)] = append(n.remaining[string(rest)], id)
		}
	}
	return n
}

// shorter yields a form and what each letter left out makes of it, each once.
// What is yielded is valid until the next.
func shorter(form []byte) func(yield func([]byte) bool) {
	return func(yield func([]byte) bool) {
		if !yield(form) {
			return
		}
		rest := make([]byte, 0, len(form))
		for i := range form {
			if i > 0 && form[i] == form[i-1] {
				continue
			}
			if rest = append(append(rest[:0], form[:i]...), form[i+1:]...); !yield(rest) {
				return
			}
		}
	}
}

// of returns the ids of the words near a word, ascending.
func (n *nearWords) of(id uint32) []uint32 {
	form := n.lex.AppendForm(nil, id)
	var near []uint32
	for rest := range shorter(form) {
		for _, other := range n.remaining[string(rest)] {
			if other != id && oneEdit(form, n.lex.AppendForm(nil, other)) {
				near = append(near, other)
			}
		}
	}
	slices.Sort(near)
	return slices.Compact(near)
}

// oneEdit reports whether two different forms are a single edit apart.
func oneEdit(a, b []byte) bool {
	if len(a) > len(b) {
		a, b = b, a
	}
	i := 0
	for i < len(a) && a[i] == b[i] {
		i++
	}
	switch len(b) - len(a) {
	case 1:
		return string(a[i:]) == string(b[i+1:])
	case 0:
		swapped := i+1 < len(a) && a[i] == b[i+1] && a[i+1] == b[i] && string(a[i+2:]) == string(b[i+2:])
		return swapped || i < len(a) && string(a[i+1:]) == string(b[i+1:])
	}
	return false
}
