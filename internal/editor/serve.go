package editor

import (
	"context"
	"encoding/json"
	"errors"
	"io"
)

// Serve holds a session over a pair of streams, until the client ends it, in ends or
// ctx does. The error is that of Server.Close. A Read of in that is under way then is
// not waited for.
func Serve(ctx context.Context, in io.Reader, out io.Writer, c Config) error {
	s := New(c, func(m json.RawMessage) error { return writeFrame(out, m) })
	ended := make(chan struct{})
	go func() {
		defer close(ended)
		s.read(newFrameReader(in))
	}()
	select {
	case <-ended:
	case <-s.Done():
	case <-ctx.Done():
		s.stop(ctx.Err())
	}
	return s.Close()
}

// read receives messages until there are none, or the session is over.
func (s *Server) read(frames *frameReader) {
	for s.ctx.Err() == nil {
		raw, err := frames.next()
		switch long := (longFrame{}); {
		case errors.As(err, &long):
			s.answer(noID, nil, failf(invalidRequest, "%v", err))
			s.show(loudWarning, "foulcase: %v; if it was about a document that is open, close and open that again", err)
		case errors.Is(err, io.EOF):
			return
		case err != nil:
			s.answer(noID, nil, failf(parseError, "%v", err))
			s.stop(err)
			return
		default:
			s.Receive(raw)
		}
	}
}
