package wholefile

import (
	"errors"
	"io"
	"os"
	"path/filepath"
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
