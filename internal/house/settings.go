// Package house holds what an organisation, or one user, settled about its
// documents: the settings of foulcase.toml, the lists of house words, and the
// decisions about marks. It also knows a mark again from run to run, by its
// fingerprint.
//
// The settings of a document come from five places; the first that sets a key
// wins: the command's flags, the environment, the project's foulcase.toml, found
// upwards from the document's folder, the user's own, and the defaults.
package house

import (
	"cmp"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strconv"

	"example.org/foulcase"
)

// Settings are what holds for the documents of one folder. They are safe for
// concurrent use.
type Settings struct {
	values []Value // in the order of Keys; of what adds up, the strongest place first
	files  []string
	words  *vocabulary
	stets  *book
}

// Load reads the settings that hold where a project has its file at path, or none when path is
// "": those of the environment and the user's own among them.
func Load(path string) (*Settings, error) {
	r := NewResolver(Sources{})
	switch {
	case r.sources.Config == None:
		path = ""
	case path != "":
		path = absolute(path)
	}
	return r.load(path)
}

// Values lists every value and who says so, with those of the defaults, in the order of
// Keys.
func (s *Settings) Values() []Value {
	var all []Value
	for _, k := range Keys() {
		n := len(all)
		for _, v := range s.values {
			if v.Key == k.Name {
				all = append(all, v)
			}
		}
		if len(all) == n {
			all = append(all, Value{Key: k.Name, Text: k.Default, Origin: "default"})
		}
	}
	return all
}

// of returns the values of a key that were set.
func (s *Settings) of(key string) []string {
	var all []string
	for _, v := range s.values {
		if v.Key == key {
			all = append(all, v.Text)
		}
	}
	return all
}

// Get returns the value of a key of one, "" when nobody sets it.
func (s *Settings) Get(key string) string {
	if all := s.of(key); len(all) > 0 {
		return all[0]
	}
	return ""
}

// Origin says who sets a key of one value, "" when nobody does.
func (s *Settings) Origin(key string) string {
	for _, v := range s.values {
		if v.Key == key {
			return v.Origin
		}
	}
	return ""
}

// Options is how the document at path is to be judged.
func (s *Settings) Options(path string) foulcase.Options {
	o := foulcase.Options{
		Fields:   s.of("fields"),
		Encoding: s.Get("encoding"),
		House:    s.words.get(),
	}
	o.Format, _ = s.Format(path)
	// Both were checked when they were set.
	o.Variety, _ = foulcase.ParseVariety(cmp.Or(s.Get("variety"), "any"))
	o.Budget, _ = strconv.ParseFloat(cmp.Or(s.Get("budget"), "0"), 64)
	return o
}

// Format is that of the first glob that matches a document's path, else that of its
// extension; ok is false, and the format plain, when neither is known.
func (s *Settings) Format(path string) (name string, ok bool) {
	for _, v := range s.values {
		if v.Key == "formats" && matches(v.Glob, v.dir, absolute(path)) {
			return v.Text, true
		}
	}
	return foulcase.FormatOf(path)
}

// Ignores tells whether a file is to be passed over when a folder that holds it is read:
// the globs say so, or it is itself a file of settings, or one that they name.
func (s *Settings) Ignores(path string) bool {
	if slices.Contains(s.Files(), absolute(path)) || s.Get("known") == absolute(path) {
		return true
	}
	return slices.ContainsFunc(s.values, func(v Value) bool {
		return v.Key == "ignore" && matches(v.Text, v.dir, absolute(path))
	})
}

func absolute(path string) string {
	if abs, err := filepath.Abs(path); err == nil {
		return abs
	}
	return path
}

// Stands tells whether someone decided that a mark of the document at path stand.
func (s *Settings) Stands(path string, m foulcase.Mark) bool { return s.stets.stands(path, m) }

// AddWord adds a house word, or an entry of another kind, to the list that was named last, or
// to the user's own where none was named. It returns that list, and an error when the entry
// contradicts another or cannot be written. From then on Options heeds the word.
func (s *Settings) AddWord(word string) (file string, err error) {
	if err := s.writable("house", s.words.target); err != nil {
		return "", err
	}
	return s.words.add(word)
}

// Record keeps a decision, and from then on Stands heeds it. Decisions may be recorded by
// several programs at once.
func (s *Settings) Record(d Decision) error {
	if s.stets.path == "" {
		return errors.New("there is no file for decisions: name one as stets in " + FileName)
	}
	if err := s.writable("stets", s.stets.path); err != nil {
		return err
	}
	return s.stets.record(d)
}

// writable refuses a file outside of the project whose settings name it: documents may
// come from strangers, and their settings with them.
func (s *Settings) writable(key, path string) error {
	for _, v := range s.values {
		if v.Key == key && v.Text == path && v.dir != "" && !within(cmp.Or(projectOf(v.dir), v.dir), path) {
			return fmt.Errorf("%s: named by %s, but outside of its project; write there by hand, or name a file inside", path, v.Origin)
		}
	}
	return nil
}

// checkFiles refuses what is no plain file, such as a pipe that nobody writes to, where a
// project's settings name it.
func (s *Settings) checkFiles() error {
	for _, v := range s.values {
		if key, _ := keyOf(v.Key); !key.paths || v.dir == "" {
			continue
		}
		if info, err := os.Stat(v.Text); err == nil && !info.Mode().IsRegular() {
			return fmt.Errorf("%s: named by %s, but no plain file; name another", v.Text, v.Origin)
		}
	}
	return nil
}

// Decisions lists what was decided, each once, in order.
func (s *Settings) Decisions() []Decision { return s.stets.list() }

// StetFile is where Record writes; "" when there is no such file.
func (s *Settings) StetFile() string { return s.stets.path }

// Files lists the files that the settings were read from, or would be if they
// were there, for a program that watches them.
func (s *Settings) Files() []string {
	all := slices.Concat(s.files, s.words.paths)
	if s.stets.path != "" {
		all = append(all, s.stets.path)
	}
	return all
}
