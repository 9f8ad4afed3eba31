package report

import (
	"bytes"
	"testing"

	"example.org/foulcase"
)

func TestAnnotations(t *testing.T) {
	runon := foulcase.Mark{
		Line: 3, Column: 14, Observed: "alot", Kind: foulcase.Runon, Grade: foulcase.GradeMark, P: 0.97,
		Corrections: []foulcase.Correction{{Text: "a lot"}, {Text: "allot"}},
	}
	repeat := foulcase.Mark{
		Line: 3, Column: 14, Observed: "100%\r\n  the", Kind: foulcase.Repeat, P: 0.4,
		Corrections: []foulcase.Correction{{Text: "the"}},
	}
	packed := runon
	packed.Part = "content.xml"
	for _, test := range []struct {
		path string
		mark foulcase.Mark
		want string
	}{
		{"log/a.txt", runon, `::warning file=log/a.txt,line=3,endLine=3,col=14,endColumn=18,title=foulcase%3A runon::"alot": probably "a lot", "allot" (p 0.97)`},
		{"100%, a:b\n", repeat, `::notice file=100%25%2C a%3Ab%0A,line=3,endLine=4,title=foulcase%3A repeat::"100%25\r\n  the": perhaps "the" (p 0.40)`},
		{"a.odt", packed, `::warning file=a.odt,title=foulcase%3A runon::"alot": probably "a lot", "allot" (p 0.97)`},
	} {
		var out bytes.Buffer
		if err := (annotations{}).Page(&out, Document{Path: test.path}).Mark(test.mark); err != nil || out.String() != test.want+"\n" {
			t.Errorf("got\n%s, %v; want\n%s", out.String(), err, test.want)
		}
	}
}

func TestEndOf(t *testing.T) {
	for observed, want := range map[string][2]int{
		"the":         {2, 8},
		"naïve":       {2, 10},
		"the\nthe":    {3, 4},
		"the\r\nthe":  {3, 4},
		"a\r  \r\n é": {4, 3},
	} {
		line, column := endOf(foulcase.Mark{Line: 2, Column: 5, Observed: observed})
		if line != want[0] || column != want[1] {
			t.Errorf("%q ends at %d:%d, want %v", observed, line, column, want)
		}
	}
}
