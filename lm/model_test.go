package lm_test

import (
	"bytes"
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"example.org/foulcase/lm"
)

func TestScoreAgainstMap(t *testing.T) {
	for _, c := range []struct{ order, vocabulary, sentences int }{
		{1, 7, 10}, {2, 3, 50}, {2, 300, 3000}, {3, 40, 500}, {4, 130, 4000}, {5, 20, 800}, {6, 9, 600}, {6, 500, 20},
	} {
		t.Run(fmt.Sprint(c), func(t *testing.T) {
			r := rand.New(rand.NewPCG(uint64(c.order), uint64(c.vocabulary)))
			o := randomOracle(r, c.order, c.vocabulary, c.sentences)
			m := open(t, encode(t, o, lm.Codebooks{}))
			if err := m.Verify(); err != nil {
				t.Fatal(err)
			}
			compare(t, r, o, m, 1e-4)
		})
	}
}

// compare runs random text through model and oracle.
func compare(t *testing.T, r *rand.Rand, o *oracle, m *lm.Model, tolerance float64) {
	t.Helper()
	states := map[lm.State]string{}
	for range 200 {
		var history []uint32
		var s lm.State
		for range 20 {
			w := uint32(r.IntN(1 + r.IntN(o.vocabulary)))
			order, want := o.score(history, w)
			e := m.Explain(s, w)
			got, next := m.Score(s, w)
			if math.Abs(float64(got-want)) > tolerance || e.Order != order || math.Abs(float64(e.Total-got)) > 1e-5 {
				t.Fatalf("%v then %d: %v by order %d (%+v), want %v by order %d", history, w, got, e.Order, e, want, order)
			}
			history = append(history, w)
			s = next
			n := o.useful(history)
			context := name(history[len(history)-n:])
			if s.Len() != n {
				t.Fatalf("after %v: state of %d words, want %d", history, s.Len(), n)
			}
			if seen, ok := states[s]; ok && seen != context {
				t.Fatalf("one state for contexts %s and %s", seen, context)
			}
			states[s] = context
		}
	}
}

func TestQuantisedScores(t *testing.T) {
	r := rand.New(rand.NewPCG(4, 4))
	o := randomOracle(r, 4, 60, 2000)
	books := evenBooks(4)
	// Half a step of each codebook, and up to three back-offs.
	tolerance := 10.0/15/2 + 3*4.0/15/2 + 1e-4
	compare(t, r, o, open(t, encode(t, o, books)), tolerance)
}

func TestEncodeIsDeterministic(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 5))
	o := randomOracle(r, 3, 50, 900)
	for _, books := range []lm.Codebooks{{}, evenBooks(3)} {
		a, b := encode(t, o, books), encode(t, o, books)
		if !bytes.Equal(a, b) {
			t.Error("two encodings differ")
		}
		probBits, backBits := books.ProbBits, books.BackoffBits
		if probBits == 0 {
			probBits, backBits = 32, 32
		}
		if size, err := lm.Size(o.tables(), probBits, backBits); err != nil || size != int64(len(a)) {
			t.Errorf("Size says %d (%v), the section has %d bytes", size, err, len(a))
		}
	}
}

func TestOutsideVocabulary(t *testing.T) {
	r := rand.New(rand.NewPCG(6, 6))
	m := open(t, encode(t, randomOracle(r, 3, 10, 100), lm.Codebooks{}))
	_, s := m.Score(lm.State{}, 1)
	for _, w := range []uint32{10, math.MaxUint32} {
		p, next := m.Score(s, w)
		if p != -1000 || next != (lm.State{}) {
			t.Errorf("id %d: %v, %v", w, p, next)
		}
		if e := m.Explain(s, w); e.Order != 0 || e.Total > -1000 {
			t.Errorf("id %d: %+v", w, e)
		}
	}
}

func TestAdvanceDoesNotAllocate(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 7))
	m := open(t, encode(t, randomOracle(r, 4, 50, 900), evenBooks(4)))
	var s, next lm.State
	w := uint32(0)
	if n := testing.AllocsPerRun(1000, func() {
		m.Advance(&s, w%50, &next)
		s, next = next, s
		w += 7
	}); n != 0 {
		t.Errorf("%v allocations a query", n)
	}
}

func TestEncodeRefuses(t *testing.T) {
	r := rand.New(rand.NewPCG(8, 8))
	for what, spoil := range map[string]func(t lm.Tables) lm.Tables{
		"no orders":           func(t lm.Tables) lm.Tables { return nil },
		"seven orders":        func(t lm.Tables) lm.Tables { return make(lm.Tables, 7) },
		"no words":            func(t lm.Tables) lm.Tables { return make(lm.Tables, 1) },
		"a short array":       func(t lm.Tables) lm.Tables { t[1].Backoff = t[1].Backoff[1:]; return t },
		"a positive log":      func(t lm.Tables) lm.Tables { t[1].LogProb[3] = 0.5; return t },
		"no number":           func(t lm.Tables) lm.Tables { t[2].LogProb[0] = float32(math.NaN()); return t },
		"an infinite backoff": func(t lm.Tables) lm.Tables { t[0].Backoff[0] = float32(math.Inf(-1)); return t },
		"a context that lacks": func(t lm.Tables) lm.Tables {
			t[2].Word[0] = 19
			return t
		},
	} {
		o := randomOracle(r, 3, 20, 300)
		if _, err := lm.Encode(spoil(o.tables()), lm.Codebooks{}); err == nil {
			t.Errorf("%s: no error", what)
		}
	}
	if _, err := lm.Encode(randomOracle(r, 2, 5, 9).tables(), lm.Codebooks{ProbBits: 8, BackoffBits: 8}); err == nil {
		t.Error("no codebooks: no error")
	}
}

func TestOpenRefuses(t *testing.T) {
	r := rand.New(rand.NewPCG(9, 9))
	good := encode(t, randomOracle(r, 3, 20, 300), evenBooks(3))
	for n := range good {
		if _, err := lm.Open(good[:n]); !errors.Is(err, lm.ErrFormat) {
			t.Fatalf("cut at %d: %v", n, err)
		}
	}
	if _, err := lm.Open(append(bytes.Clone(good), 0)); !errors.Is(err, lm.ErrFormat) {
		t.Errorf("a byte more: %v", err)
	}
	for at, b := range map[int]byte{0: 'x', 4: 99, 5: 0, 6: 13, 7: 31} {
		bad := bytes.Clone(good)
		bad[at] = b
		if _, err := lm.Open(bad); !errors.Is(err, lm.ErrFormat) {
			t.Errorf("byte %d is %d: %v", at, b, err)
		}
	}
}

// TestFlippedBits flips each bit of a small model: whatever Open lets pass must
// score without a panic. (The file around the section has a checksum.)
func TestFlippedBits(t *testing.T) {
	r := rand.New(rand.NewPCG(10, 10))
	for _, books := range []lm.Codebooks{{}, evenBooks(4)} {
		good := encode(t, randomOracle(r, 4, 70, 60), books)
		bad := bytes.Clone(good)
		for bit := range 8 * len(good) {
			bad[bit/8] ^= 1 << (bit % 8)
			if m, err := lm.Open(bad); err == nil {
				exercise(m)
			}
			bad[bit/8] = good[bit/8]
		}
	}
}

// exercise scores a little of everything.
func exercise(m *lm.Model) {
	var s lm.State
	n := uint32(min(m.Vocabulary(), 80))
	for i := range 3 * n {
		m.Explain(s, i%n)
		_, s = m.Score(s, i*7%n)
	}
}

func FuzzOpen(f *testing.F) {
	r := rand.New(rand.NewPCG(11, 11))
	for order := 1; order <= 4; order++ {
		o := randomOracle(r, order, 9, 30)
		f.Add(encode(f, o, lm.Codebooks{}))
		f.Add(encode(f, o, evenBooks(order)))
	}
	f.Fuzz(func(t *testing.T, section []byte) {
		m, err := lm.Open(section)
		if err != nil {
			if !errors.Is(err, lm.ErrFormat) {
				t.Errorf("unexpected kind of error: %v", err)
			}
			return
		}
		exercise(m)
		_ = m.Verify() // may say no; must return
	})
}
