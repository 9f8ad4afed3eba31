package main

import (
	"bufio"
	"bytes"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// TestEditorHeedsTheProject: the settings of the folder of a document hold for it, and
// what the user decides is written there.
func TestEditorHeedsTheProject(t *testing.T) {
	dir := t.TempDir()
	write := func(name, body string) {
		t.Helper()
		if err := os.WriteFile(filepath.Join(dir, name), []byte(body), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	write("foulcase.toml", "house = [\"words.txt\"]\n")
	write("words.txt", "ancher\n")
	t.Setenv("FOULCASE_CONFIG", "")
	s := startEditor(t)
	uri := "file://" + filepath.ToSlash(filepath.Join(dir, "note.txt"))
	s.send(`{"jsonrpc":"2.0","id":1,"method":"initialize","params":{"processId":null,"capabilities":{}}}`)
	s.send(`{"jsonrpc":"2.0","method":"initialized","params":{}}`)
	s.send(`{"jsonrpc":"2.0","method":"textDocument/didOpen","params":{"textDocument":{"uri":"` + uri + `","languageId":"plaintext","version":1,"text":"The ancher and the hydralic pump."}}}`)
	marks := s.await("publishDiagnostics")
	if strings.Contains(marks, "anchor") || !strings.Contains(marks, "hydraulic") {
		t.Errorf("marked %s", marks)
	}
	s.send(`{"jsonrpc":"2.0","id":2,"method":"workspace/executeCommand","params":{"command":"foulcase.addWord","arguments":[{"uri":"` + uri + `","word":"hydralic"}]}}`)
	if marks = s.await("publishDiagnostics"); strings.Contains(marks, "hydraulic") {
		t.Errorf("marked %s", marks)
	}
	s.send(`{"jsonrpc":"2.0","id":3,"method":"shutdown"}`)
	s.await(`"id":3`)
	s.send(`{"jsonrpc":"2.0","method":"exit"}`)
	if code := <-s.code; code != int(clean) {
		t.Errorf("exit code %d: %s", code, s.messages.String())
	}
	words, err := os.ReadFile(filepath.Join(dir, "words.txt"))
	if err != nil || string(words) != "ancher\nhydralic\n" {
		t.Errorf("house words %q, error %v", words, err)
	}
}

// editorSession is the verb at work in this process.
type editorSession struct {
	t        *testing.T
	in       *io.PipeWriter
	out      *bufio.Reader
	messages bytes.Buffer
	code     chan int
}

func startEditor(t *testing.T) *editorSession {
	t.Helper()
	stdin, in := io.Pipe()
	out, stdout := io.Pipe()
	s := &editorSession{t: t, in: in, out: bufio.NewReader(out), code: make(chan int, 1)}
	go func() {
		s.code <- run([]string{"editor"}, stdin, stdout, &s.messages)
		stdout.Close()
	}()
	t.Cleanup(func() { in.Close(); out.Close() })
	return s
}

func (s *editorSession) send(message string) {
	s.t.Helper()
	if _, err := fmt.Fprintf(s.in, "Content-Length: %d\r\n\r\n%s", len(message), message); err != nil {
		s.t.Fatal(err)
	}
}

// await returns the next message that has some words.
func (s *editorSession) await(words string) string {
	s.t.Helper()
	for {
		var length int
		if _, err := fmt.Fscanf(s.out, "Content-Length: %d\r\n\r\n", &length); err != nil {
			s.t.Fatalf("no message with %q came: %v; %s", words, err, s.messages.String())
		}
		body := make([]byte, length)
		if _, err := io.ReadFull(s.out, body); err != nil {
			s.t.Fatal(err)
		}
		if strings.Contains(string(body), words) {
			return string(body)
		}
	}
}
