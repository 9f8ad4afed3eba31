package foulcase

import (
	"io"
	"strings"
	"testing"
	"testing/iotest"
)

func TestDirectivesLetStand(t *testing.T) {
	const source = `birth Lisk
# foulcase: stet Lisk with-out in
Lisk birth Lisk's in Lisk
# foulcase: off
birth
# foulcase: on
birth
# foulcase: off
tail birth`
	heard := newDirectives()
	if _, err := io.Copy(io.Discard, heard.read(iotest.OneByteReader(strings.NewReader(source)))); err != nil {
		t.Fatal(err)
	}
	for name, d := range map[string]*directives{"read": heard, "at hand": directivesOf([]byte(source))} {
		for _, tt := range []struct {
			before, observed string // the mark stands right behind before
			want             bool
		}{
			{"", "birth", false},
			{"birth ", "Lisk", false}, // too early
			{"foulcase: stet ", "Lisk", true},
			{"with-out in\n", "Lisk", true},
			{"with-out in\nLisk ", "birth", false},
			{"Lisk birth ", "Lisk's", true},
			{"Lisk birth Lisk's ", "in LISK", true},
			{"# foulcase: off\n", "birth", true},
			{"# foulcase: on\n", "birth", false},
			{"tail ", "birth", true},
		} {
			from := int64(strings.Index(source, tt.before+tt.observed[:1]) + len(tt.before))
			if got := d.stand(from, from+int64(len(tt.observed)), tt.observed); got != tt.want {
				t.Errorf("%s: %q behind %q stands: %v", name, tt.observed, tt.before, got)
			}
		}
	}
}

func TestDirectivesWithoutEndAreBounded(t *testing.T) {
	d := directivesOf([]byte(strings.Repeat("# foulcase: on\n", 2*maxDirectives)))
	if len(d.silent) != maxDirectives {
		t.Errorf("%d stretches", len(d.silent))
	}
}
