package house

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"sync"

	"example.org/foulcase"
)

// maxList is the most bytes of a list of house words or of a file of decisions.
const maxList = 64 << 20

// vocabulary is the house words of some lists. It is safe for concurrent use.
type vocabulary struct {
	paths  []string // of the lists; the user's own is the last
	own    string   // the user's own, which may be missing; "" when there is none
	target string   // the list that takes new words; "" when none can

	mu    sync.Mutex
	house *foulcase.House // nil: no words
}

// openVocabulary reads lists, and the user's own at the path own, if it is there. Words are
// added to the last of the lists that were named, else to the user's own.
func openVocabulary(named []string, own string) (*vocabulary, error) {
	v := &vocabulary{own: own, target: own}
	if len(named) > 0 {
		v.target = named[len(named)-1]
	}
	v.paths = append(v.paths, named...)
	if own != "" {
		v.paths = append(v.paths, own)
	}
	var err error
	v.house, err = v.read()
	return v, err
}

// read reads the lists, with more entries behind the last.
func (v *vocabulary) read(more ...string) (*foulcase.House, error) {
	var lists []foulcase.HouseList
	for _, path := range v.paths {
		data, err := readBounded(path)
		if absent(err) && path == v.own {
			continue
		}
		if err != nil {
			return nil, fmt.Errorf("house words: %w", err)
		}
		lists = append(lists, foulcase.HouseList{Name: path, Text: bytes.NewReader(data)})
	}
	for _, entry := range more {
		lists = append(lists, foulcase.HouseList{Name: "new entry", Text: strings.NewReader(entry)})
	}
	if len(lists) == 0 {
		return nil, nil
	}
	return foulcase.ReadHouseLists(lists...)
}

// readBounded reads a file of at most maxList bytes.
func readBounded(path string) ([]byte, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	data, err := io.ReadAll(io.LimitReader(f, maxList+1))
	if err == nil && len(data) > maxList {
		err = fmt.Errorf("%s: longer than %d bytes; is it the right file?", path, maxList)
	}
	return data, err
}

func (v *vocabulary) get() *foulcase.House {
	v.mu.Lock()
	defer v.mu.Unlock()
	return v.house
}

// add appends an entry to the list that takes new ones, unless it is there.
func (v *vocabulary) add(entry string) (file string, err error) {
	entry = strings.TrimSpace(entry)
	switch {
	case v.target == "":
		return "", errors.New(`there is no list to add to: name one with --house, or as house = ["house-words.txt"] in ` + FileName)
	case entry == "" || strings.ContainsAny(entry, "\n\r") || strings.HasPrefix(entry, "#"):
		return "", fmt.Errorf("%q cannot be a house word: give one word, without line breaks", entry)
	}
	v.mu.Lock()
	defer v.mu.Unlock()
	house, err := v.read(entry)
	if err != nil {
		return "", err
	}
	if err := appendLine(v.target, entry); err != nil {
		return "", err
	}
	v.house = house
	return v.target, nil
}

// appendLine adds a line to a file, which it makes when there is none, in one write:
// programs that do so at once do not get into each other's lines.
func appendLine(path, line string) (err error) {
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		return err
	}
	f, err := os.OpenFile(path, os.O_RDWR|os.O_CREATE|os.O_APPEND, 0o644)
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, f.Close()) }()
	info, err := f.Stat()
	if err != nil {
		return err
	}
	var last [1]byte
	if n := info.Size(); n > 0 {
		if _, err := f.ReadAt(last[:], n-1); err != nil {
			return err
		}
		if last[0] != '\n' {
			line = "\n" + line
		}
	}
	_, err = f.WriteString(line + "\n")
	return err
}
