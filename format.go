package foulcase

import (
	"slices"

	"example.org/foulcase/internal/text"
)

// Format is a document format that Engine.Proof reads.
type Format struct {
	Name       string   // as Options.Format takes it
	About      string   // what is read of it, in a line
	Extensions []string // by which FormatOf knows it, lower case, with the point
}

// Formats lists the document formats.
func Formats() []Format {
	var all []Format
	for _, f := range text.Formats() {
		all = append(all, Format{string(f), f.About(), f.Extensions()})
	}
	return all
}

// FormatOf returns the name of the format that a path's extension stands for; ok
// is false, and the format plain, when it stands for none.
func FormatOf(path string) (name string, ok bool) {
	f, ok := text.FormatOf(path)
	return string(f), ok
}

// FormatOfLanguage is FormatOf for a language identifier of the Language Server
// Protocol ("plaintext", "markdown").
func FormatOfLanguage(id string) (name string, ok bool) {
	f, ok := text.FormatOfLanguage(id)
	return string(f), ok
}

// Edit replaces Length bytes at Offset of a document, or of a part of it, by Text.
type Edit struct {
	Part           string // as Mark.Part
	Offset, Length int64
	Text           []byte // as the document spells it, in its encoding
}

// Splice returns a copy of a document with the edits made, in any order; it
// is an error when two of them overlap or one lies outside. Without edits the copy has the same
// bytes. A packed document comes back packed.
func Splice(document []byte, format string, edits []Edit) ([]byte, error) {
	f, err := text.ParseFormat(format)
	if err != nil {
		return nil, err
	}
	var inner []text.Edit
	for _, e := range edits {
		inner = append(inner, text.Edit{Part: e.Part, Start: e.Offset, End: e.Offset + e.Length, Text: e.Text})
	}
	return text.Splice(document, f, slices.Clip(inner))
}
