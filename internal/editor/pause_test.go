package editor

import (
	"strings"
	"sync/atomic"
	"testing"
)

// TestConfigPause: a change that comes while a judgement pauses cuts it short.
func TestConfigPause(t *testing.T) {
	const paragraphs = 50
	var pauses atomic.Int32
	paused, resume := make(chan bool), make(chan bool)
	k := start(t, Config{Pause: func() {
		if pauses.Add(1) == 1 {
			paused <- true
			<-resume
		}
	}}, pulling)
	k.open(note, "plaintext", strings.Repeat("The ancher held.\n\n", paragraphs))
	<-paused
	pull := k.ask("textDocument/diagnostic", naming(note))
	k.change(note, 2, "", "The ancher held untill noon.")
	close(resume)
	if a := k.answer(pull); a.Error == nil || a.Error.Code != serverCancelled {
		t.Errorf("%.200s", a.Raw)
	}
	checkDiagnostics(t, k.pull(note, "").Items, "0:4-0:10 nonword anchor", "0:16-0:22 nonword until")
	if n := pauses.Load(); n >= paragraphs {
		t.Errorf("%d pauses: the judgement of %d paragraphs went on", n, paragraphs)
	}
}
