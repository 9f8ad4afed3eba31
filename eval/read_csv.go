package eval

import (
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"
	"unicode/utf8"
)

// CSVColumns says what the header of a CSV file calls the columns of pairs. An
// empty name stands for "observed", "intended" and "count".
type CSVColumns struct{ Observed, Intended, Count string }

// ParseCSVColumns reads names such as "observed=typed,intended=meant".
func ParseCSVColumns(list string) (CSVColumns, error) {
	var c CSVColumns
	if list == "" {
		return c, nil
	}
	for entry := range strings.SplitSeq(list, ",") {
		ours, theirs, ok := strings.Cut(entry, "=")
		theirs = strings.TrimSpace(theirs)
		column := map[string]*string{"observed": &c.Observed, "intended": &c.Intended, "count": &c.Count}[strings.TrimSpace(ours)]
		if !ok || column == nil || theirs == "" || *column != "" {
			return c, fmt.Errorf("columns %q: want each of observed, intended and count at most once with the header's name for it, such as observed=typed,intended=meant", list)
		}
		*column = theirs
	}
	return c, nil
}

// ReadCSV reads pairs from comma-separated values (RFC 4180) below a header. The
// columns may stand in any order, that of counts may be missing, and others are
// passed over. Case does not count in the header. Errors are of type *LineError
// and name the file as given.
func ReadCSV(file string, r io.Reader, columns CSVColumns) ([]Pair, error) {
	rows := csv.NewReader(r)
	rows.ReuseRecord = true
	header, err := rows.Read()
	if err == io.EOF {
		return nil, nil
	}
	if err != nil {
		return nil, csvError(file, err)
	}
	places, err := columns.places(header)
	if err != nil {
		return nil, &LineError{file, 1, err}
	}
	var pairs []Pair
	for {
		row, err := rows.Read()
		if err == io.EOF {
			return pairs, nil
		}
		if err != nil {
			return nil, csvError(file, err)
		}
		line, _ := rows.FieldPos(0)
		pair, err := places.pair(row)
		if err != nil {
			return nil, &LineError{file, line, err}
		}
		pair.Line = line
		pairs = append(pairs, pair)
	}
}

// csvPlaces are the indexes of the columns; count is -1 where there is none.
type csvPlaces struct{ observed, intended, count int }

func (c CSVColumns) places(header []string) (csvPlaces, error) {
	if len(header) > 0 {
		header[0] = strings.TrimPrefix(header[0], "\ufeff")
	}
	find := func(name, usual string) (int, string) {
		if name == "" {
			name = usual
		}
		return slices.IndexFunc(header, func(h string) bool { return strings.EqualFold(strings.TrimSpace(h), name) }), name
	}
	var p csvPlaces
	var name [3]string
	p.observed, name[0] = find(c.Observed, "observed")
	p.intended, name[1] = find(c.Intended, "intended")
	p.count, name[2] = find(c.Count, "count")
	for i, at := range []int{p.observed, p.intended, p.count} {
		if at < 0 && (i < 2 || c.Count != "") {
			return p, fmt.Errorf("no column %q in the header %q: name the header's columns, such as observed=typed,intended=meant", name[i], header)
		}
	}
	return p, nil
}

func (p csvPlaces) pair(row []string) (Pair, error) {
	observed, intended := strings.TrimSpace(row[p.observed]), strings.TrimSpace(row[p.intended])
	switch {
	case !utf8.ValidString(observed + intended):
		return Pair{}, errors.New("not UTF-8: convert the file first")
	case observed == "" || intended == "":
		return Pair{}, errors.New("empty word")
	}
	pair := Pair{Observed: observed, Intended: intended, Count: 1, Spaces: differInSpaces(observed, intended)}
	if p.count >= 0 {
		var err error
		if pair.Count, err = parseCount(strings.TrimSpace(row[p.count])); err != nil {
			return Pair{}, err
		}
	}
	return pair, nil
}

// csvError turns an error of encoding/csv into one that names the file.
func csvError(file string, err error) error {
	if at := (*csv.ParseError)(nil); errors.As(err, &at) {
		return &LineError{file, at.StartLine, fmt.Errorf("%w: mend the line, or give the data as tab-separated pairs", at.Err)}
	}
	return fmt.Errorf("%s: %w", file, err)
}
