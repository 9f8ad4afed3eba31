package text

import (
	"fmt"
	"io"
	"iter"
	"path/filepath"
	"slices"
	"strings"
)

// Format names a document format.
type Format string

// The formats.
const (
	Plain    Format = "plain"
	Markdown Format = "markdown"
)

// format is an entry of the registry: to add a format, write its reader and
// give it one line here. A reader yields blocks in the order of the source until
// yield returns false, and an error at most once, as the last thing.
type format struct {
	name       Format
	extensions []string // lower case, with the point
	read       func(r io.Reader, o Options, yield func(*Block, error) bool)
}

func registry() []format {
	return []format{
		{Plain, []string{".txt", ".text"}, readPlain},
		{Markdown, []string{".md", ".markdown", ".mkd"}, readMarkdown},
	}
}

// Options bound what reading may take. The zero value is good.
type Options struct {
	// Chunk is the most bytes of a block of a format that streams; 0 means
	// 64 KiB, less than 4 KiB means 4 KiB.
	Chunk int
	// MaxBytes is the most bytes of a document of a format that is read as a
	// whole; 0 means 16 MiB.
	MaxBytes int64
}

// Formats returns the names of all formats.
func Formats() []Format {
	var names []Format
	for _, f := range registry() {
		names = append(names, f.name)
	}
	return names
}

// Extensions returns the file name endings by which FormatOf knows the format.
func (f Format) Extensions() []string {
	e, _ := f.entry()
	return e.extensions
}

// FormatOf returns the format of a file by its name's ending, Plain when
// nothing is known of it.
func FormatOf(path string) Format {
	ext := strings.ToLower(filepath.Ext(path))
	for _, f := range registry() {
		if slices.Contains(f.extensions, ext) {
			return f.name
		}
	}
	return Plain
}

// ParseFormat returns the format of that name, or an error that lists the names.
func ParseFormat(name string) (Format, error) {
	e, err := Format(name).entry()
	return e.name, err
}

func (f Format) entry() (format, error) {
	all := registry()
	if i := slices.IndexFunc(all, func(e format) bool { return e.name == f }); i >= 0 {
		return all[i], nil
	}
	return format{}, fmt.Errorf("no format %q: there are %v", string(f), Formats())
}

// Blocks reads a document and yields its prose, block by block in the order of
// the source. Reading stops at the first error, which comes with a nil block.
// Plain text streams: memory is bounded by o.Chunk. Odd bytes are never an
// error: what is not UTF-8 stays in the text.
func Blocks(r io.Reader, f Format, o Options) iter.Seq2[*Block, error] {
	return func(yield func(*Block, error) bool) {
		e, err := f.entry()
		if err != nil {
			yield(nil, err)
			return
		}
		e.read(r, o, yield)
	}
}
