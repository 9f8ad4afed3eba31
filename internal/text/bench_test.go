package text_test

import (
	"io"
	"os"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// prose returns invented text, or, when FOULCASE_TEXT names a file, its first
// eight megabytes.
func prose(b *testing.B) string {
	name := os.Getenv("FOULCASE_TEXT")
	if name == "" {
		return document(300)
	}
	f, err := os.Open(name)
	if err != nil {
		b.Fatal(err)
	}
	defer f.Close()
	data, err := io.ReadAll(io.LimitReader(f, 8<<20))
	if err != nil {
		b.Fatal(err)
	}
	return string(data)
}

// BenchmarkSegmenter measures text to tokens with normal forms.
func BenchmarkSegmenter(b *testing.B) {
	block := []byte(prose(b))
	b.SetBytes(int64(len(block)))
	b.ReportAllocs()
	var s text.Segmenter
	tokens := 0
	for b.Loop() {
		for sentence := range s.Sentences(block) {
			tokens += len(sentence.Tokens)
		}
	}
	b.ReportMetric(float64(tokens)/b.Elapsed().Seconds(), "tokens/s")
}

// BenchmarkBlocks measures the readers alone.
func BenchmarkBlocks(b *testing.B) {
	source := prose(b)
	for _, f := range text.Formats() {
		b.Run(string(f), func(b *testing.B) {
			for _, err := range text.Blocks(strings.NewReader(source), f, text.Options{}) {
				if err != nil {
					b.Skipf("the prose is no document of this format: %v", err)
				}
			}
			b.SetBytes(int64(len(source)))
			b.ReportAllocs()
			for b.Loop() {
				for _, err := range text.Blocks(strings.NewReader(source), f, text.Options{}) {
					if err != nil {
						b.Fatal(err)
					}
				}
			}
		})
	}
}
