package main

import (
	"context"
	"encoding/json"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"
)

// project is a folder with documents.
type project struct {
	dir      string
	document string // that the session opens
	report   string // the file that the session reports to
}

// newProject makes a folder with the demo document, under a name and with line ends, a
// list of house words and settings.
func newProject(t *testing.T, name, lineEnd string) project {
	t.Helper()
	p := newFolder(t, map[string]string{
		name:            strings.ReplaceAll(demoText(t), "\n", lineEnd),
		"foulcase.toml": "house = [\"words.txt\"]\n",
		"words.txt":     "Skarrow\n",
	})
	p.document = name
	return p
}

// newFolder makes a folder with files of some text.
func newFolder(t *testing.T, files map[string]string) project {
	t.Helper()
	p := project{dir: t.TempDir(), report: filepath.Join(t.TempDir(), "report.json")}
	for name, body := range files {
		if err := os.WriteFile(filepath.Join(p.dir, name), []byte(body), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	return p
}

// demoText is the demo document.
func demoText(t *testing.T) string {
	t.Helper()
	text, err := os.ReadFile(clientFile(t, "watch-note.md"))
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// command is a program in the folder of the project, with foulcase on its path and no
// settings of the user who runs the test.
func (p project) command(t *testing.T, program string, args ...string) *exec.Cmd {
	t.Helper()
	// Beyond the sum of what a session waits for its steps.
	ctx, cancel := context.WithTimeout(t.Context(), 4*time.Minute)
	t.Cleanup(cancel)
	home := t.TempDir()
	cmd := exec.CommandContext(ctx, program, args...)
	cmd.Dir, cmd.WaitDelay = p.dir, 10*time.Second
	cmd.Env = append(os.Environ(),
		"PATH="+builtBinary(t)+string(os.PathListSeparator)+os.Getenv("PATH"),
		"HOME="+home, "XDG_CONFIG_HOME="+home, "XDG_CACHE_HOME="+home, "XDG_DATA_HOME="+home, "XDG_STATE_HOME="+home,
		"FOULCASE_CONFIG=",
		"DOCUMENT="+p.document,
		"MARKS="+strconv.Itoa(len(demoSlips)),
		"CORRECT="+demoSlips[0].observed,
		"HOUSE="+demoHouseWord,
		"RETYPED="+demoRetyped.observed, "MEANT="+demoRetyped.corrected,
		"REPORT="+p.report)
	return cmd
}

// run runs an editor through a session and reads its report. Scripts that fail print
// the messages that went to and fro.
func (p project) run(t *testing.T, report any, program string, args ...string) {
	t.Helper()
	said, err := p.command(t, program, args...).CombinedOutput()
	if err == nil {
		var written []byte
		if written, err = os.ReadFile(p.report); err == nil {
			err = json.Unmarshal(written, report)
		}
	}
	if err != nil {
		t.Fatalf("%v\n%s", err, said)
	}
}

// checkFiles tells whether the document was saved with a text and line ends, and the
// house word in the list.
func (p project) checkFiles(t *testing.T, text, lineEnd string) {
	t.Helper()
	for name, want := range map[string]string{
		p.document:  strings.ReplaceAll(text, "\n", lineEnd),
		"words.txt": "Skarrow\n" + demoHouseWord + "\n",
	} {
		if got, err := os.ReadFile(filepath.Join(p.dir, name)); err != nil || string(got) != want {
			t.Errorf("%s holds %q, error %v, want %q", name, got, err, want)
		}
	}
}
