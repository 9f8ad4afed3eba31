//go:build unix

package modelfile

import (
	"fmt"
	"os"
	"syscall"
)

// load maps the file read-only, so that opening costs no copy and several
// processes share one model.
func load(path string) ([]byte, func() error, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, nil, err
	}
	defer f.Close()
	info, err := f.Stat()
	if err != nil {
		return nil, nil, err
	}
	if !info.Mode().IsRegular() || info.Size() == 0 || int64(int(info.Size())) != info.Size() {
		return readAll(path)
	}
	data, err := syscall.Mmap(int(f.Fd()), 0, int(info.Size()), syscall.PROT_READ, syscall.MAP_SHARED)
	if err != nil {
		return nil, nil, fmt.Errorf("map %s: %w", path, err)
	}
	return data, func() error { return syscall.Munmap(data) }, nil
}
