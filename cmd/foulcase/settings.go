package main

import (
	"fmt"
	"io"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
	"example.org/foulcase/internal/report"
)

// printSettings prints every value that holds for the documents at paths, or for the
// working directory when there are none, and who says so.
func printSettings(w io.Writer, emit string, found *house.Resolver, paths []string) error {
	if len(paths) == 0 {
		paths = []string{standardInput}
	}
	enc := report.JSONLines(w)
	for i, path := range paths {
		settings, err := found.For(path)
		if err != nil {
			return err
		}
		if emit == "jsonl" {
			for _, v := range settings.Values() {
				if err := enc.Encode(settingObject{path, v}); err != nil {
					return err
				}
			}
			continue
		}
		if len(paths) > 1 {
			if i > 0 {
				fmt.Fprintln(w)
			}
			fmt.Fprintf(w, "%s:\n", report.Visible(path))
		}
		for _, v := range settings.Values() {
			text := v.Text
			if v.Glob != "" {
				text = fmt.Sprintf("%s for %s", v.Text, v.Glob)
			}
			if _, err := fmt.Fprintf(w, "%-9s %s  (%s)\n", v.Key, report.Visible(text), report.Visible(v.Origin)); err != nil {
				return err
			}
		}
	}
	return nil
}

// settingObject is a value as --emit jsonl prints it.
type settingObject struct {
	Path string `json:"path"`
	house.Value
}

// documentFormat tells the format of a file below a folder by its settings. A file whose settings cannot be read keeps its place, so that
// reading it reports why.
func documentFormat(found *house.Resolver) func(path string) (name string, ok bool) {
	return func(path string) (string, bool) {
		s, err := found.For(path)
		if err != nil {
			return foulcase.FormatOf(path)
		}
		return s.Format(path)
	}
}

// ignoredDocuments tells which files below folders their settings have passed over.
func ignoredDocuments(found *house.Resolver) func(path string) bool {
	return func(path string) bool {
		s, err := found.For(path)
		return err == nil && s.Ignores(path)
	}
}

// knownFile tells which file of known marks the settings of a document name.
func knownFile(found *house.Resolver) func(path string) (string, error) {
	return func(path string) (string, error) {
		s, err := found.For(path)
		if err != nil {
			return "", err
		}
		return s.Get("known"), nil
	}
}
