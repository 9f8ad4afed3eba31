package foulcase_test

import (
	"bytes"
	"context"
	"os"
	"testing"

	"example.org/foulcase"
)

// BenchmarkProof proofs the file that FOULCASE_TEXT names, everything on; the
// tests' own short text where it names none. Run it with -cpu 1.
func BenchmarkProof(b *testing.B) {
	document := []byte(manifest)
	if path := os.Getenv("FOULCASE_TEXT"); path != "" {
		var err error
		if document, err = os.ReadFile(path); err != nil {
			b.Fatal(err)
		}
	}
	words := len(bytes.Fields(document))
	b.SetBytes(int64(len(document)))
	for b.Loop() {
		for _, err := range engine().Proof(context.Background(), bytes.NewReader(document), foulcase.Options{}) {
			if err != nil {
				b.Fatal(err)
			}
		}
	}
	b.ReportMetric(float64(words)*float64(b.N)/b.Elapsed().Seconds(), "words/s")
}

// BenchmarkRank ranks misspellings of every length without context.
func BenchmarkRank(b *testing.B) {
	words := []string{"teh", "recieve", "sikology", "acommodation", "untill", "brth", "hydralic", "maintainance"}
	engine().Rank("warm", foulcase.RankOptions{})
	for i := 0; b.Loop(); i++ {
		engine().Rank(words[i%len(words)], foulcase.RankOptions{K: 20})
	}
}
