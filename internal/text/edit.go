package text

import (
	"cmp"
	"fmt"
	"slices"
)

// Edit replaces a stretch of a source.
type Edit struct {
	Part       string // as Block.Part
	Start, End int64  // bytes of the source, or of its part
	Text       []byte // as the source spells it, see Block.Escape
}

// Splice returns a copy of a source of format f with the edits made. They may
// come in any order; it is an error when two overlap or one lies outside. Without
// edits the copy has the same bytes.
func Splice(source []byte, f Format, edits []Edit) ([]byte, error) {
	e, err := f.entry()
	if err != nil {
		return nil, err
	}
	if len(edits) == 0 {
		return slices.Clone(source), nil
	}
	if e.splice != nil {
		return e.splice(source, edits)
	}
	return spliceBytes(source, edits)
}

// spliceBytes makes edits of one part.
func spliceBytes(source []byte, edits []Edit) ([]byte, error) {
	edits = slices.Clone(edits)
	slices.SortStableFunc(edits, func(a, b Edit) int {
		return cmp.Or(cmp.Compare(a.Start, b.Start), cmp.Compare(a.End, b.End))
	})
	out := make([]byte, 0, len(source)+64)
	at := int64(0)
	for _, e := range edits {
		if e.Start < at || e.End < e.Start || e.End > int64(len(source)) {
			return nil, fmt.Errorf("an edit of bytes %d to %d overlaps another or lies outside", e.Start, e.End)
		}
		out = append(out, source[at:e.Start]...)
		out = append(out, e.Text...)
		at = e.End
	}
	return append(out, source[at:]...), nil
}
