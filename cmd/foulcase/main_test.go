package main

import (
	"bytes"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

// TestMain makes the test binary act as foulcase when a script runs that.
func TestMain(m *testing.M) {
	testscript.Main(tidily{m}, map[string]func(){"foulcase": main})
}

// tidily runs the tests and removes the binary that they built.
type tidily struct{ m *testing.M }

func (t tidily) Run() int {
	defer func() { os.RemoveAll(binary.dir) }()
	return t.m.Run()
}

// TestScripts runs the scripts with a small model, which $MODEL names, made of
// the texts in testdata/tiny by the verbs that a user makes one with.
func TestScripts(t *testing.T) {
	model := tinyModel(t)
	testscript.Run(t, testscript.Params{
		Dir:                 filepath.Join("testdata", "script"),
		RequireExplicitExec: true,
		RequireUniqueNames:  true,
		Setup: func(env *testscript.Env) error {
			env.Setenv("MODEL", model)
			env.Setenv("TINY", filepath.Join(projectRoot(t), "testdata", "tiny"))
			return nil
		},
		Condition: func(name string) (bool, error) {
			if name == "root" { // whom no permission stops
				return os.Getuid() == 0, nil
			}
			return false, fmt.Errorf("unknown condition %q", name)
		},
		Cmds: map[string]func(*testscript.TestScript, bool, []string){"status": checkStatus},
	})
}

// checkStatus is the script command `status N program args...`: the program
// must end with that exit code.
func checkStatus(ts *testscript.TestScript, negated bool, args []string) {
	if negated || len(args) < 2 {
		ts.Fatalf("usage: status CODE program args...")
	}
	want, err := strconv.Atoi(args[0])
	ts.Check(err)
	got := 0
	err = ts.Exec(args[1], args[2:]...)
	if exit := (*exec.ExitError)(nil); err != nil {
		var ok bool
		if exit, ok = err.(*exec.ExitError); !ok {
			ts.Fatalf("%v", err)
		}
		got = exit.ExitCode()
	}
	if got != want {
		ts.Fatalf("exit code %d, want %d", got, want)
	}
}

// tinyModel builds the small model and returns its path.
func tinyModel(t *testing.T) string {
	t.Helper()
	dir := t.TempDir()
	tiny := func(name string) string { return filepath.Join(projectRoot(t), "testdata", "tiny", name) }
	at := func(name string) string { return filepath.Join(dir, name) }
	mustRun(t, "model", "build", "--text", tiny("corpus.txt"), "--pairs", tiny("pairs.tsv"), "--homophones", tiny("homophones.csv"),
		"--words", "en-GB="+tiny("words-en-GB.txt"), "--words", "en-US="+tiny("words-en-US.txt"), "-o", at("base.fcm"))
	mustRun(t, "lm", "train", "--lexicon", at("base.fcm"), "--order", "3", "--hold-out", "-o", at("lm.fcm"), tiny("corpus.txt"))
	mustRun(t, "model", "build", "--from", at("base.fcm"), "--from", at("lm.fcm"), "--judgement", tiny("judgement.json"),
		"--card", tiny("card.md"), "-o", at("tiny.fcm"))
	return at("tiny.fcm")
}

// mustRun runs foulcase in this process and returns what it printed.
func mustRun(t *testing.T, args ...string) string {
	t.Helper()
	var out, messages bytes.Buffer
	if code := run(args, strings.NewReader(""), &out, &messages); code == int(trouble) {
		t.Fatalf("foulcase %s: %s", strings.Join(args, " "), messages.String())
	}
	return out.String()
}

// projectRoot is the folder of go.mod.
func projectRoot(t testing.TB) string {
	t.Helper()
	root, err := filepath.Abs(filepath.Join("..", ".."))
	if err != nil {
		t.Fatal(err)
	}
	if _, err := os.Stat(filepath.Join(root, "go.mod")); err != nil {
		t.Fatal(err)
	}
	return root
}

// workFolder is a new folder with a link to the project's testdata, for command
// lines as a user at the project's root would type them.
func workFolder(t *testing.T) string {
	t.Helper()
	dir := t.TempDir()
	if err := os.Symlink(filepath.Join(projectRoot(t), "testdata"), filepath.Join(dir, "testdata")); err != nil {
		t.Skipf("no symbolic links here: %v", err)
	}
	return dir
}

// shell runs a command line with foulcase on the path and returns what it
// prints, messages included, and its exit code.
func shell(t *testing.T, dir, line string) (string, int) {
	t.Helper()
	sh, err := exec.LookPath("sh")
	if err != nil {
		t.Skipf("no shell here: %v", err)
	}
	cmd := exec.Command(sh, "-c", line)
	cmd.Dir = dir
	cmd.Env = append(os.Environ(), "PATH="+builtBinary(t)+string(os.PathListSeparator)+os.Getenv("PATH"))
	out, err := cmd.CombinedOutput()
	if _, exited := err.(*exec.ExitError); err != nil && !exited {
		t.Fatal(err)
	}
	return string(out), cmd.ProcessState.ExitCode()
}

// TestHelpExamples runs the examples that each verb's help shows. Those of
// model build come first, since others read what they write.
func TestHelpExamples(t *testing.T) {
	dir := workFolder(t)
	list := verbs()
	for i, v := range list {
		if v.name == "model build" {
			list = append([]verb{v}, append(list[:i:i], list[i+1:]...)...)
		}
	}
	for _, v := range list {
		if len(v.exampleLines()) == 0 {
			t.Errorf("%s has no example", v.name)
		}
		for _, line := range v.exampleLines() {
			if !strings.HasPrefix(line, "foulcase "+v.name) {
				t.Errorf("%s: the example %q is of something else", v.name, line)
			}
			if out, code := shell(t, dir, line); code != int(clean) && code != int(marked) {
				t.Errorf("%s\nexit code %d\n%s", line, code, out)
			}
		}
	}
}

// TestHelp asks every verb for help in each way there is.
func TestHelp(t *testing.T) {
	for _, v := range verbs() {
		words := strings.Fields(v.name)
		help := mustRun(t, append(words[:len(words):len(words)], "--help")...)
		for _, want := range []string{"foulcase " + v.name + ": " + v.summary, "Usage:", "For example:\n  foulcase " + v.name} {
			if !strings.Contains(help, want) {
				t.Errorf("the help of %s lacks %q:\n%s", v.name, want, help)
			}
		}
		for line := range strings.Lines(strings.Split(help, "For example:")[0]) {
			if n := len([]rune(strings.TrimRight(line, "\n"))); n > 80 {
				t.Errorf("the help of %s has a line of %d columns: %s", v.name, n, line)
			}
		}
		if again := mustRun(t, append([]string{"help"}, words...)...); again != help {
			t.Errorf("`help %s` and `%s --help` differ", v.name, v.name)
		}
		if overview := mustRun(t, "--help"); !strings.Contains(overview, fmt.Sprintf("  %-15s %s\n", v.name, v.summary)) {
			t.Errorf("the overview lacks %s", v.name)
		}
	}
}
