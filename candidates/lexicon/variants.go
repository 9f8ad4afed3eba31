package lexicon

import "strings"

// respelling rewrites one spelling habit into another so that the varieties of
// a word meet in one key. It applies to every place of from in a word where at
// least stem letters stand before it and, if set, where one of the letters of
// left stands just before and one of the endings of right just behind ("$" is
// the word's end).
type respelling struct {
	from, to string
	stem     int
	left     string
	right    []string
	unsure   bool // now and then joins two words: filing and filling
}

// respellings, in order of use. They are about habits that differ between the
// written varieties of English, or are free within one, from general knowledge;
// single words come first.
var respellings = []respelling{
	{from: "aeroplane", to: "airplane"},
	{from: "aluminium", to: "aluminum"},
	{from: "artefact", to: "artifact"},
	{from: "cosy", to: "cozy"},
	{from: "grey", to: "gray"},
	{from: "moustache", to: "mustache"},
	{from: "practis", to: "practic"},
	{from: "pyjama", to: "pajama"},
	{from: "sceptic", to: "skeptic"},
	// organise, analyse, organisation
	{
		from: "s", to: "z", stem: 3, left: "iy", unsure: true,
		right: []string{"e$", "ed$", "es$", "er$", "ers$", "ing$", "ings$", "able$", "abilit", "ation", "ement", "ingly$", "edly$"},
	},
	// colour, favourite, neighbourhood
	{
		from: "our", to: "or", stem: 2, left: "bcdglmnptvhi",
		right: []string{"$", "s$", "ed$", "ing$", "ings$", "er", "ful", "less", "abl", "ation", "ite", "hood", "ly$", "y$", "ism", "ist", "al", "iz"},
	},
	// centre, fibre, metre, theatre, kilometres, centring
	{from: "re", to: "er", stem: 2, left: "tbhv", right: []string{"$", "s$"}},
	{from: "r", to: "er", stem: 3, left: "t", right: []string{"ing$", "ed$"}},
	// travelled, jeweller, marvellous; worshipped; benefitted; focussed
	{
		from: "ll", to: "l", stem: 2, left: "aeiou", unsure: true,
		right: []string{"ed$", "ing$", "ings$", "er$", "ers$", "ery$", "or$", "ors$", "ous$", "ously$", "ist$", "ists$", "able$", "en$", "ization"},
	},
	{from: "pp", to: "p", stem: 3, left: "aio", right: []string{"ed$", "ing$", "er$", "ers$"}, unsure: true},
	{from: "tt", to: "t", stem: 3, left: "eio", right: []string{"ed$", "ing$"}, unsure: true},
	{from: "ss", to: "s", stem: 3, left: "ua", right: []string{"ed$", "ing$", "es$"}, unsure: true},
	// fulfil, skilful, instalment
	{from: "ll", to: "l", stem: 2, left: "aeiou", right: []string{"$", "s$", "ful", "ment", "ness"}, unsure: true},
	// catalogue, dialogues
	{from: "ogue", to: "og", stem: 2, right: []string{"$", "s$", "d$"}},
	// encyclopaedia, foetus, manoeuvre, apnoea
	{from: "ae", to: "e", right: []string{"b", "c", "d", "g", "l", "m", "n", "o", "p", "q", "r", "s", "t", "u", "v"}},
	{from: "oeu", to: "eu", stem: 1},
	{from: "oe", to: "e", right: []string{"a", "b", "c", "de", "di", "l", "m", "n", "so", "st", "t"}},
	// defence, licence, pretences
	{from: "ence", to: "ense", stem: 1, right: []string{"$", "s$", "d$", "less"}, unsure: true},
	{from: "enc", to: "ens", stem: 1, right: []string{"ing$"}, unsure: true},
	// programme, kilogrammes
	{from: "gramme", to: "gram", right: []string{"$", "s$"}},
	// judgement; ageing, likeable
	{from: "gement", to: "gment", stem: 2, left: "d"},
	{from: "e", to: "", stem: 2, left: "bcdgklmnprstvz", right: []string{"ing$", "able$"}, unsure: true},
	// mould, smoulder; plough; inflexion
	{from: "ould", to: "old", stem: 1, left: "m"},
	{from: "ough", to: "ow", stem: 1, left: "l", right: []string{"$", "s$", "ed$", "ing$", "man$", "men$", "share"}},
	{from: "xion", to: "ction", stem: 3, left: "e"},
}

// respelled gives the key of a form: the same for the spelling variants of a
// word, and, unless only the sure rules are used, now and then for two words.
func respelled(form string, sureOnly bool) string {
	for i := range respellings {
		if r := &respellings[i]; !r.unsure || !sureOnly {
			form = r.apply(form)
		}
	}
	return form
}

func (r *respelling) apply(form string) string {
	for from := 0; ; {
		i := strings.Index(form[from:], r.from)
		if i < 0 {
			return form
		}
		i += from
		from = i + 1
		if r.fits(form, i) {
			form = form[:i] + r.to + form[i+len(r.from):]
			from = i + len(r.to)
		}
	}
}

func (r *respelling) fits(form string, i int) bool {
	if i < r.stem || r.left != "" && (i == 0 || strings.IndexByte(r.left, form[i-1]) < 0) {
		return false
	}
	if r.right == nil {
		return true
	}
	rest := form[i+len(r.from):] + "$"
	for _, ending := range r.right {
		if strings.HasPrefix(rest, ending) {
			return true
		}
	}
	return false
}

// SpellingVariants reports whether two different folded forms are, by the rules
// of English spelling alone, one word in two spellings: the American and the
// British (colour, color; travelled, traveled), or two that are both free
// (judgement, judgment). It takes some pairs of different words for variants
// (filing, filling); [Lexicon.Variants] knows better.
func SpellingVariants(a, b string) bool {
	return a != b && respelled(a, false) == respelled(b, false)
}

// Variants reports whether two forms are spelling variants of one word, which
// must not compete as two: by the rules, and, where these are unsure, also by
// the word lists, which give one of the forms to one variety alone, or by length.
func (l *Lexicon) Variants(a, b uint32) bool {
	if a == b || a >= l.forms || b >= l.forms {
		return false
	}
	var bufA, bufB [MaxForm]byte
	formA, formB := string(l.AppendForm(bufA[:0], a)), string(l.AppendForm(bufB[:0], b))
	if !SpellingVariants(formA, formB) {
		return false
	}
	const long = 8 // letters; shorter pairs are often two words
	return l.Entry(a).Variety != Both || l.Entry(b).Variety != Both ||
		min(len(formA), len(formB)) >= long || respelled(formA, true) == respelled(formB, true)
}
