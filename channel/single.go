package channel

import (
	"fmt"
	"io"
	"strconv"
)

// Edit is a single-letter edit without its right neighbour, with a count.
type Edit struct {
	Kind  Kind   // Replaced, Dropped, Inserted or Swapped
	Left  Symbol // intended letter to the left; for Swapped unused
	Meant Symbol // for Swapped the first of two
	Typed Symbol // for Swapped the second intended letter; unused for Dropped
	Count float64
}

// ReadEdits reads lines of typed TAB meant TAB count, where both sides are one
// or two letters: "t TAB te" is e left out after t, "ea TAB e" is a added after
// e, "ei TAB ie" is a swap, and '>' stands for the start of the word. Lines with
// other shapes or with capitals or spaces ('_') are skipped.
func ReadEdits(r io.Reader) ([]Edit, error) {
	var edits []Edit
	err := eachLine(r, func(fields []string) error {
		if len(fields) < 3 {
			return fmt.Errorf("expected three fields, found %d", len(fields))
		}
		n, err := strconv.ParseFloat(fields[2], 64)
		if err != nil || !(n > 0) {
			return fmt.Errorf("count %q is not a number above 0", fields[2])
		}
		if e, ok := parseEdit(fields[0], fields[1]); ok {
			e.Count = n
			edits = append(edits, e)
		}
		return nil
	})
	return edits, err
}

func parseEdit(typed, meant string) (Edit, bool) {
	t, ok1 := editSymbols(typed)
	m, ok2 := editSymbols(meant)
	switch {
	case !ok1 || !ok2:
	case len(t) == 1 && len(m) == 1 && t[0] != Edge && m[0] != Edge:
		return Edit{Kind: Replaced, Typed: t[0], Meant: m[0]}, true
	case len(t) == 1 && len(m) == 2 && t[0] == m[0]:
		return Edit{Kind: Dropped, Left: m[0], Meant: m[1]}, true
	case len(t) == 2 && len(m) == 1 && t[0] == m[0]:
		return Edit{Kind: Inserted, Left: m[0], Typed: t[1]}, true
	case len(t) == 2 && len(m) == 2 && t[0] == m[1] && t[1] == m[0] && t[0] != t[1]:
		return Edit{Kind: Swapped, Meant: m[0], Typed: m[1]}, true
	}
	return Edit{}, false
}

func editSymbols(s string) ([]Symbol, bool) {
	var out []Symbol
	for i, r := range s {
		switch {
		case r == '>' && i == 0:
			out = append(out, Edge)
		case r == '\'' || r == '-' || 'a' <= r && r <= 'z':
			out = append(out, LetterOf(r).Sym)
		default:
			return nil, false
		}
	}
	return out, len(out) > 0
}
