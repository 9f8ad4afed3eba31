package tree

import (
	"fmt"
	"maps"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

func TestReadDiff(t *testing.T) {
	long := strings.Repeat("x", 3*maxDiffHeader)
	diff := strings.Join([]string{
		"diff --git a/log/a.txt b/log/a.txt",
		"index 1..2 100644",
		"--- a/log/a.txt",
		"+++ b/log/a.txt",
		"@@ -3 +3,2 @@ heading",
		"-+++ b/fake.txt",
		"+@@ -1 +1 @@",
		"+" + long,
		"@@ -9,2 +10,0 @@",
		"-gone",
		"--- gone too",
		`diff --git "a/caf\303\251.txt" "b/caf\303\251.txt"`,
		`--- "a/caf\303\251.txt"`,
		`+++ "b/caf\303\251 \"\t\\.txt"`,
		"@@ -1 +1 @@",
		"-a",
		`\ No newline at end of file`,
		"+b",
		`\ No newline at end of file`,
		"diff --git a/two words.txt b/two words.txt",
		"--- /dev/null",
		"+++ b/two words.txt\t",
		"@@ -0,0 +1,3 @@",
		"+1", "+2", "+3",
		"diff --git a/gone.txt b/gone.txt",
		"--- a/gone.txt",
		"+++ /dev/null",
		"@@ -1 +0,0 @@",
		"-x",
		"diff --git a/mode b/mode",
		"old mode 100644",
		"new mode 100755",
	}, "\n")
	want := map[string][]lineRange{
		"log/a.txt":       {{3, 2}, {10, 0}},
		"café \"\t\\.txt": {{1, 1}},
		"two words.txt":   {{1, 3}},
	}
	got, err := readDiff(strings.NewReader(diff))
	if err != nil || !maps.EqualFunc(got, want, slices.Equal) {
		t.Errorf("%v, %v; want %v", got, err, want)
	}
}

func TestReadDiffErrors(t *testing.T) {
	for diff, want := range map[string]string{
		"+++ a.txt\n":                    `diff:1: the path "a.txt" does not begin with b/`,
		"x\n+++ \"b/a.txt\n":             "diff:2: the path \"b/a.txt has no closing quotation mark",
		`+++ "b/\9"`:                     "diff:1: the path",
		`+++ "b/\777"`:                   "diff:1: the path",
		"@@ -1 +x @@\n":                  `diff:1: the hunk "@@ -1 +x @@" is not of a unified diff`,
		"@@ -1 +1\n":                     "diff:1: the hunk",
		"@@ -1 +99999999999 @@\n":        "diff:1: the hunk",
		"+++ b/a\n@@ -1 +1,3 @@\n-a\n+b": "diff:5: cut off, 2 lines of a hunk are missing",
	} {
		if _, err := readDiff(strings.NewReader(diff)); err == nil || !strings.HasPrefix(err.Error(), want) {
			t.Errorf("%q: error %v, want %q", diff, err, want)
		}
	}
}

func FuzzReadDiff(f *testing.F) {
	f.Add("diff --git a/a b/a\n--- a/a\n+++ \"b/\\303\\251\"\n@@ -1,2 +1 @@\n-a\n-b\n+c\n\\ No newline\n")
	f.Fuzz(func(t *testing.T, diff string) {
		changed, err := readDiff(strings.NewReader(diff))
		if err != nil && changed != nil {
			t.Error("a result beside an error")
		}
		for path, lines := range changed {
			if path == "" || len(lines) == 0 {
				t.Errorf("%q has changes %v", path, lines)
			}
			spans, err := spansOf(strings.NewReader(diff), lines)
			if err != nil {
				t.Error(err)
			}
			for _, s := range spans.spans {
				if s.start > s.end || s.end > int64(len(diff)) {
					t.Errorf("span %v in %d bytes", s, len(diff))
				}
			}
		}
	})
}

func TestSpans(t *testing.T) {
	text := "one\n" + strings.Repeat("two", 50_000) + "\r\nthree\n\nfive"
	two, three := int64(len("one\n")), int64(strings.Index(text, "three"))
	spans, err := spansOf(strings.NewReader(text), []lineRange{{0, 0}, {2, 1}, {3, 0}, {5, 1}, {9, 2}})
	if err != nil {
		t.Fatal(err)
	}
	for _, test := range []struct {
		offset, length int64
		want           bool
	}{
		{0, 3, false},                    // line 1
		{0, two + 1, true},               // lines 1 and 2
		{two, 3, true},                   // line 2
		{three - 1, 1, true},             // its end
		{three, 5, false},                // line 3
		{three, 7, true},                 // over what was taken away after line 3
		{three, 6, false},                // up to it
		{int64(len(text)) - 4, 4, true},  // line 5
		{int64(len(text)) - 5, 1, false}, // line 4
		{0, int64(len(text)), true},
	} {
		if got := spans.Touch(test.offset, test.length); got != test.want {
			t.Errorf("%d+%d touches: %v, want %v", test.offset, test.length, got, test.want)
		}
	}
}

// commit makes a repository of a folder and commits what is in it.
func commit(t *testing.T, root string) {
	t.Helper()
	runGit(t, root, "", "init", "-q")
	runGit(t, root, "", "add", "-A")
	runGit(t, root, "", "commit", "-q", "-m", "first")
	runGit(t, root, "", "tag", "first")
}

// touched lists the lines, from 1, of a file that a revision lacks.
func touched(t *testing.T, c *Changes, path string) []int {
	t.Helper()
	spans, err := c.Spans(path)
	if err != nil {
		t.Fatal(err)
	}
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	var lines []int
	offset, n := int64(0), 1
	for line := range strings.Lines(string(data)) {
		if spans.Touch(offset, int64(len(line))) {
			lines = append(lines, n)
		}
		offset += int64(len(line))
		n++
	}
	return lines
}

func TestChanged(t *testing.T) {
	needGit(t)
	root := writeFiles(t, map[string]string{
		".gitignore":         "*.tmp\n",
		"same.txt":           "a\nb\n",
		"log/changed.txt":    "a\nb\nc\nd\n",
		"log/moved.txt":      strings.Repeat("line of a log\n", 30),
		"gone.txt":           "a\n",
		"shortened.txt":      "a\nb\nc\n",
		"utf-16.txt":         "\xff\xfea\x00\n\x00",
		"odd \"é\t name.txt": "a\n",
	})
	commit(t, root)
	// Settings that change the form of git's output or run programs.
	for _, setting := range []string{
		"diff.noprefix true", "diff.mnemonicPrefix true", "core.quotePath false", "diff.interHunkContext 9",
		"diff.context 9", "color.ui always", "diff.external /bin/false", "core.fsmonitor /bin/false", "diff.relative true",
	} {
		name, value, _ := strings.Cut(setting, " ")
		runGit(t, root, "", "config", name, value)
	}
	t.Setenv("GIT_EXTERNAL_DIFF", "/bin/false")
	t.Setenv("GIT_DIFF_OPTS", "--unified=5")
	writeFile(t, root, "log/changed.txt", "a\nB\nc\nd\ne")
	runGit(t, root, "", "mv", "log/moved.txt", "log/new.txt")
	writeFile(t, root, "log/new.txt", strings.Repeat("line of a log\n", 30)+"one more\n")
	runGit(t, root, "", "rm", "-q", "gone.txt")
	writeFile(t, root, "shortened.txt", "a\nc\n")
	writeFile(t, root, "utf-16.txt", "\xff\xfeb\x00\n\x00")
	writeFile(t, root, "odd \"é\t name.txt", "b\n")
	writeFile(t, root, "log/new/untracked.txt", "a\nb\n")
	writeFile(t, root, "ignored.tmp", "a\n")
	c, err := Changed(filepath.Join(root, "log"), "first")
	if err != nil {
		t.Fatal(err)
	}
	for name, want := range map[string][]int{
		"log/changed.txt":       {2, 5},
		"log/new.txt":           {31},
		"shortened.txt":         nil,
		"utf-16.txt":            {1, 2},
		"odd \"é\t name.txt":    {1},
		"log/new/untracked.txt": {1, 2},
		"same.txt":              nil,
		"ignored.tmp":           nil,
	} {
		path := filepath.Join(root, filepath.FromSlash(name))
		has, err := c.Has(path)
		if wantHas := want != nil || name == "shortened.txt"; has != wantHas || err != nil {
			t.Errorf("%s has changed: %v, %v; want %v", name, has, err, wantHas)
		}
		if got := touched(t, c, path); !slices.Equal(got, want) {
			t.Errorf("%s: changed are lines %v, want %v", name, got, want)
		}
	}
	outside := writeFiles(t, map[string]string{"a.txt": "a"})
	if _, err := c.Has(filepath.Join(outside, "a.txt")); err == nil || !strings.Contains(err.Error(), "outside of the working tree") {
		t.Errorf("a file elsewhere: error %v", err)
	}
}

// TestChangedSinceFork has a revision go on after the checked-out branch parted from it:
// what others wrote there is no change of this branch's.
func TestChangedSinceFork(t *testing.T) {
	needGit(t)
	root := writeFiles(t, map[string]string{"theirs.txt": "a\nb\n", "ours.txt": "a\nb\n"})
	commit(t, root)
	runGit(t, root, "", "checkout", "-q", "-b", "theirs")
	writeFile(t, root, "theirs.txt", "A\nb\n")
	runGit(t, root, "", "commit", "-q", "-a", "-m", "theirs")
	runGit(t, root, "", "checkout", "-q", "-b", "ours", "first")
	writeFile(t, root, "ours.txt", "a\nB\n")
	runGit(t, root, "", "commit", "-q", "-a", "-m", "ours")
	check := func(base string, theirs, ours []int) {
		t.Helper()
		c, err := Changed(root, base)
		if err != nil {
			t.Fatal(err)
		}
		for name, want := range map[string][]int{"theirs.txt": theirs, "ours.txt": ours} {
			if got := touched(t, c, filepath.Join(root, name)); !slices.Equal(got, want) {
				t.Errorf("since %s, %s: changed are lines %v, want %v", base, name, got, want)
			}
		}
	}
	check("theirs", nil, []int{2})
	runGit(t, root, "", "checkout", "-q", "--orphan", "alone")
	runGit(t, root, "", "commit", "-q", "-m", "no history in common")
	check("theirs", []int{1}, []int{2})
}

// TestChangedLines holds the changed lines against lines that are new by their text.
func TestChangedLines(t *testing.T) {
	needGit(t)
	random := rand.New(rand.NewPCG(6, 4))
	before := map[string]string{}
	for i := range 20 {
		for range random.IntN(30) {
			before[fmt.Sprint(i)] += fmt.Sprintf("line %d\n", random.Int())
		}
	}
	root := writeFiles(t, before)
	commit(t, root)
	want := map[string][]int{}
	for name, text := range before {
		after, n := "", 1
		for line := range strings.Lines(text) {
			if random.IntN(4) == 0 {
				continue
			}
			if random.IntN(4) == 0 {
				line = fmt.Sprintf("new %d\n", random.Int())
				want[name] = append(want[name], n)
			}
			after += line
			n++
		}
		writeFile(t, root, name, after)
	}
	c, err := Changed(root, "HEAD")
	if err != nil {
		t.Fatal(err)
	}
	for name := range before {
		if got := touched(t, c, filepath.Join(root, name)); !slices.Equal(got, want[name]) {
			t.Errorf("%s: changed are lines %v, want %v", name, got, want[name])
		}
	}
}

func TestChangedErrors(t *testing.T) {
	needGit(t)
	root := writeFiles(t, map[string]string{"a.txt": "a\n"})
	t.Setenv("GIT_CEILING_DIRECTORIES", filepath.Dir(root))
	if _, err := Changed(root, "HEAD"); err == nil || !strings.Contains(err.Error(), "not in a working tree of git") {
		t.Errorf("outside of a repository: error %v", err)
	}
	commit(t, root)
	for base, want := range map[string]string{
		"":                "no revision",
		"--output=a.txt":  "no revision",
		"second":          "no such revision",
		"first:a.txt":     "no such revision",
		"first..HEAD":     "no such revision",
		"HEAD --output=x": "no such revision",
	} {
		if _, err := Changed(root, base); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q: error %v, want %q", base, err, want)
		}
	}
	t.Setenv("PATH", t.TempDir())
	if _, err := Changed(root, "first"); err == nil || !strings.Contains(err.Error(), "install it") {
		t.Errorf("without git: error %v", err)
	}
}

func TestGitEnvironment(t *testing.T) {
	got := gitEnvironment([]string{"HOME=/h", "GIT_DIR=/r", "GIT_EXTERNAL_DIFF=x", "GIT_CONFIG_COUNT=1", "GIT_TRACE=1", "GIT_OPTIONAL_LOCKS=1"})
	want := []string{"HOME=/h", "GIT_DIR=/r", "LC_ALL=C", "GIT_OPTIONAL_LOCKS=0", "GIT_TERMINAL_PROMPT=0", "GIT_NO_LAZY_FETCH=1"}
	if !slices.Equal(got, want) {
		t.Errorf("environment %q, want %q", got, want)
	}
}
