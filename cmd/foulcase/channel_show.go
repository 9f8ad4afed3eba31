package main

import (
	"cmp"
	"fmt"
	"io"
	"slices"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/channel"
	"example.org/foulcase/eval"
	"example.org/foulcase/internal/report"
	"github.com/spf13/pflag"
)

func channelShowVerb() verb {
	return verb{
		name:     "channel show",
		operands: "[WORD...]",
		summary:  "show what the error model knows, or why a word was typed",
		about: `
Without a WORD, prints the cheapest and the costliest rules by place (anywhere,
start, end, or whole: the rule is the word), -k of each: the letters meant,
those typed for them, and the cost in nats, -log P. With one, prints the best
candidates of each WORD and the cheapest steps by which each comes to it.

--emit jsonl prints an object a rule (place, intended, observed, cost), by place
and cost, all of them; or an object a candidate: word, text, channel (nats, a
cost) and steps ({kind, intended, observed, left, cost}, left being the letter
meant before, ^ at the start).`,
		examples: `
			foulcase channel show -k 5
			foulcase channel show -k 3 acress`,
		declare: declareChannelShow,
	}
}

// channelShowFlags are what the user asked of channel show.
type channelShowFlags struct {
	engine engineFlags
	k      count
	emit   *choice
}

func declareChannelShow(fs *pflag.FlagSet) action {
	f := &channelShowFlags{k: 10}
	f.engine.declare(fs)
	fs.VarP(&f.k, "count", "k", "how many rules or candidates at most")
	f.emit = emitFlag(fs)
	return f.run
}

func (f *channelShowFlags) run(c *console, words []string) (status, error) {
	e, o, err := f.engine.open()
	if err != nil {
		return trouble, err
	}
	defer e.Close()
	source, err := openSlipSource(f.engine.model)
	if err != nil {
		return trouble, err
	}
	defer source.close()
	if len(words) == 0 {
		return clean, f.printRules(c.out, source.channel)
	}
	for _, word := range words {
		ranking := e.Rank(word, foulcase.RankOptions{K: int(f.k), Variety: o.Variety, House: o.House})
		if err := f.printOrigins(c.out, source.channel, ranking); err != nil {
			return trouble, err
		}
	}
	return clean, nil
}

// places name where rules hold, by channel.Place.
var places = [...]string{"anywhere", "start", "end", "whole"}

// ruleObject is a rule as --emit jsonl prints it.
type ruleObject struct {
	Place    string  `json:"place"`
	Intended string  `json:"intended"`
	Observed string  `json:"observed"`
	Cost     float64 `json:"cost"` // nats
}

func rulesOf(m *channel.Model) []ruleObject {
	var rules []ruleObject
	for _, r := range m.Rules() {
		rules = append(rules, ruleObject{
			places[r.Place], spellSymbols(r.Intended[:r.NIntended]), spellSymbols(r.Observed[:r.NObserved]), float64(r.Cost),
		})
	}
	slices.SortStableFunc(rules, func(a, b ruleObject) int {
		return cmp.Or(slices.Index(places[:], a.Place)-slices.Index(places[:], b.Place), cmp.Compare(a.Cost, b.Cost),
			cmp.Compare(a.Intended, b.Intended), cmp.Compare(a.Observed, b.Observed))
	})
	return rules
}

func spellSymbols(side []channel.Symbol) string {
	var b strings.Builder
	for _, s := range side {
		b.WriteRune(s.Rune())
	}
	return b.String()
}

func (f *channelShowFlags) printRules(w io.Writer, m *channel.Model) error {
	rules := rulesOf(m)
	if f.emit.value == "jsonl" {
		enc := report.JSONLines(w)
		for _, r := range rules {
			if err := enc.Encode(r); err != nil {
				return err
			}
		}
		return nil
	}
	p := m.Prices()
	if _, err := fmt.Fprintf(w, "%d rules; a space left out costs %.2f nats, one put in %.2f, a wrong accent %.2f\n", len(rules), p.RunOn, p.Split, p.Accent); err != nil {
		return err
	}
	for _, place := range places {
		var here []ruleObject
		for _, r := range rules {
			if r.Place == place {
				here = append(here, r)
			}
		}
		if err := f.printPlace(w, place, here); err != nil {
			return err
		}
	}
	return nil
}

// printPlace prints the rules of one place, cheapest first; of many only those at
// either end.
func (f *channelShowFlags) printPlace(w io.Writer, place string, rules []ruleObject) error {
	if len(rules) == 0 {
		return nil
	}
	t := eval.Table{Header: []string{place, "meant", "typed", "nats"}}
	for i, r := range rules {
		end := ""
		switch i {
		case 0:
			end = "cheapest"
		case max(int(f.k), len(rules)-int(f.k)):
			end = "costliest"
		}
		if i < int(f.k) || i >= len(rules)-int(f.k) {
			t.Rows = append(t.Rows, []string{end, r.Intended, visibleSide(r.Observed), fmt.Sprintf("%.2f", r.Cost)})
		}
	}
	if _, err := fmt.Fprintln(w); err != nil {
		return err
	}
	return t.WritePlain(w)
}

// visibleSide shows letters left out as a dash.
func visibleSide(letters string) string { return cmp.Or(letters, "-") }
