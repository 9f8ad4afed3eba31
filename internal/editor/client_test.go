package editor

import (
	"bytes"
	"encoding/json"
	"fmt"
	"strings"
	"sync"
	"testing"
	"time"

	"example.org/foulcase"
	"example.org/foulcase/lm/english"
)

// engine is the English model, opened once.
var engine = sync.OnceValue(func() *foulcase.Engine {
	e, err := foulcase.Open(english.Model())
	if err != nil {
		panic(err)
	}
	return e
})

// client is an editor as a server sees it.
type client struct {
	t      *testing.T
	server *Server
	id     int

	mu      sync.Mutex
	arrived []arrival // not read by the test
	news    chan struct{}
}

// arrival is a message of the server.
type arrival struct {
	Raw    string
	ID     json.RawMessage
	Method string
	Params json.RawMessage
	Result json.RawMessage
	Error  *failure
}

func (a *arrival) UnmarshalJSON(raw []byte) error {
	type plain arrival
	a.Raw = string(raw)
	return json.Unmarshal(raw, (*plain)(a))
}

// newClient starts a session, which the test's end closes.
func newClient(t *testing.T, c Config) *client {
	t.Helper()
	if c.Engine == nil {
		c.Engine = engine()
	}
	k := &client{t: t, news: make(chan struct{}, 1)}
	k.server = New(c, k.take)
	t.Cleanup(func() { k.server.Close() })
	return k
}

// start is newClient and the handshake. Capabilities are a JSON object.
func start(t *testing.T, c Config, capabilities string) *client {
	t.Helper()
	k := newClient(t, c)
	k.request("initialize", `{"processId":null,"rootUri":null,"capabilities":`+capabilities+`}`)
	k.notify("initialized", "{}")
	return k
}

func (k *client) take(raw json.RawMessage) error {
	var a arrival
	if err := json.Unmarshal(bytes.Clone(raw), &a); err != nil {
		k.t.Errorf("the server sent %q: %v", raw, err)
		return nil
	}
	k.mu.Lock()
	k.arrived = append(k.arrived, a)
	k.mu.Unlock()
	select {
	case k.news <- struct{}{}:
	default:
	}
	return nil
}

// send passes a message of the client on.
func (k *client) send(format string, args ...any) {
	k.server.Receive(fmt.Appendf(nil, format, args...))
}

func (k *client) notify(method, params string) {
	k.send(`{"jsonrpc":"2.0","method":%q,"params":%s}`, method, params)
}

// request asks and waits for the answer.
func (k *client) request(method, params string) arrival {
	k.t.Helper()
	return k.answer(k.ask(method, params))
}

// ask asks and does not wait.
func (k *client) ask(method, params string) (id string) {
	k.id++
	id = fmt.Sprint(k.id)
	k.send(`{"jsonrpc":"2.0","id":%s,"method":%q,"params":%s}`, id, method, params)
	return id
}

func (k *client) answer(id string) arrival {
	k.t.Helper()
	return k.await("the answer to request "+id, func(a arrival) bool { return a.Method == "" && string(a.ID) == id })
}

// await waits for a message and removes it from those that wait.
func (k *client) await(what string, is func(arrival) bool) arrival {
	k.t.Helper()
	deadline := time.After(time.Minute)
	for {
		if a, ok := k.find(is); ok {
			return a
		}
		select {
		case <-k.news:
		case <-deadline:
			k.t.Fatalf("%s did not come; what came: %s", what, k.rest())
		}
	}
}

// find removes the first message that is so.
func (k *client) find(is func(arrival) bool) (arrival, bool) {
	k.mu.Lock()
	defer k.mu.Unlock()
	for i, a := range k.arrived {
		if is(a) {
			k.arrived = append(k.arrived[:i], k.arrived[i+1:]...)
			return a, true
		}
	}
	return arrival{}, false
}

func (k *client) rest() string {
	k.mu.Lock()
	defer k.mu.Unlock()
	var all []string
	for _, a := range k.arrived {
		all = append(all, a.Raw)
	}
	return strings.Join(all, "\n")
}

func called(method string) func(arrival) bool {
	return func(a arrival) bool { return a.Method == method }
}

// asked answers a request of the server and returns it.
func (k *client) asked(method, result string) arrival {
	k.t.Helper()
	a := k.await("request "+method, called(method))
	k.send(`{"jsonrpc":"2.0","id":%s,"result":%s}`, a.ID, result)
	return a
}

// logged waits for a message to the log or to the user that has some words.
func (k *client) logged(words string) {
	k.t.Helper()
	k.await("a message with "+words, func(a arrival) bool {
		return (a.Method == "window/logMessage" || a.Method == "window/showMessage") && strings.Contains(string(a.Params), words)
	})
}

// open opens a document, version 1.
func (k *client) open(uri, language, text string) {
	k.notify("textDocument/didOpen", fmt.Sprintf(`{"textDocument":{"uri":%q,"languageId":%q,"version":1,"text":%s}}`, uri, language, encode(text)))
}

// change replaces a range, or everything when it is "".
func (k *client) change(uri string, version int, where, text string) {
	if where != "" {
		where = `"range":` + where + `,`
	}
	k.notify("textDocument/didChange", fmt.Sprintf(`{"textDocument":{"uri":%q,"version":%d},"contentChanges":[{%s"text":%s}]}`, uri, version, where, encode(text)))
}

func naming(uri string) string { return fmt.Sprintf(`{"textDocument":{"uri":%q}}`, uri) }

func between(startLine, startColumn, endLine, endColumn int) string {
	return encode(span{position{startLine, startColumn}, position{endLine, endColumn}})
}

func encode(v any) string {
	raw, err := json.Marshal(v)
	if err != nil {
		panic(err)
	}
	return string(raw)
}

// diagnostic is one as the client reads it.
type diagnostic struct {
	Range    span
	Severity int
	Source   string
	Code     string
	Message  string
	Data     struct {
		P           float64
		Corrections []string
	}
}

// String is what tests compare: range, code and corrections.
func (d diagnostic) String() string {
	s, e := d.Range.Start, d.Range.End
	return fmt.Sprintf("%d:%d-%d:%d %s %s", s.Line, s.Character, e.Line, e.Character, d.Code, strings.Join(d.Data.Corrections[:1], ""))
}

type publication struct {
	URI         string
	Version     *int
	Diagnostics []diagnostic
}

// published waits for the diagnostics of a version; 0 is those of a closed document.
func (k *client) published(uri string, version int) []diagnostic {
	k.t.Helper()
	var p publication
	k.await(fmt.Sprintf("diagnostics of %s, version %d", uri, version), func(a arrival) bool {
		if a.Method != "textDocument/publishDiagnostics" {
			return false
		}
		p = publication{}
		read(k.t, a.Params, &p)
		return p.URI == uri && (p.Version == nil && version == 0 || p.Version != nil && *p.Version == version)
	})
	return p.Diagnostics
}

func read(t *testing.T, raw json.RawMessage, into any) {
	t.Helper()
	if err := json.Unmarshal(raw, into); err != nil {
		t.Fatalf("%s: %v", raw, err)
	}
}

// checkDiagnostics compares the String of each.
func checkDiagnostics(t *testing.T, got []diagnostic, want ...string) {
	t.Helper()
	var all []string
	for _, d := range got {
		all = append(all, d.String())
	}
	if strings.Join(all, "\n") != strings.Join(want, "\n") {
		t.Errorf("diagnostics\n%s\nwant\n%s", strings.Join(all, "\n"), strings.Join(want, "\n"))
	}
}
