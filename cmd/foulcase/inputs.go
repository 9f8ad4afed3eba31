package main

import (
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"

	"example.org/foulcase"
)

// input is one document to read. An input whose err is set could not be
// found; it keeps its place so that messages come in the order of the files.
type input struct {
	path string // as shown to the user; "-" for standard input
	size int64  // bytes, 0 when unknown
	err  error
	in   io.Reader // set for standard input alone
}

// standardInput is the operand that stands for it.
const standardInput = "-"

// findInputs turns operands into documents: files as named, folders walked in
// the order of names for files of a known format, "-" (or no operand at all)
// for standard input, which goes by stdinName.
func findInputs(operands []string, stdin io.Reader, stdinName string) []input {
	if len(operands) == 0 {
		operands = []string{standardInput}
	}
	var found []input
	for _, path := range operands {
		if path == standardInput {
			found = append(found, input{path: stdinName, in: stdin})
			stdin = strings.NewReader("") // it can be read but once
			continue
		}
		info, err := os.Stat(path)
		switch {
		case err != nil:
			found = append(found, input{path: path, err: err})
		case info.IsDir():
			found = append(found, walkFolder(path)...)
		default:
			found = append(found, input{path: path, size: info.Size()})
		}
	}
	return found
}

// walkFolder lists the documents of a known format below a folder. Hidden
// files and folders are passed over and links are not followed.
func walkFolder(root string) []input {
	var found []input
	err := filepath.WalkDir(root, func(path string, d fs.DirEntry, err error) error {
		hidden := strings.HasPrefix(d.Name(), ".") && path != root
		switch {
		case err != nil:
			found = append(found, input{path: path, err: err})
		case d.IsDir() && hidden:
			return fs.SkipDir
		case !hidden && d.Type().IsRegular() && hasFormat(path):
			in := input{path: path}
			if info, err := d.Info(); err == nil {
				in.size = info.Size()
			}
			found = append(found, in)
		}
		return nil
	})
	if err == nil && len(found) == 0 {
		err = fmt.Errorf("%s: no text in this folder (looked for %s); name other files one by one",
			root, strings.Join(extensions(), " "))
	}
	if err != nil {
		found = append(found, input{path: root, err: err})
	}
	return found
}

// extensions lists those of every known format.
func extensions() []string {
	var all []string
	for _, f := range foulcase.Formats() {
		all = append(all, f.Extensions...)
	}
	return all
}

func hasFormat(path string) bool {
	_, ok := foulcase.FormatOf(path)
	return ok
}

// open opens the document for reading.
func (in input) open() (io.ReadCloser, error) {
	switch {
	case in.err != nil:
		return nil, in.err
	case in.in != nil:
		return io.NopCloser(in.in), nil
	}
	return os.Open(in.path)
}

// isTyped tells whether someone types the document as it is read.
func (in input) isTyped() bool { return in.in != nil && isTerminal(in.in) }

// totalSize is the number of bytes in all documents, 0 if one is unknown.
func totalSize(inputs []input) int64 {
	var total int64
	for _, in := range inputs {
		if in.in != nil {
			return 0
		}
		total += in.size
	}
	return total
}
