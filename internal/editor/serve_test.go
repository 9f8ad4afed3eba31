package editor

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"strings"
	"testing"
	"testing/synctest"
	"time"
)

// framed puts each message behind its header.
func framed(messages ...string) string {
	var b bytes.Buffer
	for _, m := range messages {
		if err := writeFrame(&b, []byte(m)); err != nil {
			panic(err)
		}
	}
	return b.String()
}

const (
	hello   = `{"jsonrpc":"2.0","id":1,"method":"initialize","params":{"processId":null,"capabilities":{}}}`
	goodbye = `{"jsonrpc":"2.0","id":2,"method":"shutdown"}`
	exit    = `{"jsonrpc":"2.0","method":"exit"}`
)

// serve holds a session over what a client sends and returns what it got, message
// by message.
func serve(t *testing.T, sent io.Reader) ([]arrival, error) {
	t.Helper()
	var out bytes.Buffer
	err := Serve(context.Background(), sent, &out, Config{Engine: engine()})
	var all []arrival
	for frames := newFrameReader(&out); ; {
		raw, end := frames.next()
		if errors.Is(end, io.EOF) {
			return all, err
		}
		if end != nil {
			t.Fatalf("the server sent a bad frame: %v", end)
		}
		var a arrival
		read(t, raw, &a)
		all = append(all, a)
	}
}

func TestServe(t *testing.T) {
	got, err := serve(t, strings.NewReader(framed(hello, goodbye, exit)))
	if err != nil || len(got) != 2 || got[0].Error != nil || string(got[1].Result) != "null" {
		t.Errorf("%+v, error %v", got, err)
	}
	if _, err = serve(t, strings.NewReader(framed(hello, goodbye))); err != nil {
		t.Errorf("the end after shutdown: %v", err)
	}
	for _, sent := range []string{"", framed(hello), framed(hello, exit), framed(exit)} {
		if _, err := serve(t, strings.NewReader(sent)); !errors.Is(err, ErrNoShutdown) {
			t.Errorf("%q: error %v", sent, err)
		}
	}
}

// TestBadMessages: a message that is none is answered, and the session goes on.
func TestBadMessages(t *testing.T) {
	for _, tt := range []struct {
		message string
		want    code
	}{
		{`{"jsonrpc":"2.0","id":7,`, parseError},
		{"", parseError},
		{"\xff\xfe", parseError},
		{strings.Repeat("[", 100_000), parseError},
		{`[]`, invalidRequest},
		{`[` + goodbye + `]`, invalidRequest},
		{`"hello"`, invalidRequest},
		{`{"jsonrpc":"1.0","id":7,"method":"shutdown"}`, invalidRequest},
		{`{"id":7,"method":"shutdown"}`, invalidRequest},
		{`{"jsonrpc":"2.0","id":{},"method":"shutdown"}`, invalidRequest},
		{`{"jsonrpc":"2.0","id":7,"method":12}`, invalidRequest},
		{`{"jsonrpc":"2.0"}`, invalidRequest},
		{`{"jsonrpc":"2.0","id":7,"method":"no/such"}`, methodNotFound},
		{`{"jsonrpc":"2.0","id":7,"method":"textDocument/codeAction"}`, invalidParams},
		{`{"jsonrpc":"2.0","id":7,"method":"textDocument/codeAction","params":[1]}`, invalidParams},
	} {
		got, err := serve(t, strings.NewReader(framed(hello, tt.message, goodbye, exit)))
		if err != nil || len(got) != 3 || got[1].Error == nil || got[1].Error.Code != tt.want {
			t.Errorf("%.60q: %+v, error %v; want code %d", tt.message, got, err, tt.want)
		}
	}
}

// TestBadFrames: a stream that cannot be followed any more ends the session with an
// error that says why.
func TestBadFrames(t *testing.T) {
	for _, tt := range []struct{ sent, want string }{
		{"Content-Length: -5\r\n\r\n{}", "is no length"},
		{"Content-Length: many\r\n\r\n{}", "is no length"},
		{"Content-Length: 99999999999999999999\r\n\r\n{}", "is no length"},
		{"Content-Type: text\r\n\r\n{}", "no Content-Length"},
		{"\r\n{}", "no Content-Length"},
		{"Content-Length: 100\r\n\r\n{}", "in a message of 100 bytes"},
		{"Content-Length: 9000000000000000000\r\n\r\n{}", "in a message of 9000000000000000000 bytes"},
		{"Content-Length: 100\r\n", "in the header"},
		{"Content-Len", "in the header"},
		{strings.Repeat("X", 1<<20), "more than 8192 bytes"},
		{strings.Repeat("X-Flood: yes\r\n", 1<<16), "more than 8192 bytes"},
	} {
		got, err := serve(t, strings.NewReader(framed(hello)+tt.sent))
		if err == nil || !strings.Contains(err.Error(), tt.want) {
			t.Errorf("%.60q: error %v, want %q", tt.sent, err, tt.want)
		}
		if last := got[len(got)-1]; last.Error == nil || string(last.ID) != "null" {
			t.Errorf("%.60q: last message %s", tt.sent, last.Raw)
		}
	}
}

// TestLongFrame: a message that is too long is read past.
func TestLongFrame(t *testing.T) {
	const size = maxFrame + 1
	sent := io.MultiReader(strings.NewReader(framed(hello)+fmt.Sprintf("Content-Length: %d\r\n\r\n", size)),
		io.LimitReader(blanks{}, size), strings.NewReader(framed(goodbye, exit)))
	got, err := serve(t, sent)
	if err != nil || len(got) != 4 || got[1].Error == nil || got[1].Error.Code != invalidRequest || got[2].Method != "window/showMessage" {
		t.Errorf("%+v, error %v", got, err)
	}
}

// blanks reads as spaces without end.
type blanks struct{}

func (blanks) Read(p []byte) (int, error) {
	for i := range p {
		p[i] = ' '
	}
	return len(p), nil
}

// TestHeaders: the header is read as the protocol allows it.
func TestHeaders(t *testing.T) {
	f := newFrameReader(strings.NewReader("content-length:2\r\nContent-Type: application/vscode-jsonrpc; charset=utf-8\r\n\r\n{}Content-Length: 3\n\n[1]"))
	for _, want := range []string{"{}", "[1]"} {
		if got, err := f.next(); string(got) != want || err != nil {
			t.Errorf("%q, error %v, want %q", got, err, want)
		}
	}
	if _, err := f.next(); err != io.EOF {
		t.Errorf("error %v at the end", err)
	}
}

// TestClientThatDoesNotRead: the session ends though a write never returns.
func TestClientThatDoesNotRead(t *testing.T) {
	synctest.Test(t, func(t *testing.T) {
		release := make(chan struct{})
		s := New(Config{Engine: engine()}, func(json.RawMessage) error { <-release; return nil })
		s.Receive([]byte(hello))
		for range 10 {
			s.Receive([]byte(`{"jsonrpc":"2.0","id":3,"method":"no/such"}`))
		}
		begun := time.Now()
		if err := s.Close(); !errors.Is(err, ErrNoShutdown) {
			t.Errorf("error %v", err)
		}
		if waited := time.Since(begun); waited != lastWords {
			t.Errorf("waited %v", waited)
		}
		close(release)
	})
}

func TestClientThatIsGone(t *testing.T) {
	gone := errors.New("broken pipe")
	s := New(Config{Engine: engine()}, func(json.RawMessage) error { return gone })
	s.Receive([]byte(hello))
	<-s.Done()
	if err := s.Close(); !errors.Is(err, gone) {
		t.Errorf("error %v", err)
	}
}

// TestParent: the server ends when the process of the client does.
func TestParent(t *testing.T) {
	synctest.Test(t, func(t *testing.T) {
		begun := time.Now()
		alive := func(pid int) bool { return pid == 4711 && time.Since(begun) < time.Minute }
		s := New(Config{Engine: engine(), Alive: alive}, func(json.RawMessage) error { return nil })
		s.Receive([]byte(strings.Replace(hello, `"processId":null`, `"processId":4711`, 1)))
		<-s.Done()
		if lived := time.Since(begun); lived < time.Minute || lived > time.Minute+parentPeriod {
			t.Errorf("lived %v", lived)
		}
		if err := s.Close(); !errors.Is(err, ErrNoShutdown) {
			t.Errorf("error %v", err)
		}
	})
}

func TestServeEndsWithItsContext(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	in, _ := io.Pipe() // nothing ever comes
	cancel()
	if err := Serve(ctx, in, io.Discard, Config{Engine: engine()}); !errors.Is(err, context.Canceled) {
		t.Errorf("error %v", err)
	}
}

// TestSuperseded: of diagnostics that wait to be sent the newest are, in the place of
// all others.
func TestSuperseded(t *testing.T) {
	begin := make(chan struct{})
	var sent []string
	o := newOutbox(func(m json.RawMessage) error {
		<-begin
		sent = append(sent, string(m))
		return nil
	}, func(error) {})
	for _, p := range []parcel{{"", []byte("first")}, {"a", []byte("a1")}, {"b", []byte("b1")}, {"a", []byte("a2")}, {"", []byte("last")}} {
		o.put(p)
	}
	close(begin)
	o.close()
	<-o.closed
	got := strings.Join(sent, " ")
	if got != "first b1 a2 last" && got != "first a1 b1 a2 last" { // a1 may have been on its way
		t.Errorf("sent %s", got)
	}
}

// TestTooMuchWaits: a client that never reads does not fill the memory.
func TestTooMuchWaits(t *testing.T) {
	release, broken := make(chan struct{}), make(chan error, 1)
	o := newOutbox(func(json.RawMessage) error { <-release; return nil }, func(err error) { broken <- err })
	for range 10 {
		o.put(parcel{message: make([]byte, maxWaiting/8)})
	}
	if err := <-broken; err == nil {
		t.Error("no error")
	}
	close(release)
	<-o.closed
}
