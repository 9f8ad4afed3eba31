package lexicon

import (
	"math/bits"
	"strings"
)

// listing is what the word lists say of a form.
type listing struct {
	variety [4]Variety // of the lists that have it, by case: lower, title, upper, mixed
	mixed   string     // how it is written in mixed capitals
}

// cases gives the patterns of capitals the form is listed in.
func (l *listing) cases() Cases {
	var c Cases
	for i, v := range l.variety {
		if v != 0 {
			c |= 1 << i
		}
	}
	return c
}

// listedForms folds the lists' words together. Possessives of listed words are
// left out, and single letters but for a, i and o: text never has those as words.
func listedForms(lists []WordList) map[string]*listing {
	forms := map[string]*listing{}
	for _, list := range lists {
		for _, word := range list.Words {
			enterWord(forms, word, list.Variety)
		}
	}
	var dropped []string
	for form := range forms {
		if stem, ok := possessiveStem([]byte(form)); ok && forms[string(stem)] != nil || isLetterName(form) {
			dropped = append(dropped, form)
		}
	}
	for _, form := range dropped {
		delete(forms, form)
	}
	for form := range contractions {
		enterWord(forms, form, Both)
	}
	for _, form := range cliticEndings {
		enterWord(forms, form, Both)
	}
	settleVariety(forms)
	return forms
}

func enterWord(forms map[string]*listing, word string, variety Variety) {
	form := foldString(word)
	if form == "" || len(form) > MaxForm || strings.ContainsAny(form, " -\t") {
		return
	}
	l := forms[form]
	if l == nil {
		l = &listing{}
		forms[form] = l
	}
	c := casesOf(word)
	l.variety[bits.TrailingZeros8(uint8(c))] |= variety
	if c == MixedCase && (l.mixed == "" || word < l.mixed) {
		l.mixed = word
	}
}

func isLetterName(form string) bool {
	return len(form) == 1 && form != "a" && form != "i" && form != "o"
}

// settleVariety gives to both varieties the names that only one list happens to
// have: a name in one list is marked only where the other has its variant.
func settleVariety(forms map[string]*listing) {
	keys := map[string]Variety{}
	for form, l := range forms {
		keys[respelled(form, false)] |= l.of()
	}
	for form, l := range forms {
		if l.variety[0] == 0 && keys[respelled(form, false)] != Both {
			for i, v := range l.variety {
				if v != 0 {
					l.variety[i] = Both
				}
			}
		}
	}
}

// of gives the varieties of a form: those of its small-letter spelling if it
// has one ("centre" is British, whatever lists have a place called Centre).
func (l *listing) of() Variety {
	if l.variety[0] != 0 {
		return l.variety[0]
	}
	return l.variety[1] | l.variety[2] | l.variety[3]
}
