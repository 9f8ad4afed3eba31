package text_test

import (
	"testing"

	"example.org/foulcase/internal/text"
)

const vttSample = "WEBVTT - The tide\n\nSTYLE\n::cue { color: red }\n\nNOTE hidden\nwords\n\nintro\n00:01.000 --> 00:03.000 align:start\n" +
	"<v Ada Brook>The <c.loud>tug &amp; the pilot</c> <00:02.000>wait\nfor <lang fr>le <i>bac</i></lang> here,\n\n" +
	"00:03.000 --> 00:04.000\n<v Ada Brook>and the ice.\n\n00:05.000 --> 00:06.000\n<v.quiet Tom>Fog &lt;ahead&gt;"

func TestVTT(t *testing.T) {
	checkReadings(t, text.VTT, []reading{
		{"empty", "", nil},
		{"header alone", "WEBVTT\n\nThe tide.\n", nil},
		{"sample", vttSample, []string{"The tug & the pilot wait\nfor \uFFFC here,\nand the ice.", "Fog <ahead>"}},
		{"two voices", "WEBVTT\n\n0:01 --> 0:02\n<v Ada>Fog\n<v Tom>Ice", []string{"Fog", "Ice"}},
		{"language not closed", "WEBVTT\n\n0:01 --> 0:02\nFog <lang de>Nebel\nund Eis\n\n0:02 --> 0:03\nIce", []string{"Fog \uFFFC", "Ice"}},
		{"language in language", "WEBVTT\n\n0:01 --> 0:02\n<lang de>a <lang fr>b</lang> &amp; c</lang> fog", []string{"\uFFFC fog"}},
		{"own language", "WEBVTT\n\n0:01 --> 0:02\n<lang en-GB>fog</lang> and </lang>ice", []string{"fog and ice"}},
		{"no tag", "WEBVTT\n\n0:01 --> 0:02\na < b & c &bogus; <d", []string{"a < b & c &bogus; <d"}},
		{"CRLF", "\uFEFFWEBVTT\r\n\r\n0:01 --> 0:02\r\nFog\r\nand ice\r\n", []string{"Fog\nand ice"}},
	})
	checkOptions(t, text.VTT, text.Options{Language: "fr"}, []reading{
		{"French", "WEBVTT\n\n0:01 --> 0:02\n<lang fr-CA>le bac</lang> <lang en>the ferry</lang>", []string{"le bac \uFFFC"}},
	})
}

func TestVTTSpelling(t *testing.T) {
	if s, ok, _ := spelled(t, vttSample, text.VTT, "pilot", "a&b<c"); s != "a&amp;b&lt;c" || !ok {
		t.Errorf("spelled %q, %v", s, ok)
	}
}

func FuzzVTT(f *testing.F) { fuzzFormat(f, text.VTT, vttSample) }
