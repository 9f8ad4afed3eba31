package lexicon_test

import (
	"bytes"
	"testing"

	"example.org/foulcase/candidates/lexicon"
)

func BenchmarkID(b *testing.B) {
	forms := debianList(b, "american-english-huge")
	l := build(b, forms...)
	words := make([][]byte, 0, 1<<16) // every so many forms, out of order
	for i := range cap(words) {
		words = append(words, []byte(forms[i*7919%len(forms)]))
	}
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		l.ID(words[i&(1<<16-1)])
		i++
	}
}

// BenchmarkIDCommon looks up the words of a running text.
func BenchmarkIDCommon(b *testing.B) {
	l := build(b, debianList(b, "american-english-huge")...)
	words := bytes.Fields([]byte("the pilot took the launch out to meet the vessel at the station and " +
		"boarded her in a moderate swell while the coxswain kept station under the lee side"))
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		l.ID(words[i%len(words)])
		i++
	}
}

func BenchmarkEdges(b *testing.B) {
	l := build(b, debianList(b, "american-english-huge")...)
	edges := 0
	var visit func(n lexicon.Node, depth int)
	visit = func(n lexicon.Node, depth int) {
		for e := l.Edges(n); e.Next(); {
			edges++
			if depth > 0 {
				visit(e.Target, depth-1)
			}
		}
	}
	b.ReportAllocs()
	for b.Loop() {
		visit(l.Root(), 3)
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(edges), "ns/edge")
}

func BenchmarkBestPrior(b *testing.B) {
	l := build(b, debianList(b, "american-english-huge")...)
	n := uint32(l.Len())
	i := uint32(0)
	for b.Loop() {
		lo := i * 7919 % n
		l.BestPrior(lo, lo+i%1000)
		i++
	}
}

func BenchmarkOpen(b *testing.B) {
	var bu lexicon.Builder
	bu.AddLexicon(build(b, debianList(b, "american-english-huge")...))
	section, err := bu.Section()
	if err != nil {
		b.Fatal(err)
	}
	b.SetBytes(int64(len(section)))
	for b.Loop() {
		if _, err := lexicon.Open(section); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(len(section)), "bytes")
}
