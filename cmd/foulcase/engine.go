package main

import (
	"example.org/foulcase"
	"example.org/foulcase/internal/house"
	"github.com/spf13/pflag"
)

// engineFlags are the flags of every verb that judges text.
type engineFlags struct {
	config string
	set    *pflag.FlagSet // the verb's: what was given there wins over files
	// Known once the engine is open:
	here  *house.Settings // of the working directory
	model string          // the engine's file; "" is the English model inside foulcase
}

func (f *engineFlags) declare(fs *pflag.FlagSet) {
	f.set = fs
	modelFlag(fs, &f.model)
	fs.StringArray("house", nil, "`FILE` of house words, beside those that settings name; may be repeated")
	choiceFlag(fs, "variety", "the English asked for", "any", "en-US", "en-GB")
	configFlag(fs, &f.config)
}

func modelFlag(fs *pflag.FlagSet, path *string) {
	fs.StringVar(path, "model", "", "`FILE` of the model (default: the English model inside foulcase)")
}

func configFlag(fs *pflag.FlagSet, path *string) {
	fs.StringVar(path, "config", "", "`FILE` of settings in place of the "+house.FileName+" found upwards from each document; none for neither that nor the user's own")
}

// open opens the engine and reads the options that hold for text of no document: those of
// the working directory. The caller closes the engine.
func (f *engineFlags) open() (*foulcase.Engine, foulcase.Options, error) {
	e, _, err := f.openFor()
	if err != nil {
		return nil, foulcase.Options{}, err
	}
	o := f.here.Options(standardInput)
	return e, foulcase.Options{Variety: o.Variety, House: o.House, Budget: o.Budget}, nil
}

// openFor opens the engine and finds the settings of documents. There is one model for
// all of them: that of the working directory. The caller closes the engine.
func (f *engineFlags) openFor() (e *foulcase.Engine, found *house.Resolver, err error) {
	found = f.settings()
	if f.here, err = found.For(standardInput); err != nil {
		return nil, nil, err
	}
	f.model = f.here.Get("model")
	e, err = openEngine(f.model)
	return e, found, err
}

// settings finds the settings of documents. Every flag of the verb that goes by the
// name of a setting, and was given, is among them.
func (f *engineFlags) settings() *house.Resolver {
	given := map[string][]string{}
	for _, k := range house.Keys() {
		flag := f.set.Lookup(k.Flag)
		if flag == nil || !flag.Changed {
			continue
		}
		given[k.Name] = []string{flag.Value.String()}
		if many, ok := flag.Value.(pflag.SliceValue); ok {
			given[k.Name] = many.GetSlice()
		}
	}
	return house.NewResolver(house.Sources{Config: f.config, Flags: given})
}
