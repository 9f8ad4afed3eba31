package text

import (
	"fmt"
	"io"
	"iter"
	"path/filepath"
	"slices"
	"strings"
	"sync"
)

// Format names a document format.
type Format string

// The formats.
const (
	Plain    Format = "plain"
	Markdown Format = "markdown"
	HTML     Format = "html"
	XML      Format = "xml"
	LaTeX    Format = "latex"
	RST      Format = "rst"
	AsciiDoc Format = "asciidoc"
)

// format is an entry of the registry: to add a format, write its reader and
// give it an entry here. A reader yields blocks in the order of the source until
// yield returns false, and an error at most once, as the last thing.
type format struct {
	name       Format
	about      string   // what is read of it, in a line
	extensions []string // lower case, with the point
	names      []string // whole names of files, lower case
	languages  []string // identifiers of the Language Server Protocol 3.17, where it has any
	read       func(r io.Reader, o Options, yield func(*Block, error) bool)
	// splice writes edits into a source whose parts are packed; nil where the
	// source is the text itself.
	splice func(source []byte, edits []Edit) ([]byte, error)
}

// registered is the registry, made once.
var registered struct {
	sync.Once
	formats []format
}

// registry lists the formats; it is not to be changed.
func registry() []format {
	registered.Do(func() { registered.formats = allFormats() })
	return registered.formats
}

func allFormats() []format {
	return slices.Concat([]format{
		{
			name: Plain, about: "paragraphs, whether lines are wrapped or not",
			extensions: []string{".txt", ".text"}, languages: []string{"plaintext"}, read: readPlain,
		},
		{
			name: Markdown, about: "all prose, that in HTML too; not code, link destinations and front matter",
			extensions: []string{".md", ".markdown", ".mkd"}, languages: []string{"markdown"}, read: readMarkdown,
		},
		{
			name: HTML, about: "text and the attributes that are shown, in the language asked for; not code and scripts",
			extensions: []string{".html", ".htm", ".xhtml"}, languages: []string{"html"}, read: readHTML,
		},
		{
			name: XML, about: "text of two words or more, in the language asked for; not elements named as code",
			extensions: []string{".xml", ".dita", ".ditamap", ".dbk"}, languages: []string{"xml"}, read: readXML,
		},
		{
			name: LaTeX, about: "text and the arguments that are text; not mathematics, code, references and comments",
			extensions: []string{".tex", ".ltx"}, languages: []string{"latex", "tex"}, read: readLaTeX,
		},
		{
			name: RST, about: "text and the directives that hold text; not code, roles that are code, and comments",
			extensions: []string{".rst", ".rest"}, languages: []string{"restructuredtext"}, read: readRST,
		},
		{
			name: AsciiDoc, about: "text, titles and tables; not listings, attributes, macros and comments",
			extensions: []string{".adoc", ".asciidoc", ".asc"}, languages: []string{"asciidoc"}, read: readAsciiDoc,
		},
	}, recordFormats(), packedFormats(), sourceFormats())
}

// Options says what is read of a document and bounds what reading may take. The
// zero value is good.
type Options struct {
	// Chunk is the most bytes of a block of a format that streams; 0 means
	// 64 KiB, less than 4 KiB means 4 KiB.
	Chunk int
	// MaxBytes is the most bytes of a document of a format that is read as a
	// whole; 0 means 16 MiB.
	MaxBytes int64
	// Language is the primary subtag (BCP 47) of the language whose prose is read,
	// where a format tells languages apart; "" means "en".
	Language string
	// Fields are the columns or members that are read of a format of records; none
	// means all that hold prose.
	Fields []string
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

// About says in a line what is read of the format.
func (f Format) About() string {
	e, _ := f.entry()
	return e.about
}

// Packed reports that the text stands in parts inside the document, packed, so
// that offsets are of a part.
func (f Format) Packed() bool {
	e, _ := f.entry()
	return e.splice != nil
}

// FormatOf returns the format of a file by its name or its name's ending; ok is
// false, and the format Plain, when nothing is known of it.
func FormatOf(path string) (f Format, ok bool) {
	name := strings.ToLower(filepath.Base(path))
	ext := filepath.Ext(name)
	for _, f := range registry() {
		if slices.Contains(f.names, name) || slices.Contains(f.extensions, ext) {
			return f.name, true
		}
	}
	return Plain, false
}

// FormatOfLanguage is FormatOf for a language identifier of the Language Server
// Protocol.
func FormatOfLanguage(id string) (f Format, ok bool) {
	for _, f := range registry() {
		if slices.Contains(f.languages, id) {
			return f.name, true
		}
	}
	return Plain, false
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
	return format{}, refusal{fmt.Errorf("no format %q: there are %v", string(f), Formats()), ErrFormat}
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
