package tree

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"os/exec"
	"slices"
	"strings"
)

// repository is a working tree of git.
type repository struct {
	top string // its folder, a real path
}

// safely are settings for every call of git: it neither fetches nor starts what a
// repository's configuration names for watching files.
var safely = []string{
	"-c", "protocol.allow=never",
	"-c", "core.fsmonitor=false",
	"--no-pager",
}

// trusted are the variables of git's that are passed on: they say where the
// repository is, as git itself tells its hooks, and which settings files there are.
var trusted = []string{
	"GIT_DIR", "GIT_WORK_TREE", "GIT_INDEX_FILE", "GIT_COMMON_DIR", "GIT_OBJECT_DIRECTORY",
	"GIT_ALTERNATE_OBJECT_DIRECTORIES", "GIT_CEILING_DIRECTORIES", "GIT_DISCOVERY_ACROSS_FILESYSTEM",
	"GIT_CONFIG_GLOBAL", "GIT_CONFIG_SYSTEM", "GIT_CONFIG_NOSYSTEM",
}

// gitEnvironment is the environment that git runs in: without what changes the form
// of its output or has it start other programs.
func gitEnvironment(outer []string) []string {
	var inner []string
	for _, setting := range outer {
		name, _, _ := strings.Cut(setting, "=")
		if !strings.HasPrefix(name, "GIT_") || slices.Contains(trusted, name) {
			inner = append(inner, setting)
		}
	}
	return append(inner, "LC_ALL=C", "GIT_OPTIONAL_LOCKS=0", "GIT_TERMINAL_PROMPT=0", "GIT_NO_LAZY_FETCH=1")
}

// git runs a command of git in a folder and has read take its output.
func git(dir string, read func(io.Reader) error, args ...string) error {
	program, err := exec.LookPath("git")
	if err != nil {
		return errors.New("--changed needs git, and there is no program of that name on the path; install it")
	}
	cmd := exec.Command(program, append(slices.Clone(safely), args...)...)
	cmd.Dir = dir
	cmd.Env = gitEnvironment(os.Environ())
	var messages bytes.Buffer
	cmd.Stderr = &messages
	out, err := cmd.StdoutPipe()
	if err != nil {
		return err
	}
	if err := cmd.Start(); err != nil {
		return err
	}
	readErr := read(out)
	if readErr != nil {
		cmd.Process.Kill()
	}
	err = cmd.Wait()
	switch {
	case readErr != nil:
		return fmt.Errorf("git %s: %w", args[0], readErr)
	case err != nil:
		first, _, _ := strings.Cut(strings.TrimSpace(messages.String()), "\n")
		return fmt.Errorf("git %s: %s (%w)", args[0], first, err)
	}
	return nil
}

// findRepository finds the working tree that a folder is in.
func findRepository(dir string) (*repository, error) {
	var top string
	err := git(dir, func(r io.Reader) error {
		data, err := io.ReadAll(io.LimitReader(r, maxListed))
		top = strings.TrimSuffix(string(data), "\n")
		return err
	}, "rev-parse", "--show-toplevel")
	if exit := (*exec.ExitError)(nil); errors.As(err, &exit) {
		return nil, fmt.Errorf("%s: not in a working tree of git, where --changed could look; %w", dir, err)
	}
	if err != nil {
		return nil, err
	}
	real, err := realPath(top)
	return &repository{real}, err
}

// checkRevision refuses what is no commit.
func (r *repository) checkRevision(base string) error {
	if base == "" || strings.HasPrefix(base, "-") {
		return fmt.Errorf("--changed %q is no revision; name a branch, a tag or a commit", base)
	}
	err := git(r.top, func(out io.Reader) error {
		_, err := io.Copy(io.Discard, out)
		return err
	}, "rev-parse", "--verify", "--quiet", "--end-of-options", base+"^{commit}")
	if exit := (*exec.ExitError)(nil); errors.As(err, &exit) {
		return fmt.Errorf("--changed %s: no such revision in %s; fetch it, or name another branch, tag or commit", base, r.top)
	}
	return err
}

// forkPoint is the commit, one line of history before both, at which the checked-out
// commit parted from a revision; the revision itself where there is none, as in a
// shallow clone. What others changed in the revision since is no change of ours.
func (r *repository) forkPoint(base string) (string, error) {
	var fork string
	err := git(r.top, func(out io.Reader) error {
		data, err := io.ReadAll(io.LimitReader(out, maxListed))
		fork = strings.TrimSpace(string(data))
		return err
	}, "merge-base", "--", base, "HEAD")
	if exit := (*exec.ExitError)(nil); errors.As(err, &exit) {
		return base, nil
	}
	return fork, err
}

// hunks returns the lines changed since a revision, by path from the top.
func (r *repository) hunks(base string) (changed map[string][]lineRange, err error) {
	err = git(r.top, func(out io.Reader) (err error) {
		changed, err = readDiff(out)
		return err
	}, r.diff(base, "--patch", "--find-renames", "--unified=0", "--inter-hunk-context=0",
		"--src-prefix=a/", "--dst-prefix=b/", "--no-color")...)
	return changed, err
}

// binaries returns the files changed since a revision that git takes for binary.
func (r *repository) binaries(base string) ([]string, error) {
	var names []string
	err := git(r.top, func(out io.Reader) error {
		records, err := ReadList(out, true, "numstat")
		for _, record := range records {
			if name, ok := strings.CutPrefix(record, "-\t-\t"); ok {
				names = append(names, name)
			}
		}
		return err
	}, r.diff(base, "--numstat", "-z", "--no-renames")...)
	return names, err
}

// diff is the command that compares the working tree with a revision.
func (r *repository) diff(base string, form ...string) []string {
	args := append([]string{"diff", "--no-ext-diff", "--no-textconv", "--no-relative", "--ignore-submodules=all"}, form...)
	return append(args, "--end-of-options", base, "--")
}

// untracked returns the files that git does not know and does not ignore.
func (r *repository) untracked() (names []string, err error) {
	err = git(r.top, func(out io.Reader) (err error) {
		names, err = ReadList(out, true, "ls-files")
		return err
	}, "ls-files", "--others", "--exclude-standard", "-z")
	return names, err
}
