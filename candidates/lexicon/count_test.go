package lexicon

import (
	"errors"
	"fmt"
	"iter"
	"maps"
	"math/rand/v2"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// watchLog is a small text of several documents.
const watchLog = `The pilot boarded the Skarrow at the pilot station. Skarrow's master took the helm.
NOTICE TO THE MASTERS OF ALL VESSELS
The Deep Berth And The Inner Harbour

A pilot-cutter lay at the quay; the cutter's crew, McAuley among them, ate. It's late.

Pilot launches keep to the north of the fairway. VHF watch is kept.
`

func documents(s string) iter.Seq2[[]byte, error] { return text.Documents(strings.NewReader(s)) }

func TestCounter(t *testing.T) {
	c := NewCounter()
	for doc, err := range documents(watchLog) {
		if err != nil {
			t.Fatal(err)
		}
		c.Document(doc)
	}
	tests := []struct {
		form string
		want Count
	}{
		{"pilot", Count{Documents: 3, Amid: [4]uint32{3, 0, 0, 0}, Lead: [4]uint32{0, 1, 0, 0}, Joined: 1}},
		{"skarrow", Count{Documents: 1, Amid: [4]uint32{0, 1, 0, 0}, Lead: [4]uint32{0, 1, 0, 0}}},
		{"cutter", Count{Documents: 1, Amid: [4]uint32{2, 0, 0, 0}, Joined: 1}},
		{"berth", Count{Documents: 1, Lead: [4]uint32{0, 1, 0, 0}}},
		{"vessels", Count{Documents: 1, Lead: [4]uint32{0, 0, 1, 0}}},
		{"mcauley", Count{Documents: 1, Amid: [4]uint32{0, 0, 0, 1}}},
		{"'s", Count{Documents: 2, Amid: [4]uint32{2, 0, 0, 0}}},
		{"it's", Count{Documents: 1, Lead: [4]uint32{0, 1, 0, 0}}},
		{"cutter's", Count{}},
		{"tide", Count{}},
	}
	for _, tt := range tests {
		got := c.Get(tt.form)
		got.last = 0
		if got != tt.want {
			t.Errorf("%s: %+v, want %+v", tt.form, got, tt.want)
		}
	}
	if c.Documents != 3 || c.spelled["McAuley"] != 1 {
		t.Errorf("%d documents, spelled %v", c.Documents, c.spelled)
	}
}

// manyDocuments makes a corpus of random words that spans several pieces.
func manyDocuments(n int) string {
	r := rand.New(rand.NewPCG(10, 11))
	var b strings.Builder
	for range n {
		for range 40 {
			fmt.Fprintf(&b, "Word%c%c%c is ", 'a'+r.IntN(26), 'a'+r.IntN(26), 'a'+r.IntN(4))
		}
		b.WriteString("said.\n\n")
	}
	return b.String()
}

func sameCounts(a, b *Counter) bool {
	if a.Words != b.Words || a.Documents != b.Documents || a.Len() != b.Len() || !maps.Equal(a.spelled, b.spelled) {
		return false
	}
	for form := range a.index {
		x, y := a.Get(form), b.Get(form)
		x.last, y.last = 0, 0
		if x != y {
			return false
		}
	}
	return true
}

func TestCountDocuments(t *testing.T) {
	corpus := manyDocuments(40_000) // about two pieces
	if len(corpus) < pieceSize {
		t.Fatalf("a corpus of %d bytes is one piece", len(corpus))
	}
	want := NewCounter()
	held := 0
	for doc := range documents(corpus) {
		if text.HeldOut(doc) {
			held++
			continue
		}
		want.Document(doc)
	}
	if held == 0 {
		t.Fatal("no document is held out")
	}
	for _, jobs := range []int{0, 1, 3} {
		got, err := CountDocuments(documents(corpus), jobs)
		if err != nil {
			t.Fatal(err)
		}
		if !sameCounts(got, want) {
			t.Errorf("%d jobs: counts differ from those of one pass", jobs)
		}
	}
}

func TestCountDocumentsError(t *testing.T) {
	broken := errors.New("broken")
	docs := func(yield func([]byte, error) bool) {
		_ = yield([]byte("The tide turns.\n"), nil) && yield(nil, broken)
	}
	if _, err := CountDocuments(docs, 2); !errors.Is(err, broken) {
		t.Errorf("got error %v, want %v", err, broken)
	}
}

func TestPrune(t *testing.T) {
	c := NewCounter()
	for i := range 100 {
		for range 1 + i%5 {
			c.add(fmt.Append(nil, "form", i), text.Lower, false, false)
		}
	}
	c.prune(60)
	if c.Len() != 60 {
		t.Errorf("%d forms left, want the 60 seen three times or more", c.Len())
	}
	for i := range 100 {
		n := c.Get(fmt.Sprint("form", i))
		want := uint32(1 + i%5)
		if want < 3 {
			want = 0
		}
		if n.Total() != want {
			t.Errorf("form%d: count %d, want %d", i, n.Total(), want)
		}
	}
}
