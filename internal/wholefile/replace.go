package wholefile

import (
	"bytes"
	"errors"
	"io/fs"
	"os"
)

// ErrChanged is an error of Replace: the file is not what it was when it was read.
var ErrChanged = errors.New("the file was changed since it was read; nothing is written, run again")

// Replace has the file at path hold now in the place of old, with the same
// permissions and, where the system lets us, the same owner. It is an error, and
// nothing is written, when the file is no regular file (a link, too, is none), may
// not be written, or holds anything but old, up to the last moment.
func Replace(path string, old, now []byte) error {
	info, err := os.Lstat(path)
	if err != nil {
		return err
	}
	if !info.Mode().IsRegular() {
		return &fs.PathError{Op: "replace", Path: path, Err: errors.New("is no regular file")}
	}
	if err := mayWrite(path); err != nil {
		return err
	}
	return fill(path, func(tmp *os.File) error {
		if _, err := tmp.Write(now); err != nil {
			return err
		}
		keepOwner(tmp, info) // before the mode, of which it takes bits away
		return tmp.Chmod(info.Mode() & (fs.ModePerm | fs.ModeSetuid | fs.ModeSetgid | fs.ModeSticky))
	}, func() error { return unchanged(path, old) })
}

// mayWrite asks whether the file itself may be written: to rename another over it
// takes but the folder's permission.
func mayWrite(path string) error {
	f, err := os.OpenFile(path, os.O_WRONLY, 0)
	if err != nil {
		return err
	}
	return f.Close()
}

func unchanged(path string, old []byte) error {
	current, err := os.ReadFile(path)
	if err == nil && !bytes.Equal(current, old) {
		err = &fs.PathError{Op: "replace", Path: path, Err: ErrChanged}
	}
	return err
}
