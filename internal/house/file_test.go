package house

import (
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// pilots is a file of settings that sets every key.
const pilots = `# Skarrow Sound Pilots
variety = "en-GB"
budget = 2
model = "models/skarrow.fcm"
house = ["words.txt",
         "/srv/craft.txt"]
encoding = "windows-1252"
fields = ["remarks", "2"]
ignore = ["archive/", "*.bak"]
stets = "stets.jsonl"
known = "known.tsv"

[formats]
"*.note" = "plain"
"logs/**" = "markdown"
`

func TestParse(t *testing.T) {
	values, err := parse(filepath.FromSlash("/p/foulcase.toml"), []byte(pilots))
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	set := map[string]bool{}
	for _, v := range values {
		set[v.Key] = true
		line := strings.TrimPrefix(v.Origin, filepath.FromSlash("/p/foulcase.toml:"))
		got = append(got, fmt.Sprintf("%s %s%s=%s", line, v.Key, v.Glob, filepath.ToSlash(v.Text)))
	}
	want := `2 variety=en-GB; 3 budget=2; 4 model=/p/models/skarrow.fcm; 5 house=/p/words.txt; 5 house=/srv/craft.txt; ` +
		`7 encoding=windows-1252; 8 fields=remarks; 8 fields=2; 9 ignore=archive/; 9 ignore=*.bak; 10 stets=/p/stets.jsonl; ` +
		`11 known=/p/known.tsv; 14 formats*.note=plain; 15 formatslogs/**=markdown`
	if s := strings.Join(got, "; "); s != want {
		t.Errorf("got  %s\nwant %s", s, want)
	}
	for _, k := range Keys() {
		if !set[k.Name] {
			t.Errorf("no value of %s was tried", k.Name)
		}
	}
}

func TestExamplesOfKeysAreRight(t *testing.T) {
	for _, k := range Keys() {
		values, err := parse("foulcase.toml", []byte(k.Example))
		if err != nil || len(values) == 0 || values[0].Key != k.Name {
			t.Errorf("%s: %v, %v", k.Example, values, err)
		}
	}
}

func TestParseSaysWhatIsWrongAndWhere(t *testing.T) {
	for toml, want := range map[string]string{
		"varity = \"any\"":                     `f:1:1: there is no key "varity": did you mean "variety"?`,
		"\n  hosue = []":                       `f:2:3: there is no key "hosue": did you mean "house"?`,
		"pilot = 1":                            `f:1:1: there is no key "pilot": there are variety, budget, `,
		"[fromats]":                            `f:1:2: there is no key "fromats": did you mean "formats"?`,
		"variety = \"en-AU\"":                  `f:1:1: variety: variety "en-AU": want en-US, en-GB or any; write for example variety = "en-GB"`,
		"variety = 1":                          `f:1:1: variety takes a text in quotation marks; write for example`,
		"budget = \"2\"":                       `f:1:1: budget takes a number;`,
		"budget = -1":                          `f:1:1: budget: "-1" is no number above 0;`,
		"budget = inf":                         `f:1:1: budget: "inf" is no number above 0;`,
		"house = \"words.txt\"":                `f:1:1: house takes a list of texts;`,
		"house = [1]":                          `f:1:1: house takes a list of texts;`,
		"house = [\"\"]":                       `f:1:1: house is empty`,
		"house.list = []":                      `f:1:1: house takes a list of texts;`,
		"[house]":                              `f:1:2: house takes a list of texts;`,
		"[[formats]]":                          `f:1:3: formats takes a table of texts;`,
		"[formats.deep]":                       `f:1:2: formats takes a table of texts;`,
		"[formats]\n\"*.log\" = \"prose\"":     `f:2:1: formats: no format "prose": there are `,
		"[formats]\n\"[\" = \"plain\"":         `f:2:1: "[" is no glob;`,
		"formats = {\"*.log\" = 1}":            `f:1:12: formats takes a table of texts;`,
		"ignore = [\"/\"]":                     `f:1:1: ignore: "/" is no glob;`,
		"encoding = \"klingon\"":               `f:1:1: encoding: `,
		"variety = \"any\"\nvariety = \"any\"": `f:2:`,
		"variety":                              `f:1:`,
		"stets = \"a\\u0000b\"":                `f:1:1: stets has a NUL in it`,
		strings.Repeat(" ", maxFile+1):         `f: longer than 1048576 bytes`,
		"ignore = [" + strings.Repeat("'a',", maxValues+1) + "]": `f:1:1: more than 10000 values`,
	} {
		values, err := parse("f", []byte(toml))
		if err == nil || !strings.HasPrefix(err.Error(), want) {
			t.Errorf("%.60q: %v, %v; want %s", toml, values, err, want)
		}
	}
}

func TestParseSurvivesDepth(t *testing.T) {
	for _, toml := range []string{
		"house = " + strings.Repeat("[", maxFile/2),
		"formats = " + strings.Repeat("{a=", maxFile/4),
		"formats" + strings.Repeat(".a", maxFile/4) + " = 1",
		"[formats" + strings.Repeat(".a", maxFile/4) + "]",
	} {
		if _, err := parse("f", []byte(toml)); err == nil {
			t.Errorf("%.20q...: no error", toml)
		}
	}
}

func TestMatches(t *testing.T) {
	for _, tt := range []struct {
		glob, file string
		want       bool
	}{
		{"*.log", "a.log", true},
		{"*.log", "deep/er/a.log", true},
		{"*.log", "a.log.txt", false},
		{"archive", "archive/a.txt", true},
		{"archive/", "deep/archive/a.txt", true},
		{"archive/", "archive", false},
		{"/archive", "deep/archive/a.txt", false},
		{"/archive", "archive/a.txt", true},
		{"logs/*.txt", "logs/a.txt", true},
		{"logs/*.txt", "logs/b/a.txt", false},
		{"logs/*.txt", "x/logs/a.txt", false},
		{"logs/**", "logs/b/a.txt", true},
		{"logs/**/a.txt", "logs/a.txt", true},
		{"logs/**/a.txt", "logs/b/c/a.txt", true},
		{"logs/**/c/**/a.txt", "logs/b/c/c/d/a.txt", true},
		{"logs/**/c/**/a.txt", "logs/b/d/a.txt", false},
		{"**", "a", true},
		{"*.log", "../a.log", false},
	} {
		dir := filepath.FromSlash("/p/q")
		if got := matches(tt.glob, dir, filepath.Join(dir, filepath.FromSlash(tt.file))); got != tt.want {
			t.Errorf("%s covers %s: %v", tt.glob, tt.file, got)
		}
	}
}

// FuzzParse holds the reader to errors that name the file, and values to being usable.
func FuzzParse(f *testing.F) {
	f.Add(pilots)
	f.Add("formats = { \"a\" = \"plain\", b.c = 1 }\n[[house]]\n")
	f.Add("budget = 0x1p3\n\"\\u0000\" = 1979-05-27\n")
	f.Fuzz(func(t *testing.T, toml string) {
		values, err := parse("f", []byte(toml))
		if err != nil {
			if !strings.HasPrefix(err.Error(), "f:") {
				t.Errorf("%v does not name the file", err)
			}
			return
		}
		for _, v := range values {
			key, ok := keyOf(v.Key)
			if !ok || key.accept(v.Text) != nil {
				t.Errorf("%v was taken", v)
			}
			if v.Glob != "" {
				matches(v.Glob, v.dir, "x/y/z")
			}
		}
	})
}

// write makes a file below dir, with the folders that it is in.
func write(t *testing.T, dir, name, content string) string {
	t.Helper()
	path := filepath.Join(dir, filepath.FromSlash(name))
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, []byte(content), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}
