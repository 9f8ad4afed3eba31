package editor

import (
	"errors"
	"fmt"
	"runtime"
	"strings"
	"sync/atomic"
	"testing"
	"testing/synctest"
	"time"
	"weak"

	"example.org/foulcase"
)

// TestManyMarks: a client gets as many marks and actions as it can bear, and the user is
// told.
func TestManyMarks(t *testing.T) {
	k := start(t, Config{}, "{}")
	k.open(note, "plaintext", strings.Repeat("x ", mostMarks+7))
	k.published(note, 1)
	var marks []foulcase.Mark
	for i := range int64(mostMarks + 7) {
		marks = append(marks, foulcase.Mark{Offset: 2 * i, Length: 1, Observed: fmt.Sprint(i), Corrections: forms("y")})
	}
	done := make(chan bool)
	d := k.server.find(note)
	d.inbox.put(task{run: func() {
		d.keep(marks)
		d.publish()
		d.keep(marks)
		close(done)
	}})
	<-done
	if got := k.published(note, 1); len(got) != mostMarks {
		t.Errorf("%d diagnostics", len(got))
	}
	k.logged("more than 5000 marks")
	if again, ok := k.find(called("window/showMessage")); ok {
		t.Errorf("told again: %s", again.Raw)
	}
	if all := k.actions(note, between(0, 0, 1, 0), `{"diagnostics":[],"only":["quickfix"]}`); len(all) != mostOffered {
		t.Errorf("%d actions", len(all))
	}
}

// TestSettlingYields: who asks while everything is judged anew after a save need not wait
// for the end of that.
func TestSettlingYields(t *testing.T) {
	const paragraphs = 50
	var pauses atomic.Int32
	paused, resume := make(chan bool), make(chan bool)
	k := start(t, Config{Pause: func() {
		if pauses.Add(1) == paragraphs+2 { // the first judgement had one for each
			paused <- true
			<-resume
		}
	}}, "{}")
	k.open(note, "plaintext", "The ancher held."+strings.Repeat("\n\nAll is well.", paragraphs-1))
	k.published(note, 1)
	k.change(note, 2, between(0, 16, 0, 16), " ")
	k.published(note, 2)
	k.notify("textDocument/didSave", naming(note))
	<-paused
	id := k.ask("textDocument/codeAction", fmt.Sprintf(`{"textDocument":{"uri":%q},"range":%s,"context":{"diagnostics":[]}}`, note, between(0, 4, 0, 4)))
	close(resume)
	if a := k.answer(id); a.Error != nil || !strings.Contains(a.Raw, "anchor") {
		t.Errorf("%.200s", a.Raw)
	}
	if n := pauses.Load(); n >= 2*paragraphs {
		t.Errorf("%d pauses: the settling went on to its end first", n)
	}
	checkDiagnostics(t, k.published(note, 2), "0:4-0:10 nonword anchor") // it goes on later
}

// TestIdleDocumentsRest: a document that is left alone holds little, and is judged as
// before when that ends.
func TestIdleDocumentsRest(t *testing.T) {
	engine()
	synctest.Test(t, func(t *testing.T) {
		k := start(t, Config{}, "{}")
		k.open(note, "plaintext", "The ancher held.")
		k.published(note, 1)
		resting := func() bool {
			answer := make(chan bool)
			d := k.server.find(note)
			d.inbox.put(task{run: func() { answer <- d.resting }})
			return <-answer
		}
		time.Sleep(restPause / 2)
		if resting() {
			t.Error("rests too early")
		}
		time.Sleep(2 * restPause)
		if !resting() {
			t.Error("does not rest")
		}
		k.change(note, 2, between(0, 0, 0, 0), "Untill noon. ")
		checkDiagnostics(t, k.published(note, 2), "0:0-0:6 nonword Until", "0:17-0:23 nonword anchor")
		if resting() {
			t.Error("rests while it is written in")
		}
		k.server.Close()
	})
}

// TestErrorsWhileTyping: half a record is no news for the user.
func TestErrorsWhileTyping(t *testing.T) {
	const records = "file:///log.jsonl"
	k := start(t, Config{}, "{}")
	k.open(records, "jsonl", `{"note":"The ancher held."}`+"\n")
	checkDiagnostics(t, k.published(records, 1), "0:13-0:19 nonword anchor")
	k.change(records, 2, between(1, 0, 1, 0), `{"note":"The`)
	checkDiagnostics(t, k.published(records, 2), "0:13-0:19 nonword anchor")
	k.logged("log.jsonl")
	if shown, ok := k.find(called("window/showMessage")); ok {
		t.Errorf("shown: %s", shown.Raw)
	}
	k.open("file:///other.jsonl", "jsonl", `{"note":"The`)
	k.published("file:///other.jsonl", 1)
	k.await("a message to the user", called("window/showMessage"))
}

// TestFaultsOfSettingsAreShownOnce: not for each document.
func TestFaultsOfSettingsAreShownOnce(t *testing.T) {
	k := start(t, Config{Settings: func(string) (Settings, error) { return nil, errors.New("foulcase.toml:3:1: no key") }}, "{}")
	for i := range 3 {
		uri := fmt.Sprintf("file:///papers/%d.txt", i)
		k.open(uri, "plaintext", "")
		k.published(uri, 1)
	}
	shown := func() (n int) {
		for {
			if _, ok := k.find(called("window/showMessage")); !ok {
				return n
			}
			n++
		}
	}
	if n := shown(); n != 1 {
		t.Errorf("shown %d times", n)
	}
	k.notify("workspace/didChangeWatchedFiles", `{"changes":[]}`)
	k.logged("foulcase.toml:3:1") // still, or again
}

// TestTooManyRequests: beyond what may wait, requests are refused.
func TestTooManyRequests(t *testing.T) {
	paused, resume := make(chan bool), make(chan bool)
	var pauses atomic.Int32
	k := start(t, Config{Pause: func() {
		if pauses.Add(1) == 1 {
			paused <- true
			<-resume
		}
	}}, pulling)
	k.open(note, "plaintext", "The ancher held.")
	<-paused
	var ids []string
	for range maxCalls {
		ids = append(ids, k.ask("textDocument/diagnostic", naming(note)))
	}
	if a := k.request("textDocument/diagnostic", naming(note)); a.Error == nil || a.Error.Code != requestFailed {
		t.Errorf("one too many: %s", a.Raw)
	}
	close(resume)
	for _, id := range ids[len(ids)-3:] {
		if a := k.answer(id); a.Error != nil {
			t.Error(a.Raw)
		}
	}
}

// TestQueuesLetGo: what was taken from a queue is not held by it.
func TestQueuesLetGo(t *testing.T) {
	large := func() (*[1 << 16]byte, weak.Pointer[[1 << 16]byte]) {
		p := new([1 << 16]byte)
		return p, weak.Make(p)
	}
	inbox := newMailbox()
	p, held := large()
	inbox.put(task{run: func() { p[0]++ }})
	inbox.put(task{run: func() {}})
	if _, ok := inbox.take(); !ok {
		t.Fatal("no task")
	}
	p = nil
	runtime.GC()
	if held.Value() != nil {
		t.Error("the mailbox holds a task that was taken")
	}
	runtime.KeepAlive(&inbox)

	o := &outbox{wake: make(chan struct{}, 1)}
	q, held := large()
	o.put(parcel{"", q[:]})
	o.put(parcel{"", nil})
	if _, more, _ := o.take(); !more {
		t.Fatal("no parcel")
	}
	q = nil
	runtime.GC()
	if held.Value() != nil {
		t.Error("the outbox holds a parcel that was taken")
	}
	runtime.KeepAlive(o)
}
