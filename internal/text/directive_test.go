package text_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// scanDirectives writes a source to a scanner in pieces of n bytes.
func scanDirectives(source string, n int) []text.Directive {
	var found []text.Directive
	s := text.NewDirectiveScanner(func(d text.Directive) { found = append(found, d) })
	for piece := range slices.Chunk([]byte(source), n) {
		s.Write(piece)
	}
	s.Close()
	return found
}

func TestDirectives(t *testing.T) {
	for _, tt := range []struct {
		source, want string // what stands from Start to End, then the verb and the words
	}{
		{"foulcase: off", "foulcase: off=off"},
		{"\ufefffoulcase: off", "foulcase: off=off"},
		{"text\n  foulcase:on\r\nmore", "foulcase:on=on"},
		{"<!-- foulcase: stet Lisk Gannel -->", "foulcase: stet Lisk Gannel=stet Lisk Gannel"},
		{"<!--foulcase: stet Lisk-->, he said", "foulcase: stet Lisk=stet Lisk"},
		{"/* foulcase: stet Lisk,Gannel, Tolva */ x", "foulcase: stet Lisk,Gannel, Tolva=stet Lisk Gannel Tolva"},
		{"x := 1 // foulcase: stet o'clock", "foulcase: stet o'clock=stet o'clock"},
		{".. foulcase: off\n% foulcase: on", "foulcase: off=off foulcase: on=on"},
		{"{# foulcase: stet Tolva #}", "foulcase: stet Tolva=stet Tolva"},
		{"; foulcase: stet  Ængus\r; gone", "foulcase: stet  Ængus=stet Ængus"},
		{"# foulcase: stett Lisk", ""},
		{"# foulcase: stet", ""},
		{"# foulcase: on the slip", ""},
		{"Write `foulcase: off` there.", ""},
		{"He runs foulcase: off he goes", ""},
		{"# foulcase foulcase: off", ""},
		{"# foulcafoulcase: off", ""},
		{"# Foulcase: off", ""},
	} {
		for _, n := range []int{1, 3, len(tt.source)} {
			var got []string
			for _, d := range scanDirectives(tt.source, n) {
				got = append(got, fmt.Sprintf("%s=%s", tt.source[d.Start:d.End], strings.Join(append([]string{d.Verb}, d.Words...), " ")))
			}
			if s := strings.Join(got, " "); s != tt.want {
				t.Errorf("%q in pieces of %d: %q, want %q", tt.source, n, s, tt.want)
			}
		}
	}
}

func TestDirectiveWithoutEndIsBounded(t *testing.T) {
	found := scanDirectives("# foulcase: stet "+strings.Repeat("lisk ", 100_000), 1000)
	if len(found) != 1 || len(found[0].Words) > 1000 {
		t.Errorf("%d directives of %d words", len(found), len(found[0].Words))
	}
}

// FuzzDirectives holds the scanner to the same answer however the source is cut, and to
// places inside it.
func FuzzDirectives(f *testing.F) {
	f.Add("<!-- foulcase: stet Lisk -->\nfoulcase: off\nfoulcase:\n", uint8(3))
	f.Add("fofoulcase: on\xff\n", uint8(1))
	f.Fuzz(func(t *testing.T, source string, n uint8) {
		whole := scanDirectives(source, len(source)+1)
		cut := scanDirectives(source, int(n)+1)
		if fmt.Sprint(whole) != fmt.Sprint(cut) {
			t.Errorf("whole %v, in pieces of %d %v", whole, n+1, cut)
		}
		last := int64(0)
		for _, d := range whole {
			if d.Start < last || d.End <= d.Start || d.End > int64(len(source)) {
				t.Errorf("%v does not lie behind %d in %d bytes", d, last, len(source))
			}
			last = d.End
		}
	})
}
