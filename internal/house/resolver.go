package house

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"sync"
)

// None, in the place of a file of settings, says that none is read: no project's and
// not the user's either.
const None = "none"

// configVariable is the environment variable that stands for Sources.Config.
const configVariable = "FOULCASE_CONFIG"

// Sources says where settings come from beside the files that are found. The zero value is
// usable.
type Sources struct {
	// Config is a file that is read in place of the one found upwards from a
	// document, or None.
	Config string
	// Flags are values that win over all others, by key; of what adds up they come
	// first. Paths are relative to the working directory.
	Flags map[string][]string
	// Getenv looks up environment variables; nil is os.Getenv.
	Getenv func(string) string
}

// Resolver finds the settings of documents. Each file is read once, until Forget. It is safe for
// concurrent use.
type Resolver struct {
	sources Sources
	user    string // folder of the user's own files; "" for none

	mu      sync.Mutex
	folders map[string]resolved    // by folder
	files   map[string]resolved    // by path of the project's file; "" for none
	words   map[string]*vocabulary // by the paths of its lists
	stets   map[string]*book       // by path
}

type resolved struct {
	settings *Settings
	err      error
}

// NewResolver returns a resolver that has read nothing yet.
func NewResolver(s Sources) *Resolver {
	if s.Getenv == nil {
		s.Getenv = os.Getenv
	}
	if s.Config == "" {
		s.Config = s.Getenv(configVariable)
	}
	r := &Resolver{sources: s}
	if dir, err := os.UserConfigDir(); err == nil && s.Config != None {
		r.user = filepath.Join(dir, "foulcase")
	}
	r.Forget()
	return r
}

// Forget has every file read anew.
func (r *Resolver) Forget() {
	r.mu.Lock()
	defer r.mu.Unlock()
	r.folders, r.files = map[string]resolved{}, map[string]resolved{}
	r.words, r.stets = map[string]*vocabulary{}, map[string]*book{}
}

// For returns the settings that hold for the document at path. A path that is no file, as
// "-", counts as one in the working directory.
func (r *Resolver) For(path string) (*Settings, error) {
	folder := filepath.Dir(absolute(path))
	r.mu.Lock()
	defer r.mu.Unlock()
	found, ok := r.folders[folder]
	if !ok {
		found.settings, found.err = r.inFolder(folder)
		r.folders[folder] = found
	}
	return found.settings, found.err
}

func (r *Resolver) inFolder(folder string) (*Settings, error) {
	project := r.sources.Config
	switch project {
	case None:
		project = ""
	case "":
		var err error
		if project, err = Locate(folder); err != nil {
			return nil, err
		}
	default:
		project = absolute(project)
	}
	found, ok := r.files[project]
	if !ok {
		found.settings, found.err = r.load(project)
		r.files[project] = found
	}
	return found.settings, found.err
}

// load reads the settings of a project's file, "" for none, together with all others.
func (r *Resolver) load(project string) (*Settings, error) {
	s := &Settings{}
	places := []func() ([]Value, error){r.flags, r.environment}
	if project != "" {
		s.files = append(s.files, project)
		places = append(places, func() ([]Value, error) { return readFile(project) })
	}
	if own := filepath.Join(r.user, FileName); r.user != "" && own != project {
		s.files = append(s.files, own)
		places = append(places, func() ([]Value, error) {
			values, err := readFile(own)
			if absent(err) {
				err = nil
			}
			for i := range values { // the user's globs are for documents anywhere
				values[i].dir = ""
			}
			return values, err
		})
	}
	for _, place := range places {
		values, err := place()
		if err != nil {
			return nil, err
		}
		s.values = merge(s.values, values)
	}
	return s, r.open(s)
}

// merge adds the values of a weaker place to those of stronger ones.
func merge(strong, weak []Value) []Value {
	merged := slices.Clip(strong)
	for _, v := range weak {
		key, _ := keyOf(v.Key)
		set := slices.ContainsFunc(strong, func(s Value) bool { return s.Key == v.Key })
		if key.adds || !set {
			merged = append(merged, v)
		}
	}
	return merged
}

// flags are the values of the command's flags.
func (r *Resolver) flags() ([]Value, error) {
	var values []Value
	for _, k := range Keys() {
		for _, text := range r.sources.Flags[k.Name] {
			if err := k.accept(text); err != nil {
				return nil, fmt.Errorf("--%s: %w", k.Flag, err)
			}
			values = append(values, Value{Key: k.Name, Text: text, Origin: "--" + k.Flag})
		}
	}
	return values, nil
}

// environment are the values of variables.
func (r *Resolver) environment() ([]Value, error) {
	var values []Value
	for _, k := range Keys() {
		if k.Variable == "" {
			continue
		}
		if text := r.sources.Getenv(k.Variable); text != "" {
			if err := k.accept(text); err != nil {
				return nil, fmt.Errorf("environment variable %s: %w", k.Variable, err)
			}
			values = append(values, Value{Key: k.Name, Text: text, Origin: k.Variable})
		}
	}
	return values, nil
}

// open reads the lists of house words and the decisions that the settings name.
func (r *Resolver) open(s *Settings) error {
	if err := s.checkFiles(); err != nil {
		return err
	}
	lists := s.of("house")
	own := ""
	if r.user != "" {
		own = filepath.Join(r.user, "house-words.txt")
	}
	id := strings.Join(lists, "\x00")
	if r.words[id] == nil {
		words, err := openVocabulary(lists, own)
		if err != nil {
			return err
		}
		r.words[id] = words
	}
	s.words = r.words[id]

	path := s.Get("stets")
	if path == "" && r.user != "" {
		path = filepath.Join(r.user, "stets.jsonl")
	}
	if r.stets[path] == nil {
		stets, err := openBook(path)
		if err != nil {
			return err
		}
		r.stets[path] = stets
	}
	s.stets = r.stets[path]
	return nil
}
