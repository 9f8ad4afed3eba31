package main

import (
	"fmt"
	"os"
	"path/filepath"
)

// rewritable returns the file that stands behind path, when that may be written:
// when no link leads out of the folder, one of those that the user named, that it
// was found in; or, for a file named by itself, out of the current one (out of the
// file's own, for a path that leads elsewhere in plain words).
func rewritable(path string, folders []string) (string, error) {
	target, err := filepath.EvalSymlinks(path)
	if err != nil {
		return "", err
	}
	root := namedRoot(path, folders)
	real, err := filepath.EvalSymlinks(root)
	if err != nil {
		return "", err
	}
	if !below(absolute(real), absolute(target)) {
		return "", &os.PathError{Op: "write", Path: path, Err: fmt.Errorf(
			"a link leads out of %s, to %s, and is not written through; name that file itself", root, target)}
	}
	return target, nil
}

// foldersAmong are the operands that are folders.
func foldersAmong(operands []string) []string {
	var folders []string
	for _, operand := range operands {
		if info, err := os.Stat(operand); err == nil && info.IsDir() {
			folders = append(folders, operand)
		}
	}
	return folders
}

// namedRoot is the folder that a file was named under.
func namedRoot(path string, folders []string) string {
	for _, folder := range folders {
		if below(absolute(folder), absolute(path)) {
			return folder
		}
	}
	if below(absolute("."), absolute(path)) {
		return "."
	}
	return filepath.Dir(path)
}

// below tells whether an absolute path leads into a folder, by its words alone.
func below(folder, path string) bool {
	relative, err := filepath.Rel(folder, path)
	return err == nil && filepath.IsLocal(relative)
}
