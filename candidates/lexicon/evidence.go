package lexicon

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// Evidence decides which forms of a corpus enter the lexicon.
//
// A form of a word list is in. A form that only the corpus has is in when it
// passes these rules, in this order:
//
//  1. Shape: Latin letters with apostrophes inside; three letters or more; no
//     letter three times in a row; a vowel, unless mostly written in capitals;
//     no possessive or word with a clitic (the stream splits those).
//  2. Count: it stands in minDocuments documents, minWordCount times outside
//     hyphened compounds. Fewer do for names (with a capital amid sentences)
//     and for regular inflections of forms that are in; forms of three letters,
//     abbreviations and words in mixed capitals (identifiers) need more.
//  3. No closed-class word run together with another frequent word: everytime.
//  4. No slip: its count exceeds, for each form one edit away, what the slips
//     of that kind may reach (slipShare): recieve.
//
// Their numbers were tuned on a corpus of 88 million words of edited text and
// two published lists of misspellings (Wikipedia's, and learners' essays): of
// the 327,000 forms that only the corpus has, most of them seen once or twice,
// 53,400 get in; of the misspellings that no word list has, 0.2 and 0.8 %, and
// these are names as well (thame, platon). Judge says why a form is in or out.
//
// It keeps the lists and counts; one goroutine.
type Evidence struct {
	listed map[string]*listing
	counts *Counter
	near   *Lexicon          // the counted forms that others may be slips of
	plain  map[string]string // forms with marks: the plain form to the most frequent
	memo   map[string]Verdict
}

// Verdict is a decision of Evidence and what it rests on.
type Verdict struct {
	Form   string
	In     bool
	Reason string // in a few words
	Count  Count

	// Of the neighbour that decided or came nearest to it, if any had to be
	// weighed: the form is in only above Share of its count.
	Neighbour      string
	NeighbourCount uint32
	Share          float64
}

// String explains the verdict in a line.
func (v Verdict) String() string {
	in := "out"
	if v.In {
		in = "in"
	}
	s := fmt.Sprintf("%s: %s, %s; %d times in %d documents", v.Form, in, v.Reason, v.Count.Total(), v.Count.Documents)
	if v.Neighbour != "" {
		s += fmt.Sprintf("; %q stands %d times, of which slips may reach %.3g", v.Neighbour, v.NeighbourCount, v.Share*float64(v.NeighbourCount))
	}
	return s
}

// The evidence a corpus-only form needs: documents, and occurrences outside
// hyphened compounds.
const (
	minDocuments      = 3 // of any word
	minWordCount      = 4
	minNameDocuments  = 2 // of a name
	minNameCount      = 3
	minStemDocuments  = 2  // of an inflection of a known form
	minShortDocuments = 10 // of a form of three letters, and of an abbreviation
	minMixedDocuments = 25 // of a word in mixed capitals that is no family name
	minNeighbour      = 5  // occurrences, below which nothing is a slip of a form
)

// NewEvidence prepares the decisions from word lists and a counted corpus.
func NewEvidence(lists []WordList, counts *Counter) (*Evidence, error) {
	e := &Evidence{listed: listedForms(lists), counts: counts, plain: map[string]string{}, memo: map[string]Verdict{}}
	var b Builder
	for form, i := range counts.index {
		n := counts.counts[i].Total()
		if n < minNeighbour || !utf8.ValidString(form) {
			continue
		}
		b.Add(form, Entry{}, "")
		if plain := plainLetters(form); plain != form {
			if old := e.plain[plain]; old == "" || n > e.total(old) || n == e.total(old) && form < old {
				e.plain[plain] = form
			}
		}
	}
	section, err := b.Section()
	if err != nil {
		return nil, err
	}
	e.near, err = Open(section)
	return e, err
}

func (e *Evidence) total(form string) uint32 {
	n := e.counts.Get(form)
	return n.Total()
}

// Judge decides on a folded form.
func (e *Evidence) Judge(form string) Verdict {
	if v, ok := e.memo[form]; ok {
		return v
	}
	v := e.judge(form)
	e.memo[form] = v
	return v
}

func (e *Evidence) judge(form string) Verdict {
	v := Verdict{Form: form, Count: e.counts.Get(form)}
	if e.listed[form] != nil {
		v.In, v.Reason = true, "in a word list"
		return v
	}
	if v.Count.Documents == 0 {
		v.Reason = "never seen"
		return v
	}
	if v.Reason = shapeFault(form, &v.Count); v.Reason != "" {
		return v
	}
	if e.listed[form+"'t"] != nil {
		v.Reason = "the start of " + form + "'t"
		return v
	}
	if v.Reason = e.enough(form, &v.Count); v.Reason == "" {
		v.Reason = "too seldom"
		return v
	}
	if first, second := e.runTogether(form, &v.Count); first != "" {
		v.Reason = first + " + " + second
		return v
	}
	v.In = true
	e.weighNeighbours(&v)
	return v
}

// shapeFault says what keeps a form out by its shape, "" if nothing.
func shapeFault(form string, n *Count) string {
	plain := plainLetters(form)
	switch {
	case !latinWord(form):
		return "not a word of Latin letters"
	case utf8.RuneCountInString(form) < 3:
		return "one or two letters"
	case utf8.RuneCountInString(form) > 24:
		return "more than 24 letters"
	case hasTriple(form):
		return "a letter three times in a row"
	case !strings.ContainsAny(plain, "aeiouyæœø") && !n.isAcronym():
		return "no vowel"
	}
	for _, ending := range cliticEndings {
		if strings.HasSuffix(form, ending) {
			return "ends in " + ending
		}
	}
	return ""
}

// enough says why the count of a form suffices, "" if it does not.
func (e *Evidence) enough(form string, n *Count) string {
	loose := n.Total() - n.Joined
	switch {
	case n.isMixed() && !isFamilyName(form):
		if n.Documents >= minMixedDocuments {
			return "seen often enough in mixed capitals"
		}
	case utf8.RuneCountInString(form) == 3 || n.isAcronym():
		if n.Documents >= minShortDocuments {
			return "short, seen often enough"
		}
	case n.Documents >= minDocuments && loose >= minWordCount:
		return "seen often enough"
	case n.Documents >= minNameDocuments && loose >= minNameCount && n.isName():
		return "a name"
	case n.Documents >= minStemDocuments && loose >= minStemDocuments:
		if stem := e.stemOf(form); stem != "" {
			return "inflection of " + stem
		}
	}
	return ""
}

// isFamilyName reports a form that names write in mixed capitals: McLeod.
func isFamilyName(form string) bool {
	for _, prefix := range []string{"mc", "mac", "o'", "d'"} {
		if rest, ok := strings.CutPrefix(form, prefix); ok && len(rest) >= 3 {
			return true
		}
	}
	return false
}

// isName reports a word that keeps its capital amid sentences.
func (n *Count) isName() bool {
	capitals := n.Amid[1] + n.Amid[2] + n.Amid[3]
	return capitals >= 2 && capitals >= 9*n.Amid[0]
}

// isAcronym reports a word mostly written in capitals.
func (n *Count) isAcronym() bool {
	return 2*(n.Amid[2]+n.Lead[2]) > n.Total()
}

// isMixed reports a word mostly written in mixed capitals.
func (n *Count) isMixed() bool {
	return 2*(n.Amid[3]+n.Lead[3]) > n.Total()
}
