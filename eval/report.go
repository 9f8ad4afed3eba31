package eval

import (
	"encoding/json"
	"math"
	"slices"
)

// A Number is a float64 that is null in JSON when it is not defined, as the
// precision of a system that flags nothing.
type Number float64

// Defined says whether there is a value.
func (n Number) Defined() bool { return !math.IsNaN(float64(n)) && !math.IsInf(float64(n), 0) }

// MarshalJSON writes the number, or null.
func (n Number) MarshalJSON() ([]byte, error) {
	if !n.Defined() {
		return []byte("null"), nil
	}
	return json.Marshal(float64(n))
}

// UnmarshalJSON reads a number, or null as a number not defined.
func (n *Number) UnmarshalJSON(data []byte) error {
	if string(data) == "null" {
		*n = Number(math.NaN())
		return nil
	}
	return json.Unmarshal(data, (*float64)(n))
}

// A Metric is one measured value with its 95 % bootstrap interval.
type Metric struct {
	Name  string  `json:"metric"`
	Class string  `json:"class,omitempty"` // the part of the data it is of; "" is all
	Value Number  `json:"value"`
	Low   Number  `json:"low"`
	High  Number  `json:"high"`
	N     float64 `json:"n"` // what the value is a share of: items, errors, flags, or words
}

// A Report is the outcome of one measurement.
type Report struct {
	Task      string   `json:"task"` // "list", "text" or "clean"
	Items     int      `json:"items"`
	Documents int      `json:"documents,omitempty"` // what the intervals draw from, when not items
	Words     int      `json:"words,omitempty"`
	Resamples int      `json:"resamples"`
	Seed      uint64   `json:"seed"`
	Metrics   []Metric `json:"metrics"`
}

// Metric returns the metric of that name and class.
func (r *Report) Metric(name, class string) (Metric, bool) {
	for _, m := range r.Metrics {
		if m.Name == name && m.Class == class {
			return m, true
		}
	}
	return Metric{}, false
}

// axes lists the names and the classes of the metrics, each in the order met.
func (r *Report) axes() (names, classes []string) {
	for _, m := range r.Metrics {
		if !slices.Contains(names, m.Name) {
			names = append(names, m.Name)
		}
		if !slices.Contains(classes, m.Class) {
			classes = append(classes, m.Class)
		}
	}
	return names, classes
}
