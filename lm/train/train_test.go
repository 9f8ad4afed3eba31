package train_test

import (
	"bytes"
	"context"
	"fmt"
	"math"
	"os"
	"testing"

	"example.org/foulcase/lm"
	"example.org/foulcase/lm/train"
)

func TestSameBytes(t *testing.T) {
	var want []byte
	for _, o := range []train.Options{
		{Workers: 1}, {Workers: 4}, {Memory: 3 * 16 * 4096, TempDir: t.TempDir()},
	} {
		o.Order, o.Size = 4, 150_000
		r, _, err := train.TrainRaw(context.Background(), open(t, "train.txt"), o)
		if err != nil {
			t.Fatal(err)
		}
		if want == nil {
			want = r.Section
		}
		if !bytes.Equal(r.Section, want) {
			t.Errorf("%+v: other bytes", o)
		}
	}
}

func TestNothingIsLeftBehind(t *testing.T) {
	dir := t.TempDir()
	o := train.Options{Order: 3, Memory: 3 * 16 * 4096, TempDir: dir}
	if _, _, err := train.TrainRaw(context.Background(), open(t, "train.txt"), o); err != nil {
		t.Fatal(err)
	}
	if left, err := os.ReadDir(dir); err != nil || len(left) != 0 {
		t.Errorf("left in the temporary folder: %v (%v)", left, err)
	}
	o.TempDir = dir + "/none"
	if _, _, err := train.TrainRaw(context.Background(), open(t, "train.txt"), o); err == nil {
		t.Error("no error for a temporary folder that is missing")
	}
}

func TestSizeIsKept(t *testing.T) {
	last := math.Inf(1)
	for _, size := range []int64{60_000, 90_000, 150_000, 1 << 30} {
		r, v, err := train.TrainRaw(context.Background(), open(t, "train.txt"), train.Options{Order: 4, Size: size})
		if err != nil {
			t.Fatal(err)
		}
		if n := int64(len(r.Section)); n > size || size < 1<<30 && n < size*9/10 {
			t.Errorf("%d bytes where %d are allowed", n, size)
		}
		m := openModel(t, r.Section)
		sum, err := train.Measure(m, train.RawText(open(t, "heldout.txt"), v, false), train.BeginID, nil)
		if err != nil {
			t.Fatal(err)
		}
		// The text is so regular that pruning hardly matters; it must not harm.
		p := sum.Perplexity()
		if p > 1.01*last {
			t.Errorf("%d bytes: perplexity %v, the smaller model's is %v", size, p, last)
		}
		last = p
	}
}

// TestQuantisingCostsLittle bounds what codebooks of eight bits do to scores.
func TestQuantisingCostsLittle(t *testing.T) {
	exact, v := trainReference(t, train.Options{Order: 4})
	coarse, _, err := train.TrainRaw(context.Background(), open(t, "train.txt"), train.Options{Order: 4})
	if err != nil {
		t.Fatal(err)
	}
	a, b := openModel(t, exact.Section), openModel(t, coarse.Section)
	if len(coarse.Section)*2 > len(exact.Section) {
		t.Errorf("%d bytes, exact values take %d", len(coarse.Section), len(exact.Section))
	}
	n, sum := 0.0, 0.0
	for sentence, err := range train.RawText(open(t, "heldout.txt"), v, false) {
		if err != nil {
			t.Fatal(err)
		}
		s, q := a.Begin(train.BeginID), b.Begin(train.BeginID)
		for _, w := range sentence[1:] {
			var p, x float32
			p, s = a.Score(s, w)
			x, q = b.Score(q, w)
			d := math.Abs(float64(p - x))
			if d > .5 {
				t.Errorf("%v where the exact score is %v", x, p)
			}
			sum += d
			n++
		}
	}
	if sum > .02*n {
		t.Errorf("%v nats a word away from the exact scores", sum/n)
	}
}

func TestVocabularySection(t *testing.T) {
	_, v := trainReference(t, train.Options{Order: 1})
	section := v.Section()
	back, err := train.OpenVocabulary(section)
	if err != nil || back.Len() != v.Len() {
		t.Fatalf("%d words, want %d (%v)", back.Len(), v.Len(), err)
	}
	for id := range uint32(v.Len()) {
		if back.Word(id) != v.Word(id) || back.ID(v.Word(id)) != id {
			t.Fatalf("word %d: %q, want %q", id, back.Word(id), v.Word(id))
		}
	}
	for n := range section {
		if _, err := train.OpenVocabulary(section[:n]); err == nil {
			t.Fatalf("cut at %d: no error", n)
		}
	}
}

func TestSpelling(t *testing.T) {
	forms := func(yield func(string, int) bool) {
		for _, onset := range []string{"b", "str", "th", "qu", "sk", "pl"} {
			for _, nucleus := range []string{"a", "ea", "oo", "i", "ow"} {
				for _, coda := range []string{"n", "rk", "st", "ling", "ter", "t-line", "n's"} {
					if !yield(onset+nucleus+coda, 1+len(coda)%2) {
						return
					}
				}
			}
		}
	}
	section, err := train.Spelling(context.Background(), forms, 0)
	if err != nil {
		t.Fatal(err)
	}
	s, err := lm.OpenSpelling(section)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range [][2]string{{"stroon", "ntsroo"}, {"theark", "xzqvkj"}, {"quiter", "quiter7"}, {"plan", "plén"}} {
		likely, unlikely := s.Price([]byte(c[0])), s.Price([]byte(c[1]))
		if !(likely > 0 && likely < unlikely) {
			t.Errorf("%s costs %v, %s costs %v", c[0], likely, c[1], unlikely)
		}
	}
	if p := s.Price(nil); !(p > 0) || math.IsInf(p, 0) {
		t.Errorf("the empty form costs %v", p)
	}
	if p := s.Price([]byte("\xff\x00\xf0")); !(p > 0) || math.IsInf(p, 0) {
		t.Errorf("bytes that are no letters cost %v", p)
	}
	other, _, err := train.TrainRaw(context.Background(), open(t, "train.txt"), train.Options{Order: 2})
	if err != nil {
		t.Fatal(err)
	}
	if _, err := lm.OpenSpelling(other.Section); err == nil {
		t.Error("a model of words opens as one of spelling")
	}
}

func ExampleTrainRaw() {
	log := "the pilot boards at the sound\nthe pilot leaves at the pier\nthe launch waits at the pier\n"
	r, words, err := train.TrainRaw(context.Background(), bytes.NewBufferString(log), train.Options{Order: 2})
	if err != nil {
		fmt.Println(err)
		return
	}
	m, err := lm.Open(r.Section)
	if err != nil {
		fmt.Println(err)
		return
	}
	_, at := m.Score(m.Begin(train.BeginID), words.ID("at"))
	the, _ := m.Score(at, words.ID("the"))
	pier, _ := m.Score(at, words.ID("pier"))
	fmt.Println("after at, the likelier word is the:", the > pier)
	// Output: after at, the likelier word is the: true
}
