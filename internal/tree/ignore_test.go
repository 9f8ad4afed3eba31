package tree

import (
	"fmt"
	"io/fs"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

func TestPattern(t *testing.T) {
	for _, test := range []struct {
		pattern string
		yes, no []string
	}{
		{"log.txt", []string{"log.txt"}, []string{"log", "log.txt/a", "a/log.txt", ""}},
		{"*.txt", []string{"a.txt", ".txt"}, []string{"a.txt.gz", "a/b.txt", "txt"}},
		{"a*b*c", []string{"abc", "a--b--c", "abbcc"}, []string{"ab", "acb", "a/b/c"}},
		{"?", []string{"a"}, []string{"", "/", "ab"}},
		{"é", []string{"é"}, []string{"e"}},
		{"**/berth", []string{"berth", "a/berth", "a/b/berth"}, []string{"aberth", "berth/a"}},
		{"berth/**", []string{"berth/a", "berth/a/b"}, []string{"berth", "a/berth/b"}},
		{"a/**/b", []string{"a/b", "a/x/b", "a/x/y/b"}, []string{"ab", "a/b/c", "a/xb"}},
		{"a/***/b", []string{"a/b", "a/x/y/b"}, []string{"ab"}},
		{"**", []string{"a", "a/b", ""}, nil},
		{"a**", []string{"a", "abc"}, []string{"a/b", "b"}},
		{"[a-c]x", []string{"ax", "cx"}, []string{"dx", "x", "/x"}},
		{"[!a-c]x", []string{"dx"}, []string{"ax", "/x"}},
		{"[^a]", []string{"b"}, []string{"a", "/"}},
		{"[]a]", []string{"]", "a"}, []string{"b"}},
		{"[a-]", []string{"a", "-"}, []string{"b"}},
		{`[\]]`, []string{"]"}, []string{`\`}},
		{`[a\-c]`, []string{"a", "-", "c"}, []string{"b"}},
		{"[[:digit:][:upper:]]", []string{"1", "A"}, []string{"a", ":"}},
		{"[[:nothing:]]", nil, []string{"n", ":", ""}},
		{"[z-a]", []string{"z"}, []string{"a", "m"}},
		{"[ab", nil, []string{"[ab", "a"}},
		{`a\*b`, []string{"a*b"}, []string{"axb", `a\*b`}},
		{`a\`, nil, []string{"a", `a\`}},
	} {
		p := compilePattern(test.pattern)
		for _, path := range test.yes {
			if !p.match(path) {
				t.Errorf("%q does not match %q", test.pattern, path)
			}
		}
		for _, path := range test.no {
			if p.match(path) {
				t.Errorf("%q matches %q", test.pattern, path)
			}
		}
	}
}

// TestPatternTime has a pattern that takes for ever when ways are tried one by one.
func TestPatternTime(t *testing.T) {
	p := compilePattern(strings.Repeat("**/a*", 200) + "b")
	if p.match(strings.Repeat("a/aa", 1000)) {
		t.Error("the pattern matches without its last letter")
	}
}

func TestIgnoreRules(t *testing.T) {
	rules := parseIgnore([]byte("\xef\xbb\xbf# logs\n*.log\r\n!keep.log\n/draft\nbuild/\n\\#sharp\n\\!bang\nspace\\ \ntrail   \n\n!\n/\nsub/*.tmp"))
	for _, test := range []struct {
		path             string
		folder           bool
		ignored, decided bool
	}{
		{"a.log", false, true, true},
		{"deep/a.log", false, true, true},
		{"keep.log", false, false, true},
		{"draft", false, true, true},
		{"a/draft", false, false, false},
		{"build", true, true, true},
		{"a/build", true, true, true},
		{"build", false, false, false},
		{"#sharp", false, true, true},
		{"!bang", false, true, true},
		{"space ", false, true, true},
		{"space", false, false, false},
		{"trail", false, true, true},
		{"sub/a.tmp", false, true, true},
		{"a/sub/a.tmp", false, false, false},
		{"# logs", false, false, false},
	} {
		ignored, decided := decide(rules, test.path, test.folder)
		if ignored != test.ignored || decided != test.decided {
			t.Errorf("%q: ignored %v, decided %v; want %v, %v", test.path, ignored, decided, test.ignored, test.decided)
		}
	}
}

// TestIgnoreAsGit holds the rules against those of git itself on random trees.
func TestIgnoreAsGit(t *testing.T) {
	needGit(t)
	trees := 60
	if testing.Short() {
		trees = 10
	}
	random := rand.New(rand.NewPCG(4, 6))
	ignored := 0
	for range trees {
		root := randomTree(t, random)
		runGit(t, root, "", "init", "-q")
		writeFile(t, root, ".git/info/exclude", randomRules(random))
		paths := allBelow(t, root)
		output := runGit(t, root, strings.Join(paths, "\x00")+"\x00", "check-ignore", "--stdin", "-z", "--no-index")
		want := strings.FieldsFunc(output, func(r rune) bool { return r == 0 })
		got := ignoredBelow(root, ignoresOf(root), false, nil)
		slices.Sort(want)
		slices.Sort(got)
		if !slices.Equal(got, want) {
			t.Fatalf("ignored by git are not\n%q, but\n%q\n%s", without(want, got), without(got, want), rulesOf(t, root))
		}
		ignored += len(got)
	}
	if ignored < 10*trees {
		t.Errorf("only %d paths were ignored in %d trees: the trees test little", ignored, trees)
	}
}

var treeNames = []string{"a", "b", "ab", "a.log", "b.txt", "log", "x y", "é", "[a]", "#a", "!b", `c\d`, "a-b", "B"}

var ruleParts = []string{
	"*", "**", "?", "a", "b", "ab", "*.log", "b.*", "[ab]", "[!a]", "[[:alpha:]]", "[a-", `\a`, `\*`, "log", "x y", "x*", "*b", "é",
	"#a", `\#a`, "!b", `\!b`, `\[a]`, "a**", "**b", `c\\d`, "a-b", "[a-z]", `[\]a]`, "?*", "***", "[^b]*",
}

// randomRules writes an ignore file.
func randomRules(random *rand.Rand) string {
	var b strings.Builder
	for range random.IntN(5) {
		for range random.IntN(4) / 3 {
			b.WriteString("!")
		}
		if random.IntN(4) == 0 {
			b.WriteString("/")
		}
		for i := range 1 + random.IntN(3)*random.IntN(2) {
			if i > 0 {
				b.WriteString("/")
			}
			b.WriteString(ruleParts[random.IntN(len(ruleParts))])
		}
		b.WriteString([]string{"", "", "", "/", " ", `\ `, "\r"}[random.IntN(7)] + "\n")
	}
	return b.String()
}

// randomTree makes folders three deep with files and ignore files in them.
func randomTree(t *testing.T, random *rand.Rand) string {
	root := writeFiles(t, nil)
	var fill func(dir string, depth int)
	fill = func(dir string, depth int) {
		if random.IntN(2) == 0 {
			writeFile(t, root, dir+".gitignore", randomRules(random))
		}
		for _, i := range random.Perm(len(treeNames))[:4+random.IntN(4)] {
			if depth < 3 && random.IntN(2) == 0 {
				writeFile(t, root, dir+treeNames[i]+"/", "")
				fill(dir+treeNames[i]+"/", depth+1)
			} else {
				writeFile(t, root, dir+treeNames[i], "text\n")
			}
		}
	}
	fill("", 0)
	return root
}

// allBelow lists all that lies below a folder, with slashes, git's own aside.
func allBelow(t *testing.T, root string) []string {
	var paths []string
	err := filepath.WalkDir(root, func(path string, d fs.DirEntry, err error) error {
		switch {
		case err != nil || path == root:
			return err
		case d.Name() == ".git":
			return fs.SkipDir
		}
		inside, err := filepath.Rel(root, path)
		paths = append(paths, filepath.ToSlash(inside))
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	return paths
}

// ignoredBelow lists what is ignored below a folder, all in ignored folders too.
func ignoredBelow(dir string, rules *ignores, all bool, above []string) (paths []string) {
	entries, _ := os.ReadDir(dir)
	for _, d := range entries {
		name, path := d.Name(), filepath.Join(dir, d.Name())
		if name == ".git" {
			continue
		}
		inside := append(slices.Clone(above), name)
		ignored := all || rules.ignored(name, d.IsDir())
		if ignored {
			paths = append(paths, strings.Join(inside, "/"))
		}
		if d.IsDir() {
			paths = append(paths, ignoredBelow(path, rules.enter(path), ignored, inside)...)
		}
	}
	return paths
}

// without returns what of all is not in some.
func without(all, some []string) []string {
	return slices.DeleteFunc(slices.Clone(all), func(s string) bool { return slices.Contains(some, s) })
}

// rulesOf shows the ignore files of a tree.
func rulesOf(t *testing.T, root string) string {
	var b strings.Builder
	for _, path := range append(allBelow(t, root), ".git/info/exclude") {
		if strings.HasSuffix(path, ".gitignore") || strings.HasSuffix(path, "exclude") {
			data, err := os.ReadFile(filepath.Join(root, filepath.FromSlash(path)))
			if err != nil {
				t.Fatal(err)
			}
			fmt.Fprintf(&b, "%s: %q\n", path, data)
		}
	}
	return b.String()
}

func FuzzIgnore(f *testing.F) {
	f.Add("*.log\n!keep.log\n/a/**/b/\n[a-c]?\\ \n", "a/b/keep.log")
	f.Add("[[:alpha:]-z\n**/***\n\\", "x")
	f.Fuzz(func(t *testing.T, file, path string) {
		rules := parseIgnore([]byte(file))
		ignored, decided := decide(rules, path, true)
		if ignored && !decided {
			t.Error("ignored by no rule")
		}
		if fileIgnored, _ := decide(parseIgnore([]byte(file+"\n*")), path, false); !fileIgnored {
			t.Errorf("%q is not ignored by *", path)
		}
		for _, r := range rules {
			if r.matches(path, false) && !r.matches(path, true) {
				t.Errorf("a rule is for files alone in %q", file)
			}
		}
	})
}
