package tree

import (
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"testing"
)

// find has a new finder add operands from the folder root, and returns the paths
// found, "!" before those with an error.
func find(t *testing.T, root string, o Options, operands ...string) ([]string, Skipped) {
	t.Helper()
	t.Chdir(root)
	f := NewFinder(o)
	for _, operand := range operands {
		f.Add(filepath.FromSlash(operand))
	}
	var paths []string
	for _, d := range f.Found() {
		path := filepath.ToSlash(d.Path)
		if d.Err != nil {
			path = "!" + path
		}
		paths = append(paths, path)
	}
	return paths, f.Skipped()
}

// holds is what every test document holds.
const holds = "The tug let go.\n"

func TestFinder(t *testing.T) {
	root := writeFiles(t, map[string]string{
		".gitignore":             "/drafts/\n*.tmp.txt\n!keep.tmp.txt\n",
		".git/info/exclude":      "private.txt\n",
		"a.txt":                  holds,
		"b.tmp.txt":              holds,
		"keep.tmp.txt":           holds,
		"private.txt":            holds,
		"picture.png":            "\x89PNG",
		"binary.txt":             "text\x00",
		"drafts/d.txt":           holds,
		".hidden/e.txt":          holds,
		"log/.gitignore":         "!b.tmp.txt\nold*\n",
		"log/b.tmp.txt":          holds,
		"log/old/f.txt":          holds,
		"log/g.md":               holds,
		"inner/.git/HEAD":        "ref\n",
		"inner/b.tmp.txt":        holds,
		"inner/.gitignore":       "h.txt\n",
		"inner/h.txt":            holds,
		"empty/":                 "",
		"notes/2026/jan/log.lst": holds,
		"notes/2026/feb/log.lst": holds,
		"notes/.secret.lst":      holds,
	})
	everything := []string{"a.txt", "inner/b.tmp.txt", "keep.tmp.txt", "log/b.tmp.txt", "log/g.md"}
	for _, test := range []struct {
		name     string
		o        Options
		operands []string
		want     []string
		skipped  Skipped
	}{
		{"folder", Options{}, []string{"."}, everything, Skipped{Ignored: 5, Hidden: 5, Foreign: 3, Binary: 1}},
		{"twice", Options{}, []string{"log/g.md", ".", "log", "./a.txt"}, append([]string{"log/g.md"}, everything[:4]...), Skipped{Ignored: 6, Hidden: 6, Foreign: 3, Binary: 1}},
		{"no rules", Options{NoIgnore: true}, []string{"."}, []string{
			"a.txt", "b.tmp.txt", "drafts/d.txt", "inner/b.tmp.txt", "inner/h.txt",
			"keep.tmp.txt", "log/b.tmp.txt", "log/g.md", "log/old/f.txt", "private.txt",
		}, Skipped{Hidden: 5, Foreign: 3, Binary: 1}},
		{"named", Options{}, []string{"private.txt", "binary.txt", "picture.png", "gone.txt"}, []string{"private.txt", "binary.txt", "picture.png", "!gone.txt"}, Skipped{}},
		{"rules from above", Options{}, []string{"log"}, []string{"log/b.tmp.txt", "log/g.md"}, Skipped{Ignored: 1, Hidden: 1}},
		{"an ignored folder by name", Options{}, []string{"drafts"}, []string{"drafts/d.txt"}, Skipped{}},
		{"nothing", Options{}, []string{"empty"}, []string{"!empty"}, Skipped{}},
		{"glob", Options{}, []string{"*.txt"}, []string{"a.txt", "keep.tmp.txt"}, Skipped{Ignored: 2, Binary: 1}},
		{"deep glob", Options{}, []string{"notes/**/*.lst"}, []string{"notes/2026/feb/log.lst", "notes/2026/jan/log.lst"}, Skipped{}},
		{"hidden by glob", Options{}, []string{"notes/.sec*"}, []string{"notes/.secret.lst"}, Skipped{}},
		{"folders by glob", Options{}, []string{"l[aeiou]g"}, []string{"log/b.tmp.txt", "log/g.md"}, Skipped{Ignored: 1, Hidden: 1}},
		{"a glob without match", Options{}, []string{"nothing/*.txt", "*.rtf"}, []string{"!nothing/*.txt", "!*.rtf"}, Skipped{}},
		{"any bytes", Options{AnyBytes: true}, []string{"binary*"}, []string{"binary.txt"}, Skipped{}},
		{
			"formats",
			Options{Format: func(path string) (string, bool) { return "plain", strings.HasSuffix(path, ".lst") }},
			[]string{"notes"},
			[]string{"notes/2026/feb/log.lst", "notes/2026/jan/log.lst"},
			Skipped{Hidden: 1},
		},
		{
			"ignored by others than git",
			Options{Ignored: func(path string) bool { return filepath.Base(path) != "g.md" }},
			[]string{"log"},
			[]string{"log/g.md"},
			Skipped{Ignored: 1, Hidden: 1, Unasked: 1},
		},
	} {
		t.Run(test.name, func(t *testing.T) {
			got, skipped := find(t, root, test.o, test.operands...)
			if !slices.Equal(got, test.want) {
				t.Errorf("found\n%q, want\n%q", got, test.want)
			}
			if skipped != test.skipped {
				t.Errorf("skipped %+v, want %+v", skipped, test.skipped)
			}
		})
	}
}

func TestFinderErrors(t *testing.T) {
	root := writeFiles(t, map[string]string{"empty/": "", "pictures/a.png": "x"})
	t.Chdir(root)
	f := NewFinder(Options{})
	for _, operand := range []string{"empty", "pictures", "*.txt"} {
		f.Add(operand)
	}
	for i, want := range []string{
		"empty: no text in this folder (looked for .txt ",
		"; passed over: 1 of no known format); name other files one by one",
		"*.txt: nothing matches; check the path",
	} {
		if got := f.Found()[i].Err; got == nil || !strings.Contains(got.Error(), want) {
			t.Errorf("error %v, want one with %q", got, want)
		}
	}
}

func TestFinderLinks(t *testing.T) {
	root := writeFiles(t, map[string]string{
		"tree/z.txt":            holds,
		"tree/sub/a.txt":        holds,
		"tree/.hidden/only.txt": holds,
		"tree/.hidden/b.md":     holds,
		"outside/secret.txt":    holds,
	})
	at := func(name string) string { return filepath.Join(root, "tree", filepath.FromSlash(name)) }
	makeLink(t, at("z.txt"), at("a-link.txt"))       // read as z.txt
	makeLink(t, at(".hidden/only.txt"), at("b.txt")) // the only way to it
	makeLink(t, at("."), at("sub/loop"))             // a loop
	makeLink(t, at("sub"), at("c-again"))            // read as sub
	makeLink(t, at(".hidden"), at("d"))              // a folder behind a link
	makeLink(t, filepath.Join(root, "outside"), at("e"))
	makeLink(t, filepath.Join(root, "outside", "secret.txt"), at("f.txt"))
	makeLink(t, at("nowhere.txt"), at("g.txt"))
	makeLink(t, at("h.txt"), at("h.txt"))
	got, skipped := find(t, root, Options{}, "tree")
	want := []string{"tree/b.txt", "tree/d/b.md", "tree/sub/a.txt", "tree/z.txt"}
	if !slices.Equal(got, want) {
		t.Errorf("found %q, want %q", got, want)
	}
	if want := (Skipped{Hidden: 1, Links: 4}); skipped != want {
		t.Errorf("skipped %+v, want %+v", skipped, want)
	}
	if got, _ := find(t, root, Options{}, "tree/**/*.txt"); !slices.Equal(got, []string{"tree/b.txt", "tree/sub/a.txt", "tree/z.txt"}) {
		t.Errorf("a glob found %q", got)
	}
	if got, _ := find(t, root, Options{}, "tree/c-again", "tree/sub"); !slices.Equal(got, []string{"tree/c-again/a.txt"}) {
		t.Errorf("a link that is named found %q", got)
	}
}

func TestFinderPassesOverPipes(t *testing.T) {
	root := writeFiles(t, map[string]string{"a.txt": holds})
	makePipe(t, filepath.Join(root, "pipe.txt"))
	makeLink(t, filepath.Join(root, "pipe.txt"), filepath.Join(root, "to-pipe.txt"))
	got, skipped := find(t, root, Options{}, ".")
	if !slices.Equal(got, []string{"a.txt"}) || skipped.Special != 2 {
		t.Errorf("found %q, skipped %+v; want 2 that are no plain files", got, skipped)
	}
}

func TestFinderUnreadable(t *testing.T) {
	if runtime.GOOS == "windows" || os.Getuid() == 0 {
		t.Skip("no permission stops us here")
	}
	root := writeFiles(t, map[string]string{"a.txt": holds, "b/c.txt": holds, "d.txt": holds})
	for _, name := range []string{"b", "d.txt"} {
		if err := os.Chmod(filepath.Join(root, name), 0); err != nil {
			t.Fatal(err)
		}
	}
	got, _ := find(t, root, Options{}, ".")
	os.Chmod(filepath.Join(root, "b"), 0o755)
	if want := []string{"a.txt", "!b", "!d.txt"}; !slices.Equal(got, want) {
		t.Errorf("found %q, want %q", got, want)
	}
}

func TestIsBinary(t *testing.T) {
	for text, want := range map[string]bool{
		"":                          false,
		holds:                       false,
		"\xef\xbb\xbfThe tug":       false,
		"\xff\xfeT\x00h\x00e\x00":   false,
		"\xfe\xff\x00T\x00h\x00e":   false,
		"T\x00h\x00e":               true,
		"Caf\xe9 und \x1b[1mfett\t": false,
		"\x01\x02\x03text":          true,
		"\x01" + holds:              false,
	} {
		if got := isBinary([]byte(text)); got != want {
			t.Errorf("%q is binary: %v, want %v", text, got, want)
		}
	}
}

func TestLooksBinary(t *testing.T) {
	root := writeFiles(t, map[string]string{"a": "PK\x03\x04\x00\x00", "b": strings.Repeat("x", sniffed) + "\x00"})
	for _, test := range []struct {
		name, format string
		want         bool
	}{{"a", "plain", true}, {"a", "", true}, {"a", "docx", false}, {"b", "plain", false}} {
		if got, err := looksBinary(filepath.Join(root, test.name), test.format); got != test.want || err != nil {
			t.Errorf("%s as %q is binary: %v, %v; want %v", test.name, test.format, got, err, test.want)
		}
	}
}

func TestReadList(t *testing.T) {
	for _, test := range []struct {
		list  string
		null  bool
		want  []string
		error string
	}{
		{"a.txt\nb c.txt\n\n ./d\r\nlast", false, []string{"a.txt", "b c.txt", " ./d", "last"}, ""},
		{"a\nb\x00\x00c\r\x00", true, []string{"a\nb", "c\r"}, ""},
		{"", false, nil, ""},
		{"a\nb\x00c\x00", false, nil, "list:2: a NUL byte; lists ended by NUL bytes are read with --null"},
		{"a\n" + strings.Repeat("x", maxListed+1), false, nil, "list: path 2: "},
	} {
		got, err := ReadList(strings.NewReader(test.list), test.null, "list")
		switch {
		case test.error == "" && (err != nil || !slices.Equal(got, test.want)):
			t.Errorf("%.20q: %q, %v; want %q", test.list, got, err, test.want)
		case test.error != "" && (err == nil || !strings.HasPrefix(err.Error(), test.error)):
			t.Errorf("%.20q: error %v, want %q", test.list, err, test.error)
		}
	}
}
