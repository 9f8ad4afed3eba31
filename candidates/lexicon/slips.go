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
	swapEdit:       0.10,
	firstEdit:      0.01,
	finalEdit:      0.02,
	endingEdit:     0.001,
	accentEdit:     0.005,
	apostropheEdit: 0.30,
}

// lengthFactor scales slipShares by the letters of the form: short forms have
// many chance neighbours, and short words are seldom misspelled.
func lengthFactor(letters int) float64 {
	switch {
	case letters <= 3:
		return 0.02
	case letters == 4:
		return 0.05
	case letters == 5:
		return 0.15
	case letters == 6:
		return 0.4
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

// variantShare bounds the share for spelling variants, where both are right:
// only a rare one ("noticable") is taken for a slip.
const variantShare = 0.02

// slipShare is the share of the neighbour's count that form must reach.
func slipShare(form string, n, neighbour *Count, kind editKind) float64 {
	share := slipShares[kind] * lengthFactor(utf8.RuneCountInString(form))
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
	worst := 0.0
	weigh := func(other string, kind editKind) {
		n := e.counts.Get(other)
		if other == v.Form || n.Total() <= v.Count.Total() {
			return
		}
		share := slipShare(v.Form, &v.Count, &n, kind)
		if SpellingVariants(v.Form, other) {
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
	if worst > 1 {
		v.In, v.Reason = false, "a slip of "+v.Neighbour
	}
}

// closedClass are words that begin or end no compound written as one; particles
// that do (up, on, out, over ...) are left out.
const closedClass = " the an and or but of to from for with at as that this these those it is are was were be been " +
	"has have had will would can could should may might every each all any some no not so if than then there " +
	"their they them we us you your his her its our my he she which who what when where how why very too more " +
	"most many much "

func isClosedClass(word string) bool { return strings.Contains(closedClass, " "+word+" ") }

// runTogether splits a form into a closed-class word and another frequent
// word, in either order; "" and "" where it does not split so, or is a name.
func (e *Evidence) runTogether(form string, n *Count) (first, second string) {
	if n.isName() || n.isAcronym() {
		return "", ""
	}
	for i := 2; i <= len(form)-2; i++ {
		a, b := form[:i], form[i:]
		other := a
		switch {
		case isClosedClass(a):
			other = b
		case !isClosedClass(b):
			continue
		}
		if e.listed[other] != nil && e.total(other)/runTogetherFactor > n.Total() {
			return a, b
		}
	}
	return "", ""
}

// runTogetherFactor is how much more frequent than the whole the other word must be.
const runTogetherFactor = 20
