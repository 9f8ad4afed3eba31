package editor

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
)

const (
	report1    = "The ancher let go. Another ancher held. The hydralic pump failed.\n"
	resolving  = `{"workspace":{"workspaceEdit":{"documentChanges":true}},"textDocument":{"codeAction":{"dataSupport":true,"resolveSupport":{"properties":["edit"]}}}}`
	withEdits  = `{"workspace":{"workspaceEdit":{"documentChanges":true}}}`
	defectNote = "file:///papers/defects/report.txt"
)

// actions asks for the code actions at a place.
func (k *client) actions(uri, where, context string) []codeAction {
	k.t.Helper()
	a := k.request("textDocument/codeAction", fmt.Sprintf(`{"textDocument":{"uri":%q},"range":%s,"context":%s}`, uri, where, context))
	if a.Error != nil {
		k.t.Fatalf("code actions: %s", a.Raw)
	}
	var all []codeAction
	read(k.t, a.Result, &all)
	return all
}

func titles(all []codeAction) string {
	var list []string
	for _, a := range all {
		list = append(list, a.Title)
	}
	return strings.Join(list, "\n")
}

func titled(t *testing.T, all []codeAction, title string) codeAction {
	t.Helper()
	i := slices.IndexFunc(all, func(a codeAction) bool { return strings.HasPrefix(a.Title, title) })
	if i < 0 {
		t.Fatalf("no action %q among\n%s", title, titles(all))
	}
	return all[i]
}

// apply makes the edits of a code action in a text of ASCII, from the last to the
// first.
func apply(t *testing.T, text string, a codeAction, version int) string {
	t.Helper()
	if a.Edit == nil || len(a.Edit.DocumentChanges) != 1 || a.Edit.DocumentChanges[0].TextDocument.Version != version {
		t.Fatalf("action %+v wants one edit of version %d", a, version)
	}
	l := lines{unit: utf16Units}
	l.reset([]byte(text))
	for _, e := range slices.Backward(a.Edit.DocumentChanges[0].Edits) {
		start, _ := l.offset([]byte(text), e.Range.Start)
		end, _ := l.offset([]byte(text), e.Range.End)
		text = text[:start] + e.NewText + text[end:]
	}
	return text
}

func TestCodeActions(t *testing.T) {
	k := start(t, Config{}, withEdits)
	k.open(defectNote, "plaintext", report1)
	marksCorrected := report1
	for _, d := range slices.Backward(k.published(defectNote, 1)) {
		if d.Severity == 2 { // a query is left alone
			s, e := d.Range.Start.Character, d.Range.End.Character
			marksCorrected = marksCorrected[:s] + d.Data.Corrections[0] + marksCorrected[e:]
		}
	}
	all := k.actions(defectNote, between(0, 6, 0, 6), `{"diagnostics":[]}`)
	first := titled(t, all, `Correct to "anchor"`)
	if !first.IsPreferred || first.Kind != "quickfix" || all[0].Title != first.Title {
		t.Errorf("the first action is %+v", all[0])
	}
	for _, a := range all[1:] {
		if a.IsPreferred {
			t.Errorf("%q is preferred too", a.Title)
		}
	}
	for title, want := range map[string]string{
		`Correct to "anchor"`:                         "The anchor let go. Another ancher held. The hydralic pump failed.\n",
		`Correct every "ancher" here to "anchor" (2)`: "The anchor let go. Another anchor held. The hydralic pump failed.\n",
		`Correct every mark in this document`:         marksCorrected,
	} {
		if got := apply(t, report1, titled(t, all, title), 1); got != want {
			t.Errorf("%s: %q, want %q", title, got, want)
		}
	}
	if strings.Contains(titles(all), "house words") {
		t.Errorf("without settings there is no house:\n%s", titles(all))
	}
}

func TestCodeActionsAreFiltered(t *testing.T) {
	k := start(t, Config{}, withEdits)
	k.open(defectNote, "plaintext", report1)
	ancher := between(0, 4, 0, 10)
	diagnostic := `{"range":` + ancher + `,"source":"foulcase","message":"as the client has it"}`
	other := `{"range":` + ancher + `,"source":"another","message":"not ours"}`
	for _, tt := range []struct{ where, context, want string }{
		{between(0, 0, 0, 2), `{"diagnostics":[],"triggerKind":2}`, ""},
		{between(0, 0, 0, 2), `{"diagnostics":[]}`, "Correct every mark"},
		{ancher, `{"diagnostics":[],"only":["source.fixAll"]}`, "Correct every mark"},
		{ancher, `{"diagnostics":[],"only":["source"]}`, "Correct every mark"},
		{ancher, `{"diagnostics":[],"only":["refactor"]}`, ""},
		{ancher, `{"diagnostics":[],"only":["quick"]}`, ""},
		{between(0, 44, 0, 44), `{"diagnostics":[],"only":["quickfix"]}`, `Correct to "hydraulic"`},
		{between(7, 7, 7, 7), `{"diagnostics":[],"only":["quickfix"]}`, ""},
	} {
		all := k.actions(defectNote, tt.where, tt.context)
		if got := titles(all); !strings.HasPrefix(got, tt.want) || tt.want == "" && got != "" {
			t.Errorf("%s %s: %q, want %q", tt.where, tt.context, got, tt.want)
		}
	}
	all := k.actions(defectNote, ancher, `{"diagnostics":[`+other+`,`+diagnostic+`]}`)
	if d := all[0].Diagnostics; len(d) != 1 || string(d[0]) != diagnostic {
		t.Errorf("diagnostics %s, want %s", d, diagnostic)
	}
}

func TestResolve(t *testing.T) {
	k := start(t, Config{}, resolving)
	k.open(defectNote, "plaintext", report1)
	all := k.actions(defectNote, between(0, 6, 0, 6), `{"diagnostics":[]}`)
	every := titled(t, all, `Correct every "ancher"`)
	if every.Edit != nil {
		t.Errorf("the edit is there before it is asked for: %+v", every)
	}
	var whole codeAction
	read(t, k.request("codeAction/resolve", encode(every)).Result, &whole)
	if got, want := apply(t, report1, whole, 1), "The anchor let go. Another anchor held. The hydralic pump failed.\n"; got != want {
		t.Errorf("%q, want %q", got, want)
	}
	k.change(defectNote, 2, between(0, 0, 0, 0), "So. ")
	if a := k.request("codeAction/resolve", encode(every)); a.Error == nil || a.Error.Code != contentModified {
		t.Errorf("after a change: %s", a.Raw)
	}
}

// memory is settings that are kept nowhere.
type memory struct {
	words  []string
	stands []house.Decision
	format string
	files  []string
}

func (m *memory) Options(string) foulcase.Options {
	h, err := foulcase.ReadHouse("house", strings.NewReader(strings.Join(m.words, "\n")))
	if err != nil { // no words by which to judge
		h = nil
	}
	return foulcase.Options{House: h, Format: m.format}
}

func (m *memory) Stands(path string, mark foulcase.Mark) bool {
	return slices.ContainsFunc(m.stands, func(d house.Decision) bool {
		return d.Scope == house.Everywhere && d.Observed == mark.Observed ||
			d.Scope == house.Here && d.Fingerprint == house.Fingerprint(path, mark)
	})
}

func (m *memory) AddWord(word string) (string, error) {
	if strings.Contains(word, " ") {
		return "", fmt.Errorf("house words have no spaces")
	}
	m.words = append(m.words, word)
	return "house.txt", nil
}

func (m *memory) Record(d house.Decision) error { m.stands = append(m.stands, d); return nil }
func (m *memory) Files() []string               { return m.files }

func (m *memory) load(string) (Settings, error) { return m, nil }

// execute sends the command of a code action.
func (k *client) execute(a codeAction) arrival {
	k.t.Helper()
	if a.Command == nil {
		k.t.Fatalf("%q has no command", a.Title)
	}
	return k.request("workspace/executeCommand", fmt.Sprintf(`{"command":%q,"arguments":%s}`, a.Command.Command, encode(a.Command.Arguments)))
}

func TestCommands(t *testing.T) {
	m := &memory{}
	k := start(t, Config{Settings: m.load}, withEdits)
	k.open(defectNote, "plaintext", report1)
	checkDiagnostics(t, k.published(defectNote, 1), "0:4-0:10 nonword anchor", "0:27-0:33 nonword anchor", "0:44-0:52 nonword hydraulic")

	here := titled(t, k.actions(defectNote, between(0, 6, 0, 6), `{"diagnostics":[]}`), `Let "ancher" stand here`)
	if a := k.execute(here); a.Error != nil {
		t.Fatal(a.Raw)
	}
	checkDiagnostics(t, k.published(defectNote, 1), "0:27-0:33 nonword anchor", "0:44-0:52 nonword hydraulic")

	all := k.actions(defectNote, between(0, 46, 0, 46), `{"diagnostics":[]}`)
	k.execute(titled(t, all, `Add "hydralic" to house words`))
	checkDiagnostics(t, k.published(defectNote, 1), "0:27-0:33 nonword anchor")

	all = k.actions(defectNote, between(0, 30, 0, 30), `{"diagnostics":[]}`)
	k.execute(titled(t, all, `Let "ancher" stand everywhere`))
	checkDiagnostics(t, k.published(defectNote, 1))

	if d := m.stands[0]; d.Decision != house.Stet || d.Kind != "nonword" || !strings.Contains(d.Context, "ancher") {
		t.Errorf("recorded %+v", d)
	}
}

func TestCommandsThatFail(t *testing.T) {
	m := &memory{}
	k := start(t, Config{Settings: m.load}, withEdits)
	k.open(defectNote, "plaintext", report1)
	for _, tt := range []struct {
		params string
		want   code
	}{
		{`{"command":"foulcase.addWord","arguments":[{"uri":"` + defectNote + `","word":"two words"}]}`, requestFailed},
		{`{"command":"foulcase.addWord","arguments":[]}`, invalidParams},
		{`{"command":"foulcase.addWord","arguments":[7]}`, invalidParams},
		{`{"command":"foulcase.letStand","arguments":[{"uri":"file:///closed.txt"}]}`, invalidParams},
		{`{"command":"rm","arguments":[{}]}`, invalidParams},
		{`[]`, invalidParams},
	} {
		if a := k.request("workspace/executeCommand", tt.params); a.Error == nil || a.Error.Code != tt.want {
			t.Errorf("%s: %s, want error %d", tt.params, a.Raw, tt.want)
		}
	}
}
