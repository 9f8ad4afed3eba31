package report

import (
	"testing"

	"example.org/foulcase"
)

func TestLine(t *testing.T) {
	berth := foulcase.Mark{
		Line: 3, Column: 14, Observed: "birth", Kind: foulcase.Realword, Grade: foulcase.GradeMark, P: 0.971,
		Corrections: []foulcase.Correction{{Text: "berth", P: 0.96}},
	}
	packed := berth
	packed.Part = "word/document.xml"
	several := foulcase.Mark{
		Line: 1, Column: 1, Observed: "peer\x1b[2J", Kind: foulcase.Nonword, P: 0.9996,
		Corrections: []foulcase.Correction{{Text: "pier"}, {Text: "pear"}, {Text: "peer"}, {Text: "per"}},
	}
	for _, test := range []struct {
		path    string
		mark    foulcase.Mark
		palette Palette
		want    string
	}{
		{"watch.txt", berth, false, `watch.txt:3:14: mark realword "birth" -> "berth" (p 0.97)` + "\n"},
		{"watch.docx", packed, false, `watch.docx!word/document.xml:3:14: mark realword "birth" -> "berth" (p 0.97)` + "\n"},
		{"a\nb", several, false, `"a\nb":1:1: query nonword "peer\x1b[2J" -> "pier", "pear", "peer" (p 0.99)` + "\n"},
		{"w", berth, true, "\x1b[1mw:3:14:\x1b[0m \x1b[31mmark\x1b[0m realword \x1b[31m\"birth\"\x1b[0m" +
			" -> \x1b[32m\"berth\"\x1b[0m \x1b[2m(p 0.97)\x1b[0m\n"},
	} {
		if got := Line(test.path, test.mark, test.palette); got != test.want {
			t.Errorf("got\n%q, want\n%q", got, test.want)
		}
	}
}
