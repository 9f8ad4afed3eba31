package editor

import (
	"encoding/json"
	"path/filepath"

	"example.org/foulcase/internal/house"
)

// The commands that code actions give and the client sends back.
const (
	addWordCommand  = "foulcase.addWord"  // a houseWord
	letStandCommand = "foulcase.letStand" // a stet
)

type houseWord struct {
	URI  string `json:"uri"`
	Word string `json:"word"`
}

type stet struct {
	URI      string         `json:"uri"`
	Decision house.Decision `json:"decision"`
}

// executeCommand writes what the user decided, and has all documents judged by it.
func (s *Server) executeCommand(c *call, params json.RawMessage) {
	var p executeCommandParams
	if f := decode(params, &p); f != nil {
		c.reply(nil, f)
		return
	}
	uri, act, f := parseCommand(p)
	if f != nil {
		c.reply(nil, f)
		return
	}
	s.hand(c, uri, func(d *document) {
		if d.settings == nil {
			c.reply(nil, failf(requestFailed, "there are no settings to write to for %s", nameOf(d.uri)))
			return
		}
		done, err := act(d.settings)
		if err != nil {
			c.reply(nil, failf(requestFailed, "%v", err))
			return
		}
		c.reply(nil, nil)
		s.log(loudInfo, "%s", done)
		s.forget() // the settings of other documents were read before
		s.reload(false)
	})
}

// parseCommand returns what a command does to the settings of which document.
func parseCommand(p executeCommandParams) (uri string, act func(Settings) (string, error), f *failure) {
	if len(p.Arguments) != 1 {
		return "", nil, failf(invalidParams, "command %.100q wants one argument", p.Command)
	}
	switch p.Command {
	case addWordCommand:
		var a houseWord
		f = decode(p.Arguments[0], &a)
		return a.URI, func(s Settings) (string, error) {
			file, err := s.AddWord(a.Word)
			return quote(a.Word) + " is a house word now, in " + filepath.ToSlash(file), err
		}, f
	case letStandCommand:
		var a stet
		f = decode(p.Arguments[0], &a)
		return a.URI, func(s Settings) (string, error) {
			return quote(a.Decision.Observed) + " stands", s.Record(a.Decision)
		}, f
	}
	return "", nil, failf(invalidParams, "no command %.100q", p.Command)
}
