package wholefile

import (
	"errors"
	"io/fs"
	"os"
	"path/filepath"
	"runtime"
	"testing"
)

func TestReplace(t *testing.T) {
	path := filepath.Join(t.TempDir(), "log.txt")
	if err := os.WriteFile(path, []byte("moored at noon"), 0o640); err != nil {
		t.Fatal(err)
	}
	if err := os.Chmod(path, 0o640); err != nil { // whatever the umask is
		t.Fatal(err)
	}
	if err := Replace(path, []byte("moored at noon"), []byte("moored at one")); err != nil {
		t.Fatal(err)
	}
	if got, _ := os.ReadFile(path); string(got) != "moored at one" {
		t.Errorf("the file holds %q", got)
	}
	if info, err := os.Stat(path); err != nil || runtime.GOOS != "windows" && info.Mode() != 0o640 {
		t.Errorf("mode %v, %v; want the old one", info.Mode(), err)
	}

	err := Replace(path, []byte("moored at noon"), []byte("gone"))
	if !errors.Is(err, ErrChanged) {
		t.Errorf("against other bytes: %v", err)
	}
	if got, _ := os.ReadFile(path); string(got) != "moored at one" {
		t.Errorf("a refused write leaves %q", got)
	}
	if left, _ := os.ReadDir(filepath.Dir(path)); len(left) != 1 {
		t.Errorf("%d files are left, want 1", len(left))
	}
}

func TestReplaceRefuses(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "log.txt")
	if err := os.WriteFile(path, []byte("moored"), 0o444); err != nil {
		t.Fatal(err)
	}
	if err := Replace(filepath.Join(dir, "gone.txt"), nil, nil); !errors.Is(err, fs.ErrNotExist) {
		t.Errorf("a missing file: %v", err)
	}
	if err := Replace(dir, nil, nil); err == nil {
		t.Error("a folder is replaced")
	}
	link := filepath.Join(dir, "link.txt")
	if err := os.Symlink(path, link); err == nil {
		if err := Replace(link, []byte("moored"), []byte("adrift")); err == nil {
			t.Error("a link is replaced")
		}
	}
	if os.Getuid() == 0 {
		t.Skip("no permission stops the superuser")
	}
	if err := Replace(path, []byte("moored"), []byte("adrift")); !errors.Is(err, fs.ErrPermission) {
		t.Errorf("a file that may not be written: %v", err)
	}
}
