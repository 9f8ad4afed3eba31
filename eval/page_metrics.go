package eval

import (
	"strings"
)

// metricTable is a report laid out with its longer side, metrics or classes,
// downwards.
type metricTable struct {
	Corner string // what the first column names
	Header []string
	Rows   []metricRow
}

type metricRow struct {
	Name  string
	Cells []metricCell
}

// metricCell is a value and its interval, or "-" for what is not measured.
type metricCell struct{ Value, Interval string }

func newMetricTable(r *Report) metricTable {
	names, classes := r.axes()
	t := metricTable{Corner: "metric"}
	if len(classes) > len(names) {
		t.Corner, t.Header = "class", names
		for _, class := range classes {
			row := metricRow{Name: className(class)}
			for _, name := range names {
				row.Cells = append(row.Cells, newMetricCell(r, name, class))
			}
			t.Rows = append(t.Rows, row)
		}
		return t
	}
	for _, class := range classes {
		t.Header = append(t.Header, className(class))
	}
	for _, name := range names {
		row := metricRow{Name: name}
		for _, class := range classes {
			row.Cells = append(row.Cells, newMetricCell(r, name, class))
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// newFileTable lays out the metrics over all classes, file by file.
func newFileTable(data []DataFile) metricTable {
	t := metricTable{Corner: "data"}
	for _, m := range data[0].Report.Metrics {
		if m.Class == "" {
			t.Header = append(t.Header, m.Name)
		}
	}
	for _, d := range data {
		row := metricRow{Name: d.Name}
		for _, name := range t.Header {
			row.Cells = append(row.Cells, newMetricCell(d.Report, name, ""))
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

func newMetricCell(r *Report, name, class string) metricCell {
	m, ok := r.Metric(name, class)
	value, interval, _ := strings.Cut(m.cell(ok), " ")
	return metricCell{value, strings.Trim(interval, "[]")}
}
