package foulcase

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

func TestFeatureNames(t *testing.T) {
	seen := map[string]int{}
	for i, name := range featureNames {
		if before, ok := seen[name]; ok || name == "" {
			t.Errorf("feature %d is called %q, as is %d", i, name, before)
		}
		seen[name] = i
	}
}

func TestEditShape(t *testing.T) {
	for _, c := range []struct {
		typed, meant string
		want         int
	}{
		{"berth", "berths", endDropped},
		{"bert", "berth", endDropped},
		{"", "a", endDropped},
		{"brth", "berth", letterDropped},
		{"erth", "berth", letterDropped},
		{"berths", "berth", endAdded},
		{"bertth", "berth", letterAdded},
		{"aberth", "berth", letterAdded},
		{"tugg", "tug", endAdded},
		{"perth", "berth", firstReplaced},
		{"a", "o", firstReplaced},
		{"bertg", "berth", lastReplaced},
		{"birth", "berth", letterReplaced},
		{"ebrth", "berth", lettersSwapped},
		{"betrh", "berth", lettersSwapped},
		{"berht", "berth", lettersSwapped},
		{"berth", "berth", otherEdit},
		{"", "", otherEdit},
		{"boat", "", otherEdit},
		{"breth", "birth", otherEdit},
		{"harbour", "harbourage", otherEdit},
		{"quay", "key", otherEdit},
	} {
		if got := editShape([]byte(c.typed), []byte(c.meant)); got != c.want {
			t.Errorf("%q for %q: shape %d, want %d", c.typed, c.meant, got, c.want)
		}
	}
}

// odd are strings that a text may have amid its words.
var odd = []string{
	"", " ", "\n", "’", "'s", "'", "-", "--", "—", "(", ")", "[", "]", "\"", "“", "”", "...", "?", "\x00", "\xff\xfe", "\u00ad", "e\u0301", "ﬁ", "𝔸𝔹",
	"☂", "שלום", "12:30", "3rd", "https://skarrow.example/tides?a=b", "pilot@skarrow.example", strings.Repeat("z", 300), strings.Repeat("the ", 30), "THE", "I",
	"ancher", "Ancher", "ANCHER", "the the", "along side", "alot", "harbur-master", "birth", "peer", "quay’s", "piolts'", "¡X", "a", "ïle", "n't", "\u200b",
}

// TestEvidenceIsFinite collects evidence of whatever is found in strings of odd
// pieces between ordinary words.
func TestEvidenceIsFinite(t *testing.T) {
	house, err := ReadHouse("list", strings.NewReader("Skarrow\nzilverbank\n"))
	if err != nil {
		t.Fatal(err)
	}
	e := openTiny(t, nil)
	words := strings.Fields("The pilot walked to the end of the pier and the tug zilverbnak let go her anchor near the quay Skarow")
	random := rand.New(rand.NewPCG(7, 7))
	collected := 0
	for n := range 1500 {
		var b strings.Builder
		for range 1 + random.IntN(14) {
			if random.IntN(3) > 0 {
				b.WriteString(words[random.IntN(len(words))])
			} else {
				b.WriteString(odd[random.IntN(len(odd))])
			}
			if random.IntN(5) > 0 {
				b.WriteByte(' ')
			}
		}
		j := e.take(Options{House: house, Variety: Variety(n % 3), Without: Evidence(n % 8)})
		eachSentence(t, j, b.String(), func(s text.Sentence, block []byte) {
			found, err := j.findings(s, block)
			if err != nil {
				t.Fatalf("%q: %v", block, err)
			}
			for i := range found {
				collected++
				for k, v := range j.collect(&found[i]) {
					if math.IsNaN(float64(v)) || math.IsInf(float64(v), 0) {
						t.Fatalf("%q: %s is %v", block, featureNames[k], v)
					}
				}
			}
		})
		e.give(j)
	}
	if collected < 1000 {
		t.Errorf("evidence of %d findings: too few to tell", collected)
	}
}

// evidenceOf collects what is known of the finding at a word.
func evidenceOf(t *testing.T, e *Engine, document, word string, o Options) evidence {
	t.Helper()
	j := e.take(o)
	defer e.give(j)
	var x evidence
	seen := false
	eachSentence(t, j, document, func(s text.Sentence, block []byte) {
		found, err := j.findings(s, block)
		if err != nil {
			t.Fatal(err)
		}
		for i := range found {
			at := j.slots[found[i].from].token
			if string(block[at.Start:at.End]) == word && !seen {
				x, seen = *j.collect(&found[i]), true
			}
		}
	})
	if !seen {
		t.Fatalf("%q: nothing is found at %s", document, word)
	}
	return x
}

func TestEvidenceOfAFinding(t *testing.T) {
	e := openTiny(t, nil)
	for _, c := range []struct {
		document, word string
		feature        int
		want           float64
	}{
		{"The tug let go her ancher near the pier.", "ancher", fLength, 6},
		{"The tug let go her ancher near the pier.", "ancher", fEdit, letterReplaced},
		{"The tug let go her ancher near the pier.", "ancher", fSameFirst, 1},
		{"The tug let go her ancher near the pier.", "ancher", fStatus, float64(unknown)},
		{"The tug let go her ancher near the pier.", "ancher", fTypedPrior, noPrior},
		{"The tug let go her ancher near the pier.", "ancher", fQuoted, 0},
		{"The tug let go her “ancher” near the pier.", "ancher", fQuoted, 1},
		{"The tug let go “her ancher” near the pier.", "ancher", fQuoted, 1},
		{"The tug let go her ancher near “the pier.”", "ancher", fQuoted, 0},
		{"The tug let go (her ancher) near the pier.", "ancher", fBracketed, 1},
		{"The tug (a new one) let go her ancher.", "ancher", fBracketed, 0},
		{"The tug let go her sea-ancher near the pier.", "ancher", fCompound, 1},
		{"Ancher and tug lay near the pier.", "Ancher", fCase, leadCase},
		{"The tug let go her Ancher near the pier.", "Ancher", fCase, float64(text.Title)},
		{"Ancher and tug lay near the pier.", "Ancher", fBefore, noNeighbour},
		{"The tug let go her 4 ancher near the pier.", "ancher", fBefore, noWordNeighbour},
		{"The tug let go her Zorbatt ancher near the pier.", "ancher", fBefore, unknownNeighbour},
		{"The tug let go her Zorbatt ancher near the pier.", "ancher", fForeigners, 1},
		{"The tug let go her ancher.", "ancher", fTypedCount, 0},
		{"The tug let go her ancher. The ancher was lost. No ancher was found.", "ancher", fTypedCount, math.Log(3)},
		{"The tug let go her ancher, and the anchor was lost.", "ancher", fMeantCount, math.Log(2)},
		{"The tug lay behind the breakwatter.", "breakwatter", fDoubled, 1},
		{"The tug let go her ancher.", "ancher", fDoubled, 0},
	} {
		if got := float64(evidenceOf(t, e, c.document, c.word, Options{})[c.feature]); math.Abs(got-c.want) > 1e-6 {
			t.Errorf("%q: %s of %s is %v, want %v", c.document, featureNames[c.feature], c.word, got, c.want)
		}
	}
}

// TestEvidenceIsDoneWithout asks for no evidence of the document's own use.
func TestEvidenceIsDoneWithout(t *testing.T) {
	e := openTiny(t, nil)
	const document = "The tug let go her ancher, and the anchor was lost. The ancher of the Zorbatt was found."
	for _, c := range []struct {
		without Evidence
		gone    int
		stays   int
	}{
		{CacheEvidence, fMeantCount, fTypedCount},
		{RecurringEvidence, fTypedCount, fMeantCount},
		{RecurringEvidence, fJargon, fMeantCount},
	} {
		with, without := evidenceOf(t, e, document, "ancher", Options{}), evidenceOf(t, e, document, "ancher", Options{Without: c.without})
		if with[c.gone] == 0 || without[c.gone] != 0 || without[c.stays] != with[c.stays] {
			t.Errorf("without %d, %s is %v and %s %v; with it, %v and %v", c.without, featureNames[c.gone], without[c.gone], featureNames[c.stays], without[c.stays], with[c.gone], with[c.stays])
		}
	}
}

// TestEvidenceOfNGrams looks at a slip in a line that the small corpus has many
// times, and at one among words that it never has together.
func TestEvidenceOfNGrams(t *testing.T) {
	e := openTiny(t, nil)
	usual := evidenceOf(t, e, "The ferry let go her ancher near the yard.", "ancher", Options{})
	strange := evidenceOf(t, e, "Noon ancher keep the channel clear.", "ancher", Options{})
	for _, c := range []struct {
		feature            int
		ofUsual, ofStrange float32
	}{
		{fTypedLeft, 1, 1},
		{fTypedRight, 1, 1},
		{fTypedSpan, 1, 1}, // "near the" does not hold the typed word
		{fMeantLeft, tinyOrder, 1},
		{fMeantRight, tinyOrder, 1},
		{fMeantSpan, tinyOrder, 1},
	} {
		if usual[c.feature] != c.ofUsual || strange[c.feature] != c.ofStrange {
			t.Errorf("%s is %v in a usual line and %v in a strange one, want %v and %v", featureNames[c.feature], usual[c.feature], strange[c.feature], c.ofUsual, c.ofStrange)
		}
	}
	// The gain is of the word, of the next, and of those further on.
	j := e.take(Options{})
	defer e.give(j)
	eachSentence(t, j, "The ferry let go her ancher.", func(s text.Sentence, block []byte) {
		found, err := j.findings(s, block)
		if err != nil || len(found) == 0 {
			t.Fatalf("%d findings, %v", len(found), err)
		}
		f := &found[len(found)-1]
		x := j.collect(f)
		at := j.slots[f.from].from
		if x[fTypedLogP] != j.logp[at] || x[fTypedNext] != j.logp[at+1] {
			t.Errorf("the typed words score %v and %v, want %v and %v", x[fTypedLogP], x[fTypedNext], j.logp[at], j.logp[at+1])
		}
		gain := x[fMeantLogP] + x[fMeantNext] - x[fTypedLogP] - x[fTypedNext] + j.rest(f)
		if math.Abs(float64(gain-x[fGain])) > 1e-4 {
			t.Errorf("the words' scores gain %v, the change %v", gain, x[fGain])
		}
	})
}

// rest is what the words behind the next gain by a finding's best change, nats.
func (j *judge) rest(f *finding) (sum float32) {
	c := &f.changes[0]
	_, state := j.e.lm.Score(j.states[j.slots[c.from].from], j.words[c.lo])
	for i := j.slots[c.to-1].to; i < len(j.ids); i++ {
		logp, next := j.e.lm.Score(state, j.ids[i])
		if i > j.slots[c.to-1].to {
			sum += logp - j.logp[i]
		}
		state = next
	}
	return sum
}
