package main

import (
	"fmt"
	"os"
	"strings"

	"example.org/foulcase"
	"github.com/spf13/pflag"
)

// engineFlags are the flags of every verb that judges text.
type engineFlags struct {
	model   string
	house   []string
	variety *choice
}

func (f *engineFlags) declare(fs *pflag.FlagSet) {
	modelFlag(fs, &f.model)
	fs.StringArrayVar(&f.house, "house", nil, "`FILE` of house words, one a line; may be repeated")
	f.variety = choiceFlag(fs, "variety", "the English asked for", "any", "en-US", "en-GB")
}

func modelFlag(fs *pflag.FlagSet, path *string) {
	fs.StringVar(path, "model", "", "`FILE` of the model (default: the English model inside foulcase)")
}

// open opens the engine and reads the options that the flags stand for. The
// caller closes the engine.
func (f *engineFlags) open() (*foulcase.Engine, foulcase.Options, error) {
	var o foulcase.Options
	var err error
	if o.Variety, err = foulcase.ParseVariety(f.variety.value); err != nil {
		return nil, o, err
	}
	if o.House, err = readHouse(f.house); err != nil {
		return nil, o, err
	}
	e, err := openEngine(f.model)
	return e, o, err
}

// readHouse reads house lists into one; nil when there are none. Each is read
// by itself first, so that an error names its file and line.
func readHouse(paths []string) (*foulcase.House, error) {
	var all strings.Builder
	for _, path := range paths {
		data, err := os.ReadFile(path)
		if err != nil {
			return nil, fmt.Errorf("house words: %w", err)
		}
		if _, err := foulcase.ReadHouse(path, strings.NewReader(string(data))); err != nil {
			return nil, err
		}
		all.Write(data)
		all.WriteByte('\n')
	}
	if len(paths) == 0 {
		return nil, nil
	}
	return foulcase.ReadHouse("house words", strings.NewReader(all.String()))
}
