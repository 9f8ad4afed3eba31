package foulcase_test

import (
	"context"
	"errors"
	"strings"
	"testing"

	"example.org/foulcase"
)

// TestErrorsOfReading: what a caller may want to tell apart, it can.
func TestErrorsOfReading(t *testing.T) {
	for _, c := range []struct {
		document string
		options  foulcase.Options
		want     error
		says     string
	}{
		{"fog", foulcase.Options{Format: "parchment"}, foulcase.ErrFormat, `"parchment"`},
		{"fog", foulcase.Options{Encoding: "runes"}, foulcase.ErrEncoding, `"runes"`},
		{"fog", foulcase.Options{Encoding: "iso-2022-jp"}, foulcase.ErrEncoding, "convert"},
		{"{\"remark\": \"fog\n", foulcase.Options{Format: "jsonl"}, foulcase.ErrUnreadable, "line 1, column"},
		{"id,note\n1,fog\n", foulcase.Options{Format: "csv", Fields: []string{"remark"}}, foulcase.ErrUnreadable, `"remark"`},
		{"fog", foulcase.Options{Format: "docx"}, foulcase.ErrUnreadable, "save it anew"},
		{strings.Repeat("fog ", 5<<20), foulcase.Options{Format: "markdown"}, foulcase.ErrTooLarge, "split it"},
	} {
		var got error
		for _, err := range engine().Proof(context.Background(), strings.NewReader(c.document), c.options) {
			got = err
		}
		if !errors.Is(got, c.want) || !strings.Contains(got.Error(), c.says) {
			t.Errorf("%+v: %v, want %v that says %q", c.options, got, c.want, c.says)
		}
	}
}
