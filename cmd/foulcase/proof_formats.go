package main

import (
	"fmt"
	"io"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/internal/report"
)

func formatNames() []string {
	var names []string
	for _, f := range foulcase.Formats() {
		names = append(names, f.Name)
	}
	return names
}

// formatObject is a format as --formats --emit jsonl prints it.
type formatObject struct {
	Name       string   `json:"name"`
	About      string   `json:"about"`
	Extensions []string `json:"extensions"`
}

// printFormats lists the formats that documents may have.
func printFormats(w io.Writer, emit string) error {
	enc := report.JSONLines(w)
	for _, f := range foulcase.Formats() {
		var err error
		if emit == "jsonl" {
			err = enc.Encode(formatObject(f))
		} else {
			_, err = fmt.Fprintf(w, "%-10s %s\n%11s%s\n", f.Name, f.About, "", strings.Join(f.Extensions, " "))
		}
		if err != nil {
			return err
		}
	}
	return nil
}
