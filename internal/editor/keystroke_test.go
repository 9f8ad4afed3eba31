package editor

import (
	"encoding/json"
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"
)

// BenchmarkKeystroke types into a document of 200,000 words, all over it, a stretch of
// some words at each place, and measures from each keystroke to the new diagnostics
// of the whole document, as a client would have them on the wire. Run it with -cpu 1.
func BenchmarkKeystroke(b *testing.B) {
	const words = 200_000
	text := longText(b, words)
	arrived := make(chan int, 1)
	s := New(Config{Engine: engine()}, func(m json.RawMessage) error {
		if strings.HasPrefix(string(m[:min(len(m), 60)]), `{"jsonrpc":"2.0","method":"textDocument/publishDiagnostics"`) {
			arrived <- len(m)
		}
		return nil
	})
	defer s.Close()
	s.Receive([]byte(`{"jsonrpc":"2.0","id":1,"method":"initialize","params":{"processId":null,"capabilities":{}}}`))
	s.Receive([]byte(`{"jsonrpc":"2.0","method":"initialized","params":{}}`))
	begun := time.Now()
	s.Receive(fmt.Appendf(nil, `{"jsonrpc":"2.0","method":"textDocument/didOpen","params":{"textDocument":{"uri":"untitled:long","languageId":"plaintext","version":0,"text":%s}}}`, encode(text)))
	size := <-arrived
	opening := time.Since(begun)

	r := rand.New(rand.NewPCG(4, 7))
	lines := strings.Split(text, "\n")
	const typed = " the pilot launch left her berth at noone today"
	var took []time.Duration
	line, column, next := 0, 0, len(typed)
	for version := 1; b.Loop(); version++ {
		if next == len(typed) {
			line = r.IntN(len(lines))
			column, next = strings.IndexByte(lines[line]+" ", ' '), 0
			lines[line] = lines[line][:column] + typed + lines[line][column:]
		}
		at := between(line, column+next, line, column+next)
		key := typed[next : next+1]
		next++
		begun := time.Now()
		s.Receive(fmt.Appendf(nil, `{"jsonrpc":"2.0","method":"textDocument/didChange","params":{"textDocument":{"uri":"untitled:long","version":%d},"contentChanges":[{"range":%s,"text":%q}]}}`, version, at, key))
		<-arrived
		took = append(took, time.Since(begun))
	}
	b.ReportMetric(opening.Seconds(), "s/opening")
	b.ReportMetric(float64(size)/1024, "KiB/diagnostics")
	slices.Sort(took)
	for _, q := range []int{50, 99} {
		b.ReportMetric(float64(took[len(took)*q/100].Microseconds())/1000, fmt.Sprintf("ms/p%d", q))
	}
}

// longText is the papers of the pilots over and over, a paragraph in three with the
// paragraphs of the small corpus between, to a number of words.
func longText(tb testing.TB, words int) string {
	tb.Helper()
	names, err := filepath.Glob(filepath.Join("..", "..", "testdata", "pilots", "papers", "*"))
	if err != nil || len(names) == 0 {
		tb.Fatalf("no papers: %v", err)
	}
	names = append(names, filepath.Join("..", "..", "testdata", "tiny", "corpus.txt"))
	var paragraphs []string
	for _, name := range names {
		raw, err := os.ReadFile(name)
		if err != nil {
			tb.Fatal(err)
		}
		for p := range strings.SplitSeq(string(raw), "\n\n") {
			paragraphs = append(paragraphs, strings.TrimSpace(p))
		}
	}
	r := rand.New(rand.NewPCG(1, 2))
	var b strings.Builder
	for n := 0; n < words; {
		p := paragraphs[r.IntN(len(paragraphs))]
		n += len(strings.Fields(p))
		b.WriteString(p + "\n\n")
	}
	return b.String()
}
