package editor

import (
	"fmt"
	"testing"
)

const pulling = `{"textDocument":{"diagnostic":{}},"workspace":{"diagnostics":{"refreshSupport":true}}}`

type pulled struct {
	Kind, ResultID, URI string
	Items               []diagnostic
}

func (k *client) pull(uri, previous string) pulled {
	k.t.Helper()
	a := k.request("textDocument/diagnostic", fmt.Sprintf(`{"textDocument":{"uri":%q},"previousResultId":%q}`, uri, previous))
	var p pulled
	read(k.t, a.Result, &p)
	return p
}

func TestPull(t *testing.T) {
	k := start(t, Config{}, pulling)
	k.open(note, "plaintext", "The ancher held.")
	first := k.pull(note, "")
	if first.Kind != "full" || first.ResultID == "" {
		t.Errorf("first: %+v", first)
	}
	checkDiagnostics(t, first.Items, "0:4-0:10 nonword anchor")
	if again := k.pull(note, first.ResultID); again.Kind != "unchanged" || again.ResultID != first.ResultID || again.Items != nil {
		t.Errorf("again: %+v", again)
	}
	k.change(note, 2, between(0, 4, 0, 10), "anchor")
	fixed := k.pull(note, first.ResultID)
	if fixed.Kind != "full" || fixed.Items == nil || len(fixed.Items) > 0 {
		t.Errorf("after the correction: %+v", fixed)
	}
	if _, pushed := k.find(called("textDocument/publishDiagnostics")); pushed {
		t.Error("diagnostics were pushed as well")
	}
	if a := k.request("textDocument/diagnostic", naming("file:///closed.txt")); a.Error == nil {
		t.Errorf("of a document that is not open: %s", a.Raw)
	}
}

func TestPullWorkspace(t *testing.T) {
	k := start(t, Config{}, pulling)
	k.open("file:///b.txt", "plaintext", "The ancher held.")
	k.open("file:///a.txt", "plaintext", "All is well.")
	b := k.pull("file:///b.txt", "")
	var all struct{ Items []pulled }
	read(t, k.request("workspace/diagnostic", fmt.Sprintf(`{"previousResultIds":[{"uri":"file:///b.txt","value":%q}]}`, b.ResultID)).Result, &all)
	if len(all.Items) != 2 || all.Items[0].URI != "file:///a.txt" || all.Items[0].Kind != "full" || all.Items[1].Kind != "unchanged" {
		t.Errorf("%+v", all)
	}
	k.notify("textDocument/didClose", naming("file:///a.txt"))
	k.notify("textDocument/didClose", naming("file:///b.txt"))
	if a := k.request("workspace/diagnostic", `{"previousResultIds":[]}`); string(a.Result) != `{"items":[]}` {
		t.Errorf("with nothing open: %s", a.Raw)
	}
}

// TestCancel: a request that waits for a long judgement is answered at once.
func TestCancel(t *testing.T) {
	k := start(t, Config{}, pulling)
	k.open(note, "plaintext", longText(t, 20_000))
	id := k.ask("textDocument/diagnostic", naming(note))
	k.notify("$/cancelRequest", `{"id":`+id+`}`)
	if a := k.answer(id); a.Error == nil || a.Error.Code != requestCancelled {
		t.Errorf("%.200s", a.Raw)
	}
	k.notify("$/cancelRequest", `{"id":"never asked"}`)
	k.notify("$/cancelRequest", `{}`)
}

// TestContentModified: what was asked of a text that changes is not answered from it.
func TestContentModified(t *testing.T) {
	k := start(t, Config{}, pulling)
	k.open(note, "plaintext", longText(t, 20_000))
	actions := k.ask("textDocument/codeAction", `{"textDocument":{"uri":"`+note+`"},"range":`+between(0, 0, 0, 0)+`,"context":{"diagnostics":[]}}`)
	pull := k.ask("textDocument/diagnostic", naming(note))
	k.change(note, 2, "", "Short.")
	if a := k.answer(actions); a.Error == nil || a.Error.Code != contentModified {
		t.Errorf("code actions: %.200s", a.Raw)
	}
	if a := k.answer(pull); a.Error == nil || a.Error.Code != serverCancelled {
		t.Errorf("diagnostics: %.200s", a.Raw)
	}
}
