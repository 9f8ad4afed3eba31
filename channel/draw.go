package channel

import (
	"bytes"
	"math/rand/v2"
)

const (
	// mostEdits is how many edits Draw makes at most in a word.
	mostEdits = 3
	// mostDraws is how often Draw tries anew when its edits have undone one
	// another.
	mostDraws = 32
)

// Draw appends what a writer who meant the intended word, in normal form, and
// slipped might have typed: a way to write the word with one to three edits is
// drawn in proportion to its probability, exp(-cost), and what it spells is
// never the word itself. A rule is one edit. Nothing is appended for the empty
// word, nor where no way is left: in a word of many thousands of letters each
// may weigh less than a float64 can hold. One state of random gives one form.
func (m *Model) Draw(dst, intended []byte, random *rand.Rand) []byte {
	s := newSampler(m, intended)
	for range mostDraws {
		form, ok := s.draw(dst, random)
		if !ok {
			break
		}
		if !bytes.Equal(form[len(dst):], intended) {
			return form
		}
	}
	return dst
}

// sampler draws ways to write one word.
type sampler struct {
	m      *Model
	word   []Letter
	rules  [][]Rule                 // rules[p] are those whose intended side stands at letter p
	weight [][mostEdits + 1]float64 // weight[p][k]: of all ways to write the letters from p on with k edits
	steps  []way                    // scratch
}

// way is one step from a letter on: what it types, the letters it writes and
// the edits it takes.
type way struct {
	kind           Kind
	typed          Symbol // for Replaced and Inserted
	rule           *Rule  // for Rewritten
	letters, edits int
	weight         float64 // its probability
}

func newSampler(m *Model, intended []byte) *sampler {
	s := &sampler{m: m, word: AppendLetters(nil, intended)}
	if len(s.word) == 0 {
		return s
	}
	s.findRules()
	s.weight = make([][mostEdits + 1]float64, len(s.word)+1)
	for p := len(s.word); p >= 0; p-- {
		steps := s.from(p)
		for k := range s.weight[p] {
			for i := range steps {
				s.weight[p][k] += s.onward(p, k, &steps[i])
			}
		}
	}
	return s
}

// findRules finds the rules that could rewrite a part of the word.
func (s *sampler) findRules() {
	a := Aligner{intended: s.word}
	s.rules = make([][]Rule, len(s.word))
	var has [symbols]bool
	for _, l := range s.word {
		has[l.Sym] = true
	}
	for i := range s.m.rules.len() {
		if first := s.m.rules.word(i) >> (18 + 5*(maxSide-1)) & 31; !has[first] {
			continue
		}
		rule := s.m.rules.at(i)
		for p := range s.word {
			if a.holds(&rule, p) {
				s.rules[p] = append(s.rules[p], rule)
			}
		}
	}
}

func (s *sampler) sym(p int) Symbol {
	if p < 0 || p >= len(s.word) {
		return Edge
	}
	return s.word[p].Sym
}

// from lists the steps that can be taken before letter p, or at the end; the
// slice is good until the next call.
func (s *sampler) from(p int) []way {
	l, c, r := s.sym(p-1), s.sym(p), s.sym(p+1)
	steps := s.steps[:0]
	for x := Symbol(1); x < symbols; x++ {
		steps = append(steps, way{kind: Inserted, typed: x, edits: 1, weight: probability(s.m.Insert(x, l, c))})
	}
	if p == len(s.word) {
		steps = append(steps, way{kind: Ended, weight: probability(s.m.Stop(l))})
		s.steps = steps
		return steps
	}
	letter := s.word[p]
	steps = append(steps,
		way{kind: Kept, letters: 1, weight: probability(s.m.Emit(letter, l, letter, r))},
		way{kind: Dropped, letters: 1, edits: 1, weight: probability(s.m.Drop(l, c, r))})
	for x := Symbol(1); x < symbols; x++ {
		typed := Letter{x.Rune(), x}
		if x == c && (typed.Rune == letter.Rune || x == Other) {
			continue // kept; of other signs only the apostrophe is ever typed
		}
		steps = append(steps, way{kind: Replaced, typed: x, letters: 1, edits: 1, weight: probability(s.m.Emit(typed, l, letter, r))})
	}
	if r != Edge && r != c {
		steps = append(steps, way{kind: Swapped, letters: 2, edits: 1, weight: probability(s.m.Swap(c, r))})
	}
	for i := range s.rules[p] {
		rule := &s.rules[p][i]
		steps = append(steps, way{kind: Rewritten, rule: rule, letters: int(rule.NIntended), edits: 1, weight: probability(rule.Cost)})
	}
	s.steps = steps
	return steps
}

// onward weighs all ways to write the letters from p on with k edits that begin
// with a step.
func (s *sampler) onward(p, k int, step *way) float64 {
	switch {
	case step.edits > k:
		return 0
	case step.kind == Ended && k > 0:
		return 0
	case step.kind == Ended:
		return step.weight
	}
	return step.weight * s.weight[p+step.letters][k-step.edits]
}

// draw appends what one way to write the word with an edit or more spells.
func (s *sampler) draw(dst []byte, random *rand.Rand) ([]byte, bool) {
	if len(s.word) == 0 {
		return dst, false
	}
	k, ok := pick(random, mostEdits, func(i int) float64 { return s.weight[0][i+1] })
	for p, k := 0, k+1; ok; {
		var i int
		steps := s.from(p)
		if i, ok = pick(random, len(steps), func(i int) float64 { return s.onward(p, k, &steps[i]) }); !ok {
			break
		}
		if steps[i].kind == Ended {
			return dst, true
		}
		dst = s.spell(dst, p, &steps[i])
		p, k = p+steps[i].letters, k-steps[i].edits
	}
	return dst, false
}

// pick draws one of n by weight; there is none when all weigh nothing.
func pick(random *rand.Rand, n int, weight func(int) float64) (int, bool) {
	var all float64
	for i := range n {
		all += weight(i)
	}
	at, last := random.Float64()*all, -1
	for i := range n {
		if w := weight(i); w > 0 {
			if last = i; at < w {
				break
			}
			at -= w
		}
	}
	return last, last >= 0
}

// spell appends what a step types at letter p.
func (s *sampler) spell(dst []byte, p int, step *way) []byte {
	add := func(r rune) { dst = append(dst, string(r)...) }
	switch step.kind {
	case Kept:
		add(s.word[p].Rune)
	case Replaced, Inserted:
		add(step.typed.Rune())
	case Swapped:
		add(s.word[p+1].Rune)
		add(s.word[p].Rune)
	case Rewritten:
		for _, x := range step.rule.Observed[:step.rule.NObserved] {
			add(x.Rune())
		}
	}
	return dst
}
