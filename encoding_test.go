package foulcase_test

import (
	"context"
	"fmt"
	"strings"
	"testing"

	"example.org/foulcase"
	"example.org/foulcase/internal/charset"
)

// watch has slips beside characters that encodings write in other lengths.
const watch = "The café at the pier recieved us – “at noon” – before the fog.\r\n\r\n" +
	"The launch came alongsyde the quay at dusk, and alot of rain fell."

// encoded is text in an encoding.
func encoded(t *testing.T, label, text string) string {
	t.Helper()
	e, err := charset.Find(label)
	if err != nil {
		t.Fatal(err)
	}
	b, err := e.Encode(text)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

func TestEncodingsGiveTheSameMarks(t *testing.T) {
	want := proof(t, watch, foulcase.Options{})
	if len(want) < 3 {
		t.Fatalf("%d marks, want three slips found", len(want))
	}
	for _, test := range []struct{ label, encodedAs, byteOrderMark string }{
		{"windows-1252", "windows-1252", ""},
		{"utf-16be", "utf-16be", ""},
		{"", "utf-16le", "\uFEFF"},
		{"", "utf-32be", "\uFEFF"},
		{"gb18030", "gb18030", ""},
	} {
		source := encoded(t, test.encodedAs, test.byteOrderMark+watch)
		o := foulcase.Options{Encoding: test.label}
		got := proof(t, source, o)
		if len(got) != len(want) {
			t.Fatalf("%s: %d marks, want %d", test.encodedAs, len(got), len(want))
		}
		for i, m := range got {
			observed, err := foulcase.DecodeText([]byte(source), o, m.Offset, m.Offset+m.Length)
			if err != nil || observed != want[i].Observed || m.Observed != want[i].Observed {
				t.Errorf("%s: offset %d says %q, the document %q, %v", test.encodedAs, m.Offset, m.Observed, observed, err)
			}
			if m.Line != want[i].Line || m.Column != want[i].Column || m.ByHand {
				t.Errorf("%s: %+v, want the place of %+v", test.encodedAs, m, want[i])
			}
		}
	}
}

func TestEncodingErrors(t *testing.T) {
	for _, label := range []string{"morse", "iso-2022-jp"} {
		o := foulcase.Options{Encoding: label}
		_, reviseErr := foulcase.Revise(nil, o, nil)
		for _, err := range engine().Proof(context.Background(), strings.NewReader(watch), o) {
			if err == nil || !strings.Contains(err.Error(), label) || fmt.Sprint(err) != fmt.Sprint(reviseErr) {
				t.Errorf("%s: %v and %v, want errors that name it", label, err, reviseErr)
			}
		}
	}
}

func TestRevise(t *testing.T) {
	document := []byte(encoded(t, "utf-16le", "\uFEFF"+watch))
	marks := proof(t, string(document), foulcase.Options{})
	for i := range marks {
		marks[i].Grade = foulcase.GradeMark
	}
	marks[1].Grade = foulcase.GradeQuery
	overlapping := marks[2]
	overlapping.Offset += 2
	marks = append(marks, overlapping)

	r, err := foulcase.Revise(document, foulcase.Options{}, marks)
	if err != nil {
		t.Fatal(err)
	}
	if len(r.Corrected) != len(r.Edits) || len(r.Left) != 2 || r.Left[0].Observed != marks[1].Observed {
		t.Errorf("corrected %v, left %v", r.Corrected, r.Left)
	}
	revised, err := r.Apply(document)
	if err != nil {
		t.Fatal(err)
	}
	want := watch
	for _, m := range r.Corrected {
		want = strings.Replace(want, m.Observed, m.Corrections[0].Text, 1)
	}
	if got, err := foulcase.DecodeText(revised, foulcase.Options{}, 0, int64(len(revised))); err != nil || got != "\uFEFF"+want {
		t.Errorf("revised %q, %v; want %q", got, err, want)
	}
}

// A document whose encoding lacks the correction's letters is left to its writer.
func TestCorrectionsThatCannotBeEncoded(t *testing.T) {
	const document = "They met in the cafee at noon."
	for label, byHand := range map[string]bool{"": false, "windows-1252": false, "koi8-r": true} {
		o := foulcase.Options{Encoding: label}
		marks := proof(t, document, o)
		if len(marks) != 1 || marks[0].ByHand != byHand || marks[0].Corrections[0].Text != "café" {
			t.Fatalf("%q: %+v, want one mark, by hand: %v", label, marks, byHand)
		}
		marks[0].Grade = foulcase.GradeMark
		r, err := foulcase.Revise([]byte(document), o, marks)
		if left := len(r.Left) == 1 && len(r.Edits) == 0; err != nil || left != byHand {
			t.Errorf("%q: revision %+v, %v", label, r, err)
		}
	}
}
