package lexicon

import "strings"

// editKind says how one form comes from another by a single edit, as far as
// it matters for how often people slip that way.
type editKind uint8

const (
	otherEdit      editKind = iota // any letter inside the word
	doublingEdit                   // one letter of a double lost, or doubled: occured, untill
	vowelEdit                      // a vowel for another, one lost or added: seperate
	swapEdit                       // two neighbours swapped: recieve
	firstEdit                      // the first letter
	finalEdit                      // the last letter: another, or one more
	endingEdit                     // an inflection put on, taken off or changed: boat, boats
	accentEdit                     // marks on letters: cafe, café
	apostropheEdit                 // dont, don't
)

// near visits the forms of l one edit away from a form (a letter lost, added,
// replaced, or two neighbours swapped: restricted Damerau distance 1), each at
// least once, with the kind of the edit that makes form of it. Letters beyond
// ASCII are only compared, never edited.
func near(l *Lexicon, form string, visit func(id uint32, kind editKind)) {
	n, base := l.Root(), uint32(0)
	rest := func(n Node, base uint32, i int, kind editKind) {
		for ; i < len(form); i++ {
			target, skip, ok := l.Step(n, form[i])
			if !ok {
				return
			}
			n, base = target, base+skip
		}
		if l.Final(n) {
			visit(base, kind)
		}
	}
	for i := 0; ; i++ {
		if i < len(form) { // form has form[i] too much
			rest(n, base, i+1, kindOfAdded(form, i))
		}
		for e := l.Edges(n); e.Next(); {
			if e.Label >= 0x80 {
				continue
			}
			rest(e.Target, base+e.Skip, i, kindOfLost(form, i, e.Label)) // form lacks the label
			if i < len(form) && e.Label != form[i] && form[i] < 0x80 {
				rest(e.Target, base+e.Skip, i+1, kindOfReplaced(form, i, e.Label))
				if i+1 < len(form) && e.Label == form[i+1] {
					if target, skip, ok := l.Step(e.Target, form[i]); ok {
						rest(target, base+e.Skip+skip, i+2, kindOfSwapped(i))
					}
				}
			}
		}
		if i == len(form) {
			return
		}
		target, skip, ok := l.Step(n, form[i])
		if !ok {
			return
		}
		n, base = target, base+skip
	}
}

// isEnding reports a letter that inflections differ by at the end of a word.
func isEnding(c byte) bool { return strings.IndexByte("sdrny", c) >= 0 }

// kindOfAdded classes the edit that put form[i] into the other word.
func kindOfAdded(form string, i int) editKind {
	c := form[i]
	switch {
	case c == '\'':
		return apostropheEdit
	case i > 0 && form[i-1] == c || i+1 < len(form) && form[i+1] == c:
		return doublingEdit
	case i == len(form)-1 && isEnding(c):
		return endingEdit
	case i == 0:
		return firstEdit
	case i == len(form)-1:
		return finalEdit
	case isVowel(c):
		return vowelEdit
	}
	return otherEdit
}

// kindOfLost classes the edit that dropped c before form[i] from the other word.
func kindOfLost(form string, i int, c byte) editKind {
	switch {
	case c == '\'':
		return apostropheEdit
	case i > 0 && form[i-1] == c || i < len(form) && form[i] == c:
		return doublingEdit
	case i == len(form) && isEnding(c):
		return endingEdit
	case i == 0:
		return firstEdit
	case isVowel(c):
		return vowelEdit
	}
	return otherEdit
}

// kindOfReplaced classes the edit that put form[i] for c.
func kindOfReplaced(form string, i int, c byte) editKind {
	switch {
	case c == '\'' || form[i] == '\'':
		return otherEdit
	case i == len(form)-1 && isEnding(c) && isEnding(form[i]):
		return endingEdit
	case i == 0:
		return firstEdit
	case i == len(form)-1:
		return finalEdit
	case isVowel(c) && isVowel(form[i]):
		return vowelEdit
	}
	return otherEdit
}

func kindOfSwapped(i int) editKind {
	if i == 0 {
		return firstEdit
	}
	return swapEdit
}
