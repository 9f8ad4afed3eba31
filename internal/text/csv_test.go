package text_test

import (
	"encoding/csv"
	"math/rand/v2"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

const csvSample = "\uFEFFid,remark by the pilot,\"place, berth\"\r\n7,\"She \"\"lay\"\" alongside,\nAll night.\",Corran\r\n8,Fog at the bar,12 May 2024\r\n"

func TestCSV(t *testing.T) {
	all := []string{"remark by the pilot", "place, berth", "She \"lay\" alongside,", "All night.", "Fog at the bar"}
	checkReadings(t, text.CSV, []reading{
		{"empty", "", nil},
		{"sample", csvSample, all},
		{"semicolons", "a;b;c, d\n\"fog; ice\";the tide, out\n", []string{"fog; ice", "the tide, out"}},
		{"bars", "a|b\nfog, ice|the tide", []string{"fog, ice", "the tide"}},
		{"no prose", "12 May,A-7 B-9,https://x.y z,,\" \",one", nil},
		{"quotes out of place", "a,b\nthe \"big\" tide,\"fog\" and ice,\"the tug\n", []string{"the \"big\" tide", "\"fog\" and ice", "\"the tug"}},
		{"last line end missing", "the tide,the fog", []string{"the tide", "the fog"}},
		{"old line ends", "the tide,a\rthe fog,b\r", []string{"the tide", "the fog"}},
		{"paragraphs in a cell", "a,\"The fog came.\n\nThe tide went.\"", []string{"The fog came.", "The tide went."}},
	})
	checkReadings(t, text.TSV, []reading{
		{"tabs", "a\tb\nfog, ice\tthe, tide\n", []string{"fog, ice", "the, tide"}},
	})
}

func TestCSVFields(t *testing.T) {
	for fields, want := range map[string][]string{
		"remark by the pilot": {"She \"lay\" alongside,", "All night.", "Fog at the bar"},
		"place, berth":        {"Corran", "12 May 2024"},
		"2":                   {"remark by the pilot", "She \"lay\" alongside,", "All night.", "Fog at the bar"},
		"id+3":                {"7", "Corran", "8", "12 May 2024"},
	} {
		checkOptions(t, text.CSV, text.Options{Fields: strings.Split(fields, "+")}, []reading{{fields, csvSample, want}})
	}
	for _, field := range []string{"remark", "4", "0", "-1", ""} {
		got, err := readRecords(t, csvSample, text.CSV, text.Options{Fields: []string{field}})
		if len(got) > 0 || err == nil || !strings.Contains(err.Error(), `"remark by the pilot", "place, berth"`) {
			t.Errorf("column %q: %q, %v", field, got, err)
		}
	}
	wide := strings.Repeat(strings.Repeat("x", 1000)+",", 1000)
	if _, err := readRecords(t, wide, text.CSV, text.Options{Fields: []string{"y"}}); err == nil || len(err.Error()) > 2000 {
		t.Errorf("a wide header gives %v", err)
	}
}

func TestCSVSpelling(t *testing.T) {
	for _, c := range []struct {
		word, other, want string
		ok                bool
	}{
		{"alongside", `a "b", c`, `a ""b"", c`, true},
		{"Fog", "ice", "ice", true},
		{"Fog", "a,b", "", false},
		{"Fog", `"`, "", false},
	} {
		if s, ok, _ := spelled(t, csvSample, text.CSV, c.word, c.other); ok != c.ok || ok && s != c.want {
			t.Errorf("%q for %q is spelled %q, %v", c.other, c.word, s, ok)
		}
	}
}

func FuzzCSV(f *testing.F) { fuzzFormat(f, text.CSV, csvSample) }
func FuzzTSV(f *testing.F) { fuzzFormat(f, text.TSV, strings.ReplaceAll(csvSample, ",", "\t")) }

// TestCSVLikeTheStandardLibrary: what encoding/csv writes is read cell by cell.
func TestCSVLikeTheStandardLibrary(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 17))
	pieces := []string{"fog", "the tide", `"`, `""`, ",", ";", "\t", "é", "x"}
	for _, f := range []text.Format{text.CSV, text.TSV} {
		var written strings.Builder
		w := csv.NewWriter(&written)
		if f == text.TSV {
			w.Comma = '\t'
		}
		record := []string{"one", "two", "three"}
		var want []string
		for range 300 {
			if err := w.Write(record); err != nil {
				t.Fatal(err)
			}
			for i := range record {
				record[i] = ""
				for range 1 + random.IntN(5) {
					record[i] += pieces[random.IntN(len(pieces))]
				}
				if cell := strings.TrimSpace(record[i]); cell != "" {
					want = append(want, cell)
				}
			}
		}
		if err := w.Write(record); err != nil {
			t.Fatal(err)
		}
		w.Flush()
		checkOptions(t, f, text.Options{Fields: []string{"one", "two", "3"}}, []reading{{"random cells", written.String(), want}})
	}
}
