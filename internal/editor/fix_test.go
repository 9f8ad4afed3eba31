package editor

import (
	"fmt"
	"strings"
	"testing"

	"example.org/foulcase"
)

// TestCorrectionsOfAFix: what only a hand should correct is left alone, whatever the
// fix, and so is what overlaps.
func TestCorrectionsOfAFix(t *testing.T) {
	mark := func(offset, length int64, observed string, grade foulcase.Grade, corrections ...string) foulcase.Mark {
		return foulcase.Mark{Offset: offset, Length: length, Observed: observed, Grade: grade, Corrections: forms(corrections...)}
	}
	byHand := mark(40, 6, "ancher", foulcase.GradeMark, "anchor")
	byHand.ByHand = true
	escaped := mark(50, 4, "alot", foulcase.GradeMark, "a lot")
	escaped.Corrections[0].Source = "a~lot"
	d := &document{marks: []foulcase.Mark{
		mark(0, 6, "ancher", foulcase.GradeMark, "anchor", "archer"),
		mark(3, 6, "her in", foulcase.GradeMark, "herein"), // overlaps the first
		mark(20, 6, "ancher", foulcase.GradeQuery, "archer", "anchor"),
		mark(30, 6, "Ancher", foulcase.GradeMark, "Anchor"),
		byHand,
		escaped,
		mark(60, 5, "birth", foulcase.GradeMark),
	}}
	for _, tt := range []struct {
		fix  fix
		want string
	}{
		{fix{Which: fixOne, Offset: 0, Length: 6}, "0 anchor"},
		{fix{Which: fixOne, Offset: 0, Length: 6, Choice: 1}, "0 archer"},
		{fix{Which: fixOne, Offset: 0, Length: 6, Choice: 2}, ""},
		{fix{Which: fixOne, Offset: 0, Length: 6, Choice: -1}, ""},
		{fix{Which: fixOne, Offset: 1, Length: 6}, ""},
		{fix{Which: fixOne, Offset: 40, Length: 6}, ""},
		{fix{Which: fixOne, Offset: 60, Length: 5}, ""},
		{fix{Which: fixAlike, Offset: 0, Length: 6}, "0 anchor, 20 anchor"},
		{fix{Which: fixAlike, Offset: 40, Length: 6}, "0 anchor, 20 anchor"},
		{fix{Which: fixEvery}, "0 anchor, 30 Anchor, 50 a~lot"},
		{fix{Which: "none", Offset: 0, Length: 6}, ""},
	} {
		var got []string
		for m, c := range d.corrections(tt.fix) {
			got = append(got, fmt.Sprint(m.Offset, " ", c.Spelled()))
		}
		if all := strings.Join(got, ", "); all != tt.want {
			t.Errorf("%+v: %s, want %s", tt.fix, all, tt.want)
		}
	}
}
