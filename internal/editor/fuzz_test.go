package editor

import (
	"bytes"
	"context"
	"io"
	"math/rand/v2"
	"testing"
)

// FuzzServe sends arbitrary bytes, bare and as the body of a frame within a session.
func FuzzServe(f *testing.F) {
	f.Add([]byte(hello))
	f.Add([]byte("Content-Length: 5\r\n\r\nhello"))
	f.Add([]byte(`{"jsonrpc":"2.0","method":"textDocument/didOpen","params":{"textDocument":{"uri":"file:///a.md","languageId":"markdown","version":1,"text":"The *ancher* held."}}}`))
	f.Add([]byte(`{"jsonrpc":"2.0","id":9,"method":"textDocument/codeAction","params":{"textDocument":{"uri":"untitled:a"},"range":{"start":{"line":0,"character":4},"end":{"line":-9,"character":999}},"context":{}}}`))
	f.Add([]byte(`{"jsonrpc":"2.0","id":9,"method":"workspace/diagnostic","params":{}}`))
	f.Add([]byte(`{"jsonrpc":"2.0","method":"workspace/didChangeConfiguration","params":{"settings":{"foulcase":{"house":["ancher"]}}}}`))
	f.Add([]byte(`{"jsonrpc":"2.0","id":"x","method":"codeAction/resolve","params":{"title":"","data":{"uri":"untitled:a","version":1,"which":"alike","choice":-1}}}`))
	opened := framed(hello, `{"jsonrpc":"2.0","method":"textDocument/didOpen","params":{"textDocument":{"uri":"untitled:a","languageId":"plaintext","version":1,"text":"The ancher held."}}}`)
	f.Fuzz(func(t *testing.T, sent []byte) {
		for _, stream := range []string{string(sent), opened + framed(string(sent), goodbye, exit)} {
			var out bytes.Buffer
			_ = Serve(context.Background(), bytes.NewReader([]byte(stream)), &out, Config{Engine: engine(), Settings: (&memory{}).load})
			for frames := newFrameReader(&out); ; {
				if _, err := frames.next(); err == io.EOF {
					break
				} else if err != nil {
					t.Fatalf("a bad frame came back: %v", err)
				}
			}
		}
	})
}

// FuzzEdits makes edits at positions that need not be, and holds the lines to those
// read anew.
func FuzzEdits(f *testing.F) {
	f.Add("The ancher\r\nheld \U0001F6A2.\r", "\n", uint64(1), byte(0))
	f.Add("", "\r", uint64(7), byte(1))
	f.Add("\u00e9\u0301\n\n", "ebb\r\n", uint64(3), byte(2))
	f.Fuzz(func(t *testing.T, text, added string, seed uint64, unit byte) {
		text, added = string(bytes.ToValidUTF8([]byte(text), []byte("?"))), string(bytes.ToValidUTF8([]byte(added), []byte("?")))
		if len(text) > 1<<13 || len(added) > 1<<10 {
			t.Skip("longer than it need be")
		}
		r := rand.New(rand.NewPCG(seed, 3))
		l := lines{unit: encodings[unit%3]}
		l.reset([]byte(text))
		for range 8 {
			from, _ := l.offset([]byte(text), position{r.IntN(12) - 1, r.IntN(40) - 1})
			to, _ := l.offset([]byte(text), position{r.IntN(12) - 1, r.IntN(40) - 1})
			from, to = min(from, to), max(from, to)
			text = text[:from] + added + text[to:]
			l.edit([]byte(text), from, to, len(added))
		}
		checkLines(t, &l, text)
	})
}
