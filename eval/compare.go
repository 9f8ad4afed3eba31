package eval

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
)

// ErrIncomparable is wrapped by the errors of Compare.
var ErrIncomparable = errors.New("these results cannot be compared")

// A Comparison is two results on the same data, A before and B after.
type Comparison struct {
	Task      string    `json:"task"`
	Units     int       `json:"units"` // what was resampled: pairs or documents
	Resamples int       `json:"resamples"`
	Rows      []Row     `json:"rows"`
	Tests     []Test    `json:"tests"`
	Better    []Changed `json:"better"` // items that B has right and A has not, or has nearer
	Worse     []Changed `json:"worse"`
}

// A Row is one metric of both results, with the paired bootstrap of the two.
type Row struct {
	Metric string `json:"metric"`
	Class  string `json:"class,omitempty"`
	A      Number `json:"a"`
	B      Number `json:"b"`
	Paired
}

// A Test is McNemar's test of one question, asked of every item.
type Test struct {
	Question string `json:"question"` // what being right means
	Items    int    `json:"items"`
	McNemar
}

// A Changed is an item that the two results differ on.
type Changed struct {
	Data     string `json:"data"`
	Line     int    `json:"line"`
	Observed string `json:"observed"`
	Wanted   string `json:"wanted,omitempty"` // "" where nothing was wrong
	A        string `json:"a"`                // what A made of it
	B        string `json:"b"`
}

// Compare compares two results item by item: the chief metrics of the task by
// paired bootstrap, over all and for each of the classes, and what was right in
// one alone by McNemar's test. It refuses results of other tasks or of data
// that is not the same byte for byte.
func Compare(a, b *Result, classes []string, r Resampling) (*Comparison, error) {
	if err := checkComparable(a, b); err != nil {
		return nil, err
	}
	c := &Comparison{Task: a.Task, Resamples: r.resamples(), Better: []Changed{}, Worse: []Changed{}}
	var err error
	switch a.Task {
	case TaskList:
		err = c.lists(a, b, classes, r)
	case TaskClean:
		err = c.cleans(a, b, classes, r)
	default:
		err = c.texts(a, b, classes, r)
	}
	return c, err
}

func checkComparable(a, b *Result) error {
	refuse := func(format string, args ...any) error {
		return fmt.Errorf("%w: %s; measure both on the same data, the same way", ErrIncomparable, fmt.Sprintf(format, args...))
	}
	switch {
	case a.Task != b.Task:
		return refuse("one is of task %q, the other of %q", a.Task, b.Task)
	case len(a.Data) != len(b.Data):
		return refuse("one is of %d files, the other of %d", len(a.Data), len(b.Data))
	}
	for i, d := range a.Data {
		e := b.Data[i]
		switch {
		case d.SHA256 != e.SHA256:
			return refuse("%s and %s are not the same file (SHA-256 %.12s, %.12s)", d.Name, e.Name, d.SHA256, e.SHA256)
		case d.Read != e.Read:
			return refuse("%s was read as %q for one and %q for the other", d.Name, d.Read, e.Read)
		case d.Measured != e.Measured:
			return refuse("of %s one measured other texts than the other", d.Name)
		}
	}
	if len(a.Pairs) != len(b.Pairs) || len(a.Units) != len(b.Units) {
		return refuse("one holds %d items, the other %d", len(a.Pairs)+len(a.Units), len(b.Pairs)+len(b.Units))
	}
	return nil
}

// compareCounts adds a row for each measure; a and b are the counts of the same
// units in the two results.
func compareCounts[C counts[C]](c *Comparison, a, b []C, measures []measure[C], r Resampling) {
	values := func(counts []C, sample []int) []float64 {
		var sum C
		for _, i := range sample {
			sum = sum.plus(counts[i])
		}
		list := make([]float64, len(measures))
		for i, m := range measures {
			list[i], _ = m.of(sum)
		}
		return list
	}
	all := make([]int, len(a))
	for i := range all {
		all[i] = i
	}
	x, y := values(a, all), values(b, all)
	paired := PairedBootstrap(len(a), func(sample []int) ([]float64, []float64) {
		return values(a, sample), values(b, sample)
	}, r)
	c.Units = len(a)
	for i, m := range measures {
		c.Rows = append(c.Rows, Row{m.name, m.class, Number(x[i]), Number(y[i]), paired[i]})
	}
}

// chief keeps the measures that a comparison shows.
func chief[C any](measures []measure[C], names ...string) []measure[C] {
	return slices.DeleteFunc(measures, func(m measure[C]) bool { return !slices.Contains(names, m.name) })
}

// unknownClass tells of a class that neither result has.
func unknownClass(class string, known []string) error {
	return fmt.Errorf("class %q is not in these results; they have %s", class, strings.Join(known, ", "))
}

// note files a changed item under better or worse; a lower worth is better.
func (c *Comparison) note(item Changed, a, b float64) {
	switch {
	case b < a:
		c.Better = append(c.Better, item)
	case b > a:
		c.Worse = append(c.Worse, item)
	}
}

// rankWorth orders ranks; 0, no rank, is the worst.
func rankWorth(rank int) float64 {
	if rank == 0 {
		return math.Inf(1)
	}
	return float64(rank)
}

// exactBelow is the number of items right in one system alone below which the
// chi-squared of McNemar's test is rough and the exact p is shown.
const exactBelow = 25

// Shown returns the p of a test that is to be shown, and what it is called.
func (m McNemar) Shown() (p float64, name string) {
	if m.OnlyA+m.OnlyB < exactBelow {
		return m.Exact, "exact"
	}
	return m.P, "chi-squared"
}

// Table lays the rows out, shares in per cent as those of a report.
func (c *Comparison) Table() Table {
	t := Table{Header: []string{"metric", "class", "A", "B", "B - A", "p"}}
	for _, row := range c.Rows {
		class := row.Class
		if class == "" {
			class = "all"
		}
		t.Rows = append(t.Rows, []string{
			row.Metric, class, row.text(row.A), row.text(row.B),
			Metric{Name: row.Metric, Value: row.Difference, Low: row.Low, High: row.High}.cell(true),
			fmt.Sprintf("%.3f", row.P),
		})
	}
	return t
}

func (r *Row) text(n Number) string {
	if !n.Defined() {
		return "-"
	}
	scale, digits := unit(r.Metric)
	return fmt.Sprintf("%.*f", digits, scale*n)
}
