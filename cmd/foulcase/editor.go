package main

import (
	"context"
	"errors"
	"path/filepath"

	"example.org/foulcase/internal/editor"
	"example.org/foulcase/internal/house"
	"github.com/spf13/pflag"
)

func editorVerb() verb {
	return verb{
		name:     "editor",
		operands: "",
		summary:  "serve an editor, by the Language Server Protocol",
		about: `
Speaks the Language Server Protocol 3.17 on standard input and output: an editor
starts it, tells it of every change to its documents and is told their marks,
with corrections to pick from. Marks are warnings and queries information,
unless the editor's settings say otherwise. The settings of foulcase.toml hold,
and over them those that the editor has under "foulcase": variety, budget,
house (words that stand) and severity.

The exit code is 0 when the editor asked for the end, 1 when it just went away,
2 when something went wrong.`,
		examples: `
			foulcase editor </dev/null`,
		declare: declareEditor,
	}
}

// editorFlags are what the user asked of editor.
type editorFlags struct {
	model string
	stdio bool
}

func declareEditor(fs *pflag.FlagSet) action {
	f := &editorFlags{}
	modelFlag(fs, &f.model)
	fs.BoolVar(&f.stdio, "stdio", true, "speak on standard input and output; there is no other way,\nbut some editors say so")
	return f.run
}

// abandoned is the exit code that the protocol asks for when a session ends that
// was not shut down.
const abandoned status = 1

func (f *editorFlags) run(c *console, operands []string) (status, error) {
	if len(operands) > 0 {
		return trouble, misusef("editor takes no operands; an editor names its documents itself")
	}
	e, err := openEngine(f.model)
	if err != nil {
		return trouble, err
	}
	defer e.Close()
	err = editor.Serve(context.Background(), c.in, unbuffered{c.out}, editor.Config{
		Engine:   e,
		Settings: settingsFor,
		Alive:    isAlive,
	})
	if errors.Is(err, editor.ErrNoShutdown) {
		return abandoned, nil
	}
	return clean, err
}

// settingsFor reads the settings that hold for a document.
func settingsFor(path string) (editor.Settings, error) {
	file, err := house.Locate(filepath.Dir(path))
	if err != nil {
		return nil, err
	}
	return house.Load(file)
}

// unbuffered hands on at once what is written.
type unbuffered struct{ out *output }

func (u unbuffered) Write(p []byte) (int, error) {
	n, err := u.out.Write(p)
	if err == nil {
		err = u.out.Flush()
	}
	return n, err
}
