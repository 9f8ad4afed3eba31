package lexicon

import "bytes"

// contractions with 's are forms of their own: "it's" is no possessive.
var contractions = map[string]bool{
	"it's": true, "he's": true, "she's": true, "that's": true, "there's": true,
	"here's": true, "who's": true, "what's": true, "where's": true, "when's": true,
	"why's": true, "how's": true, "let's": true,
}

// possessiveStem cuts the 's off a possessive, in normal form or as it stands.
func possessiveStem(form []byte) (stem []byte, ok bool) {
	stem, ok = bytes.CutSuffix(form, []byte("'s"))
	if !ok {
		stem, ok = bytes.CutSuffix(form, []byte("'S"))
	}
	if !ok || len(stem) == 0 || contractions[string(form)] {
		return form, false
	}
	return stem, true
}
