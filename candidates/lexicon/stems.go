package lexicon

import "strings"

// suffixes are the regular endings of English, each with what may stand in the
// stem in its place.
var suffixes = []struct {
	ending string
	stem   []string
}{
	{"ies", []string{"y"}},
	{"es", []string{"", "e"}},
	{"s", []string{""}},
	{"ied", []string{"y"}},
	{"ed", []string{"", "e"}},
	{"ing", []string{"", "e"}},
	{"ings", []string{"", "e"}},
	{"er", []string{"", "e"}},
	{"ers", []string{"", "e"}},
	{"ly", []string{""}},
	{"ily", []string{"y"}},
	{"ness", []string{""}},
	{"less", []string{""}},
	{"like", []string{""}},
	{"ization", []string{"ize"}},
	{"isation", []string{"ise"}},
	{"able", []string{"", "e"}},
	{"ability", []string{"able"}},
}

// prefixes are those that form words freely.
var prefixes = []string{
	"non", "un", "re", "pre", "anti", "micro", "multi", "over", "sub", "inter", "super",
	"hyper", "cyber", "bio", "geo", "neuro", "mis", "de", "co", "semi", "meta", "auto",
}

// stemOf finds a form that is in and of which this one is a regular inflection
// or derivation, "" if there is none. A stem has four letters at least.
func (e *Evidence) stemOf(form string) string {
	for _, s := range suffixes {
		rest, ok := strings.CutSuffix(form, s.ending)
		if !ok {
			continue
		}
		for _, end := range s.stem {
			if stem := rest + end; e.isStem(stem) && joinsRegularly(stem, s.ending) {
				return stem
			}
		}
		if n := len(rest); n > 1 && rest[n-1] == rest[n-2] && !isVowel(rest[n-1]) && strings.ContainsRune("ei", rune(s.ending[0])) {
			if stem := rest[:n-1]; e.isStem(stem) {
				return stem
			}
		}
	}
	for _, p := range prefixes {
		if stem, ok := strings.CutPrefix(form, p); ok && e.isStem(stem) {
			return stem
		}
	}
	return ""
}

func (e *Evidence) isStem(stem string) bool {
	return len(stem) >= 4 && e.total(stem) > 0 && e.Judge(stem).In
}

// joinsRegularly keeps out endings put on against the rules: companys, boxs,
// stoping, lovly.
func joinsRegularly(stem, ending string) bool {
	last := stem[len(stem)-1]
	switch ending {
	case "s":
		return !strings.HasSuffix(stem, "s") && !strings.HasSuffix(stem, "x") && !strings.HasSuffix(stem, "z") &&
			!strings.HasSuffix(stem, "ch") && !strings.HasSuffix(stem, "sh") &&
			(last != 'y' || isVowel(stem[len(stem)-2]))
	case "ed", "ing", "ings", "er", "ers":
		return last != 'y' || strings.HasPrefix(ending, "ing") || isVowel(stem[len(stem)-2])
	}
	return true
}
