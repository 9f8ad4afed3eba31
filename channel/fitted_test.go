package channel_test

import (
	"encoding/binary"
	"errors"
	"fmt"
	"testing"

	"example.org/foulcase/channel"
)

func TestFitted(t *testing.T) {
	section := channel.FittedSection([]channel.Pair{
		{Observed: "ancher", Intended: "anchor"},
		{Observed: "alot", Intended: "a lot", Spaced: true},
		{Observed: "pilots's", Intended: "pilot's"},
		{Observed: "ancher", Intended: "anchor", Count: 4},
	})
	f, err := channel.OpenFitted(section)
	if err != nil {
		t.Fatal(err)
	}
	if f.Len() != 3 {
		t.Errorf("%d pairs, want 3: one came twice", f.Len())
	}
	for _, c := range []struct {
		observed, intended string
		want               bool
	}{
		{"ancher", "anchor", true},
		{"Ancher", "ANCHOR", true},
		{"pilots’s", "pilot’s", true},
		{"alot", "a lot", true},
		{"anchor", "ancher", false},
		{"ancher", "anger", false},
		{"anch", "eranchor", false},
		{"", "", false},
	} {
		if got := f.Has(c.observed, c.intended); got != c.want {
			t.Errorf("%q for %q: %v, want %v", c.observed, c.intended, got, c.want)
		}
	}
	empty, err := channel.OpenFitted(channel.FittedSection(nil))
	if err != nil || empty.Len() != 0 || empty.Has("ancher", "anchor") {
		t.Errorf("no pairs: %v, %v", empty, err)
	}
}

// Of pairs that were not fitted on, few in a million may be taken for fitted.
func TestFittedSeldomErrs(t *testing.T) {
	var pairs []channel.Pair
	for i := range 10000 {
		pairs = append(pairs, channel.Pair{Observed: fmt.Sprintf("shp%d", i), Intended: fmt.Sprintf("ship%d", i)})
	}
	f, err := channel.OpenFitted(channel.FittedSection(pairs))
	if err != nil {
		t.Fatal(err)
	}
	wrong := 0
	for i := range 100000 {
		if f.Has(fmt.Sprintf("shp%d", i+20000), fmt.Sprintf("ship%d", i)) {
			wrong++
		}
	}
	if wrong > 5 { // 0.23 expected
		t.Errorf("%d of 100,000 other pairs are taken for fitted", wrong)
	}
}

func TestOpenFittedRefuses(t *testing.T) {
	good := channel.FittedSection([]channel.Pair{{Observed: "a", Intended: "b"}, {Observed: "c", Intended: "d"}})
	swapped := append([]byte(nil), good...)
	copy(swapped[12:16], good[16:20])
	copy(swapped[16:20], good[12:16])
	more := append([]byte(nil), good...)
	binary.LittleEndian.PutUint32(more[8:], 1<<31)
	for name, section := range map[string][]byte{
		"empty": nil, "another magic": append([]byte("fcfp0002"), good[8:]...), "cut": good[:len(good)-1],
		"out of order": swapped, "count": more, "longer": append(good[:len(good):len(good)], 0, 0, 0, 0),
	} {
		if _, err := channel.OpenFitted(section); !errors.Is(err, channel.ErrFitted) {
			t.Errorf("%s: error %v", name, err)
		}
	}
}
