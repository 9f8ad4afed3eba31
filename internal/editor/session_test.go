package editor

import (
	"errors"
	"strings"
	"testing"
)

const note = "file:///papers/note.txt"

func TestDiagnosticsFollowTyping(t *testing.T) {
	k := start(t, Config{}, "{}")
	k.open(note, "plaintext", "\U0001F6A2 The pilot let go the ancher at noon.\r\nAll is well.\r\n")
	got := k.published(note, 1)
	checkDiagnostics(t, got, "0:24-0:30 nonword anchor")
	if d := got[0]; d.Severity != 2 || d.Source != "foulcase" || !strings.HasPrefix(d.Message, `"ancher" is not a word known here: "anchor"`) {
		t.Errorf("%+v", d)
	}
	k.change(note, 2, between(1, 0, 1, 0), "The hydralic pump failed.\r\n")
	checkDiagnostics(t, k.published(note, 2), "0:24-0:30 nonword anchor", "1:4-1:12 nonword hydraulic")
	k.change(note, 3, between(0, 24, 0, 30), "anchor")
	checkDiagnostics(t, k.published(note, 3), "1:4-1:12 nonword hydraulic")
	k.change(note, 4, "", "Nothing to see.")
	checkDiagnostics(t, k.published(note, 4))
	k.notify("textDocument/didClose", naming(note))
	checkDiagnostics(t, k.published(note, 0))
}

func TestLifecycle(t *testing.T) {
	k := newClient(t, Config{})
	check := func(method string, want code) {
		t.Helper()
		if a := k.request(method, "{}"); a.Error == nil || a.Error.Code != want {
			t.Errorf("%s: %s, want error %d", method, a.Raw, want)
		}
	}
	check("textDocument/codeAction", serverNotInitialized)
	k.open(note, "plaintext", "The ancher.") // dropped
	if a := k.request("initialize", `{"processId":null,"capabilities":{}}`); a.Error != nil {
		t.Fatal(a.Raw)
	}
	check("initialize", invalidRequest)
	check("no/such", methodNotFound)
	check("textDocument/codeAction", invalidParams)
	k.notify("$/setTrace", `{"value":"off"}`)
	k.notify("no/such", `{}`)
	k.logged("no/such")
	if a := k.request("shutdown", "null"); a.Error != nil || string(a.Result) != "null" {
		t.Errorf("shutdown: %s", a.Raw)
	}
	check("textDocument/codeAction", invalidRequest)
	k.notify("exit", "null")
	<-k.server.Done()
	if err := k.server.Close(); err != nil {
		t.Error(err)
	}
}

func TestExitWithoutShutdown(t *testing.T) {
	k := start(t, Config{}, "{}")
	k.notify("exit", "null")
	<-k.server.Done()
	if err := k.server.Close(); !errors.Is(err, ErrNoShutdown) {
		t.Errorf("error %v", err)
	}
}
