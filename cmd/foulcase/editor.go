package main

import (
	"context"
	"errors"

	"example.org/foulcase/internal/editor"
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
	engine engineFlags
	stdio  bool
}

func declareEditor(fs *pflag.FlagSet) action {
	f := &editorFlags{}
	f.engine.declare(fs)
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
	e, _, err := f.engine.openFor()
	if err != nil {
		return trouble, err
	}
	defer e.Close()
	settings := f.engine.settings()
	err = editor.Serve(context.Background(), c.in, c.raw, editor.Config{
		Engine:   e,
		Version:  programVersion(),
		Settings: func(path string) (editor.Settings, error) { return settings.For(path) },
		Forget:   settings.Forget,
		Alive:    isAlive,
	})
	if errors.Is(err, editor.ErrNoShutdown) {
		return abandoned, nil
	}
	return clean, err
}
