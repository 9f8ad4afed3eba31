package eval_test

import (
	"errors"
	"reflect"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

func TestReadIntended(t *testing.T) {
	got, err := eval.ReadIntended("slips.dat", strings.NewReader(
		"\ufeff$harbour\r\nharber 3\nharbuor\n\n$a_lot\nalot\n$empty\n$pilot\n  pi_lot 2  \n"))
	want := []eval.Pair{
		{Line: 2, Observed: "harber", Intended: "harbour", Count: 3},
		{Line: 3, Observed: "harbuor", Intended: "harbour", Count: 1},
		{Line: 6, Observed: "alot", Intended: "a lot", Count: 1, Spaces: true},
		{Line: 9, Observed: "pi lot", Intended: "pilot", Count: 2, Spaces: true},
	}
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("%+v, %v", got, err)
	}
}

func TestReadCSV(t *testing.T) {
	for _, c := range []struct{ about, columns, data string }{
		{"usual names", "", "\ufeffIntended,note,Observed,count\nharbour,\"seen,\nat noon\",harber,3\na lot,,alot,1\n"},
		{"its own names", "observed=typed,intended=meant,count=times", "typed,meant,times\r\nharber,harbour,3\r\n\r\n\r\n\"alot\", a lot ,1\r\n"},
	} {
		columns, err := eval.ParseCSVColumns(c.columns)
		if err != nil {
			t.Fatal(err)
		}
		got, err := eval.ReadCSV("slips.csv", strings.NewReader(c.data), columns)
		want := []eval.Pair{
			{Line: 2, Observed: "harber", Intended: "harbour", Count: 3},
			{Line: 4, Observed: "alot", Intended: "a lot", Count: 1, Spaces: true},
		}
		if c.columns != "" {
			want[1].Line = 5
		}
		if err != nil || !reflect.DeepEqual(got, want) {
			t.Errorf("%s: %+v, %v", c.about, got, err)
		}
	}
	if got, err := eval.ReadCSV("slips.csv", strings.NewReader("observed,intended\nbouy,buoy\n"), eval.CSVColumns{}); err != nil || got[0].Count != 1 {
		t.Errorf("without counts: %+v, %v", got, err)
	}
	for _, list := range []string{"typed", "observed=", "typed=observed", "observed=a,observed=b"} {
		if columns, err := eval.ParseCSVColumns(list); err == nil {
			t.Errorf("columns %q give %+v", list, columns)
		}
	}
}

// Two annotators: both mend the launch; the first joins "with in" and mends the
// grammar; the second changes a capital. The third sentence nobody annotated.
const annotated = `S The launh will sails with in the Hour .
A 1 2|||R:SPELL|||launch|||REQUIRED|||-NONE-|||0
A 3 4|||R:VERB:FORM|||sail||sailed|||REQUIRED|||-NONE-|||0
A 4 6|||R:ORTH|||within|||REQUIRED|||-NONE-|||0
A 7 8|||R:ORTH|||hour|||REQUIRED|||-NONE-|||1
A 1 2|||r:spell|||launch|||REQUIRED|||-NONE-|||1

S The tide it is high .
A 2 3|||U:PRON||||||REQUIRED|||-NONE-|||0
A 4 5|||UNK|||high|||REQUIRED|||-NONE-|||0
A -1 -1|||noop|||-NONE-|||REQUIRED|||-NONE-|||1
S Moor alongside .
`

func TestReadM2(t *testing.T) {
	got, err := eval.ReadM2("log.m2", strings.NewReader(annotated))
	want := []eval.Sentence{
		{
			Line: 1, Source: "The launh will sails with in the Hour .",
			References: []string{"The launch will sails within the Hour .", "The launch will sails with in the hour ."},
			Full:       []string{"The launch will sail within the Hour ."},
		},
		{
			Line: 8, Source: "The tide it is high .",
			References: []string{"The tide it is high .", "The tide it is high ."},
			Full:       []string{"The tide is ."},
		},
		{Line: 12, Source: "Moor alongside .", References: []string{"Moor alongside ."}},
	}
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("%+v, %v", got, err)
	}
	item := eval.Gold(got[0], knows("launh"))
	kinds := map[string]string{}
	for _, s := range item.Spans {
		kinds[item.Source[s.Start:s.End]] = string(s.Kind)
		if s.Neutral {
			kinds[item.Source[s.Start:s.End]] = "neutral"
		}
	}
	if want := map[string]string{"launh": "nonword", "with in": "split", "sails": "neutral", "Hour": "neutral"}; !reflect.DeepEqual(kinds, want) {
		t.Errorf("%v, want %v", kinds, want)
	}
}

// Bad data is named by file and line, with what to write instead.
func TestShapesRefuse(t *testing.T) {
	intended := func(s string) error {
		_, err := eval.ReadIntended("data", strings.NewReader(s))
		return err
	}
	values := func(s string) error {
		_, err := eval.ReadCSV("data", strings.NewReader(s), eval.CSVColumns{})
		return err
	}
	m2 := func(s string) error {
		_, err := eval.ReadM2("data", strings.NewReader(s))
		return err
	}
	edit := func(places, annotator string) string {
		return "S one two\n\nS three four\nA " + places + "|||R:SPELL|||five|||REQUIRED|||-NONE-|||" + annotator + "\n"
	}
	for _, c := range []struct {
		read   func(string) error
		input  string
		line   int
		remedy string
	}{
		{intended, "harber\n", 1, "begin with a line such as $harbour"},
		{intended, "$harbour\nharber\n$\n", 3, "write the intended form there"},
		{intended, "$a\nb 0\n", 2, "whole number from 1"},
		{intended, "$a\nb c 3\n", 2, "as an underscore"},
		{intended, "$a\n___\n", 2, "empty word"},
		{intended, "$a\n\xff\n", 2, "convert the file"},
		{values, "typed,intended\na,b\n", 1, "name the header's columns"},
		{values, "observed,intended\n\na,b\nc\n", 4, "tab-separated"},
		{values, "observed,intended\na,\"b\n", 2, "mend the line"},
		{values, "observed,intended\na,\n", 2, "empty word"},
		{values, "observed,intended,count\na,b,many\n", 2, "whole number from 1"},
		{values, "observed,intended\na,\xff\n", 2, "convert the file"},
		{m2, "T one\n", 1, "want a sentence"},
		{m2, "A 0 1|||R:SPELL|||five|||REQUIRED|||-NONE-|||0\n", 1, "put the line S"},
		{m2, "S one\nA 0 1|||R:SPELL|||five\n", 2, "want 6 parted by |||"},
		{m2, "S \n", 1, "empty sentence"},
		{m2, edit("1 3", "0"), 4, "two numbers from 0 to 2"},
		{m2, edit("1", "0"), 4, "two numbers from 0 to 2"},
		{m2, edit("1 0", "0"), 4, "the first not above the second"},
		{m2, edit("0 1", "x"), 4, "want a number"},
		{m2, edit("0 2", "0") + "A 1 2|||R:SPELL|||six|||REQUIRED|||-NONE-|||0\n", 5, "edited twice by annotator 0"},
	} {
		err := c.read(c.input)
		var at *eval.LineError
		if !errors.As(err, &at) || at.File != "data" || at.Line != c.line || !strings.Contains(err.Error(), c.remedy) {
			t.Errorf("%.60q: error %v, want one for data:%d with %q", c.input, err, c.line, c.remedy)
		}
	}
}

func FuzzShapes(f *testing.F) {
	f.Add("$harbour\nharber 3\n\n$a_lot\nalot\n")
	f.Add("observed,intended,count\n\"har\nber\",harbour,3\n")
	f.Add(annotated)
	f.Add("S a\nA 0 0|||M|||b|||R|||N|||0\nA 0 0|||M:SPELL|||c|||R|||N|||0\n")
	f.Fuzz(func(t *testing.T, data string) {
		lines := 1 + strings.Count(data, "\n") + strings.Count(data, "\r")
		check := func(n int, err error) {
			var at *eval.LineError
			if err != nil && (!errors.As(err, &at) || at.File != "f" || at.Line < 1 || at.Line > lines) {
				t.Fatalf("error %v names no line of the file", err)
			}
			if err == nil && n > lines {
				t.Fatalf("%d items", n)
			}
		}
		pairs, err := eval.ReadIntended("f", strings.NewReader(data))
		check(len(pairs), err)
		for _, p := range pairs {
			if p.Observed == "" || p.Intended == "" || p.Count < 1 {
				t.Fatalf("%+v", p)
			}
		}
		pairs, err = eval.ReadCSV("f", strings.NewReader(data), eval.CSVColumns{})
		check(len(pairs), err)
		sentences, err := eval.ReadM2("f", strings.NewReader(data))
		check(len(sentences), err)
		for _, s := range sentences {
			for _, span := range eval.Gold(s, func(string) bool { return true }).Spans {
				if span.Start < 0 || span.End < span.Start || span.End > len(s.Source) {
					t.Fatalf("span %+v of %q", span, s.Source)
				}
			}
		}
	})
}
