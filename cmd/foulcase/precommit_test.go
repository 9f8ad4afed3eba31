package main

import (
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// TestPreCommitHooks has pre-commit read the list of our hooks, and each of them
// begin with a verb that there is.
func TestPreCommitHooks(t *testing.T) {
	path := filepath.Join(projectRoot(t), ".pre-commit-hooks.yaml")
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	entries := 0
	for line := range strings.Lines(string(data)) {
		command, ok := strings.CutPrefix(strings.TrimSpace(line), "entry: foulcase ")
		if !ok {
			continue
		}
		entries++
		v, rest, ok := findVerb(strings.Fields(command))
		if !ok {
			t.Fatalf("%s: no verb in %q", path, line)
		}
		if fs, _ := v.flagSet(); fs.Parse(rest) != nil {
			t.Errorf("%s: the flags of %q cannot be read", path, line)
		}
	}
	if entries == 0 {
		t.Errorf("%s has no entry of foulcase", path)
	}
	if _, err := exec.LookPath("pre-commit"); err != nil {
		t.Skip("pre-commit is not installed")
	}
	check := exec.Command("pre-commit", "validate-manifest", path)
	check.Env = append(os.Environ(), "PRE_COMMIT_HOME="+t.TempDir())
	if out, err := check.CombinedOutput(); err != nil {
		t.Errorf("%v\n%s", err, out)
	}
}
