package eval

import (
	"cmp"
	"fmt"
)

// An Outcome is what a flag turned out to be.
type Outcome uint8

const (
	Wrong   Outcome = iota // a false alarm: nothing is wrong there
	Right                  // it finds an error
	Neither                // on neutral ground, or one more flag on an error already found
)

// A Verdict is what became of one error.
type Verdict struct {
	Span Span
	Flag int // the flag that finds it, -1 where none does
	Rank int // the place of a right correction among the flag's, from 1; 0 where there is none
}

// Judge holds the flags of one item against its errors. A flag finds an error
// when the two overlap; of several flags on one error, the one with the best
// correction finds it. A correction is right when it makes of the text what the
// error's correction makes of it, whatever bytes the flag covers. Case and the
// kind of apostrophe do not count. There is an outcome for each flag and a
// verdict for each span that is not neutral.
func Judge(item Item, flags []Flag) ([]Outcome, []Verdict, error) {
	for _, f := range flags {
		if f.Start < 0 || f.End < f.Start || f.End > len(item.Source) {
			return nil, nil, fmt.Errorf("line %d: flag of %q at bytes %d to %d of a text of %d", item.Line, f.Observed, f.Start, f.End, len(item.Source))
		}
	}
	outcomes := make([]Outcome, len(flags))
	var verdicts []Verdict
	for _, span := range item.Spans {
		v := Verdict{Span: span, Flag: -1}
		for i, f := range flags {
			if f.Start >= span.End || span.Start >= f.End {
				continue
			}
			if outcomes[i] == Wrong {
				outcomes[i] = Neither
			}
			if rank := correctionRank(item.Source, span, f); v.Flag < 0 || better(rank, v.Rank) {
				v.Flag, v.Rank = i, rank
			}
		}
		if span.Neutral {
			continue
		}
		if v.Flag >= 0 {
			outcomes[v.Flag] = Right
		}
		verdicts = append(verdicts, v)
	}
	return outcomes, verdicts, nil
}

// better says whether one rank beats another; 0 is none.
func better(a, b int) bool {
	return a > 0 && (b == 0 || cmp.Less(a, b))
}

// correctionRank returns the place of the first right correction, or 0.
func correctionRank(source string, span Span, f Flag) int {
	lo, hi := min(span.Start, f.Start), max(span.End, f.End)
	for i, correction := range f.Corrections {
		got := reading(source[lo:f.Start] + correction + source[f.End:hi])
		for _, want := range span.Corrections {
			if got == reading(source[lo:span.Start]+want+source[span.End:hi]) {
				return i + 1
			}
		}
	}
	return 0
}
