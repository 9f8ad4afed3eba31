package channel_test

import (
	"errors"
	"testing"

	"example.org/foulcase/channel"
)

func TestOpenReadsWhatFitWrote(t *testing.T) {
	m := fitSlips(t)
	again, err := channel.Open(m.Section())
	if err != nil {
		t.Fatal(err)
	}
	for _, p := range invented(t) {
		if got, want := again.Cost(p.Observed, p.Intended), m.Cost(p.Observed, p.Intended); got != want {
			t.Errorf("%s for %s costs %v after opening, %v before", p.Observed, p.Intended, got, want)
		}
	}
	if size := len(m.Section()); size > 200_000 {
		t.Errorf("section of %d bytes", size)
	}
}

func TestOpenRefuses(t *testing.T) {
	section := fitSlips(t).Section()
	for _, cut := range []int{0, 1, 8, 20, 28, 1000, len(section) - 8, len(section) - 1} {
		if _, err := channel.Open(section[:cut]); !errors.Is(err, channel.ErrSection) {
			t.Errorf("cut to %d bytes: %v", cut, err)
		}
	}
	if _, err := channel.Open(append(section[:len(section):len(section)], 0)); !errors.Is(err, channel.ErrSection) {
		t.Errorf("a byte too many: %v", err)
	}
}

// FuzzOpen changes bytes of a sound section: Open refuses it or gives a model
// that prices anything without panic.
func FuzzOpen(f *testing.F) {
	section := fitSlips(f).Section()
	f.Add(uint32(3), byte(1), "recieve", "receive")
	f.Add(uint32(len(section)-3), byte(0xff), "stashun", "station")
	f.Fuzz(func(t *testing.T, at uint32, flip byte, observed, intended string) {
		if len(observed) > 40 || len(intended) > 40 {
			return
		}
		damaged := append([]byte(nil), section...)
		damaged[int(at)%len(damaged)] ^= flip
		m, err := channel.Open(damaged)
		if err != nil {
			return
		}
		if cost := m.Cost(observed, intended); !(cost >= 0) {
			t.Errorf("cost %v", cost)
		}
		m.Explain(observed, intended)
	})
}
