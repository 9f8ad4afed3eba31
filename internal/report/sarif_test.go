package report

import (
	"encoding/json"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"unicode/utf8"

	"example.org/foulcase"
	"github.com/santhosh-tekuri/jsonschema/v6"
)

// sarifSchemaFile finds the published schema: the npm package
// @microsoft/jest-sarif has it; FOULCASE_NPM names a folder that it is installed in.
func sarifSchemaFile(t *testing.T) string {
	t.Helper()
	path := filepath.Join(os.Getenv("FOULCASE_NPM"), "node_modules", "@microsoft", "jest-sarif", "lib", "schemas", "sarif-2.1.0-rtm.5.json")
	if _, err := os.Stat(path); err != nil {
		t.Skip("no schema of SARIF: npm install --prefix DIR @microsoft/jest-sarif, and set FOULCASE_NPM=DIR")
	}
	return path
}

func TestSARIFKeepsToItsSchema(t *testing.T) {
	schema, err := jsonschema.NewCompiler().Compile(sarifSchemaFile(t))
	if err != nil {
		t.Fatal(err)
	}
	valid := func(log string) error {
		document, err := jsonschema.UnmarshalJSON(strings.NewReader(log))
		if err != nil {
			t.Fatal(err)
		}
		return schema.Validate(document)
	}
	for name, documents := range map[string][]Document{"papers": papers(), "nothing marked": papers()[1:2], "nothing": nil} {
		if err := valid(written(t, "sarif", documents...)); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
	wrong := strings.Replace(written(t, "sarif", papers()...), `"startLine":1`, `"startLine":0`, 1)
	if valid(wrong) == nil {
		t.Error("the schema takes line 0: it does not check")
	}
}

// sarifLog is what the tests read of a log.
type sarifLog struct {
	Runs []struct {
		sarifRun
		Results []sarifResult
	}
}

func TestSARIFSaysWhatTheMarksSay(t *testing.T) {
	var log sarifLog
	text := written(t, "sarif", papers()...)
	if err := json.Unmarshal([]byte(text), &log); err != nil {
		t.Fatalf("%v in\n%s", err, text)
	}
	results := log.Runs[0].Results
	rules := log.Runs[0].Tool.Driver.Rules
	at := 0
	for _, d := range papers() {
		source := string(d.Source)
		for _, m := range marksOf(t, source, d.Options) {
			r := results[at]
			at++
			if rules[r.RuleIndex].ID != r.RuleID || r.RuleID != m.Kind.String() || r.Level != map[foulcase.Grade]string{foulcase.GradeMark: "warning", foulcase.GradeQuery: "note"}[m.Grade] {
				t.Errorf("%q: rule %s, level %s", m.Observed, r.RuleID, r.Level)
			}
			region := r.Locations[0].Physical.Region
			if got := source[region.ByteOffset : region.ByteOffset+region.ByteLength]; got != m.Observed {
				t.Errorf("the bytes of %q are %q", m.Observed, got)
			}
			if got := between(source, region); got != m.Observed {
				t.Errorf("the lines and columns of %q are %q", m.Observed, got)
			}
			if len(r.Fixes) != len(m.Corrections) || r.Fixes[0].Changes[0].Replacements[0].Inserted.Text != m.Corrections[0].Text {
				t.Errorf("%q: fixes %+v", m.Observed, r.Fixes)
			}
		}
	}
	if at != len(results) || at < 4 {
		t.Errorf("%d marks and %d results", at, len(results))
	}
	first, last := results[0].Locations[0].Physical.Artifact, results[at-1].Locations[0].Physical.Artifact
	if first.URI != "log/watch%203.txt" || last.URI != "log/na%C3%AFve.md" || log.Runs[0].Bases[first.Base].Description.Text == "" {
		t.Errorf("artifacts %+v, %+v", first, last)
	}
}

// between returns what stands at lines and columns.
func between(source string, r *sarifRegion) string {
	at := func(line, column int) int {
		offset := 0
		for ; line > 1; line-- {
			offset += strings.IndexByte(source[offset:], '\n') + 1
		}
		for ; column > 1; column-- {
			_, size := utf8.DecodeRuneInString(source[offset:])
			offset += size
		}
		return offset
	}
	return source[at(r.StartLine, r.StartColumn):at(r.EndLine, r.EndColumn)]
}

func TestSARIFOfMarksByHandAndPacked(t *testing.T) {
	m := marksOf(t, "The master recieved it.", foulcase.Options{})[0]
	m.ByHand = true
	if r := sarifResultOf("a.txt", m); r.Fixes != nil || r.Locations[0].Physical.Region == nil {
		t.Errorf("by hand: %+v", r)
	}
	m.Part = "content.xml"
	if r := sarifResultOf("a.odt", m); r.Fixes != nil || r.Locations[0].Physical.Region != nil || r.Locations[0].Logical[0].Name != m.Part {
		t.Errorf("packed: %+v", r)
	}
}

func TestURI(t *testing.T) {
	absolute := filepath.Join(string(filepath.Separator), "log", "a b.txt")
	for path, want := range map[string]string{
		"log/watch.txt":       "log/watch.txt",
		"a:b?c#d%.txt":        "a%3Ab%3Fc%23d%25.txt",
		"../naïve\xff.txt":    "../na%C3%AFve%FF.txt",
		absolute:              "file:///log/a%20b.txt",
		"with \"quotes\".txt": "with%20%22quotes%22.txt",
	} {
		if got, isAbsolute := uriOf(path); got != want || isAbsolute != (path == absolute) {
			t.Errorf("%q: %q, %v; want %q", path, got, isAbsolute, want)
		}
	}
}
