package main

import (
	"bufio"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"time"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
	"example.org/foulcase/internal/report"
)

// maxMark is the longest line of marks that is read, in bytes.
const maxMark = 1 << 20

// decided is a decision and the settings that it is to be recorded by.
type decided struct {
	settings *house.Settings
	house.Decision
}

// recordMarks records a decision on each mark that is picked.
func (f *stetFlags) recordMarks(c *console, found *house.Resolver) error {
	in, name := c.in, "standard input"
	if f.from != standardInput {
		file, err := os.Open(f.from)
		if err != nil {
			return err
		}
		defer file.Close()
		in, name = file, f.from
	}
	marks, err := readMarks(in, name)
	if err != nil {
		return err
	}
	if marks, err = f.pick(marks); err != nil {
		return err
	}
	decision, scope := house.Stet, house.Here
	switch {
	case f.accept:
		decision, scope = house.Corrected, ""
	case f.everywhere:
		scope = house.Everywhere
	}
	var decisions []decided
	for _, m := range marks {
		settings, err := found.For(m.path)
		if err != nil {
			return err
		}
		decisions = append(decisions, decided{settings, house.DecisionOn(m.path, m.Mark, decision, scope)})
	}
	return recordAll(c, decisions)
}

// recordAll records decisions and tells how many were new, file by file.
func recordAll(c *console, decisions []decided) error {
	date := time.Now().UTC().Format(time.RFC3339)
	before := map[string]int{}
	var written []*house.Settings // one a file
	for _, d := range decisions {
		if _, ok := before[d.settings.StetFile()]; !ok {
			before[d.settings.StetFile()] = len(d.settings.Decisions())
			written = append(written, d.settings)
		}
		d.Date = date
		if err := d.settings.Record(d.Decision); err != nil {
			return err
		}
	}
	for _, s := range written {
		added := len(s.Decisions()) - before[s.StetFile()]
		fmt.Fprintf(c.err, "foulcase: %s: %s added\n", s.StetFile(), counted(added, "decision"))
	}
	return nil
}

// placedMark is a mark with its document.
type placedMark struct {
	path string
	foulcase.Mark
}

// place is where a mark stands, as proof prints it in lines.
func (m placedMark) place() string {
	return report.Place(filepath.Clean(m.path), m.Mark)
}

// pick returns the marks at the places that were asked for, all if none was.
func (f *stetFlags) pick(marks []placedMark) ([]placedMark, error) {
	if len(f.at) == 0 {
		return marks, nil
	}
	var picked []placedMark
	for _, at := range f.at {
		n := len(picked)
		for _, m := range marks {
			if m.place() == filepath.Clean(at) {
				picked = append(picked, m)
			}
		}
		if len(picked) == n {
			return nil, fmt.Errorf("--at %s: no mark stands there; write PATH:LINE:COLUMN as proof prints it", at)
		}
	}
	return picked, nil
}

// readMarks reads marks as proof --emit jsonl prints them.
func readMarks(r io.Reader, name string) ([]placedMark, error) {
	var marks []placedMark
	lines := bufio.NewScanner(r)
	lines.Buffer(nil, maxMark)
	n := 0
	for lines.Scan() {
		n++
		if strings.TrimSpace(lines.Text()) == "" {
			continue
		}
		m, err := readMark(lines.Bytes())
		if err != nil {
			return nil, fmt.Errorf("%s:%d: %w; give what proof --emit jsonl prints", name, n, err)
		}
		marks = append(marks, m)
	}
	if err := lines.Err(); errors.Is(err, bufio.ErrTooLong) {
		return nil, fmt.Errorf("%s:%d: a line of more than %d bytes; give what proof --emit jsonl prints", name, n+1, maxMark)
	} else if err != nil {
		return nil, fmt.Errorf("%s:%d: %w", name, n+1, err)
	}
	return marks, nil
}

// readMark reads what a decision takes of a mark.
func readMark(line []byte) (placedMark, error) {
	var read struct {
		Path, Part, Observed, Kind, Context string
		Line, Column                        int
		P                                   float64
		Corrections                         []foulcase.Correction
	}
	if err := json.Unmarshal(line, &read); err != nil {
		return placedMark{}, err
	}
	if read.Path == "" || read.Observed == "" {
		return placedMark{}, fmt.Errorf("no mark: it wants path and observed")
	}
	m := placedMark{read.Path, foulcase.Mark{
		Part: read.Part, Line: read.Line, Column: read.Column,
		Observed: read.Observed, P: read.P, Corrections: read.Corrections, Context: read.Context,
	}}
	for _, kind := range foulcase.Kinds() {
		if kind.String() == read.Kind {
			m.Kind = kind
			return m, nil
		}
	}
	return placedMark{}, fmt.Errorf("kind %q is none", read.Kind)
}
