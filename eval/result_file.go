package eval

import (
	"encoding/json"
	"errors"
	"fmt"
	"io"

	"example.org/foulcase/internal/wholefile"
)

// Errors of ReadResult, for errors.Is.
var (
	ErrNoResult    = errors.New("not a result of foulcase eval")
	ErrNewerResult = errors.New("result is newer than this program")
)

// Write writes the result as JSON, indented, so that two can be read side by side.
func (r *Result) Write(w io.Writer) error {
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	enc.SetIndent("", " ")
	return enc.Encode(r)
}

// WriteFile writes the result to path, whole or not at all.
func (r *Result) WriteFile(path string) error { return wholefile.Write(path, r.Write) }

// ReadResult reads a result that Write wrote. Errors name the file as given
// and wrap ErrNoResult or ErrNewerResult, or tell what is wrong inside.
func ReadResult(file string, in io.Reader) (*Result, error) {
	data, err := io.ReadAll(in)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", file, err)
	}
	var head struct{ Format int }
	if err := json.Unmarshal(data, &head); err != nil || head.Format < 1 {
		return nil, fmt.Errorf("%s: %w; name a file written by `foulcase eval list|text|noise --results`", file, ErrNoResult)
	}
	if head.Format > ResultFormat {
		return nil, fmt.Errorf("%s: %w: format %d, this program reads up to %d; update foulcase or measure again", file, ErrNewerResult, head.Format, ResultFormat)
	}
	r := new(Result)
	if err := json.Unmarshal(data, r); err != nil {
		return nil, fmt.Errorf("%s: %w (%v); measure again", file, ErrNoResult, err)
	}
	if err := r.check(); err != nil {
		return nil, fmt.Errorf("%s: %w (%v); measure again", file, ErrNoResult, err)
	}
	return r, nil
}

// check makes sure that indexes and offsets can be followed.
func (r *Result) check() error {
	if r.Report == nil || len(r.Data) == 0 {
		return errors.New("no report or no data")
	}
	for i := range r.Data {
		if r.Data[i].Report == nil {
			return fmt.Errorf("data %d has no report", i+1)
		}
	}
	for i, p := range r.Pairs {
		if p.Data < 0 || p.Data >= len(r.Data) || p.Rank < 0 {
			return fmt.Errorf("pair %d is of no data", i+1)
		}
	}
	for i, u := range r.Units {
		if u.Data < 0 || u.Data >= len(r.Data) || u.Words < 0 {
			return fmt.Errorf("unit %d is of no data", i+1)
		}
	}
	for i, p := range r.Places {
		if p.Unit < 0 || p.Unit >= len(r.Units) || p.Flag == nil && p.Error == nil || p.Rank < 0 {
			return fmt.Errorf("place %d is of no unit, or neither flag nor error", i+1)
		}
	}
	return nil
}
