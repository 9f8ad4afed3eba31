package tree

import (
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
)

// maxDepth bounds how deep folders may nest.
const maxDepth = 256

// walk is the way through one folder. What links lead to is looked at when all
// else was seen, so that a file goes by its own name where it has one.
type walk struct {
	finder    *Finder
	root      string // real path of the folder, which no link may leave
	documents []Document
	links     []link
	folders   map[string]bool // real paths of the folders that were gone through
	met       bool            // some document was met, if perhaps found before
	depth     int
	// wanted says of a glob which paths it stands for; nil stands for every document.
	wanted func(path string) bool
}

// link is a symbolic link that the walk met.
type link struct {
	path string
	at   int // the number of documents before it
}

// place is a file or folder: as the user spelled its beginning, and really.
type place struct{ path, real string }

func (p place) join(name string) place {
	return place{filepath.Join(p.path, name), filepath.Join(p.real, name)}
}

// newWalk begins a walk of the folder at path.
func (f *Finder) newWalk(path string) (*walk, place, error) {
	root, err := realPath(path)
	return &walk{finder: f, root: root, folders: map[string]bool{}}, place{path, root}, err
}

// walk goes through a folder and those below it in the order of their names.
func (w *walk) walk(dir place, rules *ignores) {
	if w.folders[dir.real] {
		w.met = true
		return
	}
	w.folders[dir.real] = true
	names, err := os.ReadDir(dir.path)
	if err == nil && w.depth == maxDepth {
		names, err = nil, fmt.Errorf("%s: folders nest deeper than %d here; name those below by themselves", dir.path, maxDepth)
	}
	if err != nil {
		w.add(dir, Document{Path: dir.path, Err: err})
	}
	w.depth++
	defer func() { w.depth-- }()
	for _, d := range names {
		w.visit(dir.join(d.Name()), d, rules)
	}
}

// visit decides about one name of a folder. What a glob does not stand for is not
// counted as passed over.
func (w *walk) visit(at place, d fs.DirEntry, rules *ignores) {
	skipped := &w.finder.skipped
	if w.wanted != nil && !w.wanted(at.path) {
		skipped = new(Skipped)
	}
	switch {
	case d.Name() == ".git": // which nobody expects to be read
	case strings.HasPrefix(d.Name(), ".") && !w.names(at.path):
		skipped.Hidden++
	case !w.finder.options.NoIgnore && rules.ignored(d.Name(), d.IsDir()):
		skipped.Ignored++
	case d.Type()&fs.ModeSymlink != 0:
		w.links = append(w.links, link{at.path, len(w.documents)})
	case d.IsDir():
		w.enter(at, rules.enter(at.path))
	case !d.Type().IsRegular():
		skipped.Special++
	default:
		w.file(at, d)
	}
}

// names tells whether a glob stands for the path by itself.
func (w *walk) names(path string) bool { return w.wanted != nil && w.wanted(path) }

// enter goes into a folder below. One that a glob stands for is read like one that
// is named.
func (w *walk) enter(dir place, rules *ignores) {
	wanted := w.wanted
	if w.names(dir.path) {
		w.wanted = nil
	}
	w.walk(dir, rules)
	w.wanted = wanted
}

// file takes a plain file, if it is a document.
func (w *walk) file(at place, d fs.DirEntry) {
	if w.wanted != nil && !w.wanted(at.path) {
		return
	}
	options := w.finder.options
	format, known := options.Format(at.path)
	if known && options.Ignored != nil && options.Ignored(at.path) {
		w.finder.skipped.Unasked++
		return
	}
	if !known && w.wanted == nil {
		w.finder.skipped.Foreign++
		return
	}
	document := Document{Path: at.path}
	if info, err := d.Info(); err == nil {
		document.Size = info.Size()
	}
	if !options.AnyBytes {
		binary, err := looksBinary(at.path, format)
		if binary {
			w.finder.skipped.Binary++
			return
		}
		document.Err = err
	}
	w.add(at, document)
}

// add takes a document unless its file was found before.
func (w *walk) add(at place, d Document) {
	w.met = true
	if w.finder.claim(at.real) {
		w.documents = append(w.documents, d)
	}
}

// follow looks at the links that the walk met, and at those below them, and puts
// what they lead to in their place.
func (w *walk) follow() {
	var all []Document
	done := 0
	for _, l := range w.links {
		inner := *w
		inner.documents, inner.links = nil, nil
		inner.followLink(l.path)
		inner.follow()
		w.met = w.met || inner.met
		all = slices.Concat(all, w.documents[done:l.at], inner.documents)
		done = l.at
	}
	w.documents = append(all, w.documents[done:]...)
}

// followLink visits what a link stands for, when that is inside the folder.
func (w *walk) followLink(path string) {
	real, err := realPath(path)
	if err != nil || !below(w.root, real) {
		w.finder.skipped.Links++
		return
	}
	at := place{path, real}
	info, err := os.Stat(path)
	switch {
	case err != nil:
		w.add(at, Document{Path: path, Err: err})
	case info.IsDir():
		w.enter(at, ignoresOf(real))
	case !info.Mode().IsRegular():
		w.finder.skipped.Special++
	default:
		w.file(at, fs.FileInfoToDirEntry(info))
	}
}
