package eval

import (
	"fmt"
	"io"
	"slices"
	"strings"
	"unicode/utf8"
)

// A Table is a report laid out for reading: a row a class, a column a metric.
type Table struct {
	Header []string
	Rows   [][]string
}

// Table lays the report out. Values are shares in per cent, other than those
// that are counts per 1,000 words; intervals stand in brackets.
func (r *Report) Table() Table {
	names, classes := r.axes()
	t := Table{Header: append([]string{"class", "n"}, names...)}
	for _, class := range classes {
		row := []string{class, ""}
		if class == "" {
			row[0] = "all"
		}
		for _, name := range names {
			m, ok := r.Metric(name, class)
			row = append(row, m.cell(ok))
			if row[1] == "" && ok {
				row[1] = fmt.Sprintf("%.0f", m.N)
			}
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

func (m Metric) cell(present bool) string {
	if !present || !m.Value.Defined() {
		return "-"
	}
	scale, digits := unit(m.Name)
	return fmt.Sprintf("%.*f [%.*f, %.*f]", digits, scale*m.Value, digits, scale*m.Low, digits, scale*m.High)
}

// unit says how a metric is shown: what it is multiplied by, and how many
// decimals it has.
func unit(metric string) (scale Number, digits int) {
	switch metric {
	case "flags", "false.alarms", "good.flagged", "harmed":
		return 1, 2 // counts per 1,000 words
	}
	return 100, 1 // shares, in per cent
}

// WriteMarkdown writes the table as a Markdown pipe table.
func (t Table) WriteMarkdown(w io.Writer) error {
	var b strings.Builder
	line := func(cells []string) {
		b.WriteString("|")
		for _, cell := range cells {
			b.WriteString(" " + strings.ReplaceAll(cell, "|", `\|`) + " |")
		}
		b.WriteString("\n")
	}
	line(t.Header)
	rule := slices.Repeat([]string{"---:"}, len(t.Header))
	rule[0] = "---"
	line(rule)
	for _, row := range t.Rows {
		line(row)
	}
	_, err := io.WriteString(w, b.String())
	return err
}

// WritePlain writes the table in columns padded with spaces.
func (t Table) WritePlain(w io.Writer) error {
	widths := make([]int, len(t.Header))
	all := append([][]string{t.Header}, t.Rows...)
	for _, row := range all {
		for i, cell := range row {
			widths[i] = max(widths[i], utf8.RuneCountInString(cell))
		}
	}
	var b strings.Builder
	for _, row := range all {
		var line strings.Builder
		for i, cell := range row {
			pad := strings.Repeat(" ", widths[i]-utf8.RuneCountInString(cell))
			if i == 0 {
				line.WriteString(cell + pad)
			} else {
				line.WriteString("  " + pad + cell)
			}
		}
		b.WriteString(strings.TrimRight(line.String(), " ") + "\n")
	}
	_, err := io.WriteString(w, b.String())
	return err
}
