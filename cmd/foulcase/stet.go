package main

import (
	"cmp"
	"fmt"
	"io"
	"maps"
	"slices"
	"strings"
	"unicode"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
	"example.org/foulcase/internal/report"
	"github.com/spf13/pflag"
)

func stetVerb() verb {
	return verb{
		name:     "stet",
		operands: "[WORD...]",
		summary:  "record which marks to let stand, and which were right",
		about: `
Keeps decisions about marks in the file that the settings name as stets, or in
the user's own: JSON Lines, an object a decision. From then on proof and editor
let stand what was let stand.

  foulcase stet --everywhere WORD...    these forms stand in all documents
  foulcase stet --from marks.jsonl      these marks stand, here alone
  foulcase stet --from - --accept       these marks were right

--from reads marks as proof --emit jsonl prints them: all of them, or those that
--at picks; with --everywhere their forms stand in all documents. Run it where
proof was run, since paths are taken from there. What was decided is data:

  --list    every decision
  --pairs   what was observed, intended and how often, parted by tabs, as
            model build --pairs and eval list read it; no repeated words
  --good    the text around the marks that stand, a line each, as model
            calibrate reads good text; none with a form that was corrected

A decision is taken back by deleting its line in that file.`,
		examples: `
			foulcase stet --list
			foulcase stet --pairs`,
		declare: declareStet,
	}
}

// stetFlags are what the user asked of stet.
type stetFlags struct {
	engine            engineFlags
	everywhere        bool
	accept            bool
	from              string
	at                []string
	list, pairs, good bool
	emit              *choice
}

func declareStet(fs *pflag.FlagSet) action {
	f := &stetFlags{}
	f.engine.set = fs
	fs.BoolVar(&f.everywhere, "everywhere", false, "let the forms stand in all documents")
	fs.StringVar(&f.from, "from", "", "`FILE` of marks, as proof --emit jsonl prints them; - is standard input")
	fs.StringArrayVar(&f.at, "at", nil, "with --from: only the mark at `PATH:LINE:COLUMN`; may be repeated")
	fs.BoolVar(&f.accept, "accept", false, "with --from: the first corrections of the marks were right")
	fs.BoolVar(&f.list, "list", false, "print the decisions")
	fs.BoolVar(&f.pairs, "pairs", false, "print the corrections that were right, as pairs")
	fs.BoolVar(&f.good, "good", false, "print the text around the marks that stand")
	f.emit = emitFlag(fs)
	configFlag(fs, &f.engine.config)
	return f.run
}

func (f *stetFlags) run(c *console, words []string) (status, error) {
	if err := f.check(words); err != nil {
		return trouble, err
	}
	found := f.engine.settings()
	here, err := found.For(standardInput)
	if err != nil {
		return trouble, err
	}
	switch {
	case f.list:
		return clean, f.printDecisions(c.out, here.Decisions())
	case f.pairs:
		return clean, printPairs(c.out, here.Decisions())
	case f.good:
		return clean, printGood(c.out, here.Decisions())
	case f.from != "":
		return clean, f.recordMarks(c, found)
	}
	var decisions []decided
	for _, word := range words {
		decisions = append(decisions, decided{here, house.Decision{Decision: house.Stet, Scope: house.Everywhere, Observed: word}})
	}
	return clean, recordAll(c, decisions)
}

// check refuses flags that do not go together.
func (f *stetFlags) check(words []string) error {
	jobs := 0
	for _, asked := range []bool{f.list, f.pairs, f.good, f.from != "", len(words) > 0} {
		if asked {
			jobs++
		}
	}
	switch {
	case jobs == 0:
		return misusef("nothing to do; give --everywhere WORD..., --from FILE, --list, --pairs or --good")
	case jobs > 1:
		return misusef("one thing at a time: either WORD..., --from, --list, --pairs or --good")
	case len(words) > 0 && !f.everywhere:
		return misusef("words stand in all documents or in none; say --everywhere")
	case f.from == "" && (f.accept || len(f.at) > 0):
		return misusef("--accept and --at pick marks; give them with --from")
	case f.accept && f.everywhere:
		return misusef("--accept says that marks were right, --everywhere that they were wrong")
	}
	return nil
}

func (f *stetFlags) printDecisions(w io.Writer, decisions []house.Decision) error {
	enc := report.JSONLines(w)
	for _, d := range decisions {
		if f.emit.value == "jsonl" {
			if err := enc.Encode(d); err != nil {
				return err
			}
			continue
		}
		if _, err := fmt.Fprintln(w, report.Visible(decisionLine(d))); err != nil {
			return err
		}
	}
	return nil
}

// decisionLine puts a decision in words.
func decisionLine(d house.Decision) string {
	switch {
	case d.Decision == house.Corrected:
		return fmt.Sprintf("corrected %q -> %q", d.Observed, d.Intended)
	case d.Scope == house.Everywhere:
		return fmt.Sprintf("stet everywhere %q", d.Observed)
	}
	return fmt.Sprintf("stet here %q in %s: %s", d.Observed, d.Path, d.Context)
}

// printPairs prints what was corrected, the most frequent first. A word written twice is
// no other spelling of it.
func printPairs(w io.Writer, decisions []house.Decision) error {
	counts := map[string]int{}
	for _, d := range decisions {
		if d.Decision == house.Corrected && d.Kind != foulcase.Repeat.String() {
			counts[oneLine(d.Observed)+"\t"+oneLine(d.Intended)]++
		}
	}
	for _, pair := range slices.SortedFunc(maps.Keys(counts), func(a, b string) int {
		return cmp.Or(cmp.Compare(counts[b], counts[a]), cmp.Compare(a, b))
	}) {
		if _, err := fmt.Fprintf(w, "%s\t%d\n", pair, counts[pair]); err != nil {
			return err
		}
	}
	return nil
}

// printGood prints the contexts of the marks that stand, each once, but not those in
// which something else was corrected.
func printGood(w io.Writer, decisions []house.Decision) error {
	var corrected []string
	for _, d := range decisions {
		if d.Decision == house.Corrected {
			corrected = append(corrected, oneLine(d.Observed))
		}
	}
	seen := map[string]bool{}
	for _, d := range decisions {
		context := oneLine(d.Context)
		if d.Decision != house.Stet || context == "" || seen[context] || holdsAny(context, corrected, d.Observed) {
			continue
		}
		seen[context] = true
		if _, err := fmt.Fprintln(w, context); err != nil {
			return err
		}
	}
	return nil
}

// holdsAny tells whether one of the forms, but that which stands, is among the words of
// a context.
func holdsAny(context string, forms []string, stands string) bool {
	words := " " + strings.Join(strings.FieldsFunc(context, isNoLetter), " ") + " "
	return slices.ContainsFunc(forms, func(form string) bool {
		form = strings.Join(strings.FieldsFunc(form, isNoLetter), " ")
		return form != stands && strings.Contains(words, " "+form+" ")
	})
}

func isNoLetter(r rune) bool { return !unicode.IsLetter(r) && !unicode.IsMark(r) }

// oneLine is text with a single space for any white space.
func oneLine(s string) string { return strings.Join(strings.Fields(s), " ") }
