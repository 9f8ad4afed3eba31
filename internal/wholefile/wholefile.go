// Package wholefile writes files that are whole or not there.
package wholefile

import (
	"io"
	"os"
	"path/filepath"
)

// Write has write fill a file beside path and renames it into place once it is
// whole and on disk, so that path never holds half of it. On an error (a full
// disk, say) path is left as it was.
func Write(path string, write func(io.Writer) error) error {
	return fill(path, func(tmp *os.File) error {
		if err := write(tmp); err != nil {
			return err
		}
		return tmp.Chmod(0o644)
	}, func() error { return nil })
}

// fill has write fill a file beside path, and renames it into place when ready
// says so in the last moment.
func fill(path string, write func(*os.File) error, ready func() error) (err error) {
	tmp, err := os.CreateTemp(filepath.Dir(path), "."+filepath.Base(path)+".*")
	if err != nil {
		return err
	}
	defer func() {
		if err != nil {
			tmp.Close()
			os.Remove(tmp.Name())
		}
	}()
	if err = write(tmp); err != nil {
		return err
	}
	if err = tmp.Sync(); err != nil {
		return err
	}
	if err = tmp.Close(); err != nil {
		return err
	}
	if err = ready(); err != nil {
		return err
	}
	return os.Rename(tmp.Name(), path)
}
