package main

import (
	"fmt"
	"os"
	"path/filepath"
)

// rewritable returns the file that stands behind path, when that may be written:
// when no link leads out of the folder that the user named, or, for a file named
// by itself, out of the current one (out of the file's own, for a path that leads
// elsewhere in plain words).
func rewritable(path string, operands []string) (string, error) {
	target, err := filepath.EvalSymlinks(path)
	if err != nil {
		return "", err
	}
	root := namedRoot(path, operands)
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

// namedRoot is the folder that a file was named under.
func namedRoot(path string, operands []string) string {
	for _, operand := range operands {
		if info, err := os.Stat(operand); err == nil && info.IsDir() && below(absolute(operand), absolute(path)) {
			return operand
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
