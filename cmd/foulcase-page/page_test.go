package main

import (
	"io/fs"
	"os"
	"os/exec"
	"path/filepath"
	"testing"

	// What build.sh builds: a result that `go test` remembers is of these.
	_ "example.org/foulcase"
	_ "example.org/foulcase/internal/editor"
	_ "example.org/foulcase/lm/english"
)

// TestPage builds the page and tries it in a browser, see page/test/page.mjs. With
// FOULCASE_CLIENTS=1 in the environment, a program that is missing is a failure.
func TestPage(t *testing.T) {
	if testing.Short() {
		t.Skip("builds a page and starts a browser")
	}
	for _, name := range []string{"bash", "npm", "node", "chromium"} {
		path, err := exec.LookPath(name)
		switch {
		case err == nil:
			t.Logf("%s is %s", name, path)
		case os.Getenv("FOULCASE_CLIENTS") == "1":
			t.Fatalf("%v: the page cannot be tried", err)
		default:
			t.Skipf("%v: the page cannot be tried", err)
		}
	}
	if os.Getenv("FOULCASE_CLIENTS") != "1" {
		if err := exec.Command("npm", "view", "esbuild", "version").Run(); err != nil {
			t.Skipf("npm reaches no registry (%v): the page cannot be built", err)
		}
	}
	touch(t)
	dist, work := filepath.Join(t.TempDir(), "dist"), filepath.Join(t.TempDir(), "work")
	run(t, "bash", "build.sh", dist, work)
	run(t, "node", filepath.Join(work, "test", "page.mjs"), dist)
}

// touch opens every file here, so that `go test` knows that the result depends on them.
func touch(t *testing.T) {
	t.Helper()
	err := filepath.WalkDir(".", func(name string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		_, err = os.ReadFile(name)
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
}

// run runs a program and logs what it says.
func run(t *testing.T, name string, args ...string) {
	t.Helper()
	said, err := exec.Command(name, args...).CombinedOutput()
	t.Logf("%s", said)
	if err != nil {
		t.Fatalf("%s %q: %v", name, args, err)
	}
}
