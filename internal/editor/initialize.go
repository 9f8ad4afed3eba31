package editor

import (
	"encoding/json"
	"slices"
)

type initializeParams struct {
	ProcessID             *int               `json:"processId"`
	RootURI               string             `json:"rootUri"`
	WorkspaceFolders      []workspaceFolder  `json:"workspaceFolders"`
	InitializationOptions json.RawMessage    `json:"initializationOptions"`
	Capabilities          clientCapabilities `json:"capabilities"`
}

// clientCapabilities are what a client says it can do, so far as it matters here.
type clientCapabilities struct {
	General struct {
		PositionEncodings []encoding `json:"positionEncodings"`
	} `json:"general"`
	Window struct {
		WorkDoneProgress bool `json:"workDoneProgress"`
	} `json:"window"`
	Workspace struct {
		Configuration bool `json:"configuration"`
		WorkspaceEdit struct {
			DocumentChanges bool `json:"documentChanges"`
		} `json:"workspaceEdit"`
		DidChangeConfiguration struct {
			DynamicRegistration bool `json:"dynamicRegistration"`
		} `json:"didChangeConfiguration"`
		DidChangeWatchedFiles struct {
			DynamicRegistration    bool `json:"dynamicRegistration"`
			RelativePatternSupport bool `json:"relativePatternSupport"`
		} `json:"didChangeWatchedFiles"`
		Diagnostics struct {
			RefreshSupport bool `json:"refreshSupport"`
		} `json:"diagnostics"`
	} `json:"workspace"`
	TextDocument struct {
		Diagnostic json.RawMessage `json:"diagnostic"` // if any, it pulls diagnostics
		CodeAction struct {
			DataSupport    bool `json:"dataSupport"`
			ResolveSupport struct {
				Properties []string `json:"properties"`
			} `json:"resolveSupport"`
		} `json:"codeAction"`
	} `json:"textDocument"`
}

func (c *clientCapabilities) pulls() bool {
	return len(c.TextDocument.Diagnostic) > 0 && string(c.TextDocument.Diagnostic) != "null"
}

// resolvesEdits says that the edit of a code action may be left out until it is asked
// for.
func (c *clientCapabilities) resolvesEdits() bool {
	a := c.TextDocument.CodeAction
	return a.DataSupport && slices.Contains(a.ResolveSupport.Properties, "edit")
}

type initializeResult struct {
	Capabilities serverCapabilities `json:"capabilities"`
	ServerInfo   serverInfo         `json:"serverInfo"`
}

type serverInfo struct {
	Name    string `json:"name"`
	Version string `json:"version,omitempty"`
}

type serverCapabilities struct {
	PositionEncoding       encoding            `json:"positionEncoding"`
	TextDocumentSync       syncOptions         `json:"textDocumentSync"`
	DiagnosticProvider     *diagnosticOptions  `json:"diagnosticProvider,omitempty"`
	CodeActionProvider     codeActionOptions   `json:"codeActionProvider"`
	ExecuteCommandProvider *commandOptions     `json:"executeCommandProvider,omitempty"`
	Workspace              workspaceCapability `json:"workspace"`
}

type syncOptions struct {
	OpenClose bool     `json:"openClose"`
	Change    int      `json:"change"` // 2: changes by range
	Save      struct{} `json:"save"`
}

type diagnosticOptions struct {
	Identifier            string `json:"identifier"`
	InterFileDependencies bool   `json:"interFileDependencies"`
	WorkspaceDiagnostics  bool   `json:"workspaceDiagnostics"`
}

type codeActionOptions struct {
	CodeActionKinds []string `json:"codeActionKinds"`
	ResolveProvider bool     `json:"resolveProvider"`
}

type commandOptions struct {
	Commands []string `json:"commands"`
}

type workspaceCapability struct {
	WorkspaceFolders struct {
		Supported           bool `json:"supported"`
		ChangeNotifications bool `json:"changeNotifications"`
	} `json:"workspaceFolders"`
}

// initialize takes notice of the client and tells it what it may ask for.
func (s *Server) initialize(c *call, params json.RawMessage) {
	var p initializeParams
	if f := decode(params, &p); f != nil {
		c.reply(nil, f)
		return
	}
	s.client = p.Capabilities
	s.unit = chooseEncoding(p.Capabilities.General.PositionEncodings)
	s.setFolders(p)
	s.defaults.set(p.InitializationOptions, s.reportSetting)
	if p.ProcessID != nil && s.config.Alive != nil {
		go s.watchParent(*p.ProcessID)
	}
	s.stage = initialized
	c.reply(initializeResult{s.capabilities(), serverInfo{"foulcase", s.config.Version}}, nil)
}

func (s *Server) capabilities() serverCapabilities {
	can := serverCapabilities{
		PositionEncoding:   s.unit,
		TextDocumentSync:   syncOptions{OpenClose: true, Change: 2},
		CodeActionProvider: codeActionOptions{[]string{quickFix, fixAll}, s.client.resolvesEdits()},
	}
	if s.client.pulls() {
		can.DiagnosticProvider = &diagnosticOptions{Identifier: source, WorkspaceDiagnostics: true}
	}
	if s.config.Settings != nil {
		can.ExecuteCommandProvider = &commandOptions{[]string{addWordCommand, letStandCommand}}
	}
	can.Workspace.WorkspaceFolders.Supported = true
	can.Workspace.WorkspaceFolders.ChangeNotifications = true
	return can
}

// setFolders notes where documents that are no files belong.
func (s *Server) setFolders(p initializeParams) {
	s.folders = p.WorkspaceFolders
	if len(s.folders) == 0 && p.RootURI != "" {
		s.folders = []workspaceFolder{{URI: p.RootURI}}
	}
}
