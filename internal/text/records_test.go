package text_test

import (
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// checkOptions is checkReadings with options.
func checkOptions(t *testing.T, f text.Format, o text.Options, readings []reading) {
	t.Helper()
	for _, c := range readings {
		if got, err := readRecords(t, c.in, f, o); err != nil || !slices.Equal(got, c.want) {
			t.Errorf("%s with %v:\n got %q, %v\nwant %q", c.name, o, got, err, c.want)
		}
	}
}

// readRecords returns the texts of the blocks, which it checks, and the error at
// their end.
func readRecords(t *testing.T, source string, f text.Format, o text.Options) (all []string, err error) {
	t.Helper()
	for b, failed := range text.Blocks(strings.NewReader(source), f, o) {
		if err = failed; err != nil {
			break
		}
		checkBlock(t, b, []byte(source))
		checkTokens(t, b.Text)
		all = append(all, string(b.Text))
	}
	return all, err
}

// spelled returns how the first block that has the word must spell another, and
// whether it can, and whether markup stands inside the word.
func spelled(t *testing.T, source string, f text.Format, word, other string) (spelling string, ok, interrupted bool) {
	t.Helper()
	for _, b := range blocks(t, source, f) {
		if at := strings.Index(string(b.Text), word); at >= 0 {
			spelling, ok = b.Escape(other)
			return spelling, ok, b.Interrupted(at, at+len(word))
		}
	}
	t.Fatalf("%q is in no block of %q", word, source)
	return "", false, false
}

// TestRecordsBounds: hostile documents come to an end.
func TestRecordsBounds(t *testing.T) {
	for f, units := range map[text.Format][]string{
		text.SRT:       {"<", "<a", "{\\", "1\n", "0-->\n", "0-->\n<i", "0-->\na\n\n"},
		text.VTT:       {"<", "<lang x>", "</lang>", "&", "0-->\n<v>a", "0-->\n<lang x>a\n\n", "0-->\n<v a>a\n"},
		text.PO:        {"msgid \"", "\"", "\\", "msgid \"a\"\nmsgstr \"\\\\%{<&_\"\n", "msgstr[\"a\"\n", "msgstr \"{{\"\n\"<\"\n"},
		text.Mail:      {"Subject: a\n b\n", "Subject: =?utf-8?q?", " a", "Content-Type: a;b=c;\n d=e;", "\n", "=", "= "},
		text.CSV:       {"\"", "\"\"", ",\"", "\"a\"\",", "\"a\"b,", "\n", "a b,"},
		text.TSV:       {"\t", "\"\t", "\"\n\""},
		text.JSONLines: {"[", "{\"a\":", "\"", "\\", "[]\n", "\"a b\"\n"},
		text.JSON:      {"[", "/*", "//", "/**/", "[1,", "\"\\u0041"},
	} {
		for _, unit := range units {
			source := strings.Repeat(unit, 300_000/len(unit))
			last := -1
			for b := range text.Blocks(strings.NewReader(source), f, text.Options{}) {
				if b == nil {
					break
				}
				if from, _ := b.Source(0, 0); int(from) < last {
					t.Fatalf("%s: a block at %d after one at %d", f, from, last)
				} else {
					last = int(from)
				}
			}
		}
	}
}

// BenchmarkRecords measures the readers of records and messages, each with a
// megabyte of its format.
func BenchmarkRecords(b *testing.B) {
	for f, sample := range map[text.Format]string{
		text.SRT: srtSample, text.VTT: vttSample + "\n\n", text.PO: poSample, text.Mail: mailSample,
		text.CSV: csvSample, text.JSONLines: strings.ReplaceAll(jsonSample, "\n", "") + "\n",
	} {
		source := strings.Repeat(sample, 1<<20/len(sample))
		if f == text.Mail {
			source = strings.Replace(sample, "The pilot", strings.Repeat("The pilot left the caf=C3=A9 at n=\r\noon.\r\n\r\n", 1<<20/48)+"The pilot", 1)
		}
		b.Run(string(f), func(b *testing.B) {
			b.SetBytes(int64(len(source)))
			for b.Loop() {
				for _, err := range text.Blocks(strings.NewReader(source), f, text.Options{}) {
					if err != nil {
						b.Fatal(err)
					}
				}
			}
		})
	}
}

// TestRecordsEdits holds fuller documents than those in testdata to the rules for
// edits.
func TestRecordsEdits(t *testing.T) {
	for f, source := range map[text.Format]string{
		text.SRT: srtSample, text.VTT: vttSample, text.PO: poSample, text.Mail: mailSample, text.CSV: csvSample,
		text.TSV: strings.ReplaceAll(csvSample, ",", "\t"), text.JSON: jsonSample, text.JSONLines: strings.ReplaceAll(jsonSample, "\n", ""),
	} {
		t.Run(string(f), func(t *testing.T) { checkEdits(t, f, []byte(source)) })
	}
}
