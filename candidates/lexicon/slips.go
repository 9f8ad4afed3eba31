package lexicon

import (
	"strings"
	"unicode/utf8"
)

// slipShares is, by kind of edit, the share of a long word's occurrences that
// its slips of the kind do not reach, even in text nobody has edited, one
// particular wrong form for one hard word taken: "recieve" stands about once
// for thirty times "receive" in unedited text, "accomodate" once for ten. From
// experience with such text, on the safe side; the corpus at hand is edited and
// has a hundredth of that.
var slipShares = [...]float64{
	otherEdit:      0.05,
	doublingEdit:   0.25,
	vowelEdit:      0.20,
	swapEdit:       0.20,
	firstEdit:      0.01,
	finalEdit:      0.02,
	endingEdit:     0.001,
	accentEdit:     0.005,
	apostropheEdit: 0.30,
}

// lengthFactor scales slipShares by the letters of the form: short forms have
// many chance neighbours, and short words are seldom misspelled (contractions,
// which lose their apostrophe at any length, aside).
func lengthFactor(letters int) float64 {
	switch {
	case letters <= 3:
		return 0.02
	case letters == 4:
		return 0.05
	case letters == 5:
		return 0.3
	case letters == 6:
		return 0.5
	}
	return 1
}

// Factors of slipShares for capitals: a slip of a word is written with its
// capitals, so a name is hardly a slip of a word that is none.
const (
	nameOfWord    = 0.02 // the form is a name, the neighbour is not
	nameOfName    = 0.15 // both are: names have more neighbours of their kind
	acronymFactor = 0.01 // abbreviations lie close together
)

// A technical word recurs where it stands, a slip does not: of a word of
// burstLetters letters that stands burstRate times in a document, in
// burstDocuments at least, slips are taken to make up less.
const (
	burstRate      = 1.7
	burstDocuments = 8
	burstLetters   = 6
	burstFactor    = 0.1
)

func (n *Count) isBursty() bool {
	return n.Documents >= burstDocuments && float64(n.Total()) >= burstRate*float64(n.Documents)
}

// variantShare bounds the share where habits of spelling differ and both are
// right (judgment, containerise): only a rare variant is taken for a slip.
const variantShare = 0.02

func isFreeVariant(a, b string) bool {
	return respelled(a, true) == respelled(b, true) || strings.ReplaceAll(a, "s", "z") == strings.ReplaceAll(b, "s", "z")
}

// slipShare is the share of the neighbour's count that form must reach.
func slipShare(form string, n, neighbour *Count, kind editKind) float64 {
	letters := utf8.RuneCountInString(form)
	share := slipShares[kind]
	if kind != apostropheEdit {
		share *= lengthFactor(letters)
	}
	if letters >= burstLetters && n.isBursty() {
		share *= burstFactor
	}
	switch {
	case n.isAcronym():
		return share * acronymFactor
	case n.isName() && neighbour.isName():
		return share * nameOfName
	case n.isName():
		return share * nameOfWord
	}
	return share
}

// weighNeighbours turns the verdict where a neighbour shows the form to be a
// slip, and notes the neighbour that comes nearest to it.
func (e *Evidence) weighNeighbours(v *Verdict) {
	total := float64(v.Count.Total())
	worst := 0.0 // slips over occurrences
	weigh := func(other string, kind editKind) {
		n := e.counts.Get(other)
		if other == v.Form || n.Total() <= v.Count.Total() {
			return
		}
		share := slipShare(v.Form, &v.Count, &n, kind)
		if isFreeVariant(v.Form, other) {
			share = min(share, variantShare)
		}
		if slips := share * float64(n.Total()) / total; slips > worst {
			worst = slips
			v.Neighbour, v.NeighbourCount, v.Share = other, n.Total(), share
		}
	}
	var buf [MaxForm]byte
	near(e.near, v.Form, func(id uint32, kind editKind) {
		weigh(string(e.near.AppendForm(buf[:0], id)), kind)
	})
	plain := plainLetters(v.Form)
	weigh(plain, accentEdit)
	if marked := e.plain[plain]; marked != "" {
		weigh(marked, accentEdit)
	}
	if worst >= 1 {
		v.In, v.Reason = false, "a slip of "+v.Neighbour
	}
}

// closedClass are words that begin or end no compound written as one; particles
// that do (up, on, out, over ...) are left out, as are short ones that other
// words happen to end in (as, is, us, an).
const closedClass = " the and but of to from for with that this these those was were been has have had will would can could " +
	"should every each all than then there their they your very too more most many much what when where how why which who "

func isClosedClass(word string) bool { return strings.Contains(closedClass, " "+word+" ") }

// runTogether splits a form into a closed-class word and another listed word
// that is runTogetherFactor times as frequent as the form; an "a" at the start
// ("alot") needs a hundred times, as it also begins words (atypical). It gives
// "" and "" where the form does not split so, or is a name.
func (e *Evidence) runTogether(form string, n *Count) (first, second string) {
	if n.isName() || n.isAcronym() {
		return "", ""
	}
	frequent := func(word string, factor uint32) bool {
		return e.listed[word] != nil && e.total(word)/factor > n.Total()
	}
	for i := 2; i <= len(form)-2; i++ {
		a, b := form[:i], form[i:]
		if isClosedClass(a) && frequent(b, runTogetherFactor) || isClosedClass(b) && frequent(a, runTogetherFactor) {
			return a, b
		}
	}
	if rest, ok := strings.CutPrefix(form, "a"); ok && frequent(rest, 100) {
		return "a", rest
	}
	return "", ""
}

const runTogetherFactor = 20
