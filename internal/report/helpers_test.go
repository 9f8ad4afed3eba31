package report

import (
	"bytes"
	"context"
	"strings"
	"sync"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/lm/english"
)

// engine is the embedded English model, opened once for all tests.
var engine = sync.OnceValues(func() (*foulcase.Engine, error) { return foulcase.Open(english.Model()) })

// marksOf proofreads a document.
func marksOf(t testing.TB, source string, o foulcase.Options) []foulcase.Mark {
	t.Helper()
	e, err := engine()
	if err != nil {
		t.Fatal(err)
	}
	var marks []foulcase.Mark
	for m, err := range e.Proof(context.Background(), strings.NewReader(source), o) {
		if err != nil {
			t.Fatal(err)
		}
		marks = append(marks, m)
	}
	return marks
}

// written is the report of documents in a form.
func written(t testing.TB, name string, documents ...Document) string {
	t.Helper()
	form, err := New(name, Settings{Version: "1.2", Model: func() string { return "0123456789abcdef" }})
	if err != nil {
		t.Fatal(err)
	}
	var out bytes.Buffer
	w, err := NewWriter(&out, form)
	if err != nil {
		t.Fatal(err)
	}
	for i, d := range documents {
		d.Number = i + 1
		var text bytes.Buffer
		page := form.Page(&text, d)
		for _, m := range marksOf(t, string(d.Source), d.Options) {
			if err := page.Mark(m); err != nil {
				t.Fatal(err)
			}
		}
		if err := page.Close(true); err != nil {
			t.Fatal(err)
		}
		if err := w.Add(text.Bytes()); err != nil {
			t.Fatal(err)
		}
	}
	if err := w.Close(true); err != nil {
		t.Fatal(err)
	}
	return out.String()
}

// papers are documents with marks of several kinds, and one without any.
func papers() []Document {
	return []Document{
		{Path: "log/watch 3.txt", Source: []byte("The café at the pier recieved us – “at noon” – before the\nthe fog.\n")},
		{Path: "log/good.txt", Source: []byte("The tug let go her anchor near the pier.\n")},
		{Path: "log/naïve.md", Source: []byte("# Notice\r\n\r\nAlot of rain fell on the <quay> & the launch came alongsyde."), Options: foulcase.Options{Format: "markdown"}},
	}
}
