// Package house holds what an organisation, or one user, settled about its
// documents: the settings of foulcase.toml, the lists of house words, and the
// decisions about marks. It also tells marks apart from run to run, by their
// fingerprints.
//
// Settings of one document come from five places; the first that has a word on it wins: the
// command's flags, the environment, the project's foulcase.toml, found upwards
// from the document's folder, the user's own, and the defaults.
package house

import "example.org/foulcase"

// Settings are what holds for the documents of one folder. They are safe for
// concurrent use.
type Settings struct{}

// Load reads the settings of one file, with nothing before and behind it but
// the defaults. The path "" stands for a file that sets nothing.
func Load(path string) (*Settings, error) { return &Settings{}, nil }

// Options is how the document at path is to be judged.
func (s *Settings) Options(path string) foulcase.Options {
	format, _ := foulcase.FormatOf(path)
	return foulcase.Options{Format: format}
}

// Stands tells whether someone decided that a mark of the document at path stand.
func (s *Settings) Stands(path string, m foulcase.Mark) bool { return false }

// AddWord adds a house word and returns the list it was added to.
func (s *Settings) AddWord(word string) (file string, err error) { return "", nil }

// Record keeps a decision.
func (s *Settings) Record(d Decision) error { return nil }

// Files lists the files that the settings were read from, or would be if they
// were there, for a program that watches them.
func (s *Settings) Files() []string { return nil }
