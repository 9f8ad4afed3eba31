package house

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"

	"github.com/pelletier/go-toml/v2"
	"github.com/pelletier/go-toml/v2/unstable"
)

const (
	// maxFile is the most bytes of a file of settings.
	maxFile = 1 << 20
	// maxValues is the most values that a file may give, those of lists and tables
	// counted one by one.
	maxValues = 10_000
	// byteOrderMark stands at the start of some editors' files.
	byteOrderMark = "\uFEFF"
)

// Value is one value of a setting, and who says so. Settings of several values have
// several.
type Value struct {
	Key    string `json:"key"`
	Glob   string `json:"glob,omitempty"` // of formats: the documents it is for
	Text   string `json:"value"`
	Origin string `json:"origin"` // "FILE:LINE", "FOULCASE_...", "--flag" or "default"

	dir string // that globs are relative to; "" is the root of the file system
}

// readFile reads the values of a file of settings. Errors name the file, the line
// and the column, and say what would be right.
func readFile(path string) ([]Value, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	data, err := io.ReadAll(io.LimitReader(f, maxFile+1))
	if err != nil {
		return nil, err
	}
	return parse(path, data)
}

// parse is readFile for a file that was read.
func parse(path string, data []byte) ([]Value, error) {
	if len(data) > maxFile {
		return nil, fmt.Errorf("%s: longer than %d bytes, which is no file of settings; is it the right file?", path, maxFile)
	}
	data = bytes.TrimPrefix(data, []byte(byteOrderMark))
	var any map[string]any
	if err := toml.Unmarshal(data, &any); err != nil { // is it TOML, with no key twice
		if bad := (*toml.DecodeError)(nil); errors.As(err, &bad) {
			line, column := bad.Position()
			return nil, fmt.Errorf("%s:%d:%d: %s; see toml.io for how TOML is written", path, line, column, bad.Error())
		}
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	r := reader{path: path, dir: filepath.Dir(path)}
	r.toml.Reset(data)
	for r.toml.NextExpression() {
		if err := r.expression(r.toml.Expression()); err != nil {
			return nil, err
		}
	}
	if err := r.toml.Error(); err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	return r.values, nil
}

// reader takes values out of TOML that is known to be sound.
type reader struct {
	path, dir string
	toml      unstable.Parser
	table     []string // that the lines are in
	values    []Value
}

// expression takes a line, with what follows it inside its brackets.
func (r *reader) expression(e *unstable.Node) error {
	if e.Kind != unstable.Table && e.Kind != unstable.ArrayTable {
		return r.keyValue(r.table, e)
	}
	var at *unstable.Node
	r.table, at = names(nil, e.Key())
	key, ok := keyOf(r.table[0])
	switch {
	case !ok:
		return r.fail(at, unknownKey(r.table[0]))
	case e.Kind == unstable.ArrayTable || key.Type != "table" || len(r.table) > 1:
		return r.fail(at, wrongType(key))
	}
	return nil
}

// names reads a key of one or more names behind those of a table, and returns its first node.
func names(table []string, key unstable.Iterator) (all []string, first *unstable.Node) {
	all = append(all, table...)
	for key.Next() {
		if first == nil {
			first = key.Node()
		}
		all = append(all, string(key.Node().Data))
	}
	return all, first
}

// keyValue takes a key and what it is given.
func (r *reader) keyValue(table []string, e *unstable.Node) error {
	path, at := names(table, e.Key())
	key, ok := keyOf(path[0])
	if !ok {
		return r.fail(at, unknownKey(path[0]))
	}
	value := e.Value()
	switch {
	case len(path) == 2 && key.Type == "table" && value.Kind == unstable.String:
		if err := checkGlob(path[1]); err != nil {
			return r.fail(at, err)
		}
		return r.take(key, path[1], value, at)
	case len(path) != 1:
	case key.Type == "table" && value.Kind == unstable.InlineTable:
		for entries := value.Children(); entries.Next(); {
			if err := r.keyValue(path, entries.Node()); err != nil {
				return err
			}
		}
		return nil
	case key.Type == "texts" && value.Kind == unstable.Array:
		for items := value.Children(); items.Next(); {
			if items.Node().Kind != unstable.String {
				return r.fail(at, wrongType(key))
			}
			if err := r.take(key, "", items.Node(), at); err != nil {
				return err
			}
		}
		return nil
	case key.Type == "text" && value.Kind == unstable.String,
		key.Type == "number" && (value.Kind == unstable.Integer || value.Kind == unstable.Float):
		return r.take(key, "", value, at)
	}
	return r.fail(at, wrongType(key))
}

func wrongType(key Key) error {
	return fmt.Errorf("%s takes a %s; write for example %s", key.Name,
		map[string]string{"text": "text in quotation marks", "number": "number", "texts": "list of texts", "table": "table of texts"}[key.Type], key.Example)
}

// take keeps one value, given at a node.
func (r *reader) take(key Key, glob string, value, at *unstable.Node) error {
	text := string(value.Data)
	if err := key.accept(text); err != nil {
		return r.fail(at, err)
	}
	if len(r.values) == maxValues {
		return r.fail(at, fmt.Errorf("more than %d values, which is no file of settings", maxValues))
	}
	if key.paths && !filepath.IsAbs(text) {
		text = filepath.Join(r.dir, filepath.FromSlash(text))
	}
	line := r.toml.Shape(at.Raw).Start.Line
	r.values = append(r.values, Value{key.Name, glob, text, fmt.Sprintf("%s:%d", r.path, line), r.dir})
	return nil
}

func (r *reader) fail(at *unstable.Node, err error) error {
	start := r.toml.Shape(at.Raw).Start
	return fmt.Errorf("%s:%d:%d: %w", r.path, start.Line, start.Column, err)
}
