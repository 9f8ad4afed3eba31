package house

import (
	"fmt"
	"path"
	"path/filepath"
	"strings"
)

// maxGlob is the most bytes of a glob.
const maxGlob = 1000

// checkGlob checks that a glob can be matched.
func checkGlob(glob string) error {
	if _, err := path.Match(glob, ""); err != nil || len(glob) > maxGlob || strings.Trim(glob, "/") == "" {
		return fmt.Errorf("%q is no glob; write for example \"*.log\" or \"papers/**/draft-*.md\"", glob)
	}
	return nil
}

// matches tells whether a glob of a folder's file of settings covers a file. Without
// a slash before its end it is held against the names of the file and of the folders that it
// is in, with one against the path from that folder on; there ** stands for any
// folders. A glob covers what is in a folder that it matches, and one that ends in a
// slash nothing but that. The folder "" is the root of the file system.
func matches(glob, dir, file string) bool {
	if dir == "" {
		dir = filepath.VolumeName(file) + string(filepath.Separator)
	}
	rel, err := filepath.Rel(dir, file)
	if err != nil || rel == ".." || strings.HasPrefix(rel, ".."+string(filepath.Separator)) {
		return false
	}
	names := strings.Split(filepath.ToSlash(rel), "/")
	glob, folderOnly := strings.CutSuffix(glob, "/")
	if !strings.Contains(glob, "/") && glob != "**" {
		glob = "**/" + glob
	}
	pattern := strings.Split(strings.TrimPrefix(glob, "/"), "/")
	for n := 1; n <= len(names); n++ {
		if n == len(names) && folderOnly {
			break
		}
		if matchNames(pattern, names[:n]) {
			return true
		}
	}
	return false
}

// matchNames matches a path name by name. A ** takes as few names as it can; when the
// rest does not fit, only the last one must take more.
func matchNames(pattern, names []string) bool {
	p, n := 0, 0
	star, next := -1, 0 // the last ** and where what it takes would end next
	for n < len(names) {
		if p < len(pattern) && pattern[p] == "**" {
			star, next = p, n
			p++
			continue
		}
		if p < len(pattern) {
			if ok, _ := path.Match(pattern[p], names[n]); ok {
				p++
				n++
				continue
			}
		}
		if star < 0 {
			return false
		}
		next++
		p, n = star+1, next
	}
	for p < len(pattern) && pattern[p] == "**" {
		p++
	}
	return p == len(pattern)
}
