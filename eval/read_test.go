package eval_test

import (
	"errors"
	"reflect"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

func TestReadPairs(t *testing.T) {
	got, err := eval.ReadPairs("slips.tsv", strings.NewReader(
		"\ufefflaunh\tlaunch\r\n\nalot\ta lot\t3\tmw\nwithin\twith in\nbirth\tberth\t1\t-\n"))
	want := []eval.Pair{
		{Line: 1, Observed: "launh", Intended: "launch", Count: 1},
		{Line: 3, Observed: "alot", Intended: "a lot", Count: 3, Spaces: true},
		{Line: 4, Observed: "within", Intended: "with in", Count: 1, Spaces: true},
		{Line: 5, Observed: "birth", Intended: "berth", Count: 1},
	}
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("%+v, %v", got, err)
	}
}

func TestReadSentences(t *testing.T) {
	columns, err := eval.ParseColumns("source, reference,full,-,document,rewrite")
	if err != nil {
		t.Fatal(err)
	}
	got, err := eval.ReadSentences("log.tsv", strings.NewReader(
		"a\tb\tc\t7\twatch 1\td\te\n\nA\tB\tC\t0\twatch 2\n"), columns)
	want := []eval.Sentence{
		{Line: 1, Document: "watch 1", Source: "a", References: []string{"b"}, Full: []string{"c"}, Rewrites: []string{"d", "e"}},
		{Line: 3, Document: "watch 2", Source: "A", References: []string{"B"}, Full: []string{"C"}},
	}
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("%+v, %v", got, err)
	}
	natural := []eval.Column{eval.Source, eval.Reference, eval.Observed, eval.Intended, eval.Document}
	got, err = eval.ReadSentences("log.tsv", strings.NewReader("At birth 4.\tAt berth 4.\tbirth\tberth\t12\n"), natural)
	if err != nil || got[0].Observed != "birth" || got[0].Intended != "berth" || got[0].Document != "12" {
		t.Errorf("%+v, %v", got, err)
	}
	got, err = eval.ReadSentences("log.tsv", strings.NewReader("a\tb\tc\t\td\n"), eval.PlainColumns)
	if err != nil || !reflect.DeepEqual(got[0].References, []string{"b", "c", "d"}) {
		t.Errorf("%+v, %v", got, err)
	}
}

func TestReadClean(t *testing.T) {
	got, err := eval.ReadClean("notices.txt", strings.NewReader("\nOne.\nTwo.\n \n\nThree.\n"))
	want := []eval.Item{
		{Line: 2, Document: "1", Source: "One."},
		{Line: 3, Document: "1", Source: "Two."},
		{Line: 6, Document: "2", Source: "Three."},
	}
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("%+v, %v", got, err)
	}
}

func TestParseColumnsRefuses(t *testing.T) {
	for _, list := range []string{"", "source", "reference", "source,reference,source", "source,refrence", "source,full", "source,reference,document,document"} {
		if columns, err := eval.ParseColumns(list); err == nil {
			t.Errorf("%q gives %q", list, columns)
		}
	}
}

// Bad data is named by file and line.
func TestReadersRefuse(t *testing.T) {
	pairs := func(s string) error {
		_, err := eval.ReadPairs("data.tsv", strings.NewReader(s))
		return err
	}
	plain := func(s string) error {
		_, err := eval.ReadSentences("data.tsv", strings.NewReader(s), eval.PlainColumns)
		return err
	}
	natural := func(s string) error {
		_, err := eval.ReadSentences("data.tsv", strings.NewReader(s), []eval.Column{eval.Source, eval.Reference, eval.Document})
		return err
	}
	clean := func(s string) error {
		_, err := eval.ReadClean("data.tsv", strings.NewReader(s))
		return err
	}
	for _, c := range []struct {
		read  func(string) error
		input string
		line  int
	}{
		{pairs, "a\tb\nalone\n", 2},
		{pairs, "a\tb\t1\t-\t9\n", 1},
		{pairs, "a\t \n", 1},
		{pairs, "a\tb\tmany\n", 1},
		{pairs, "a\tb\t0\n", 1},
		{pairs, "a\tb\n\n\xff\tb\n", 3},
		{pairs, "a\tb\n" + strings.Repeat("x", 2<<20), 2},
		{plain, "a\tb\n\tb\n", 2},
		{plain, "alone\n", 1},
		{plain, "a\t \n", 1},
		{natural, "a\tb\n", 1},
		{natural, "a\tb\tpage\tmore\n", 1},
		{clean, "fine\n\xc3(\n", 2},
	} {
		err := c.read(c.input)
		var at *eval.LineError
		if !errors.As(err, &at) || at.File != "data.tsv" || at.Line != c.line {
			t.Errorf("%.40q: error %v, want one for data.tsv:%d", c.input, err, c.line)
		}
	}
}

func FuzzReaders(f *testing.F) {
	f.Add("launh\tlaunch\t2\t-\nalot\ta lot\t1\tmw\n")
	f.Add("At birth 4.\tAt berth 4.\tbirth\tberth\t12\n")
	f.Add("\ufeff\r\n\t\t\n\xff")
	natural := []eval.Column{eval.Source, eval.Reference, eval.Observed, eval.Intended, eval.Document}
	f.Fuzz(func(t *testing.T, data string) {
		check := func(n int, err error) {
			var at *eval.LineError
			if err != nil && (!errors.As(err, &at) || at.File != "f" || at.Line < 1 || at.Line > 1+strings.Count(data, "\n")) {
				t.Fatalf("error %v names no line of the file", err)
			}
			if err == nil && n > 1+strings.Count(data, "\n") {
				t.Fatalf("%d items", n)
			}
		}
		pairs, err := eval.ReadPairs("f", strings.NewReader(data))
		check(len(pairs), err)
		for _, columns := range [][]eval.Column{eval.PlainColumns, natural} {
			s, err := eval.ReadSentences("f", strings.NewReader(data), columns)
			check(len(s), err)
		}
		items, err := eval.ReadClean("f", strings.NewReader(data))
		check(len(items), err)
	})
}
