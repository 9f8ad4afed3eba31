package editor

import "encoding/json"

// The structures of the Language Server Protocol 3.17 in use, with the members that
// are read or written here.

type textDocumentItem struct {
	URI        string `json:"uri"`
	LanguageID string `json:"languageId"`
	Version    int    `json:"version"`
	Text       string `json:"text"`
}

type textDocument struct {
	URI     string `json:"uri"`
	Version *int   `json:"version"` // null where the client does not say
}

type didOpenParams struct {
	TextDocument textDocumentItem `json:"textDocument"`
}

type didChangeParams struct {
	TextDocument   textDocument    `json:"textDocument"`
	ContentChanges []contentChange `json:"contentChanges"`
}

// contentChange replaces a range, or the whole text when there is none.
type contentChange struct {
	Range *span  `json:"range"`
	Text  string `json:"text"`
}

// documentParams are those of every notification and request that names a document
// and nothing else that matters here.
type documentParams struct {
	TextDocument textDocument `json:"textDocument"`
}

// didChangeConfigurationParams has any JSON for settings, by the names of servers.
type didChangeConfigurationParams struct {
	Settings json.RawMessage `json:"settings"`
}

type didChangeWorkspaceFoldersParams struct {
	Event struct {
		Added   []workspaceFolder `json:"added"`
		Removed []workspaceFolder `json:"removed"`
	} `json:"event"`
}

type workspaceFolder struct {
	URI  string `json:"uri"`
	Name string `json:"name"`
}

type cancelParams struct {
	ID json.RawMessage `json:"id"`
}

type configurationParams struct {
	Items []configurationItem `json:"items"`
}

type configurationItem struct {
	ScopeURI string `json:"scopeUri,omitempty"`
	Section  string `json:"section"`
}

type registrationParams struct {
	Registrations []registration `json:"registrations"`
}

type registration struct {
	ID              string `json:"id"`
	Method          string `json:"method"`
	RegisterOptions any    `json:"registerOptions,omitempty"`
}

type watchOptions struct {
	Watchers []watcher `json:"watchers"`
}

// watcher has a glob pattern: a string, or a relativePattern.
type watcher struct {
	GlobPattern any `json:"globPattern"`
}

type relativePattern struct {
	BaseURI string `json:"baseUri"`
	Pattern string `json:"pattern"`
}

type codeActionParams struct {
	TextDocument textDocument `json:"textDocument"`
	Range        span         `json:"range"`
	Context      struct {
		Diagnostics []json.RawMessage `json:"diagnostics"`
		Only        []string          `json:"only"`
		TriggerKind int               `json:"triggerKind"`
	} `json:"context"`
}

type codeAction struct {
	Title       string            `json:"title"`
	Kind        string            `json:"kind,omitempty"`
	Diagnostics []json.RawMessage `json:"diagnostics,omitempty"`
	IsPreferred bool              `json:"isPreferred,omitempty"`
	Edit        *workspaceEdit    `json:"edit,omitempty"`
	Command     *command          `json:"command,omitempty"`
	Data        *fix              `json:"data,omitempty"`
}

type command struct {
	Title     string `json:"title"`
	Command   string `json:"command"`
	Arguments []any  `json:"arguments,omitempty"`
}

type executeCommandParams struct {
	Command   string            `json:"command"`
	Arguments []json.RawMessage `json:"arguments"`
}

// workspaceEdit has its edits in the one form or the other, as the client knows it.
type workspaceEdit struct {
	Changes         map[string][]textEdit `json:"changes,omitempty"`
	DocumentChanges []documentEdit        `json:"documentChanges,omitempty"`
}

type documentEdit struct {
	TextDocument struct {
		URI     string `json:"uri"`
		Version int    `json:"version"`
	} `json:"textDocument"`
	Edits []textEdit `json:"edits"`
}

type textEdit struct {
	Range   span   `json:"range"`
	NewText string `json:"newText"`
}

type diagnosticParams struct {
	TextDocument     textDocument `json:"textDocument"`
	PreviousResultID string       `json:"previousResultId"`
}

type workspaceDiagnosticParams struct {
	PreviousResultIDs []struct {
		URI   string `json:"uri"`
		Value string `json:"value"`
	} `json:"previousResultIds"`
}

type progressParams struct {
	Token string        `json:"token"`
	Value progressValue `json:"value"`
}

type progressValue struct {
	Kind       string `json:"kind"` // begin, report or end
	Title      string `json:"title,omitempty"`
	Message    string `json:"message,omitempty"`
	Percentage *int   `json:"percentage,omitempty"`
}
