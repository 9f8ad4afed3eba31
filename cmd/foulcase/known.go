package main

import (
	"errors"
	"fmt"
	"io/fs"
	"maps"
	"os"
	"path/filepath"
	"slices"
	"sync"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
	"example.org/foulcase/internal/tree"
)

// knownMarks tells marks that are known from new ones and keeps the file of them.
// A mark counts as often as it stands in the file: one more of the same is new.
// It is safe for concurrent use; one that neither reads nor writes lets all through.
type knownMarks struct {
	from, to string // the files of --known and --write-known; "" for none

	mu      sync.Mutex
	left    map[string]int // by fingerprint: how many known marks were not met yet
	lines   []tree.KnownMark
	written []tree.KnownMark // met so far, as they will stand in the file
	hidden  int              // marks that would have been shown
	done    map[string]bool  // absolute paths of the documents read to the end
}

// knownFiles are the files of known marks: the one that flags name, or else that which
// the settings of each document name. They are safe for concurrent use, finish aside.
type knownFiles struct {
	from, to string // of --known and --write-known; "" for none
	named    func(path string) (file string, err error)

	mu     sync.Mutex
	opened map[string]openedKnown // by file; "" is that of the documents without one
}

type openedKnown struct {
	marks *knownMarks
	err   error
}

// of returns the known marks that count for a document. A file is opened once.
func (f *knownFiles) of(path string) (*knownMarks, error) {
	from := f.from
	if from == "" && f.to == "" && f.named != nil {
		var err error
		if from, err = f.named(path); err != nil {
			return nil, err
		}
	}
	f.mu.Lock()
	defer f.mu.Unlock()
	found, ok := f.opened[from]
	if !ok {
		found.marks, found.err = openKnown(from, f.to)
		f.opened[from] = found
	}
	return found.marks, found.err
}

// finish tells what was not shown, file by file, and writes the file asked for.
func (f *knownFiles) finish(c *console) error {
	for _, from := range slices.Sorted(maps.Keys(f.opened)) {
		if found := f.opened[from]; found.err == nil {
			if err := found.marks.finish(c); err != nil {
				return err
			}
		}
	}
	return nil
}

// openKnown reads the file of known marks. Either name may be "".
func openKnown(from, to string) (*knownMarks, error) {
	k := &knownMarks{from: from, to: to, left: map[string]int{}, done: map[string]bool{}}
	if from == "" {
		return k, nil
	}
	file, err := os.Open(from)
	if errors.Is(err, fs.ErrNotExist) {
		return nil, fmt.Errorf("%s: no such file of known marks; make it with --write-known %[1]s alone", from)
	}
	if err != nil {
		return nil, fmt.Errorf("known marks: %w", err)
	}
	defer file.Close()
	if k.lines, err = tree.ReadKnown(file, from); err != nil {
		return nil, err
	}
	for i, line := range k.lines {
		k.left[line.Fingerprint]++
		if k.lines[i].Path = filepath.FromSlash(line.Path); !filepath.IsAbs(k.lines[i].Path) {
			k.lines[i].Path = absolute(filepath.Join(filepath.Dir(from), k.lines[i].Path))
		}
	}
	return k, nil
}

// keep tells whether a mark is to be shown. Touched says that it would be, were it
// not known.
func (k *knownMarks) keep(path string, m foulcase.Mark, touched bool) bool {
	if k.from == "" && k.to == "" {
		return true
	}
	mark := tree.KnownMark{Fingerprint: house.Fingerprint(path, m), Path: absolute(path), Observed: m.Observed}
	k.mu.Lock()
	defer k.mu.Unlock()
	switch {
	case k.left[mark.Fingerprint] > 0:
		k.left[mark.Fingerprint]--
		if touched {
			k.hidden++
		}
	case k.from != "" || !touched:
		return true
	}
	k.written = append(k.written, mark)
	return false
}

// read says that a document was read to its end, so that its known marks that were
// not met are gone.
func (k *knownMarks) read(path string) {
	k.mu.Lock()
	defer k.mu.Unlock()
	k.done[absolute(path)] = true
}

// finish tells what was not shown and writes the file.
func (k *knownMarks) finish(c *console) error {
	gone, stay := k.unmet()
	if k.hidden > 0 {
		fmt.Fprintf(c.err, "foulcase: %s not shown\n", counted(k.hidden, "known mark"))
	}
	if gone > 0 && k.to == "" {
		fmt.Fprintf(c.err, "foulcase: %s gone from the documents; --known %s --write-known %[2]s takes them out of the file\n",
			counted(gone, "known mark"), k.from)
	}
	if k.to == "" {
		return nil
	}
	marks := append(k.written, stay...)
	for i := range marks {
		marks[i].Path = relativeTo(filepath.Dir(k.to), marks[i].Path)
	}
	if err := tree.WriteKnown(k.to, marks); err != nil {
		return fmt.Errorf("--write-known: %w", err)
	}
	fmt.Fprintf(c.err, "foulcase: %s: %s written, %d taken out\n", k.to, counted(len(marks), "known mark"), gone)
	return nil
}

// unmet counts the known marks that are gone, and returns those that may yet be
// there, in documents that were not read.
func (k *knownMarks) unmet() (gone int, stay []tree.KnownMark) {
	for _, line := range k.lines {
		if k.left[line.Fingerprint] == 0 {
			continue
		}
		k.left[line.Fingerprint]--
		if _, err := os.Stat(line.Path); k.done[line.Path] || errors.Is(err, fs.ErrNotExist) {
			gone++
		} else {
			stay = append(stay, line)
		}
	}
	return gone, stay
}

// absolute is a path from the root of the file system, or as it is where that
// cannot be told.
func absolute(path string) string {
	if absolute, err := filepath.Abs(path); err == nil {
		return absolute
	}
	return path
}

// relativeTo spells an absolute path, with slashes, from a folder on, so that it
// holds on other machines too.
func relativeTo(dir, path string) string {
	if relative, err := filepath.Rel(absolute(dir), path); err == nil {
		path = relative
	}
	return filepath.ToSlash(path)
}

// counted words a number of things: "1 known mark", "2 known marks".
func counted(n int, what string) string {
	if n != 1 {
		what += "s"
	}
	return fmt.Sprintf("%d %s", n, what)
}
