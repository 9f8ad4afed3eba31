package main

import (
	"bytes"
	"context"
	"fmt"
	"io"
	"math"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/channel"
	"example.org/foulcase/eval"
	"example.org/foulcase/internal/report"
)

// leastPairs is the number of single words from which pairs can say something:
// a fifth of fewer measures nothing. Guessed.
const leastPairs = 50

// houseFit blends the channel of a model with the pairs of a house.
type houseFit struct {
	flags *channelFitFlags
	base  *slipSource
	found *corrections

	learn, held   []channel.Pair
	strength      float64
	report        channel.AdaptReport
	before, after heldOut
	overlap       eval.Overlap // of the pairs set apart with what the model was fitted on before
}

// heldOut is how a model does on the pairs set apart.
type heldOut struct {
	likelihood float64
	ranks      *eval.Report
}

func (h *houseFit) run(ctx context.Context, c *console) error {
	if err := h.deal(); err != nil {
		return err
	}
	model := h.base.channel
	var err error
	h.strength, _, err = channel.ChooseStrength(model, h.learn, func(done, all int) {
		c.progress.Set(fmt.Sprintf("weighing the pairs: %d %%", 100*done/all), 0)
	})
	if err != nil {
		return err
	}
	b := &builder{parts: &modelParts{from: []string{h.flags.from}, homophones: h.flags.homophones, output: h.flags.output}, progress: c.progress, held: map[string][]byte{}}
	if err := b.takeOver(); err != nil {
		return err
	}
	c.progress.Set("measuring", 0)
	name, err := h.measure(b, model, &h.before)
	if err != nil {
		return err
	}
	tried, _, err := channel.Adapt(model, h.learn, h.strength)
	if err != nil {
		return err
	}
	if _, err := h.measure(b, tried, &h.after); err != nil {
		return err
	}
	if err := ctx.Err(); err != nil {
		return err
	}
	return h.write(ctx, c, b, name)
}

// deal sets a fifth of the pairs apart.
func (h *houseFit) deal() error {
	single := 0
	for _, p := range h.found.pairs {
		if !p.Spaced {
			single++
		}
		if channel.Fold(p) == 0 {
			h.held = append(h.held, p)
		} else {
			h.learn = append(h.learn, p)
		}
	}
	switch {
	case single == 0:
		return fmt.Errorf("no pair is a slip of spelling in a single word (left out: %s); give others", h.leftOut())
	case single < leastPairs && !h.flags.fewToo:
		return fmt.Errorf("%d pairs are too few to say anything, %d are wanted (left out: %s); collect more, or give --few-too", single, leastPairs, h.leftOut())
	}
	return nil
}

// measure looks at the pairs set apart with a channel in the place of b's, and
// returns the hash of that model.
func (h *houseFit) measure(b *builder, m *channel.Model, to *heldOut) (hash string, err error) {
	b.held[foulcase.SectionChannel] = m.Section()
	w, err := b.writer()
	if err != nil {
		return "", err
	}
	var file bytes.Buffer
	if _, err := w.WriteTo(&file); err != nil {
		return "", err
	}
	e, err := foulcase.Open(file.Bytes())
	if err != nil {
		return "", naming(h.flags.from, err)
	}
	defer e.Close()
	pairs := make([]eval.Pair, len(h.held))
	for i, p := range h.held {
		pairs[i] = eval.Pair{Observed: p.Observed, Intended: p.Intended, Count: 1, Spaces: p.Spaced}
	}
	if to == &h.before {
		h.overlap = eval.Fitted(e.Fitted).OverlapOf(pairs)
	}
	rankings := rankAll(e, pairs, foulcase.RankOptions{K: 20}, int(*h.flags.jobs))
	to.likelihood = m.LogLikelihood(h.held)
	to.ranks, err = eval.ScoreList(pairs, rankings, nil, resampling)
	return e.Hash(), err
}

// write fits all pairs and writes the model. It was made from one with that hash.
func (h *houseFit) write(ctx context.Context, c *console, b *builder, from string) error {
	adapted, r, err := channel.Adapt(h.base.channel, h.found.pairs, h.strength)
	if err != nil {
		return err
	}
	h.report = r
	b.held[foulcase.SectionChannel] = adapted.Section()
	if h.moved() {
		if err := h.note(c, b, from); err != nil {
			return err
		}
	} else {
		fmt.Fprintln(c.err, "foulcase: the pairs do not make the model clearly better; its channel stays as it was")
	}
	if h.flags.rebuild {
		if err := b.findConfusables(ctx); err != nil {
			return err
		}
	}
	return b.write()
}

// moved reports whether the channel was blended with the pairs at all.
func (h *houseFit) moved() bool { return !math.IsInf(h.strength, 1) }

// note has the model say what its channel was fitted to and which parts are of
// the channel before.
func (h *houseFit) note(c *console, b *builder, from string) error {
	if section, ok := b.held[foulcase.SectionFitted]; ok {
		fitted, err := channel.OpenFitted(section)
		if err != nil {
			return naming(h.flags.from, err)
		}
		b.held[foulcase.SectionFitted] = fitted.With(h.found.pairs)
	}
	var stale []string
	if !h.flags.rebuild {
		stale = append(stale, "table of confusable words")
	}
	if _, ok := b.held[foulcase.SectionCalibration]; ok {
		stale = append(stale, "calibration")
		fmt.Fprintln(c.err, "foulcase: the calibration was learned with the channel before; foulcase model calibrate learns it anew")
	}
	card := fmt.Appendf(bytes.TrimRight(b.held[foulcase.SectionCard], "\n"),
		"\n\n## A house's corrections\n\nThe channel of model %s, for as much as %g pairs, was blended with %d pairs of a house.\n", from, h.strength, len(h.found.pairs))
	for _, part := range stale {
		card = fmt.Appendf(card, "The %s is of the channel before.\n", part)
	}
	b.held[foulcase.SectionCard] = bytes.TrimLeft(card, "\n")
	return nil
}

func (h *houseFit) leftOut() string {
	if len(h.found.left) == 0 {
		return "none"
	}
	var parts []string
	for _, l := range h.found.left {
		parts = append(parts, fmt.Sprintf("%d %s", l.N, l.Why))
	}
	return strings.Join(parts, "; ")
}

// fitObject is what channel fit read and chose, as --emit jsonl prints it.
type fitObject struct {
	Pairs    int       `json:"pairs"`
	Learned  int       `json:"learned"`
	Held     int       `json:"held"`
	Left     []leftOut `json:"left"`
	Strength *float64  `json:"strength"` // null: the channel stays as it was
	Rules    int       `json:"rules"`
	Fitted   int       `json:"fitted"` // of those held, what the model was fitted on before
}

// fitMetric is a metric of the pairs set apart.
type fitMetric struct {
	Model string `json:"model"`
	eval.Metric
}

// print reports on the fit.
func (h *houseFit) print(w io.Writer) error {
	if h.flags.emit.value == "jsonl" {
		return h.printObjects(w)
	}
	strength := "not at all"
	if h.moved() {
		strength = fmt.Sprintf("the channel counting for %g pairs, %d rules more", h.strength, h.report.Rules)
	}
	if _, err := fmt.Fprintf(w, "%d pairs (left out: %s)\nblended: %s\n%d pairs set apart, before and after learning from the other %d:\n%s",
		len(h.found.pairs), h.leftOut(), strength, len(h.held), len(h.learn), overlapLine(eval.TaskList, h.overlap)); err != nil {
		return err
	}
	t := eval.Table{Header: []string{"channel", "nats a pair", "first %", "among 5 %", "mrr %"}}
	for _, side := range h.sides() {
		row := []string{side.name, fmt.Sprintf("%.3f", side.likelihood)}
		for _, name := range fitMetrics {
			m, _ := side.ranks.Metric(name, "")
			row = append(row, fmt.Sprintf("%.1f [%.1f, %.1f]", 100*m.Value, 100*m.Low, 100*m.High))
		}
		t.Rows = append(t.Rows, row)
	}
	return t.WritePlain(w)
}

var fitMetrics = [...]string{"accuracy@1", "accuracy@5", "mrr"}

type fitSide struct {
	name string
	heldOut
}

func (h *houseFit) sides() []fitSide { return []fitSide{{"before", h.before}, {"after", h.after}} }

func (h *houseFit) printObjects(w io.Writer) error {
	enc := report.JSONLines(w)
	o := fitObject{Pairs: len(h.found.pairs), Learned: len(h.learn), Held: len(h.held), Left: h.found.left, Rules: h.report.Rules, Fitted: h.overlap.Fitted}
	if h.moved() {
		o.Strength = &h.strength
	}
	if err := enc.Encode(o); err != nil {
		return err
	}
	for _, side := range h.sides() {
		n := float64(len(h.held))
		none := eval.Number(math.NaN())
		metrics := []eval.Metric{{Name: "loglikelihood", Value: eval.Number(side.likelihood), Low: none, High: none, N: n}}
		for _, name := range fitMetrics {
			m, _ := side.ranks.Metric(name, "")
			metrics = append(metrics, m)
		}
		for _, m := range metrics {
			if err := enc.Encode(fitMetric{side.name, m}); err != nil {
				return err
			}
		}
	}
	return nil
}
