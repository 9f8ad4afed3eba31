package text_test

import (
	"testing"

	"example.org/foulcase/internal/text"
)

const srtSample = "\uFEFF1\r\n00:00:01,000 --> 00:00:03,500 X1:10\r\n{\\an8}<i>The pilot boards</i>\r\nat the fairway buoy,\r\n\r\n" +
	"2\r\n00:00:03,600 --> 00:00:05,000\r\nand the <b>tug</b> is made fast.\r\n\r\n3\r\n00:00:06,000 --> 00:00:08,000\r\n- Fog ahead!\r\n- Slow down.\r\n"

func TestSRT(t *testing.T) {
	checkReadings(t, text.SRT, []reading{
		{"empty", "", nil},
		{"sample", srtSample, []string{"The pilot boards\nat the fairway buoy,\nand the tug is made fast.", "- Fog ahead!", "- Slow down."}},
		{"no cue", "The tide.\n\n1\n", nil},
		{"a cue ends with a point", "1\n0:01 --> 0:02\nFog.\n\n2\n0:02 --> 0:03\nice\n", []string{"Fog.", "ice"}},
		{"a capital begins a block", "1\n0:01 --> 0:02\nFog\n\n2\n0:02 --> 0:03\nIce\n", []string{"Fog", "Ice"}},
		{"blank line in a cue", "1\n0:01 --> 0:02\nFog\n\nand ice\n", []string{"Fog\nand ice"}},
		{"number as text", "1\n0:01 --> 0:02\n1984\nwas foggy\n2\n0:03 --> 0:04\nIce.", []string{"1984\nwas foggy", "Ice."}},
		{"no tags", "1\n0:01 --> 0:02\na < b {c} <3 <d", []string{"a < b {c} <3 <d"}},
		{"quotes", "1\n0:01 --> 0:02\n\u201CFog and\n\n2\n0:02 --> 0:03\n<i>\u201Cice\u201D</i>", []string{"\u201CFog and\n\u201Cice\u201D"}},
	})
}

// TestSRTInterrupted: a mark over two cues is by hand, one over two lines is not,
// unless a tag stands between.
func TestSRTInterrupted(t *testing.T) {
	for words, want := range map[string]bool{"fairway buoy": false, "boards\nat": true, "buoy,\nand": true, "the fairway": false} {
		if _, ok, interrupted := spelled(t, srtSample, text.SRT, words, "fog"); !ok || interrupted != want {
			t.Errorf("%q: interrupted %v, spelled %v", words, interrupted, ok)
		}
	}
	if s, ok, _ := spelled(t, srtSample, text.SRT, "fairway", "a<b"); ok {
		t.Errorf("a tag was spelled %q", s)
	}
}

func FuzzSRT(f *testing.F) { fuzzFormat(f, text.SRT, srtSample) }
