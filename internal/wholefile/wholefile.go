// Package wholefile writes files that are whole or not there.
package wholefile

import (
	"errors"
	"io"
	"io/fs"
	"os"
	"path/filepath"
)

// Write has write fill a file beside path and renames it into place once it is
// whole and on disk, so that path never holds half of it. On an error (a full
// disk, say) path is left as it was. What a link leads to is written, with the
// permissions that it has; a device or a pipe is written to, and stays one.
func Write(path string, write func(io.Writer) error) error {
	mode := fs.FileMode(0o644)
	if info, err := os.Stat(path); err == nil {
		if !info.Mode().IsRegular() {
			return writeTo(path, write)
		}
		mode = info.Mode().Perm()
		if path, err = filepath.EvalSymlinks(path); err != nil {
			return err
		}
	}
	return fill(path, func(tmp *os.File) error {
		if err := write(tmp); err != nil {
			return err
		}
		return tmp.Chmod(mode)
	}, func() error { return nil })
}

// writeTo has write fill what is no regular file.
func writeTo(path string, write func(io.Writer) error) error {
	f, err := os.OpenFile(path, os.O_WRONLY, 0)
	if err != nil {
		return err
	}
	return errors.Join(write(f), f.Close())
}

// fill has write fill a file beside path, and renames it into place when ready
// says so in the last moment.
func fill(path string, write func(*os.File) error, ready func() error) (err error) {
	tmp, err := os.CreateTemp(filepath.Dir(path), "."+filepath.Base(path)+".*")
	if failed := (*fs.PathError)(nil); errors.As(err, &failed) {
		return &fs.PathError{Op: "write", Path: path, Err: failed.Err} // of the name that the user knows
	}
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
