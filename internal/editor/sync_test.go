package editor

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"
	"testing/synctest"
	"time"
)

// capable offers one encoding.
func capable(e encoding) string {
	return fmt.Sprintf(`{"general":{"positionEncodings":[%q]}}`, e)
}

func TestEncodings(t *testing.T) {
	for _, tt := range []struct {
		offered, want encoding
		column        int
	}{
		{utf8Units, utf8Units, 13},
		{utf16Units, utf16Units, 9},
		{utf32Units, utf32Units, 8},
		{"utf-7", utf16Units, 9},
	} {
		k := newClient(t, Config{})
		a := k.request("initialize", `{"processId":null,"capabilities":`+capable(tt.offered)+`}`)
		if !strings.Contains(string(a.Result), fmt.Sprintf(`"positionEncoding":%q`, tt.want)) {
			t.Errorf("offered %s: %s", tt.offered, a.Result)
		}
		k.open(note, "plaintext", "A e\u0301\u00e9 \U0001F6A2 ancher held.")
		got := k.published(note, 1)
		if len(got) != 1 || got[0].Range.Start.Character != tt.column {
			t.Errorf("%s: %v, want column %d", tt.offered, got, tt.column)
		}
	}
}

// TestTextFollowsTheClient: after random edits, in each encoding, server and client
// have the same text, and the diagnostics after a save are those of a document that
// is opened with that text.
func TestTextFollowsTheClient(t *testing.T) {
	for seed := range uint64(6) {
		unit := encodings[seed%3]
		t.Run(fmt.Sprint(seed, unit), func(t *testing.T) {
			r := rand.New(rand.NewPCG(seed, 2))
			k := start(t, Config{}, capable(unit))
			text := longText(t, 300)
			k.open(note, "plaintext", text)
			version := 1
			for range 25 {
				version++
				first, last := randomStretch(r, text)
				added := randomText(r, r.IntN(12))
				l := lines{unit: unit}
				l.reset([]byte(text))
				at := l.cursor([]byte(text))
				where := encode(span{at.position(first), at.position(last)})
				text = text[:first] + added + text[last:]
				if r.IntN(10) == 0 {
					where, text = "", text+" The hydralic pump."
					added = text
				}
				k.change(note, version, where, added)
			}
			d := k.server.find(note)
			have := make(chan string)
			d.inbox.put(task{run: func() { have <- string(d.draft.Source()) }})
			if got := <-have; got != text {
				t.Fatalf("the server has\n%q\nwant\n%q", got, text)
			}
			k.published(note, version)
			k.notify("textDocument/didSave", naming(note))
			saved := k.published(note, version)
			k.open("file:///fresh.txt", "plaintext", text)
			fresh := k.published("file:///fresh.txt", 1)
			if encode(saved) != encode(fresh) {
				t.Errorf("after a save\n%v\nfresh\n%v", saved, fresh)
			}
		})
	}
}

func TestEditsOutOfRange(t *testing.T) {
	k := start(t, Config{}, "{}")
	k.open(note, "plaintext", "The ancher held.\n")
	k.published(note, 1)
	version := 1
	for _, where := range []string{
		between(-5, -5, 0, 0), between(9, 0, 99, 0), between(0, 3, 0, 0), between(1<<40, 1<<40, 1<<50, 0), between(0, 99, 1<<30, 1),
	} {
		version++
		k.change(note, version, where, " ")
		k.published(note, version)
	}
	k.logged("reaches out of the document")
	k.notify("textDocument/didChange", `{"textDocument":{"uri":"`+note+`","version":7},"contentChanges":[{"range":{"start":{"line":1e99}},"text":""}]}`)
	k.logged("open it again")
	k.change(note, 3, between(0, 0, 0, 0), "x")
	k.logged("version 3 after version 6")
	k.change("file:///closed.txt", 2, "", "x")
	k.logged("closed.txt is not open")
}

func TestDocumentTooLarge(t *testing.T) {
	k := start(t, Config{}, "{}")
	k.open(note, "plaintext", strings.Repeat("x", maxDocument+1))
	k.logged("nothing is marked in it")
	checkDiagnostics(t, k.published(note, 1))
	k.change(note, 2, between(0, 0, 0, 1), "y")
	checkDiagnostics(t, k.published(note, 2))
	k.change(note, 3, "", "The ancher held.")
	checkDiagnostics(t, k.published(note, 3), "0:4-0:10 nonword anchor")
	k.change(note, 4, between(0, 0, 0, 0), strings.Repeat("x", maxDocument))
	k.logged("nothing is marked in it")
	checkDiagnostics(t, k.published(note, 4))
}

func TestOpenedTwice(t *testing.T) {
	k := start(t, Config{}, "{}")
	k.open(note, "plaintext", "The ancher held.")
	k.published(note, 1)
	k.open(note, "plaintext", "The anchor held.")
	k.logged("for a second time")
	checkDiagnostics(t, k.published(note, 1))
	k.notify("textDocument/didClose", naming(note))
	k.notify("textDocument/didClose", naming(note))
	k.logged("is not open")
}

// TestPause: a document that takes long to judge is left alone until its writer
// pauses.
func TestPause(t *testing.T) {
	engine()
	synctest.Test(t, func(t *testing.T) {
		k := start(t, Config{}, "{}")
		k.open(note, "plaintext", "The ancher held.")
		k.published(note, 1)
		d := k.server.find(note)
		d.inbox.put(task{run: func() { d.took = time.Second }})
		for version := 2; version < 6; version++ {
			k.change(note, version, between(0, 0, 0, 0), "x")
			time.Sleep(longestPause / 2)
		}
		begun := time.Now()
		k.published(note, 5)
		if waited := time.Since(begun); waited != longestPause/2 {
			t.Errorf("waited %v", waited)
		}
		if early, ok := k.find(called("textDocument/publishDiagnostics")); ok {
			t.Errorf("judged while it was typed in: %s", early.Raw)
		}
		k.server.Close()
	})
}

func TestProgress(t *testing.T) {
	if testing.Short() {
		t.Skip("judges a long document")
	}
	k := start(t, Config{}, `{"window":{"workDoneProgress":true}}`)
	k.open(note, "plaintext", longText(t, 60_000))
	a := k.asked("window/workDoneProgress/create", "null")
	last := -1
	for kind := ""; kind != "end"; {
		var p progressParams
		read(t, k.await("progress", called("$/progress")).Params, &p)
		if !strings.Contains(string(a.Params), fmt.Sprintf("%q", p.Token)) {
			t.Errorf("token %s, made %s", p.Token, a.Params)
		}
		if kind = p.Value.Kind; (kind == "begin") != (last < 0) {
			t.Errorf("%s after %d %%", kind, last)
		}
		if p.Value.Percentage != nil {
			if *p.Value.Percentage < last {
				t.Errorf("%d %% after %d %%", *p.Value.Percentage, last)
			}
			last = *p.Value.Percentage
		}
	}
	k.published(note, 1)
}
