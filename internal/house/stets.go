package house

import (
	"bufio"
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"slices"
	"strings"
	"sync"

	"example.org/foulcase"
)

// maxDecision is the most bytes of a line of a file of decisions.
const maxDecision = 64 << 10

// book is a file of decisions: JSON Lines, an object a decision. It is safe for concurrent
// use.
type book struct {
	path string // "" when there is none

	mu         sync.Mutex
	decisions  []Decision // each once
	known      map[Decision]bool
	everywhere map[string]bool // folded forms
	here       map[string]bool // fingerprints
}

// openBook reads the file at path, if it is there.
func openBook(path string) (*book, error) {
	b := &book{path: path, known: map[Decision]bool{}, everywhere: map[string]bool{}, here: map[string]bool{}}
	if path == "" {
		return b, nil
	}
	data, err := readBounded(path)
	if absent(err) {
		return b, nil
	}
	if err != nil {
		return nil, err
	}
	return b, b.read(data)
}

// read takes the decisions of a file that was read.
func (b *book) read(data []byte) error {
	lines := bufio.NewScanner(bytes.NewReader(bytes.TrimPrefix(data, []byte(byteOrderMark))))
	lines.Buffer(nil, maxDecision)
	n := 0
	for lines.Scan() {
		n++
		line := bytes.TrimSpace(lines.Bytes())
		if len(line) == 0 {
			continue
		}
		var d Decision
		err := json.Unmarshal(line, &d)
		if err == nil {
			err = d.check()
		}
		if err != nil {
			return fmt.Errorf("%s:%d: %w; mend the line or take it out", b.path, n, err)
		}
		b.take(d)
	}
	if lines.Err() != nil {
		return fmt.Errorf("%s:%d: the line is longer than %d bytes; mend it or take it out", b.path, n+1, maxDecision)
	}
	return nil
}

// check tells what keeps a decision from being one.
func (d *Decision) check() error {
	switch {
	case strings.TrimSpace(d.Observed) == "":
		return errors.New(`"observed" is empty`)
	case d.Decision == Corrected && d.Intended == "":
		return errors.New(`"intended" is empty: say what was meant`)
	case d.Decision == Corrected:
		return nil
	case d.Decision != Stet:
		return fmt.Errorf(`"decision" is %q: want %q or %q`, d.Decision, Stet, Corrected)
	case d.Scope == Here && len(d.Fingerprint) != 2*fingerprintBytes:
		return fmt.Errorf(`"fingerprint" is %q: want %d digits`, d.Fingerprint, 2*fingerprintBytes)
	case d.Scope != Here && d.Scope != Everywhere:
		return fmt.Errorf(`"scope" is %q: want %q or %q`, d.Scope, Here, Everywhere)
	}
	return nil
}

// take heeds a decision and reports whether it is new.
func (b *book) take(d Decision) bool {
	what := d.identity()
	if b.known[what] {
		return false
	}
	b.known[what] = true
	b.decisions = append(b.decisions, d)
	switch {
	case d.Decision != Stet:
	case d.Scope == Everywhere:
		b.everywhere[formOf(d.Observed)] = true
	default:
		b.here[d.Fingerprint] = true
	}
	return true
}

// identity is what makes two decisions the same.
func (d Decision) identity() Decision {
	same := Decision{Decision: d.Decision, Scope: d.Scope, Observed: d.Observed, Intended: d.Intended, Fingerprint: d.Fingerprint}
	if d.Scope == Everywhere {
		same.Observed, same.Fingerprint = formOf(d.Observed), ""
	}
	return same
}

// record adds a decision to the file, unless it is there.
func (b *book) record(d Decision) error {
	if err := d.check(); err != nil {
		return err
	}
	line, err := encode(d)
	if err != nil {
		return err
	}
	if len(line) >= maxDecision {
		return fmt.Errorf("the decision on %.40q... takes more than %d bytes; leave its context out", d.Observed, maxDecision)
	}
	b.mu.Lock()
	defer b.mu.Unlock()
	if b.known[d.identity()] {
		return nil
	}
	if err := appendLine(b.path, line); err != nil {
		return err
	}
	b.take(d)
	return nil
}

// encode writes an object on a line, with "<", ">" and "&" as they are.
func encode(d Decision) (string, error) {
	var line bytes.Buffer
	enc := json.NewEncoder(&line)
	enc.SetEscapeHTML(false)
	err := enc.Encode(d)
	return strings.TrimSpace(line.String()), err
}

func (b *book) list() []Decision {
	b.mu.Lock()
	defer b.mu.Unlock()
	return slices.Clone(b.decisions)
}

// stands tells whether a mark of the document at path was let stand.
func (b *book) stands(path string, m foulcase.Mark) bool {
	b.mu.Lock()
	defer b.mu.Unlock()
	form := formOf(m.Observed)
	if b.everywhere[form] || b.everywhere[strings.TrimSuffix(form, "'s")] {
		return true
	}
	return len(b.here) > 0 && b.here[Fingerprint(path, m)]
}
