//go:build unix

package tree

import (
	"syscall"
	"testing"
)

// makePipe makes a named pipe.
func makePipe(t *testing.T, path string) {
	t.Helper()
	if err := syscall.Mkfifo(path, 0o644); err != nil {
		t.Skipf("no named pipes here: %v", err)
	}
}
