package house

import (
	"errors"
	"io/fs"
	"os"
	"path/filepath"
)

// FileName is what a file of settings is called, in a project and in a user's
// folder of settings.
const FileName = "foulcase.toml"

// repositoryMark is what the root of a repository holds.
const repositoryMark = ".git"

// Locate looks for the FileName that holds for the documents of a folder: in the
// folder itself and upwards, as far as the root of its repository or of the file
// system. It returns "" when there is none.
func Locate(dir string) (path string, err error) {
	dir, err = filepath.Abs(dir)
	if err != nil {
		return "", err
	}
	for folder := range upwards(dir) {
		path := filepath.Join(folder, FileName)
		info, err := os.Stat(path)
		switch {
		case err == nil && info.Mode().IsRegular():
			return path, nil
		case err != nil && !absent(err):
			return "", err
		case exists(filepath.Join(folder, repositoryMark)):
			return "", nil
		}
	}
	return "", nil
}

// Name is what a document is called whoever looks at it: its path, with slashes,
// from the root of its repository; where it is in none, from the folder of its
// FileName; where it has none either, from the working directory.
func Name(path string) string {
	abs, err := filepath.Abs(path)
	if err != nil {
		return filepath.ToSlash(filepath.Clean(path))
	}
	root := ""
	for folder := range upwards(filepath.Dir(abs)) {
		if exists(filepath.Join(folder, repositoryMark)) {
			root = folder
			break
		}
		if root == "" && exists(filepath.Join(folder, FileName)) {
			root = folder
		}
	}
	if root == "" {
		root, _ = os.Getwd()
	}
	name, err := filepath.Rel(root, abs)
	if err != nil {
		name = abs
	}
	return filepath.ToSlash(name)
}

// upwards yields a folder, given by its absolute path, and those that hold it.
func upwards(dir string) func(yield func(string) bool) {
	return func(yield func(string) bool) {
		for yield(dir) {
			parent := filepath.Dir(dir)
			if parent == dir {
				return
			}
			dir = parent
		}
	}
}

func exists(path string) bool {
	_, err := os.Lstat(path)
	return err == nil
}

// absent tells whether an error says that there is no such file, or that no
// file system is there to have one, as in a web page.
func absent(err error) bool {
	return errors.Is(err, fs.ErrNotExist) || errors.Is(err, errors.ErrUnsupported)
}
