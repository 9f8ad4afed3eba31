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
// from the root of its project; where it is in none, from the working directory.
func Name(path string) string {
	abs, err := filepath.Abs(path)
	if err != nil {
		return filepath.ToSlash(filepath.Clean(path))
	}
	root := projectOf(filepath.Dir(abs))
	if root == "" {
		root, _ = os.Getwd()
	}
	name, err := filepath.Rel(root, abs)
	if err != nil {
		name = abs
	}
	return filepath.ToSlash(name)
}

// projectOf is the root of the project that a folder belongs to: that of its repository,
// else the folder of its FileName, else "".
func projectOf(dir string) string {
	root := ""
	for folder := range upwards(dir) {
		if exists(filepath.Join(folder, repositoryMark)) {
			return folder
		}
		if root == "" && exists(filepath.Join(folder, FileName)) {
			root = folder
		}
	}
	return root
}

// within tells whether a file lies, or would lie, below a folder, links followed.
func within(dir, path string) bool {
	real, err := filepath.EvalSymlinks(path)
	if err != nil { // it is not there yet: the folder it would be made in counts
		parent := filepath.Dir(path)
		return !exists(path) && parent != path && within(dir, parent)
	}
	if dir, err = filepath.EvalSymlinks(dir); err != nil {
		return false
	}
	rel, err := filepath.Rel(dir, real)
	return err == nil && filepath.IsLocal(rel)
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
