package tree

import (
	"io"
	"os"
	"path/filepath"
	"strings"
)

// ignores are the ignore rules in force in one folder: its own, those of the
// folders above it up to the repository's, and the repository's info/exclude.
type ignores struct {
	up    *ignores // of the folder above; nil at the top of the repository
	name  string   // of this folder in the one above
	rules []rule
}

// ignoresOf reads the rules in force in a folder. Outside of a repository they
// begin with the folder's own.
func ignoresOf(dir string) *ignores {
	absolute, err := filepath.Abs(dir)
	if err != nil {
		return (*ignores)(nil).enter(dir)
	}
	top := absolute
	for !isRepository(top) {
		above := filepath.Dir(top)
		if above == top {
			return (*ignores)(nil).enter(absolute)
		}
		top = above
	}
	rules := (*ignores)(nil).enter(top)
	if below, err := filepath.Rel(top, absolute); err == nil && below != "." {
		for name := range strings.SplitSeq(filepath.ToSlash(below), "/") {
			top = filepath.Join(top, name)
			rules = rules.enter(top)
		}
	}
	return rules
}

// enter adds the rules of a folder right below that of g. The top of a repository
// starts anew.
func (g *ignores) enter(dir string) *ignores {
	rules := parseIgnore(readSome(filepath.Join(dir, ".gitignore"), maxIgnoreFile))
	if isRepository(dir) {
		exclude := parseIgnore(readSome(filepath.Join(gitFolder(dir), "info", "exclude"), maxIgnoreFile))
		return &ignores{up: &ignores{rules: exclude}, rules: rules}
	}
	return &ignores{up: g, name: filepath.Base(dir), rules: rules}
}

// ignored tells whether the entry of that name in the folder is not to be read.
// The folders above it must have been asked about before.
func (g *ignores) ignored(name string, folder bool) bool {
	path := name
	for ; g != nil; g = g.up {
		if ignored, decided := decide(g.rules, path, folder); decided {
			return ignored
		}
		if g.name != "" {
			path = g.name + "/" + path
		}
	}
	return false
}

func isRepository(dir string) bool {
	_, err := os.Lstat(filepath.Join(dir, ".git"))
	return err == nil
}

// gitFolder is where git keeps what the repository's working trees share. In
// worktrees and submodules ".git" is a file that names another folder, which may
// name another in turn.
func gitFolder(top string) string {
	const mostLink = 4 << 10
	dir := filepath.Join(top, ".git")
	if named, ok := strings.CutPrefix(string(readSome(dir, mostLink)), "gitdir: "); ok {
		dir = resolve(top, named)
	}
	if common := readSome(filepath.Join(dir, "commondir"), mostLink); len(common) > 0 {
		dir = resolve(dir, string(common))
	}
	return dir
}

// resolve reads a path that stands in a file of git, relative to dir.
func resolve(dir, path string) string {
	path = filepath.FromSlash(strings.TrimRight(path, "\r\n"))
	if filepath.IsAbs(path) {
		return path
	}
	return filepath.Join(dir, path)
}

// readSome reads at most n bytes of a regular file; nothing, when there is none or
// it cannot be read.
func readSome(path string, n int64) []byte {
	if info, err := os.Stat(path); err != nil || !info.Mode().IsRegular() {
		return nil
	}
	f, err := os.Open(path)
	if err != nil {
		return nil
	}
	defer f.Close()
	data, err := io.ReadAll(io.LimitReader(f, n))
	if err != nil {
		return nil
	}
	return data
}
