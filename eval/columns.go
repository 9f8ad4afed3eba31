package eval

import (
	"fmt"
	"io"
	"slices"
	"strings"
)

// A Column is what one column of a sentence file holds.
type Column string

const (
	Source    Column = "source"    // the text as it was written; there must be one
	Reference Column = "reference" // the text with its spelling corrected and little else
	Rewrite   Column = "rewrite"   // a free correction, of style too
	Full      Column = "full"      // grammar corrected too, beside a reference
	Observed  Column = "observed"  // the word in error, when one is of interest
	Intended  Column = "intended"  // its correction
	Document  Column = "document"  // the document, page or writer
	Ignored   Column = "-"         // passed over
)

// PlainColumns is `source TAB corrected`; further columns are more references.
var PlainColumns = []Column{Source, Reference}

// ParseColumns reads a comma-separated list of columns, such as
// "source,reference,-,document".
func ParseColumns(list string) ([]Column, error) {
	known := []Column{Source, Reference, Rewrite, Full, Observed, Intended, Document, Ignored}
	var columns []Column
	for name := range strings.SplitSeq(list, ",") {
		c := Column(strings.TrimSpace(name))
		if !slices.Contains(known, c) {
			return nil, fmt.Errorf("columns %q: no column is called %q; known are %q", list, c, known)
		}
		columns = append(columns, c)
	}
	if err := checkColumns(columns); err != nil {
		return nil, fmt.Errorf("columns %q: %w", list, err)
	}
	return columns, nil
}

func checkColumns(columns []Column) error {
	count := map[Column]int{}
	for _, c := range columns {
		count[c]++
	}
	for _, c := range []Column{Source, Observed, Intended, Document} {
		if count[c] > 1 {
			return fmt.Errorf("%q twice", c)
		}
	}
	if count[Source] == 0 || count[Reference]+count[Rewrite] == 0 {
		return fmt.Errorf("want %q and at least one %q or %q", Source, Reference, Rewrite)
	}
	return nil
}

// ReadSentences reads a sentence a line in tab-separated columns. A line may
// have fewer columns than are named, when only references or rewrites are
// missing, and with a reference or rewrite in the last column it may have more
// of them. An empty reference or rewrite says nothing. Empty lines are passed
// over. Errors in the data are of type *LineError and name the file as given.
func ReadSentences(file string, r io.Reader, columns []Column) ([]Sentence, error) {
	if err := checkColumns(columns); err != nil {
		return nil, fmt.Errorf("%s: columns: %w", file, err)
	}
	var sentences []Sentence
	for n, line := range lines(file, r) {
		if line.err != nil {
			return nil, line.err
		}
		if strings.TrimSpace(line.text) == "" {
			continue
		}
		s, err := parseSentence(line.text, columns)
		if err != nil {
			return nil, &LineError{file, n, err}
		}
		s.Line = n
		sentences = append(sentences, s)
	}
	return sentences, nil
}

func parseSentence(line string, columns []Column) (Sentence, error) {
	var s Sentence
	values := strings.Split(line, "\t")
	last := columns[len(columns)-1]
	if extra := len(values) - len(columns); extra > 0 && last != Reference && last != Rewrite {
		return s, fmt.Errorf("%d columns, want %d", len(values), len(columns))
	}
	for i, value := range values {
		column := last
		if i < len(columns) {
			column = columns[i]
		}
		s.set(column, value)
	}
	for _, missing := range columns[min(len(values), len(columns)):] {
		if missing != Reference && missing != Rewrite {
			return s, fmt.Errorf("%d columns: %q is missing", len(values), missing)
		}
	}
	switch {
	case strings.TrimSpace(s.Source) == "":
		return s, fmt.Errorf("empty %q", Source)
	case len(s.References)+len(s.Rewrites) == 0:
		return s, fmt.Errorf("no corrected text")
	}
	return s, nil
}

func (s *Sentence) set(column Column, value string) {
	add := func(list *[]string) {
		if strings.TrimSpace(value) != "" {
			*list = append(*list, value)
		}
	}
	switch column {
	case Source:
		s.Source = value
	case Reference:
		add(&s.References)
	case Rewrite:
		add(&s.Rewrites)
	case Full:
		add(&s.Full)
	case Observed:
		s.Observed = value
	case Intended:
		s.Intended = value
	case Document:
		s.Document = value
	}
}
