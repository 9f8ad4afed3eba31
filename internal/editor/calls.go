package editor

import (
	"context"
	"encoding/json"
	"fmt"
	"maps"
	"slices"
	"sync"
)

// calls keeps account of requests under way, in both directions.
type calls struct {
	mu      sync.Mutex
	from    map[string]*call                     // the client's, by id as it wrote it
	to      map[int]func(json.RawMessage, error) // ours
	counter int
}

// call is a request of the client. It is answered once: later answers are dropped.
type call struct {
	s      *Server
	id     json.RawMessage
	ctx    context.Context // ends when the client cancels, or the session
	cancel context.CancelFunc
}

// maxCalls is the most requests of the client that may be under way.
const maxCalls = 1000

// begin notes a request; it is an error when one of the same id is under way, or too
// many are.
func (s *Server) begin(id json.RawMessage) (*call, *failure) {
	s.calls.mu.Lock()
	defer s.calls.mu.Unlock()
	if _, ok := s.calls.from[string(id)]; ok {
		return nil, failf(invalidRequest, "a request with the id %.40s is under way", id)
	}
	if len(s.calls.from) >= maxCalls {
		return nil, failf(requestFailed, "%d requests are under way already: wait for an answer", maxCalls)
	}
	c := &call{s: s, id: id}
	c.ctx, c.cancel = context.WithCancel(s.ctx)
	s.calls.from[string(id)] = c
	return c, nil
}

// end strikes a request off; ok is false when it was answered already.
func (c *call) end() (ok bool) {
	c.cancel()
	c.s.calls.mu.Lock()
	defer c.s.calls.mu.Unlock()
	ok = c.s.calls.from[string(c.id)] == c
	if ok {
		delete(c.s.calls.from, string(c.id))
	}
	return ok
}

// reply answers with a result, or with the error when there is one.
func (c *call) reply(result any, f *failure) {
	if !c.end() {
		return
	}
	if f != nil {
		c.s.answer(c.id, nil, f)
		return
	}
	raw, err := json.Marshal(result)
	if err != nil {
		c.s.answer(c.id, nil, failf(internalError, "%v", err))
		return
	}
	c.s.answer(c.id, raw, nil)
}

// cancelCall answers a request that the client has lost interest in. Whoever works
// on it sees its context end.
func (s *Server) cancelCall(id json.RawMessage) {
	s.calls.mu.Lock()
	c := s.calls.from[string(id)]
	s.calls.mu.Unlock()
	if c != nil {
		c.reply(nil, failf(requestCancelled, "cancelled"))
	}
}

// abandonCalls answers what nobody works on any more.
func (s *Server) abandonCalls() {
	s.calls.mu.Lock()
	left := slices.Collect(maps.Values(s.calls.from))
	s.calls.mu.Unlock()
	for _, c := range left {
		c.reply(nil, failf(serverCancelled, "the session ends"))
	}
}

func (s *Server) answer(id, result json.RawMessage, f *failure) {
	if f != nil {
		s.post("", refusal{"2.0", id, f})
		return
	}
	// By hand, because marshalling would read the result once more.
	raw := append([]byte(`{"jsonrpc":"2.0","id":`), id...)
	raw = append(append(append(raw, `,"result":`...), result...), '}')
	s.out.put(parcel{message: raw})
}

// ask sends a request; done, which may be nil, gets the answer, in the goroutine
// that reads.
func (s *Server) ask(method string, params any, done func(result json.RawMessage, err error)) {
	if done == nil {
		done = func(json.RawMessage, error) {}
	}
	s.calls.mu.Lock()
	s.calls.counter++
	id := s.calls.counter
	s.calls.to[id] = done
	s.calls.mu.Unlock()
	s.post("", request{"2.0", id, method, params})
}

// answered takes a response of the client. One to no request of ours is ignored.
func (s *Server) answered(m message) {
	var id int
	if json.Unmarshal(m.ID, &id) != nil {
		return
	}
	s.calls.mu.Lock()
	done := s.calls.to[id]
	delete(s.calls.to, id)
	s.calls.mu.Unlock()
	switch {
	case done == nil:
	case m.Error != nil:
		done(nil, fmt.Errorf("the client answered with error %d: %s", m.Error.Code, m.Error.Message))
	default:
		done(m.Result, nil)
	}
}

// tell sends a notification.
func (s *Server) tell(method string, params any) {
	s.post("", notification{"2.0", method, params})
}

// post queues a message of ours.
func (s *Server) post(key string, m any) {
	raw, err := json.Marshal(m)
	if err != nil { // a value of ours that JSON has no form for
		s.stop(err)
		return
	}
	s.out.put(parcel{key, raw})
}

// kind of a message to the user (LSP 3.17, MessageType).
type loudness int

const (
	loudError   loudness = 1
	loudWarning loudness = 2
	loudInfo    loudness = 3
)

type shownMessage struct {
	Type    loudness `json:"type"`
	Message string   `json:"message"`
}

// log writes to the client's log.
func (s *Server) log(l loudness, format string, args ...any) {
	s.tell("window/logMessage", shownMessage{l, fmt.Sprintf(format, args...)})
}

// show puts a message before the user.
func (s *Server) show(l loudness, format string, args ...any) {
	s.tell("window/showMessage", shownMessage{l, fmt.Sprintf(format, args...)})
}
