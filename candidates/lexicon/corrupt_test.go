package lexicon_test

import (
	"encoding/binary"
	"testing"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
)

// sample is a small section with everything in it.
func sample(t testing.TB) []byte {
	t.Helper()
	var b lexicon.Builder
	for i, form := range []string{"'s", "berth", "berths", "birth", "café", "iphone", "it's", "pilot", "pilots", "quay", "quays", "tide", "tides"} {
		e := lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true, Prior: -float32(i)}
		spelled := ""
		if form == "iphone" {
			e.Cases, e.Usual, spelled = lexicon.MixedCase, lexicon.MixedCase, "iPhone"
		}
		b.Add(form, e, spelled)
	}
	section, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	return section
}

// exercise calls everything that reads a section; it must neither panic nor
// run for ever, whatever the bytes are.
func exercise(section []byte) {
	l, err := lexicon.Open(section)
	if err != nil {
		return
	}
	for _, form := range []string{"berths", "iphone", "quays", "zzz", "café", ""} {
		l.ID([]byte(form))
	}
	var buf []byte
	for id := range uint32(min(l.Len(), 50)) {
		buf = l.AppendForm(buf[:0], id)
		l.Entry(id)
		l.Canonical(id)
		l.BestPrior(id, id+uint32(len(buf)))
		l.Variants(id, id+1)
	}
	l.BestPrior(0, 1<<31)
	l.AppendForm(nil, 1<<31)
	l.Read(nil, text.Token{Kind: text.Word, Norm: []byte("pilot's")})
	steps := 0
	var visit func(n lexicon.Node)
	visit = func(n lexicon.Node) {
		if steps++; steps > 5000 { // bytes gone wrong may spell very many words
			return
		}
		l.Final(n)
		for e := l.Edges(n); e.Next(); {
			visit(e.Target)
		}
	}
	visit(l.Root())
}

func TestFlippedBits(t *testing.T) {
	section := sample(t)
	for bit := range 8 * len(section) {
		section[bit/8] ^= 1 << (bit % 8)
		exercise(section)
		section[bit/8] ^= 1 << (bit % 8)
	}
}

func TestCuts(t *testing.T) {
	section := sample(t)
	for n := range len(section) {
		if _, err := lexicon.Open(section[:n]); err == nil {
			t.Errorf("opened the first %d of %d bytes", n, len(section))
		}
	}
	if _, err := lexicon.Open(append(section[:len(section):len(section)], 0)); err == nil {
		t.Error("opened a section with a byte too many")
	}
}

func FuzzSection(f *testing.F) {
	f.Add(sample(f))
	f.Add([]byte("FCX1"))
	f.Fuzz(func(t *testing.T, data []byte) {
		exercise(data)
		// Most changed bytes break the sizes in the header, so make them fit and
		// give all of the body to the automaton.
		const header = 16
		if len(data) > header {
			body := append([]byte(nil), data...)
			copy(body, "FCX1")
			forms := min(uint32(data[4]), uint32(len(data)-header)/2)
			binary.LittleEndian.PutUint32(body[4:], forms)
			binary.LittleEndian.PutUint32(body[8:], uint32(len(data)-header)-2*forms)
			binary.LittleEndian.PutUint32(body[12:], 0)
			exercise(body)
		}
	})
}
