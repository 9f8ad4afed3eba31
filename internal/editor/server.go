package editor

import (
	"context"
	"encoding/json"
	"errors"
	"strings"
	"sync"
	"sync/atomic"
	"time"

	"example.org/foulcase"
)

// Config is what a Server works with.
type Config struct {
	Engine *foulcase.Engine
	// Settings loads what holds for the document at path; nil when there are no files of
	// settings. It is called by several goroutines at once, and what it returns may be
	// that of other documents too.
	Settings func(path string) (Settings, error)
	// Forget has Settings read its files anew; nil when it does so at each call.
	Forget  func()
	Version string // of the program, for the client to show
	// Alive tells whether a process is alive; nil where nobody can know. A server whose
	// client has died ends.
	Alive func(pid int) bool
	// Pause is called between the sentences of a judgement, by the goroutine that judges;
	// nil where nothing need happen there. A program whose single thread also brings the
	// messages of the client lets them in.
	Pause func()
}

// ErrNoShutdown says that a session ended before the client asked for it by a
// request `shutdown`: the protocol wants exit code 1.
var ErrNoShutdown = errors.New("the client went away without a shutdown request")

// Server is one session with an editor.
type Server struct {
	config Config
	ctx    context.Context
	cancel context.CancelCauseFunc
	out    *outbox
	calls  calls
	work   sync.WaitGroup // the goroutines of documents

	stage   stage              // of the goroutine that calls Receive
	orderly atomic.Bool        // the client asked for shutdown
	client  clientCapabilities // constant after initialize, as is unit
	unit    encoding

	mu        sync.Mutex
	closed    bool
	documents map[string]*document // open, by URI
	folders   []workspaceFolder
	defaults  preferences     // the client's settings for documents it says nothing else of
	reported  map[string]bool // settings not understood, reported once
	watched   map[string]bool // files that the client watches for us
	faults    map[string]bool // of files of settings, shown since they were read anew

	counter atomic.Int64 // numbers states of diagnostics and tokens of progress
}

type stage int

const (
	fresh stage = iota
	initialized
	shutDown
)

// New begins a session. The server calls send, from one goroutine, with each message
// for the client; an error of it ends the session. Close must be called.
func New(c Config, send func(json.RawMessage) error) *Server {
	s := &Server{
		config:    c,
		documents: map[string]*document{},
		reported:  map[string]bool{},
		watched:   map[string]bool{},
		faults:    map[string]bool{},
		defaults:  newPreferences(),
		calls:     calls{from: map[string]*call{}, to: map[int]func(json.RawMessage, error){}},
	}
	s.ctx, s.cancel = context.WithCancelCause(context.Background())
	s.out = newOutbox(send, s.stop)
	return s
}

// errExit is the cause of a session's end that is as it should be.
var errExit = errors.New("exit")

func (s *Server) stop(cause error) { s.cancel(cause) }

// end stops the session at the client's wish, or because there is no client.
func (s *Server) end() {
	if s.orderly.Load() {
		s.stop(errExit)
	}
	s.stop(ErrNoShutdown)
}

// Done is closed when the session is over: the client said so, or nothing can be
// sent any more.
func (s *Server) Done() <-chan struct{} { return s.ctx.Done() }

// lastWords is how long Close waits for a client to read what is on its way.
const lastWords = time.Second

// Close ends the session, unless it is over, and waits for its goroutines. The error
// is nil after a shutdown in order, ErrNoShutdown or what else went wrong. A call of
// send that never returns is given up.
func (s *Server) Close() error {
	s.end()
	s.mu.Lock()
	s.closed = true
	s.mu.Unlock()
	s.work.Wait()
	s.abandonCalls()
	s.out.close()
	select {
	case <-s.out.closed:
	case <-time.After(lastWords):
	}
	if err := context.Cause(s.ctx); !errors.Is(err, errExit) {
		return err
	}
	return nil
}

// Receive takes a message of the client; the bytes are not kept. One goroutine calls
// it, in the order of the messages, and Close after the last.
func (s *Server) Receive(raw []byte) {
	m, f := parseMessage(raw)
	switch {
	case f != nil && m.Method != nil && m.ID == nil: // nobody waits for an answer
		s.log(loudWarning, "%s", f.Message)
	case f != nil:
		s.answer(m.ID, nil, f)
	case m.Method == nil:
		s.answered(m)
	case m.ID == nil:
		s.notified(*m.Method, m.Params)
	default:
		s.asked(m.ID, *m.Method, m.Params)
	}
}

// asked starts on a request. Whoever takes it must reply.
func (s *Server) asked(id json.RawMessage, method string, params json.RawMessage) {
	c, f := s.begin(id)
	if f != nil {
		s.answer(id, nil, f)
		return
	}
	handle, known := map[string]func(*call, json.RawMessage){
		"initialize":               s.initialize,
		"shutdown":                 s.shutdown,
		"textDocument/codeAction":  s.codeAction,
		"codeAction/resolve":       s.resolve,
		"textDocument/diagnostic":  s.diagnostic,
		"workspace/diagnostic":     s.workspaceDiagnostic,
		"workspace/executeCommand": s.executeCommand,
	}[method]
	switch {
	case s.stage == shutDown:
		c.reply(nil, failf(invalidRequest, "%s after shutdown", method))
	case s.stage == fresh && method != "initialize":
		c.reply(nil, failf(serverNotInitialized, "%s before initialize", method))
	case s.stage == initialized && method == "initialize":
		c.reply(nil, failf(invalidRequest, "initialize for a second time"))
	case !known:
		c.reply(nil, failf(methodNotFound, "no method %.100q", method))
	default:
		handle(c, params)
	}
}

func (s *Server) shutdown(c *call, _ json.RawMessage) {
	s.stage = shutDown
	s.orderly.Store(true)
	c.reply(nil, nil)
}

// notified acts on a notification. Outside of a session all but `exit` are dropped,
// and within those that nobody knows.
func (s *Server) notified(method string, params json.RawMessage) {
	if method == "exit" {
		s.end()
		return
	}
	if s.stage != initialized {
		return
	}
	handle, known := map[string]func(json.RawMessage) *failure{
		"initialized":                         s.begun,
		"$/cancelRequest":                     s.cancelled,
		"textDocument/didOpen":                s.didOpen,
		"textDocument/didChange":              s.didChange,
		"textDocument/didSave":                s.didSave,
		"textDocument/didClose":               s.didClose,
		"workspace/didChangeConfiguration":    s.didChangeConfiguration,
		"workspace/didChangeWatchedFiles":     s.didChangeWatchedFiles,
		"workspace/didChangeWorkspaceFolders": s.didChangeWorkspaceFolders,
	}[method]
	if !known {
		if !strings.HasPrefix(method, "$/") {
			s.log(loudInfo, "no notification %.100q is known here", method)
		}
		return
	}
	if f := handle(params); f != nil {
		s.log(loudError, "%s: %s", method, f.Message)
	}
}

func (s *Server) cancelled(params json.RawMessage) *failure {
	var p cancelParams
	if f := decode(params, &p); f != nil {
		return f
	}
	s.cancelCall(p.ID)
	return nil
}

// decode reads the parameters of a message.
func decode(params json.RawMessage, into any) *failure {
	if len(params) == 0 {
		return failf(invalidParams, "there are no parameters")
	}
	if err := json.Unmarshal(params, into); err != nil {
		return failf(invalidParams, "the parameters are not as the protocol has them: %v", err)
	}
	return nil
}

// parentPeriod is how often it is looked whether the client lives.
const parentPeriod = 2 * time.Second

// watchParent ends the session when the client's process is no more.
func (s *Server) watchParent(pid int) {
	tick := time.NewTicker(parentPeriod)
	defer tick.Stop()
	for s.config.Alive(pid) {
		select {
		case <-tick.C:
		case <-s.ctx.Done():
			return
		}
	}
	s.stop(ErrNoShutdown)
}
