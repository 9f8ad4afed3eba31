package main

import (
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/eval"
)

// undone writes an item's corrections into its source, and fails where a span
// does not cover what its correction would change.
func undone(t *testing.T, item eval.Item) string {
	t.Helper()
	var b strings.Builder
	at := 0
	for _, s := range item.Spans {
		if s.Start < at || s.End <= s.Start || s.End > len(item.Source) || len(s.Corrections) == 0 {
			t.Fatalf("span %+v behind %d of %d bytes", s, at, len(item.Source))
		}
		if typed := item.Source[s.Start:s.End]; typed == s.Corrections[0] {
			t.Errorf("a span at %d corrects %q to itself", s.Start, typed)
		}
		b.WriteString(item.Source[at:s.Start])
		b.WriteString(s.Corrections[0])
		at = s.End
	}
	return b.String() + item.Source[at:]
}

// logbook is invented; it has words a few times and "the" very often.
const logbook = "The cutter left the quay at noon. The pilot joined the cutter off the breakwater.\n" +
	"Off the breakwater the pilot gave the order to anchor. The anchor held; the cutter's anchor did not.\n" +
	"Pilot Orme signed the log. A pilot must sign the log before the cutter leaves – the quay is watched.\n"

func TestWithHabitsKeepsSpansRight(t *testing.T) {
	mangled := func(kind eval.Kind, word string, random *rand.Rand) string {
		if kind == eval.Realword {
			return map[string]string{"log": "lag", "quay": "key"}[word]
		}
		k := random.IntN(len(word))
		return word[:k] + "q" + word[k:]
	}
	habits := 0
	for seed := range uint64(300) {
		mixed := mix{eval.Nonword: 3, eval.Realword: 1, eval.Runon: 1, eval.Split: 1, eval.Repeat: 1}
		item := eval.Inject([]eval.Item{{Line: 3, Document: "log", Source: logbook}},
			eval.Slips{Every: 15, Mix: mixed, Mistype: mangled, Seed: seed})[0]
		got := withHabits(item, rand.New(rand.NewPCG(seed, 1)))
		if text := undone(t, got); text != logbook {
			t.Fatalf("seed %d: corrected, the text reads\n%s", seed, text)
		}
		if len(got.Spans) < len(item.Spans) || got.Line != item.Line || got.Document != item.Document {
			t.Fatalf("seed %d: %d spans of %d, line %d, document %q", seed, len(got.Spans), len(item.Spans), got.Line, got.Document)
		}
		habits += len(got.Spans) - len(item.Spans)
		if text := undone(t, item); text != logbook {
			t.Fatalf("seed %d: the item itself was altered", seed)
		}
	}
	if habits < 50 {
		t.Errorf("%d slips for habit's sake in 300 texts", habits)
	}
}

// A habit has the same form wherever the word stands, and is no habit with a
// word met all the time.
func TestHabits(t *testing.T) {
	at := strings.Index(logbook, "cutter")
	slip := func(word, typed string) eval.Item {
		at := strings.Index(logbook, word)
		return eval.Item{
			Source: logbook[:at] + typed + logbook[at+len(word):],
			Spans:  []eval.Span{{Start: at, End: at + len(typed), Kind: eval.Nonword, Corrections: []string{word}}},
		}
	}
	made := map[int]int{}
	for seed := range uint64(60) {
		got := withHabits(slip("cutter", "cuter"), rand.New(rand.NewPCG(seed, 2)))
		made[len(got.Spans)]++
		for _, s := range got.Spans {
			if got.Source[s.Start:s.End] != "cuter" || s.Kind != eval.Nonword {
				t.Fatalf("seed %d: %q is written for cutter, a %s", seed, got.Source[s.Start:s.End], s.Kind)
			}
		}
	}
	// "cutter's" is a word of its own.
	all := len(occurrences(eval.Item{Source: logbook}, "cutter"))
	if len(made) != 2 || made[1] == 0 || made[all] == 0 || all != 3 {
		t.Errorf("slips for cutter, which stands %d times: %v", all, made)
	}
	for seed := range uint64(60) {
		if got := withHabits(slip("the", "teh"), rand.New(rand.NewPCG(seed, 2))); len(got.Spans) != 1 {
			t.Fatalf("seed %d: %d times teh", seed, len(got.Spans))
		}
		other := slip("cutter", "cuter")
		other.Spans[0].Kind = eval.Realword
		if got := withHabits(other, rand.New(rand.NewPCG(seed, 2))); len(got.Spans) != 1 {
			t.Fatalf("seed %d: a word for a word %d times", seed, len(got.Spans))
		}
	}
	if found := occurrences(slip("cutter", "cuter"), "cutter"); len(found) != all-1 || found[0].Start <= at {
		t.Errorf("besides its slip, cutter stands at %v", found)
	}
	twice := slip("cutter", "cutter cutter")
	twice.Spans[0].Kind = eval.Repeat
	if found := occurrences(twice, "cutter"); len(found) != all-1 || found[0].Start < twice.Spans[0].End {
		t.Errorf("besides the cutter typed twice it stands at %v", found)
	}
}

func TestCutDocument(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 4))
	var documents []string
	for _, size := range []int{0, 1, pieceSize, pieceSize * 3 / 2, pieceSize*3/2 + 1, 3 * pieceSize, 10 * pieceSize} {
		var b strings.Builder
		for b.Len() < size {
			b.WriteString(strings.Repeat("The tide turned. ", 1+random.IntN(80)))
			b.WriteByte('\n')
		}
		documents = append(documents, b.String(), strings.ReplaceAll(b.String(), "\n", " "))
	}
	cut := 0
	for _, d := range documents {
		pieces := cutDocument(d)
		if strings.Join(pieces, "") != d {
			t.Errorf("%d pieces do not make the document of %d bytes", len(pieces), len(d))
		}
		for i, p := range pieces[:len(pieces)-1] {
			cut++
			if len(p) < pieceSize || !strings.HasSuffix(p, "\n") {
				t.Errorf("piece %d of %d bytes ends with %q", i, len(p), p[max(0, len(p)-9):])
			}
		}
		if last := pieces[len(pieces)-1]; strings.Contains(d, "\n") && len(last) > pieceSize*3/2 {
			t.Errorf("the last piece of %d bytes has %d", len(d), len(last))
		}
	}
	if cut == 0 {
		t.Error("no document was cut")
	}
}

// pairsFile is a list of corrections, a slip a line.
func pairsFile(t *testing.T, lines ...string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), "pairs.tsv")
	if err := os.WriteFile(path, []byte(strings.Join(lines, "\n")+"\n"), 0o600); err != nil {
		t.Fatal(err)
	}
	return path
}

func TestTrialSlipsDrawFromLists(t *testing.T) {
	pairs := pairsFile(t, "hxrbxur\tharbour\t100", "harbr\tharbour\t1", "sheer\tshear\t4", "Anchr\tanchor\t9", "an chor\tanchor\t9", "zz\tpilot\t9", "boat\tzyzzy\t9")
	slips, err := openTrialSlips(tinyModel(t), []string{pairs})
	if err != nil {
		t.Fatal(err)
	}
	defer slips.close()
	for list, want := range map[string]string{
		fmt.Sprint(slips.forms): "map[harbour:[{hxrbxur 10} {harbr 1}]]", // square roots of the counts
		fmt.Sprint(slips.words): "map[shear:[{sheer 2}]]",
	} {
		if list != want {
			t.Errorf("lists %s, want %s", list, want)
		}
	}
	random := rand.New(rand.NewPCG(9, 9))
	drawn := map[string]int{}
	for range 4000 {
		if form := slips.mistype(eval.Nonword, "harbour", random); form != "" {
			if _, isWord := slips.lexicon.ID([]byte(form)); isWord {
				t.Fatalf("%q for harbour is a word", form)
			}
			drawn[form]++
		}
	}
	others := -drawn["hxrbxur"] - drawn["harbr"]
	for _, n := range drawn {
		others += n
	}
	if often, seldom := drawn["hxrbxur"], drawn["harbr"]; seldom == 0 || often < 5*seldom || often > 20*seldom || others == 0 || others > often {
		t.Errorf("drawn for harbour: %d, %d and %d others; want 10 to 1 and some from the channel", often, seldom, others)
	}
	seen := 0
	for range 1000 {
		switch form := slips.mistype(eval.Realword, "shear", random); form {
		case "sheer":
			seen++
		case "":
		default:
			if _, isWord := slips.lexicon.ID([]byte(form)); !isWord || form == "shear" {
				t.Fatalf("%q for shear is no other word", form)
			}
		}
	}
	if seen < 300 {
		t.Errorf("sheer for shear in %d of 1,000 draws", seen)
	}
	if form := slips.mistype(eval.Nonword, "zyzzy", random); form != "" {
		t.Errorf("%q for an unknown word", form)
	}
}

func TestTrialsMarkTheirSlips(t *testing.T) {
	slips, err := openTrialSlips(tinyModel(t), []string{filepath.Join(projectRoot(t), "testdata", "tiny", "pairs.tsv")})
	if err != nil {
		t.Fatal(err)
	}
	defer slips.close()
	corpus, err := os.ReadFile(filepath.Join(projectRoot(t), "testdata", "tiny", "corpus.txt"))
	if err != nil {
		t.Fatal(err)
	}
	pieces := cutDocument(string(corpus))
	trials := slips.trials("corpus.txt", pieces, 1)
	if len(trials) != len(pieces) {
		t.Fatalf("%d trials of %d pieces", len(trials), len(pieces))
	}
	for i, trial := range trials {
		if len(trial.Slips) < eval.Words(pieces[i])/400 || trial.Source != "corpus.txt" {
			t.Errorf("trial %d of %q: %d slips in %d words", i, trial.Source, len(trial.Slips), eval.Words(pieces[i]))
		}
		// Outside its slips a trial is the piece.
		at, from := 0, 0
		for _, s := range trial.Slips {
			kept := trial.Text[at:s.Start]
			k := strings.Index(pieces[i][from:], kept)
			if s.Start < at || k < 0 || k > 60 {
				t.Fatalf("trial %d: %q does not follow within a word or two", i, kept)
			}
			from += k + len(kept)
			at = s.End
		}
		if !strings.HasSuffix(pieces[i], trial.Text[at:]) {
			t.Errorf("trial %d ends otherwise than its piece", i)
		}
	}
	again := slips.trials("corpus.txt", pieces, 1)
	if !slices.EqualFunc(trials, again, sameTrial) {
		t.Error("the same seed gives other slips")
	}
	if slices.EqualFunc(trials, slips.trials("corpus.txt", pieces, 2), sameTrial) {
		t.Error("another seed gives the same slips")
	}
}

func TestOpenTrialSlipsRefuses(t *testing.T) {
	model := tinyModel(t)
	bad := pairsFile(t, "no tabs here")
	for name, pairs := range map[string]string{"missing": "gone.tsv", "no pairs": bad} {
		if _, err := openTrialSlips(model, []string{pairs}); err == nil || !strings.Contains(err.Error(), filepath.Base(pairs)) {
			t.Errorf("%s: %v", name, err)
		}
	}
}

func sameTrial(a, b foulcase.Trial) bool {
	return a.Text == b.Text && a.Source == b.Source && slices.Equal(a.Slips, b.Slips)
}

func TestHalvesDealOutInTurn(t *testing.T) {
	first, second := halves([]string{"a", "b", "c", "d", "e"})
	if !slices.Equal(first, []string{"a", "c", "e"}) || !slices.Equal(second, []string{"b", "d"}) {
		t.Errorf("dealt %q and %q", first, second)
	}
}

func TestInflected(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want bool
	}{
		{"tug", "tugs", true},
		{"moored", "moor", true},
		{"near", "nearly", true},
		{"anchor", "anchoring", true},
		{"berth", "birth", false},
		{"quay", "key", false},
		{"pier", "pierce", false},
		{"tide", "untide", false},
		{"tug", "tug", false},
		{"to", "ly", false},
	} {
		if got := inflected(c.a, c.b); got != c.want || inflected(c.b, c.a) != got {
			t.Errorf("%s and %s: %v, want %v", c.a, c.b, got, c.want)
		}
	}
}
