package text

import (
	"go/build"
	"os"
	"path/filepath"
	"slices"
	"testing"
)

// TestScannerAgainstGo: the table's scanner, given Go's comments and strings, finds
// what the standard library's does.
func TestScannerAgainstGo(t *testing.T) {
	table := language{line: []string{"//"}, enclosures: []enclosure{cBlock, double, char, goRaw}}
	paths, err := filepath.Glob("*.go")
	if err != nil || len(paths) < 10 {
		t.Fatalf("%d files, %v", len(paths), err)
	}
	for _, folder := range []string{"go/scanner", "encoding/json", "strconv", "regexp/syntax"} {
		more, err := filepath.Glob(filepath.Join(build.Default.GOROOT, "src", folder, "*.go"))
		if err != nil {
			t.Fatal(err)
		}
		paths = append(paths, more...)
	}
	pieces := 0
	for _, path := range paths {
		source, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		var got, want []stretch
		table.pieces(source, func(p codePiece) { got = append(got, stretch{p.from, p.to}) })
		goPieces(source, func(p codePiece) { want = append(want, stretch{p.from, p.to}) })
		for i := range min(len(got), len(want)) {
			if got[i] != want[i] {
				t.Errorf("%s: %q, want %q", path, source[got[i].from:got[i].to], source[want[i].from:want[i].to])
				break
			}
		}
		if !slices.Equal(got, want) {
			t.Errorf("%s: %d pieces, want %d", path, len(got), len(want))
		}
		pieces += len(want)
	}
	if pieces < 1000 {
		t.Errorf("%d pieces compared", pieces)
	}
}
