package tree

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"example.org/foulcase"
)

// Document is one file to read. One whose Err is set could not be found; it keeps
// its place, so that messages come in the order of the documents.
type Document struct {
	Path string // beginning as the user spelled it
	Size int64  // bytes
	Err  error
}

// Options say which files below a folder are documents. The zero value is good.
type Options struct {
	// NoIgnore reads what the ignore rules of git leave out, too.
	NoIgnore bool
	// AnyBytes reads files that look binary, too, as those of some encodings do.
	AnyBytes bool
	// Format returns the format of the file at a path, if it has one; nil stands for
	// foulcase.FormatOf.
	Format func(path string) (name string, ok bool)
	// Ignored tells which files are passed over beside those that git ignores; nil
	// stands for none.
	Ignored func(path string) bool
}

// Skipped counts what was passed over below folders, by reason.
type Skipped struct {
	Ignored int // by the rules of git; a folder counts as one
	Unasked int // by Options.Ignored
	Hidden  int // a name that begins with a point; a folder counts as one
	Foreign int // files of no known format
	Binary  int
	Links   int // symbolic links that lead out of the folder, or nowhere
	Special int // devices, pipes, sockets
}

// String lists the reasons that occurred: "3 ignored by git, 2 binary". It is empty
// when nothing was passed over.
func (s Skipped) String() string {
	var parts []string
	for _, reason := range []struct {
		n    int
		what string
	}{
		{s.Ignored, "ignored by git"},
		{s.Unasked, "ignored by settings"},
		{s.Hidden, "hidden"},
		{s.Foreign, "of no known format"},
		{s.Binary, "binary"},
		{s.Links, "linked from outside"},
		{s.Special, "no plain file"},
	} {
		if reason.n > 0 {
			parts = append(parts, fmt.Sprintf("%d %s", reason.n, reason.what))
		}
	}
	return strings.Join(parts, ", ")
}

// Finder turns operands into documents, in the order of the operands and, below a
// folder, of the names. A file that is named or met again is left out. It is for
// one goroutine.
type Finder struct {
	options Options
	found   []Document
	claimed map[string]bool // real paths of the files found
	skipped Skipped
}

// NewFinder returns a finder that has found nothing yet.
func NewFinder(o Options) *Finder {
	if o.Format == nil {
		o.Format = foulcase.FormatOf
	}
	return &Finder{options: o, claimed: map[string]bool{}}
}

// Found returns the documents so far. The slice belongs to the caller.
func (f *Finder) Found() []Document { return slices.Clone(f.found) }

// Skipped returns what was passed over below folders so far.
func (f *Finder) Skipped() Skipped { return f.skipped }

// Add finds what an operand stands for: a file, whatever its format; a folder, with
// the documents below it; or, when nothing of that name exists, a glob in which
// "*", "?" and "[a-c]" stand for anything but a slash and "**" for any folders.
func (f *Finder) Add(operand string) {
	if _, err := os.Lstat(operand); err != nil && isGlob(operand) {
		f.addGlob(operand)
		return
	}
	f.AddPath(operand)
}

// AddPath is Add for a path that is no glob.
func (f *Finder) AddPath(path string) {
	info, err := os.Stat(path)
	if err != nil {
		f.fail(path, err)
		return
	}
	if info.IsDir() {
		f.addFolder(path)
		return
	}
	real, err := realPath(path)
	if err != nil {
		real = path
	}
	if f.claim(real) {
		f.found = append(f.found, Document{Path: path, Size: info.Size()})
	}
}

// claim tells whether the file at a real path was not found before.
func (f *Finder) claim(real string) bool {
	if f.claimed[real] {
		return false
	}
	f.claimed[real] = true
	return true
}

// fail appends what cannot be found.
func (f *Finder) fail(path string, err error) {
	f.found = append(f.found, Document{Path: path, Err: err})
}

// addFolder appends the documents below a folder.
func (f *Finder) addFolder(path string) {
	w, dir, err := f.newWalk(path)
	if err != nil {
		f.fail(path, err)
		return
	}
	before := f.skipped
	w.walk(dir, ignoresOf(w.root))
	w.follow()
	f.found = append(f.found, w.documents...)
	if !w.met {
		f.fail(path, fmt.Errorf("%s: no text in this folder (looked for %s%s); name other files one by one",
			path, strings.Join(extensions(), " "), f.skipped.since(before)))
	}
}

// since words what was passed over after before, for the middle of a sentence.
func (s Skipped) since(before Skipped) string {
	only := Skipped{
		Ignored: s.Ignored - before.Ignored,
		Unasked: s.Unasked - before.Unasked,
		Hidden:  s.Hidden - before.Hidden,
		Foreign: s.Foreign - before.Foreign,
		Binary:  s.Binary - before.Binary,
		Links:   s.Links - before.Links,
		Special: s.Special - before.Special,
	}
	if only == (Skipped{}) {
		return ""
	}
	return "; passed over: " + only.String()
}

// extensions lists those of every known format.
func extensions() []string {
	var all []string
	for _, f := range foulcase.Formats() {
		all = append(all, f.Extensions...)
	}
	return all
}

// realPath is the absolute path without symbolic links.
func realPath(path string) (string, error) {
	absolute, err := filepath.Abs(path)
	if err != nil {
		return "", err
	}
	return filepath.EvalSymlinks(absolute)
}

// below tells whether a real path is a real folder or lies below it.
func below(root, path string) bool {
	inside, err := filepath.Rel(root, path)
	return err == nil && filepath.IsLocal(inside)
}
