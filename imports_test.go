package foulcase_test

import (
	"go/parser"
	"go/token"
	"io/fs"
	"path"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

const modulePath = "example.org/foulcase"

// layers lists the packages from the bottom up. A package may import those of
// the layers below its own; packages of one layer are strangers.
var layers = [][]string{
	{"internal/wholefile"},
	{"internal/text", "internal/charset", "internal/modelfile", "internal/additive"},
	{"channel", "lm", "candidates/lexicon"},
	{"candidates", "lm/lattice", "lm/train"},
	{"."},
	{"internal/house", "internal/tree"},
	{"eval", "internal/editor", "internal/report"},
	{"cmd/*"},
}

// leaves may be imported by commands, examples and tests alone, and import
// nothing of ours, so that who embeds the library chooses its model.
var leaves = []string{"lm/english"}

// outside says which package may import a module that is none of ours; where
// it is silent, none may. Tests may import all of them.
var outside = map[string][]string{
	"github.com/agnivade/levenshtein":  {"eval", "internal/house"},
	"github.com/aymanbagabas/go-udiff": {"internal/report"},
	"github.com/clipperhouse/uax29/v2": {"internal/text"},
	"github.com/pelletier/go-toml/v2":  {"internal/house"},
	"github.com/spf13/pflag":           {"cmd/*"},
	"github.com/yuin/goldmark":         {"internal/text"},
	"golang.org/x/term":                {"cmd/*"},
	"golang.org/x/text":                {"internal/text", "internal/charset", "candidates/lexicon", "channel", "eval"},
}

// sourceFile is a Go file of the module with what it imports.
type sourceFile struct {
	name    string // slash-separated, from the root of the module
	pkg     string // its folder, "." for the root
	test    bool
	imports []string
}

func TestImportsGoDown(t *testing.T) {
	files := sourceFiles(t)
	for _, f := range files {
		for _, imported := range f.imports {
			if ours, ok := strings.CutPrefix(imported+"/", modulePath+"/"); ok {
				checkOurs(t, f, path.Clean(ours))
			} else {
				checkOutside(t, f, imported)
			}
		}
	}
}

// checkOurs holds one import of a package of ours to the layers.
func checkOurs(t *testing.T, f sourceFile, imported string) {
	t.Helper()
	isCommand := layerOf(f.pkg) == len(layers)-1
	switch {
	case imported == f.pkg: // an external test of the package itself
	case slices.Contains(leaves, imported):
		if !f.test && !isCommand {
			t.Errorf("%s imports %s, which is for commands, examples and tests alone", f.name, imported)
		}
	case layerOf(imported) < 0:
		t.Errorf("%s imports %s, which has no layer", f.name, imported)
	case f.test && layerOf(f.pkg) < 0: // tests of the leaves
	case layerOf(imported) >= layerOf(f.pkg):
		t.Errorf("%s imports %s, which does not lie below %s", f.name, imported, f.pkg)
	}
}

// checkOutside holds one import of another module, or of the standard library,
// to the list of who may.
func checkOutside(t *testing.T, f sourceFile, imported string) {
	t.Helper()
	if imported == "C" || imported == "net" || strings.HasPrefix(imported, "net/http") {
		t.Errorf("%s imports %q: no C, no network", f.name, imported)
	}
	if first, _, _ := strings.Cut(imported, "/"); !strings.Contains(first, ".") || f.test {
		return
	}
	for module, users := range outside {
		if strings.HasPrefix(imported+"/", module+"/") {
			if !slices.ContainsFunc(users, func(u string) bool { return matches(u, f.pkg) }) {
				t.Errorf("%s imports %s, which is for %v", f.name, imported, users)
			}
			return
		}
	}
	t.Errorf("%s imports %s, which no package may", f.name, imported)
}

func TestEveryPackageHasALayer(t *testing.T) {
	seen := map[string]bool{}
	for _, f := range sourceFiles(t) {
		seen[f.pkg] = true
		if layerOf(f.pkg) < 0 && !slices.Contains(leaves, f.pkg) {
			t.Errorf("package %s has no layer", f.pkg)
		}
	}
	for _, want := range []string{".", "cmd/foulcase", "channel", "lm", "internal/text"} {
		if !seen[want] {
			t.Errorf("no file of package %s was read", want)
		}
	}
}

// layerOf returns the number of a package's layer, or -1.
func layerOf(pkg string) int {
	return slices.IndexFunc(layers, func(layer []string) bool {
		return slices.ContainsFunc(layer, func(p string) bool { return matches(p, pkg) })
	})
}

// matches tells whether pkg is the package p, or in the folder that p names
// with a star.
func matches(p, pkg string) bool {
	folder, all := strings.CutSuffix(p, "*")
	return p == pkg || all && strings.HasPrefix(pkg, folder)
}

// sourceFiles reads the imports of every Go file of the module, whatever its
// build constraints.
func sourceFiles(t *testing.T) []sourceFile {
	t.Helper()
	var files []sourceFile
	err := filepath.WalkDir(".", func(name string, d fs.DirEntry, err error) error {
		switch {
		case err != nil:
			return err
		case d.IsDir() && (d.Name() == "testdata" || len(d.Name()) > 1 && d.Name()[0] == '.'):
			return fs.SkipDir
		case d.IsDir() || filepath.Ext(name) != ".go":
			return nil
		}
		parsed, err := parser.ParseFile(token.NewFileSet(), name, nil, parser.ImportsOnly)
		if err != nil {
			return err
		}
		slashed := filepath.ToSlash(name)
		f := sourceFile{name: slashed, pkg: path.Dir(slashed), test: strings.HasSuffix(slashed, "_test.go")}
		for _, spec := range parsed.Imports {
			imported, err := strconv.Unquote(spec.Path.Value)
			if err != nil {
				return err
			}
			f.imports = append(f.imports, imported)
		}
		files = append(files, f)
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	return files
}
