package tree

import (
	"bufio"
	"cmp"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"

	"example.org/foulcase/internal/wholefile"
)

// KnownMark is a line of a file of known marks.
type KnownMark struct {
	Fingerprint string // 16 hexadecimal digits
	Path        string // of the document, with slashes
	Observed    string
}

const (
	maxKnownLine = 64 << 10 // bytes
	maxKnown     = 1 << 22  // marks in a file
)

// knownHead begins a file of known marks.
const knownHead = `# Marks that are known and not shown: fingerprint, path, observed; one a line.
# A line may be deleted by hand. Merge two versions by keeping the lines of both.
`

// ReadKnown reads a file of known marks. Lines that are empty or begin with "#" are
// passed over. Name is the file's in errors.
func ReadKnown(r io.Reader, name string) ([]KnownMark, error) {
	lines := bufio.NewScanner(r)
	lines.Buffer(nil, maxKnownLine)
	var marks []KnownMark
	n := 1
	for ; lines.Scan(); n++ {
		line := strings.TrimSuffix(lines.Text(), "\r")
		if line == "" || strings.HasPrefix(line, "#") {
			continue
		}
		fields := strings.Split(line, "\t")
		switch {
		case isMergeMark(line):
			return nil, fmt.Errorf("%s:%d: a mark of a merge; keep the lines of both sides and delete those with <, = and >", name, n)
		case len(fields) != 3 || !isFingerprint(fields[0]):
			return nil, fmt.Errorf("%s:%d: want a fingerprint of 16 digits, a path and a form, parted by tabs; delete the line or write the file anew with --write-known", name, n)
		case len(marks) == maxKnown:
			return nil, fmt.Errorf("%s:%d: more than %d marks; correct some, or name fewer documents", name, n, maxKnown)
		}
		marks = append(marks, KnownMark{fields[0], unescapeField(fields[1]), unescapeField(fields[2])})
	}
	if err := lines.Err(); errors.Is(err, bufio.ErrTooLong) {
		return nil, fmt.Errorf("%s:%d: a line of more than %d bytes; is it the right file?", name, n, maxKnownLine)
	} else if err != nil {
		return nil, fmt.Errorf("%s:%d: %w; write the file anew with --write-known", name, n, err)
	}
	return marks, nil
}

// isMergeMark tells the lines that git puts around the two sides of a conflict.
func isMergeMark(line string) bool {
	return strings.HasPrefix(line, "<<<<<<<") || strings.HasPrefix(line, ">>>>>>>") ||
		strings.HasPrefix(line, "|||||||") || line == "======="
}

func isFingerprint(s string) bool {
	return len(s) == 16 && strings.Trim(s, "0123456789abcdef") == ""
}

// WriteKnown writes a file of known marks, whole or not at all.
func WriteKnown(path string, marks []KnownMark) error {
	return wholefile.Write(path, func(w io.Writer) error { return printKnown(w, marks) })
}

// printKnown writes marks in the order of path, form and fingerprint, so that the
// same marks give the same bytes.
func printKnown(w io.Writer, marks []KnownMark) error {
	marks = slices.Clone(marks)
	slices.SortFunc(marks, func(a, b KnownMark) int {
		return cmp.Or(strings.Compare(a.Path, b.Path), strings.Compare(a.Observed, b.Observed), strings.Compare(a.Fingerprint, b.Fingerprint))
	})
	out := bufio.NewWriter(w)
	out.WriteString(knownHead)
	for _, m := range marks {
		fmt.Fprintf(out, "%s\t%s\t%s\n", m.Fingerprint, escapeField(m.Path), escapeField(m.Observed))
	}
	return out.Flush()
}

var (
	fieldEscaper   = strings.NewReplacer(`\`, `\\`, "\t", `\t`, "\n", `\n`, "\r", `\r`)
	fieldUnescaper = strings.NewReplacer(`\\`, `\`, `\t`, "\t", `\n`, "\n", `\r`, "\r")
)

// escapeField writes a field so that it holds no tab and no line end.
func escapeField(s string) string { return fieldEscaper.Replace(s) }

func unescapeField(s string) string { return fieldUnescaper.Replace(s) }
