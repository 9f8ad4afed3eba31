package main

import (
	"fmt"
	"io"
	"math"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/channel"
	"example.org/foulcase/internal/report"
)

// originObject is how a word may come from a candidate, as --emit jsonl prints it.
type originObject struct {
	Word    string       `json:"word"`
	Text    string       `json:"text"`
	Channel float64      `json:"channel"` // nats, a cost
	Steps   []stepObject `json:"steps"`
}

type stepObject struct {
	Kind     string  `json:"kind"`
	Intended string  `json:"intended"`
	Observed string  `json:"observed"`
	Left     string  `json:"left"`
	Cost     float64 `json:"cost"` // nats
}

// originOf takes the cost of a candidate apart. Of words run together, or of one
// that stands apart, the spaces are all there is to it.
func originOf(m *channel.Model, word string, c foulcase.Candidate) originObject {
	o := originObject{Word: word, Text: c.Text, Channel: -c.Channel}
	spaces := strings.Count(c.Text, " ") - strings.Count(word, " ")
	for range max(spaces, 0) {
		o.Steps = append(o.Steps, stepObject{Kind: "space left out", Intended: " ", Cost: float64(m.Prices().RunOn)})
	}
	for range max(-spaces, 0) {
		o.Steps = append(o.Steps, stepObject{Kind: "space put in", Observed: " ", Cost: float64(m.Prices().Split)})
	}
	if spaces > 0 {
		return o
	}
	for _, s := range m.Explain(joined(word), joined(c.Text)) {
		o.Steps = append(o.Steps, stepObject{s.Kind.String(), s.Intended, s.Observed, string(s.Left), s.Cost})
	}
	return o
}

func joined(words string) string { return strings.ReplaceAll(normal(words), " ", "") }

// worthALine is the cost, nats, from which a letter that was kept has its line.
const worthALine = 1

// printOrigins prints how a word may have come from each of its candidates.
func (f *channelShowFlags) printOrigins(w io.Writer, m *channel.Model, r foulcase.Ranking) error {
	if f.emit.value == "jsonl" {
		enc := report.JSONLines(w)
		for _, c := range r.Candidates {
			if err := enc.Encode(originOf(m, r.Word, c)); err != nil {
				return err
			}
		}
		return nil
	}
	var b strings.Builder
	fmt.Fprintf(&b, "%s\n", report.Quoted(r.Word))
	for _, c := range r.Candidates {
		writeOrigin(&b, originOf(m, r.Word, c), c.P)
	}
	_, err := io.WriteString(w, b.String())
	return err
}

func writeOrigin(b *strings.Builder, o originObject, p float64) {
	fmt.Fprintf(b, "  %s  p %.4f  channel %.2f\n", o.Text, p, o.Channel)
	rest, cost, sum := 0, 0.0, 0.0
	for _, s := range o.Steps {
		sum += s.Cost
		if (s.Kind == channel.Kept.String() || s.Kind == channel.Ended.String()) && s.Cost < worthALine {
			rest++
			cost += s.Cost
			continue
		}
		fmt.Fprintf(b, "    %7.2f  %s\n", s.Cost, stepLine(s))
	}
	if rest > 0 {
		fmt.Fprintf(b, "    %7.2f  %d steps that change nothing\n", cost, rest)
	}
	if other := o.Channel - sum; math.Abs(other) > .01 {
		fmt.Fprintf(b, "    %7.2f  for the stem alone, as a possessive\n", other)
	}
}

// stepLine puts a step in words.
func stepLine(s stepObject) string {
	after := fmt.Sprintf("after %s", s.Left)
	if s.Left == "^" {
		after = "at the start"
	}
	switch s.Kind {
	case channel.Kept.String():
		return fmt.Sprintf("%s kept, %s", s.Intended, after)
	case channel.Ended.String():
		return "nothing added at the end"
	case channel.Dropped.String():
		return fmt.Sprintf("%s left out, %s", s.Intended, after)
	case channel.Inserted.String():
		return fmt.Sprintf("%s put in, %s", s.Observed, after)
	case channel.Swapped.String():
		return fmt.Sprintf("%s typed as %s, swapped, %s", s.Intended, s.Observed, after)
	case channel.Replaced.String(), channel.Rewritten.String():
		line := fmt.Sprintf("%s typed as %s, %s", s.Intended, visibleSide(s.Observed), after)
		if s.Kind == channel.Rewritten.String() {
			line += ", by a rule"
		}
		return line
	}
	return s.Kind
}
