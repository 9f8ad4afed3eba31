package wholefile

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
)

func TestWrite(t *testing.T) {
	path := filepath.Join(t.TempDir(), "log.txt")
	fill := func(text string, end error) error {
		return Write(path, func(w io.Writer) error {
			_, err := io.WriteString(w, text)
			return errors.Join(err, end)
		})
	}
	if err := fill("moored at noon", nil); err != nil {
		t.Fatal(err)
	}
	disk := errors.New("disk is full")
	if err := fill("half a", disk); !errors.Is(err, disk) {
		t.Fatalf("got %v, want the writer's error", err)
	}
	if got, _ := os.ReadFile(path); string(got) != "moored at noon" {
		t.Errorf("after a failed write the file holds %q", got)
	}
	if left, _ := os.ReadDir(filepath.Dir(path)); len(left) != 1 {
		t.Errorf("%d files are left, want 1", len(left))
	}
}

// TestWriteKeeps holds that what stands at the path stays what it is.
func TestWriteKeeps(t *testing.T) {
	dir := t.TempDir()
	path, link := filepath.Join(dir, "log.txt"), filepath.Join(dir, "link.txt")
	if err := os.WriteFile(path, []byte("moored"), 0o600); err != nil {
		t.Fatal(err)
	}
	adrift := func(w io.Writer) error {
		_, err := io.WriteString(w, "adrift")
		return err
	}
	if err := os.Symlink("log.txt", link); err != nil {
		t.Skipf("no symbolic links here: %v", err)
	}
	if err := Write(link, adrift); err != nil {
		t.Fatal(err)
	}
	if got, _ := os.ReadFile(path); string(got) != "adrift" {
		t.Errorf("behind the link stands %q", got)
	}
	if info, err := os.Lstat(path); err != nil || runtime.GOOS != "windows" && info.Mode() != 0o600 {
		t.Errorf("mode %v, %v; want the old one", info.Mode(), err)
	}
	if info, err := os.Lstat(link); err != nil || info.Mode().Type() != fs.ModeSymlink {
		t.Errorf("the link has mode %v, %v", info.Mode(), err)
	}
	if err := Write(dir, adrift); err == nil {
		t.Error("a folder is written")
	}
	missing := filepath.Join(dir, "none", "log.txt")
	if err := Write(missing, adrift); !errors.Is(err, fs.ErrNotExist) || !strings.Contains(err.Error(), missing+":") {
		t.Errorf("in no folder: %v; want the path that was asked for", err)
	}
}

// TestWriteToPipe has a pipe, which must not be taken away, take what is written.
func TestWriteToPipe(t *testing.T) {
	r, w, err := os.Pipe()
	if err != nil {
		t.Fatal(err)
	}
	defer r.Close()
	path := fmt.Sprintf("/dev/fd/%d", w.Fd())
	if _, err := os.Stat(path); err != nil {
		t.Skipf("pipes have no paths here: %v", err)
	}
	err = Write(path, func(to io.Writer) error {
		_, err := io.WriteString(to, "adrift")
		return err
	})
	w.Close()
	if got, _ := io.ReadAll(r); err != nil || string(got) != "adrift" {
		t.Errorf("the pipe has %q, %v", got, err)
	}
}
