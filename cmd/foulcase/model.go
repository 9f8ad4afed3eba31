package main

import (
	"errors"
	"fmt"
	"io/fs"
	"os"

	"example.org/foulcase"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/modelfile"
	"example.org/foulcase/lm/english"
)

// openEngine opens the model at path, or the embedded one when path is empty.
func openEngine(path string) (*foulcase.Engine, error) {
	if path == "" {
		e, err := foulcase.Open(english.Model())
		return e, naming(path, err)
	}
	if err := mustBeFile(path); err != nil {
		return nil, err
	}
	return foulcase.OpenFile(path)
}

// openModelFile opens the sections of the model at path, or of the embedded
// one when path is empty. The caller closes it.
func openModelFile(path string) (*modelfile.File, error) {
	if path == "" {
		f, err := modelfile.Open(english.Model())
		return f, naming(path, err)
	}
	if err := mustBeFile(path); err != nil {
		return nil, err
	}
	return modelfile.OpenPath(path)
}

func mustBeFile(path string) error {
	info, err := os.Stat(path)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return fmt.Errorf("%s: no such model file; check the path, or make one with `foulcase model build`", path)
	case err != nil:
		return err
	case info.IsDir():
		return fmt.Errorf("%s: is a folder; name a model file made by `foulcase model build`", path)
	}
	return nil
}

// modelName is what messages call the model at path.
func modelName(path string) string {
	if path == "" {
		return "the model inside foulcase"
	}
	return path
}

// naming puts the name of the model at path before an error.
func naming(path string, err error) error {
	if err == nil {
		return nil
	}
	return fmt.Errorf("%s: %w", modelName(path), err)
}

// sectionOf returns a section of a model file, which messages call by its path.
func sectionOf(file *modelfile.File, path, section string) ([]byte, error) {
	body, ok := file.Section(section)
	if !ok {
		return nil, fmt.Errorf("%s: has no %s section (it has %v); name a model that does", modelName(path), section, file.Names())
	}
	return body, nil
}

// lexiconOf opens the lexicon of a model file and returns its bytes too.
func lexiconOf(file *modelfile.File, path string) (*lexicon.Lexicon, []byte, error) {
	section, err := sectionOf(file, path, foulcase.SectionLexicon)
	if err != nil {
		return nil, nil, err
	}
	lex, err := lexicon.Open(section)
	return lex, section, naming(path, err)
}
