package foulcase

import "math"

// recurrence counts the forms of a document. A form that comes again and again
// is likelier the writer's own word than a slip (Kuhn & De Mori 1990 give the
// same evidence to a language model as a cache).
type recurrence struct {
	words   []uint16 // by lexicon id, saturating
	touched []uint32
	oftener []float32         // by lexicon id: word with no occurrence its own, as of the last settle; 0 for words not met
	forms   map[string]uint16 // of forms the lexicon lacks
	total   float64           // words counted
	capital float64           // of them forms the lexicon lacks with a capital
}

const (
	// maxForms bounds the forms remembered, so that a document of any length
	// takes bounded memory; later new forms are then not counted.
	maxForms = 1 << 16
	// decayAt is the number of words after which counts stop growing into the
	// past of a very long document: all are halved.
	decayAt = 1 << 22
)

func (r *recurrence) init(words int) {
	r.words = make([]uint16, words)
	r.oftener = make([]float32, words)
	r.forms = make(map[string]uint16)
}

func (r *recurrence) reset() {
	for _, id := range r.touched {
		r.words[id], r.oftener[id] = 0, 0
	}
	r.touched = r.touched[:0]
	clear(r.forms)
	r.total, r.capital = 0, 0
}

// addWord counts an occurrence of a lexicon word, or takes one out: times is 1 or -1.
func (r *recurrence) addWord(id uint32, times int) {
	r.total += float64(times)
	n := r.words[id]
	if n == 0 && times > 0 {
		r.touched = append(r.touched, id)
	}
	r.words[id] = saturating(n, times)
	if r.total >= decayAt {
		r.decay()
	}
}

// addForm is addWord for a form the lexicon lacks.
func (r *recurrence) addForm(form []byte, capital bool, times int) {
	r.total += float64(times)
	if capital {
		r.capital += float64(times)
	}
	n, ok := r.forms[string(form)]
	switch n = saturating(n, times); {
	case ok && n == 0:
		delete(r.forms, string(form))
	case ok || times > 0 && len(r.forms) < maxForms:
		r.forms[string(form)] = n
	}
}

// saturating adds times to a count, which stays at its ends.
func saturating(n uint16, times int) uint16 {
	return uint16(min(max(int(n)+times, 0), math.MaxUint16))
}

func (r *recurrence) decay() {
	r.total /= 2
	r.capital /= 2
	for _, id := range r.touched {
		r.words[id] = max(1, r.words[id]/2)
	}
	for form, n := range r.forms {
		r.forms[form] = max(1, n/2)
	}
}

// prior tells how frequent a word is in running text: log share, nats.
type prior interface{ Prior(id uint32) float32 }

// word is the evidence for a lexicon word: the log of how many times more often
// than expected the document has it, other occurrences than its `own` counted.
// At least 0, nats.
func (r *recurrence) word(id uint32, lex prior, own int) float64 {
	n := float64(max(0, int(r.words[id])-own))
	if n == 0 {
		return 0
	}
	return math.Log(1 + n/(1+r.total*math.Exp(float64(lex.Prior(id)))))
}

// settle works out what the counts so far say of every word met, and forgets those
// that were taken out again.
func (r *recurrence) settle(lex prior) {
	met := r.touched[:0]
	for _, id := range r.touched {
		r.settleWord(id, lex)
		if r.words[id] > 0 {
			met = append(met, id)
		}
	}
	r.touched = met
}

// settleWord is settle for one word.
func (r *recurrence) settleWord(id uint32, lex prior) {
	r.oftener[id] = float32(r.word(id, lex, 0))
}

// form is the evidence for a form the lexicon lacks, as word.
func (r *recurrence) form(form []byte) float64 {
	return math.Log(float64(max(1, r.forms[string(form)])))
}

// jargonWords is how many words of usual prose a document's share of jargon is
// mixed with, and jargonShare the share there (guessed).
const jargonWords, jargonShare = 200, .01

// jargon is the log share of words that the lexicon lacks and that have a
// capital: names and terms, seldom slips.
func (r *recurrence) jargon() float64 {
	return math.Log((r.capital + jargonWords*jargonShare) / (r.total + jargonWords))
}
