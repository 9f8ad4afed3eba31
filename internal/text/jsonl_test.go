package text_test

import (
	"encoding/json"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

const jsonSample = `{"id": "SSP-0417", "the note": "Fog \"at\" the\tbar", "hours": [6, -1.5e+3, true, null],
 "items": [{"text": "The caf\u00e9 of the pier \ud83d\ude00"}, {"text": "one", "more text": "two words"}], "at/a~b": {"text": "rope"}}`

func TestJSON(t *testing.T) {
	checkReadings(t, text.JSON, []reading{
		{"empty", " \n", nil},
		{"sample", jsonSample, []string{"Fog \"at\" the\tbar", "The café of the pier 😀", "two words"}},
		{"one string", "\uFEFF\"the tide\"\n", []string{"the tide"}},
		{"no prose", `["12 May", "https://x.y z", "berth", "", "  ", "A-7 B-9"]`, nil},
		{"comments", "// the tug\n{/* the fog */ \"a\": \"the tide\", // ice\n}", []string{"the tide"}},
		{"paragraphs", `"The fog came.\n\nThe tide went.\r\nIce."`, []string{"The fog came.", "The tide went.", "Ice."}},
		{"half a pair", `"the \ud83d fog \ude00\ud83d\u0041"`, []string{"the \uFFFD fog \uFFFD\uFFFDA"}},
		{"bad UTF-8", "\"the \xff fog\"", []string{"the \xff fog"}},
	})
	checkReadings(t, text.JSONLines, []reading{
		{"lines", "{\"a\": \"the tide\"}\r\n\n[\"the fog\"]\n\"the ice\"", []string{"the tide", "the fog", "the ice"}},
	})
}

func TestJSONFields(t *testing.T) {
	for fields, want := range map[string][]string{
		"text":           {"The café of the pier 😀", "one", "rope"},
		"id+the note":    {"SSP-0417", "Fog \"at\" the\tbar"},
		"/items/1/text":  {"one"},
		"/items/*/text":  {"The café of the pier 😀", "one"},
		"/at~1a~0b/text": {"rope"},
		"/*/text":        nil,
		"items":          nil,
	} {
		checkOptions(t, text.JSON, text.Options{Fields: strings.Split(fields, "+")}, []reading{{fields, jsonSample, want}})
	}
	checkOptions(t, text.JSONLines, text.Options{Fields: []string{"lines"}}, []reading{
		{"strings in an array", `{"lines": ["fog", ["ice"], {"x": "bar"}]}`, []string{"fog", "ice"}},
		{"escaped name", `{"l\u0069nes": "fog"}`, []string{"fog"}},
	})
}

// TestJSONErrors: what stands before a fault is read, and the error has its
// place.
func TestJSONErrors(t *testing.T) {
	for in, want := range map[string]string{
		"\"the tide\"\n{\"a\": \"the fog\", }":       "line 2, column 18: the name of a member is missing",
		"\"the tide\"\n\n  [\"é\", \"the fog\"":      "line 3, column 18: a comma or ']' is missing",
		"\"the tide\"\n{\"a\" 1}":                    "line 2, column 6: a colon is missing",
		"\"the tide\"\n\"the fog":                    "line 2, column 9: a string has no end",
		"\"the tide\"\n\"\\q\"":                      "line 2, column 2: a backslash begins no escape",
		"\"the tide\"\n\"\\u12x4\"":                  "line 2, column 2: a backslash begins no escape",
		"\"the tide\"\n[1, \"a\tb\"]":                "line 2, column 7: a control character stands in a string",
		"\"the tide\"\n01":                           "line 2, column 2: something stands behind the value",
		"\"the tide\"\n[-]":                          "line 2, column 3: a number has no digits",
		"\"the tide\"\n1.e":                          "line 2, column 3: a number has no digits behind the point",
		"\"the tide\"\n1e+":                          "line 2, column 4: a number has no exponent",
		"\"the tide\"\nthe":                          "line 2, column 1: a value is missing",
		"\"the tide\"\n" + strings.Repeat("[", 2000): "line 2, column 1001: more than 1000 values stand in each other",
	} {
		got, err := readRecords(t, in, text.JSONLines, text.Options{})
		if len(got) == 0 || got[0] != "the tide" || err == nil || !strings.HasPrefix(err.Error(), want) {
			t.Errorf("%.40q: read %q, error %v; want %s", in, got, err, want)
		}
	}
	if _, err := readRecords(t, "{}\n{}", text.JSON, text.Options{}); err == nil {
		t.Error("two values are one document")
	}
}

func TestJSONSpelling(t *testing.T) {
	const words = "a\"b\\c é 😀\n"
	for in, want := range map[string]string{
		`["the tide"]`:   `a\"b\\c \u00e9 \ud83d\ude00\u000a`,
		`["the tide é"]`: `a\"b\\c é 😀\u000a`,
	} {
		got, ok, _ := spelled(t, in, text.JSON, "tide", words)
		if got != want || !ok {
			t.Errorf("%s: spelled %q, want %q", in, got, want)
		}
		var back string
		if err := json.Unmarshal([]byte(`"`+got+`"`), &back); err != nil || back != words {
			t.Errorf("%q reads %q, %v", got, back, err)
		}
	}
}

func FuzzJSON(f *testing.F) { fuzzFormat(f, text.JSON, jsonSample, "[1,/*x*/]//") }

func FuzzJSONLines(f *testing.F) {
	fuzzFormat(f, text.JSONLines, strings.ReplaceAll(jsonSample, "\n", ""))
}

// FuzzJSONSound: a line is refused when the standard library refuses it, and
// else is not.
func FuzzJSONSound(f *testing.F) {
	for _, s := range []string{strings.ReplaceAll(jsonSample, "\n", ""), "01", "-", "1e5", "[1,]", "{\"a\"}", "\"\\ud800\\n\"", "nul", "\"\x7f\xff\""} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, line string) {
		line = strings.TrimSpace(strings.Map(func(r rune) rune {
			if r == '\n' || r == '\r' || r == '\v' || r == '\f' || r == '\uFEFF' {
				return ' '
			}
			return r
		}, line))
		if line == "" || strings.Count(line, "[")+strings.Count(line, "{") > 1000 {
			return
		}
		var err error
		for _, failed := range text.Blocks(strings.NewReader(line), text.JSONLines, text.Options{}) {
			err = failed
		}
		if sound := json.Valid([]byte(line)); sound != (err == nil) {
			t.Fatalf("%q: sound %v, error %v", line, sound, err)
		}
	})
}
