package house

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/internal/charset"
	"github.com/agnivade/levenshtein"
)

// A Key is a setting that foulcase.toml may make.
type Key struct {
	Name    string
	Type    string // of its value: "text", "number", "texts" or "table"
	About   string // one line
	Default string // what holds where nobody sets it, in words
	Example string // a line of foulcase.toml
	// Variable is the environment variable that sets it too, Flag the flag of the
	// command; "" when there is none.
	Variable, Flag string

	adds  bool // what several places say adds up; else the strongest wins
	paths bool // values are paths, relative to the file's folder
	check func(text string) error
}

// Keys lists all settings, in the order in which they are shown.
func Keys() []Key {
	return []Key{
		{
			Name: "variety", Type: "text", About: "the English asked for: en-US, en-GB or any", Default: "any",
			Example: `variety = "en-GB"`, Variable: "FOULCASE_VARIETY", Flag: "variety", check: checkVariety,
		},
		{
			Name: "budget", Type: "number", About: "false alarms to bear in 1,000 words of good text", Default: "the model's own",
			Example: `budget = 1.5`, Variable: "FOULCASE_BUDGET", Flag: "budget", check: checkBudget,
		},
		{
			Name: "model", Type: "text", About: "file of the model", Default: "the English model inside foulcase",
			Example: `model = "skarrow.fcm"`, Variable: "FOULCASE_MODEL", Flag: "model", paths: true,
		},
		{
			Name: "house", Type: "texts", About: "lists of house words; those of every place count", Default: "none",
			Example: `house = ["house-words.txt"]`, Flag: "house", adds: true, paths: true,
		},
		{
			Name: "encoding", Type: "text", About: "encoding of the documents that do not tell it", Default: "utf-8",
			Example: `encoding = "windows-1252"`, Flag: "encoding", check: checkEncoding,
		},
		{
			Name: "formats", Type: "table", About: "format of the documents that match a glob; the first match counts", Default: "by extension",
			Example: `formats = { "logs/**" = "plain" }`, adds: true, check: checkFormat,
		},
		{
			Name: "fields", Type: "texts", About: "columns or members to read of records", Default: "all that hold prose",
			Example: `fields = ["remarks"]`, Flag: "field",
		},
		{
			Name: "ignore", Type: "texts", About: "globs of files and folders to pass over; those of every place count", Default: "none",
			Example: `ignore = ["archive/", "*.draft.md"]`, adds: true, check: checkGlob,
		},
		{
			Name: "stets", Type: "text", About: "file of what was decided about marks", Default: "the user's own",
			Example: `stets = "stets.jsonl"`, paths: true,
		},
		{
			Name: "known", Type: "text", About: "file of the marks that are known and not shown again", Default: "none",
			Example: `known = "known-marks.tsv"`, Flag: "known", paths: true,
		},
	}
}

// keyOf returns the setting of a name.
func keyOf(name string) (Key, bool) {
	for _, k := range Keys() {
		if k.Name == name {
			return k, true
		}
	}
	return Key{}, false
}

// accept checks one value.
func (k Key) accept(text string) error {
	switch {
	case text == "":
		return fmt.Errorf("%s is empty: give a value, or leave %s out", k.Name, k.Name)
	case strings.ContainsRune(text, 0):
		return fmt.Errorf("%s has a NUL in it", k.Name)
	case k.check == nil:
		return nil
	}
	if err := k.check(text); err != nil {
		return fmt.Errorf("%s: %w; write for example %s", k.Name, err, k.Example)
	}
	return nil
}

func checkVariety(text string) error {
	_, err := foulcase.ParseVariety(text)
	return err
}

func checkBudget(text string) error {
	n, err := strconv.ParseFloat(text, 64)
	if err != nil || !(n > 0) || math.IsInf(n, 0) {
		return fmt.Errorf("%q is no number above 0", text)
	}
	return nil
}

func checkEncoding(text string) error {
	_, err := charset.Find(text)
	return err
}

func checkFormat(text string) error {
	var names []string
	for _, f := range foulcase.Formats() {
		if f.Name == text {
			return nil
		}
		names = append(names, f.Name)
	}
	return fmt.Errorf("no format %q: there are %s", text, strings.Join(names, ", "))
}

// unknownKey says what a key that is none may have been meant to be.
func unknownKey(name string) error {
	best, least := "", 3 // a slip or two; more is another word
	var names []string
	for _, k := range Keys() {
		names = append(names, k.Name)
		if d := levenshtein.ComputeDistance(strings.ToLower(name), k.Name); d < least {
			best, least = k.Name, d
		}
	}
	if best != "" {
		return fmt.Errorf("there is no key %q: did you mean %q?", name, best)
	}
	return fmt.Errorf("there is no key %q: there are %s", name, strings.Join(names, ", "))
}
