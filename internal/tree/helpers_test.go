package tree

import (
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// writeFiles makes files below a new folder, which it returns: by their names, with
// slashes, what they hold. A name that ends in a slash is an empty folder.
func writeFiles(t *testing.T, files map[string]string) string {
	t.Helper()
	root, err := filepath.EvalSymlinks(t.TempDir())
	if err != nil {
		t.Fatal(err)
	}
	for name, body := range files {
		writeFile(t, root, name, body)
	}
	return root
}

func writeFile(t *testing.T, root, name, body string) {
	t.Helper()
	path := filepath.Join(root, filepath.FromSlash(name))
	folder := filepath.Dir(path)
	if strings.HasSuffix(name, "/") {
		folder = path
	}
	if err := os.MkdirAll(folder, 0o755); err != nil {
		t.Fatal(err)
	}
	if folder == path {
		return
	}
	if err := os.WriteFile(path, []byte(body), 0o644); err != nil {
		t.Fatal(err)
	}
}

// makeLink makes a symbolic link, or skips the test where there are none.
func makeLink(t *testing.T, target, path string) {
	t.Helper()
	if err := os.Symlink(target, path); err != nil {
		t.Skipf("no symbolic links here: %v", err)
	}
}

// needGit skips the test where git is not installed, and keeps it to the test's own
// settings.
func needGit(t *testing.T) {
	t.Helper()
	if _, err := exec.LookPath("git"); err != nil {
		t.Skip("git is not installed")
	}
	for name, value := range map[string]string{
		"GIT_CONFIG_GLOBAL": os.DevNull, "GIT_CONFIG_NOSYSTEM": "1", "HOME": t.TempDir(),
		"GIT_AUTHOR_NAME": "Tess", "GIT_AUTHOR_EMAIL": "tess@skarrow.example",
		"GIT_COMMITTER_NAME": "Tess", "GIT_COMMITTER_EMAIL": "tess@skarrow.example",
	} {
		t.Setenv(name, value)
	}
}

// runGit runs git in a folder and returns what it prints; input may be "".
func runGit(t *testing.T, dir, input string, args ...string) string {
	t.Helper()
	cmd := exec.Command("git", args...)
	cmd.Dir = dir
	cmd.Stdin = strings.NewReader(input)
	var messages strings.Builder
	cmd.Stderr = &messages
	out, err := cmd.Output()
	if err != nil && messages.Len() > 0 {
		t.Fatalf("git %s: %v\n%s", strings.Join(args, " "), err, messages.String())
	}
	return string(out)
}
