package editor

import (
	"errors"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

func TestSettingsOfTheClient(t *testing.T) {
	k := newClient(t, Config{})
	k.request("initialize", `{"processId":null,"capabilities":{"workspace":{"configuration":true,"didChangeConfiguration":{"dynamicRegistration":true}}},
		"initializationOptions":{"house":["Ancher"],"colour":"red","severity":{"mark":"error","query":"error"}}}`)
	k.logged("foulcase.colour")
	k.notify("initialized", "{}")
	if a := k.asked("client/registerCapability", "null"); !strings.Contains(string(a.Params), "workspace/didChangeConfiguration") {
		t.Errorf("registered %s", a.Params)
	}
	k.open(note, "plaintext", "The ancher and the hydralic pump; the harbour colour.")
	got := k.published(note, 1)
	checkDiagnostics(t, got, "0:19-0:27 nonword hydraulic")
	if got[0].Severity != 1 {
		t.Errorf("severity %d, want that of an error", got[0].Severity)
	}
	a := k.asked("workspace/configuration", `[{"house":["hydralic"],"colour":"red"}]`)
	if !strings.Contains(string(a.Params), `"scopeUri":"`+note+`"`) {
		t.Errorf("asked for %s", a.Params)
	}
	checkDiagnostics(t, k.published(note, 1), "0:4-0:10 nonword anchor")
	k.notify("workspace/didChangeConfiguration", `{"settings":null}`)
	k.asked("workspace/configuration", `[{"house":["ancher","hydralic"]}]`)
	checkDiagnostics(t, k.published(note, 1))
	if _, again := k.find(func(a arrival) bool { return strings.Contains(a.Raw, "foulcase.colour") }); again {
		t.Error("an unknown setting was reported twice")
	}
}

// TestSettingsPushed: a client that cannot be asked sends them.
func TestSettingsPushed(t *testing.T) {
	k := start(t, Config{}, "{}")
	k.open(note, "plaintext", "The ancher held.")
	checkDiagnostics(t, k.published(note, 1), "0:4-0:10 nonword anchor")
	k.notify("workspace/didChangeConfiguration", `{"settings":{"foulcase":{"house":["ancher"],"budget":1,"variety":"en-GB"}}}`)
	checkDiagnostics(t, k.published(note, 1))
}

func TestPreferences(t *testing.T) {
	for _, tt := range []struct{ settings, want string }{
		{`{"variety":"en-GB","budget":2,"house":["x"],"severity":{"query":"hint"}}`, ""},
		{`null`, ""},
		{``, ""},
		{`[]`, ""},
		{`[1]`, "not an object"},
		{`{"variety":"fr"}`, "foulcase.variety: "},
		{`{"variety":1}`, "foulcase.variety: "},
		{`{"budget":0}`, "foulcase.budget: "},
		{`{"budget":"many"}`, "foulcase.budget: "},
		{`{"house":"x"}`, "foulcase.house: "},
		{`{"severity":"error"}`, "foulcase.severity: "},
		{`{"severity":{"mark":"loud"}}`, "foulcase.severity: "},
		{`{"level":9}`, "foulcase.level is not known"},
	} {
		var complaints []string
		p := newPreferences()
		p.set([]byte(tt.settings), func(what string) { complaints = append(complaints, what) })
		if got := strings.Join(complaints, "; "); !strings.Contains(got, tt.want) || (tt.want == "") != (got == "") {
			t.Errorf("%s: %q, want %q", tt.settings, got, tt.want)
		}
	}
}

func TestWatchedFiles(t *testing.T) {
	name, _ := pathOf("file:///papers/house.txt")
	m := &memory{files: []string{name}}
	k := start(t, Config{Settings: m.load}, `{"workspace":{"didChangeWatchedFiles":{"dynamicRegistration":true,"relativePatternSupport":true}}}`)
	if a := k.asked("client/registerCapability", "null"); !strings.Contains(string(a.Params), "**/foulcase.toml") {
		t.Errorf("registered %s", a.Params)
	}
	k.open(note, "plaintext", "The ancher held.")
	checkDiagnostics(t, k.published(note, 1), "0:4-0:10 nonword anchor")
	if a := k.asked("client/registerCapability", "null"); !strings.Contains(string(a.Params), `"baseUri":"file:///papers","pattern":"house.txt"`) {
		t.Errorf("registered %s", a.Params)
	}
	// The document's goroutine is idle: its diagnostics are out.
	m.words = append(m.words, "ancher")
	k.notify("workspace/didChangeWatchedFiles", `{"changes":[{"uri":"file:///papers/house.txt","type":2}]}`)
	checkDiagnostics(t, k.published(note, 1))
	m.words = nil
	k.notify("textDocument/didOpen", `{"textDocument":{"uri":"file:///papers/house.txt","languageId":"plaintext","version":1,"text":""}}`)
	k.notify("textDocument/didSave", naming("file:///papers/house.txt"))
	checkDiagnostics(t, k.published(note, 1)) // only where there are marks, at first
	checkDiagnostics(t, k.published(note, 1), "0:4-0:10 nonword anchor")
}

// remembering reads settings once and then has what it read, until it forgets.
type remembering struct {
	lockedMemory
	read  Settings
	times int
}

func (r *remembering) load(string) (Settings, error) {
	r.mu.Lock()
	defer r.mu.Unlock()
	if r.read == nil {
		r.read = &sharedMemory{memory{words: slices.Clone(r.words)}, &r.lockedMemory}
		r.times++
	}
	return r.read, nil
}

func (r *remembering) forget() {
	r.mu.Lock()
	defer r.mu.Unlock()
	r.read = nil
}

// TestForget: settings that are remembered are read anew when they change, not for each
// document, and no document is left behind.
func TestForget(t *testing.T) {
	for _, tt := range []struct {
		capabilities string
		times        int
	}{
		{`{"workspace":{"didChangeWatchedFiles":{"dynamicRegistration":true}}}`, 1},
		{"{}", 3}, // nobody tells of changes
	} {
		r := &remembering{}
		k := start(t, Config{Settings: r.load, Forget: r.forget}, tt.capabilities)
		papers := []string{"file:///papers/a.txt", "file:///papers/b.txt", "file:///papers/c.txt"}
		for _, uri := range papers {
			k.open(uri, "plaintext", "The ancher held.")
			k.published(uri, 1)
		}
		check := func(what string, times int) {
			t.Helper()
			if r.times != times {
				t.Errorf("%s: read %d times, want %d", what, r.times, times)
			}
		}
		check("opened", tt.times)
		k.request("workspace/executeCommand", `{"command":"foulcase.addWord","arguments":[{"uri":"file:///papers/a.txt","word":"ancher"}]}`)
		for _, uri := range papers {
			checkDiagnostics(t, k.published(uri, 1))
		}
		check("a word was added", tt.times+1)
		r.words = nil
		k.notify("workspace/didChangeWatchedFiles", `{"changes":[]}`)
		k.published(papers[0], 1) // only where there are marks, at first
		checkDiagnostics(t, k.published(papers[0], 1), "0:4-0:10 nonword anchor")
		k.open("file:///papers/foulcase.toml", "toml", "") // which nobody has read yet
		k.published("file:///papers/foulcase.toml", 1)
		before := r.times
		k.notify("textDocument/didSave", naming("file:///papers/foulcase.toml"))
		k.published(papers[0], 1)
		check("a file of settings was saved", before+1)
	}
}

func TestSettingsThatCannotBeRead(t *testing.T) {
	k := start(t, Config{Settings: func(string) (Settings, error) { return nil, errors.New("foulcase.toml:3:1: no key") }}, "{}")
	k.open(note, "plaintext", "The ancher held.")
	k.logged("foulcase.toml:3:1")
	checkDiagnostics(t, k.published(note, 1), "0:4-0:10 nonword anchor")
}

func TestFormat(t *testing.T) {
	for _, tt := range []struct{ uri, language, settings, want string }{
		{"file:///a.txt", "plaintext", "", "plain"},
		{"file:///a.md", "plaintext", "", "markdown"},
		{"file:///a.txt", "markdown", "", "markdown"},
		{"file:///a.md", "no-such", "", "markdown"},
		{"untitled:Untitled-1", "markdown", "", "markdown"},
		{"untitled:Untitled-1", "no-such", "", "plain"},
		{"file:///a.txt", "plaintext", "markdown", "markdown"},
		{"file:///a.md", "markdown", "plain", "plain"},
	} {
		s := &Server{folders: []workspaceFolder{{URI: "file:///papers"}}}
		d := &document{s: s, uri: tt.uri, path: s.pathFor(tt.uri), language: tt.language}
		if tt.settings != "" {
			d.settings = &memory{format: tt.settings}
		}
		if got := d.options().Format; got != tt.want {
			t.Errorf("%+v: %s", tt, got)
		}
	}
}

func TestURI(t *testing.T) {
	for uri, want := range map[string]string{
		"file:///papers/log%20book.txt":   "/papers/log book.txt",
		"FILE:///papers/%c3%A9bb.txt#L3":  "/papers/\u00e9bb.txt",
		"file://localhost/a?b":            "/a",
		"file:///c%3A/papers/log.txt":     "C:/papers/log.txt",
		"file:///d:/log.txt":              "D:/log.txt",
		"file://server/share/a.txt":       "",
		"file:///a%zz":                    "",
		"file:///a%00b":                   "",
		"file:///a%2":                     "",
		"untitled:Untitled-1":             "",
		"vscode-notebook-cell:/a.ipynb#c": "",
		"":                                "",
		"file:":                           "",
		"file://":                         "/",
	} {
		got, ok := pathOf(uri)
		if filepath.ToSlash(got) != want || ok != (want != "") {
			t.Errorf("%s: %q (%v), want %q", uri, got, ok, want)
		}
	}
	for _, name := range []string{"/papers/log book 100%.txt", "/\u00e9bb/\U0001F6A2", "C:/papers/a.txt"} {
		if got, ok := pathOf(uriOf(name)); !ok || filepath.ToSlash(got) != name {
			t.Errorf("%s: %q by %s", name, got, uriOf(name))
		}
	}
}

// TestFolders: a document that is no file has the settings of the workspace.
func TestFolders(t *testing.T) {
	asked := make(chan string, 1)
	k := newClient(t, Config{Settings: func(path string) (Settings, error) {
		asked <- filepath.ToSlash(path)
		return &memory{}, nil
	}})
	check := func(uri, want string) {
		t.Helper()
		k.open(uri, "plaintext", "All is well.")
		if got := <-asked; got != want {
			t.Errorf("%s: settings of %q, want %q", uri, got, want)
		}
	}
	k.request("initialize", `{"processId":null,"rootUri":"file:///root","capabilities":{},"workspaceFolders":[{"uri":"file:///papers","name":"papers"}]}`)
	check("untitled:Untitled-1", "/papers/Untitled-1")
	check("file:///elsewhere/a.txt", "/elsewhere/a.txt")
	k.notify("workspace/didChangeWorkspaceFolders", `{"event":{"added":[{"uri":"file:///logs","name":"logs"}],"removed":[{"uri":"file:///papers","name":"papers"}]}}`)
	check("untitled:Untitled-2", "/logs/Untitled-2")
	check("untitled:%2E%2E%2Fabove", "/logs/above")
	k.notify("workspace/didChangeWorkspaceFolders", `{"event":{"added":[],"removed":[{"uri":"file:///logs","name":"logs"}]}}`)
	check("untitled:b%20c", "b c")
}

// TestRefresh: a client that pulls is told when settings change what it would get.
func TestRefresh(t *testing.T) {
	m := &memory{}
	k := start(t, Config{Settings: m.load}, pulling)
	k.open("untitled:note", "plaintext", "A ``reef'' and the *ancher*.")
	first := k.pull("untitled:note", "")
	checkDiagnostics(t, first.Items, "0:20-0:26 nonword anchor")
	m.words, m.format = []string{"ancher"}, "markdown"
	k.notify("workspace/didChangeWatchedFiles", `{"changes":[]}`)
	k.asked("workspace/diagnostic/refresh", "null")
	if second := k.pull("untitled:note", first.ResultID); second.Kind != "full" || len(second.Items) > 0 {
		t.Errorf("%+v", second)
	}
}
