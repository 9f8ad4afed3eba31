package main

import (
	"io"
	"os"

	"example.org/foulcase/internal/tree"
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

// findInputs turns operands into documents: files as named, folders with the
// files of a known format below them, whatever git ignores, "-" (or no operand at
// all) for standard input, which goes by stdinName.
func findInputs(operands []string, stdin io.Reader, stdinName string) []input {
	if len(operands) == 0 {
		operands = []string{standardInput}
	}
	return findWith(tree.NewFinder(tree.Options{NoIgnore: true}), operands, stdin, stdinName)
}

// findWith has a finder look for operands. Standard input is read once, in the
// place where it is named first.
func findWith(f *tree.Finder, operands []string, stdin io.Reader, stdinName string) []input {
	var before []input // with standard input, once it was named
	for _, operand := range operands {
		switch {
		case operand != standardInput:
			f.Add(operand)
		case before == nil:
			before = append(inputsOf(f.Found()), input{path: stdinName, in: stdin})
		}
	}
	if before == nil {
		return inputsOf(f.Found())
	}
	return append(before, inputsOf(f.Found()[len(before)-1:])...)
}

func inputsOf(documents []tree.Document) []input {
	var inputs []input
	for _, d := range documents {
		inputs = append(inputs, input{path: d.Path, size: d.Size, err: d.Err})
	}
	return inputs
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
