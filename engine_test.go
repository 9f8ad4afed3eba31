package foulcase_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/internal/modelfile"
	"example.org/foulcase/lm/english"
)

func TestOpenRefusesDamage(t *testing.T) {
	model := slices.Clone(english.Model())
	rng := rand.New(rand.NewPCG(1, 1))
	for range 50 {
		at, bit := rng.IntN(len(model)), byte(1)<<rng.IntN(8)
		model[at] ^= bit
		_, err := foulcase.Open(model)
		model[at] ^= bit
		if !errors.Is(err, foulcase.ErrDamaged) && !errors.Is(err, foulcase.ErrForeign) && !errors.Is(err, foulcase.ErrNewer) {
			t.Fatalf("byte %d altered: %v", at, err)
		}
	}
	for range 20 {
		if _, err := foulcase.Open(model[:rng.IntN(len(model))]); err == nil {
			t.Fatal("a cut model opens")
		}
	}
}

func TestOpenNamesTheMissingPart(t *testing.T) {
	whole, err := modelfile.Open(english.Model())
	if err != nil {
		t.Fatal(err)
	}
	for _, left := range whole.Names() {
		switch left {
		case foulcase.SectionCard, foulcase.SectionFitted, foulcase.SectionCalibration: // may be missing
			continue
		}
		w := modelfile.NewWriter()
		for _, name := range whole.Names() {
			if body, _ := whole.Section(name); name != left {
				if err := w.Set(name, body); err != nil {
					t.Fatal(err)
				}
			}
		}
		path := filepath.Join(t.TempDir(), "part.fcm")
		if err := w.WriteFile(path); err != nil {
			t.Fatal(err)
		}
		if _, err := foulcase.OpenFile(path); err == nil || !strings.Contains(err.Error(), left) || !strings.Contains(err.Error(), path) {
			t.Errorf("without %s: %v", left, err)
		}
	}
}

// TestOpenRefusesBadJudgement swaps the judgement for ones that cannot be.
func TestOpenRefusesBadJudgement(t *testing.T) {
	whole, err := modelfile.Open(english.Model())
	if err != nil {
		t.Fatal(err)
	}
	for _, judgement := range []string{"", "{}", "[1]", `{"unheard_of": 1}`, `{"budgets": [{"budget": 2}, {"budget": 1}]}`} {
		w := modelfile.NewWriter()
		for _, name := range whole.Names() {
			body, _ := whole.Section(name)
			if name == foulcase.SectionJudgement {
				body = []byte(judgement)
			}
			if err := w.Set(name, body); err != nil {
				t.Fatal(err)
			}
		}
		var model strings.Builder
		if _, err := w.WriteTo(&model); err != nil {
			t.Fatal(err)
		}
		if _, err := foulcase.Open([]byte(model.String())); err == nil || !strings.Contains(err.Error(), "judgement") {
			t.Errorf("judgement %s: %v", judgement, err)
		}
	}
}

func TestOpenFile(t *testing.T) {
	path := filepath.Join(t.TempDir(), "english.fcm")
	if err := os.WriteFile(path, english.Model(), 0o600); err != nil {
		t.Fatal(err)
	}
	e, err := foulcase.OpenFile(path)
	if err != nil {
		t.Fatal(err)
	}
	for word, want := range map[string]bool{"Berth": true, "pilot’s": true, "well-known": true, "brth": false, "brth's": false, "well-knwon": false, "": false} {
		if e.Known(word) != want {
			t.Errorf("Known(%q) = %v", word, !want)
		}
	}
	if e.Hash() != engine().Hash() || len(e.Hash()) != 16 {
		t.Error("the same model has another hash")
	}
	if len(e.Describe()) < 7 || !strings.Contains(e.Card(), "licence") {
		t.Error("the model does not describe itself")
	}
	if err := e.Close(); err != nil {
		t.Error(err)
	}
}

func TestRank(t *testing.T) {
	for _, c := range []struct{ word, want string }{
		{"acress", "across"}, // no context: Jurafsky & Martin, appendix B
		{"recieve", "receive"},
		{"Untill", "Until"},
		{"SEPERATE", "SEPARATE"},
		{"ofthe", "of the"},
		{"with out", "without"},
		{"captian's", "captain's"},
		{"londn", "London"},
	} {
		r := engine().Rank(c.word, foulcase.RankOptions{K: 5})
		if r.Known || len(r.Candidates) == 0 || r.Candidates[0].Text != c.want {
			t.Errorf("Rank(%q) = %+v, want %q first", c.word, r, c.want)
		}
		sum := 0.0
		for i, x := range r.Candidates {
			sum += x.P
			if i > 0 && x.P > r.Candidates[i-1].P {
				t.Errorf("Rank(%q) is out of order", c.word)
			}
			if x.Channel > 0 || x.LM > 0 {
				t.Errorf("Rank(%q): %+v has a positive log", c.word, x)
			}
		}
		if len(r.Candidates) > 5 || sum > 1+1e-9 {
			t.Errorf("Rank(%q): %d candidates of total p %v", c.word, len(r.Candidates), sum)
		}
	}
	if r := engine().Rank("berth", foulcase.RankOptions{}); !r.Known || len(r.Candidates) != 10 {
		t.Errorf("Rank(berth): known %v, %d candidates; want true, 10", r.Known, len(r.Candidates))
	}
	if r := engine().Rank(strings.Repeat("z", 10_000), foulcase.RankOptions{}); r.Known || r.Candidates == nil {
		t.Error("a word of 10,000 letters is known or has a nil list")
	}
}

func TestRankInContext(t *testing.T) {
	r := engine().Rank("acress", foulcase.RankOptions{Left: "She was a film and television", Right: "who won an award"})
	if r.Candidates[0].Text != "actress" {
		t.Errorf("first is %q", r.Candidates[0].Text)
	}
}

// TestLedgerAddsUp checks that the parts of every account make its score, and
// that posteriors are the scores' shares.
func TestLedgerAddsUp(t *testing.T) {
	const sentence = "The launch will birth at noon, and teh Zorbatt dose not wait."
	l := engine().Ledger(sentence, foulcase.Options{})
	if len(l.Words) != 12 {
		t.Fatalf("%d words accounted for, want 12", len(l.Words))
	}
	verdicts := map[string]string{}
	w := l.Weights
	for _, c := range l.Words {
		verdicts[c.Observed] = c.Verdict
		if sentence[c.Offset:c.Offset+len(c.Observed)] != c.Observed {
			t.Errorf("%q is not at %d", c.Observed, c.Offset)
		}
		total := 0.0
		for _, r := range c.Readings {
			want := w.LanguageModel*r.LM + r.Slip - w.Channel*r.Channel + r.Evidence
			if math.Abs(r.Score-want) > 1e-6 {
				t.Errorf("%s as %s: score %v, its parts make %v", c.Observed, r.Text, r.Score, want)
			}
			total += r.P
		}
		if total > 1+1e-6 {
			t.Errorf("%s: probabilities of its readings make %v", c.Observed, total)
		}
	}
	if verdicts["teh"] != "mark nonword" || verdicts["launch"] != "let stand" {
		t.Errorf("verdicts: %v", verdicts)
	}
	for _, part := range []string{"-gram", "channel:", "slip", "evidence"} {
		if !strings.Contains(l.String(), part) {
			t.Errorf("the printed ledger does not show %q", part)
		}
	}
}
