package text

import (
	"bytes"
	"cmp"
	"slices"
)

// mostNames bounds what is remembered of a document; names after that are not.
const mostNames = 1 << 16

// Names are the words that a document has outside its prose: in code, addresses,
// attributes. A form among them is somebody's name for something. It is not
// changed once read; nil has none.
type Names map[string]struct{}

// Has reports whether a normal form is a name, or a name with a plural's or a possessive's
// ending ("bufs", "buf's").
func (n Names) Has(form []byte) bool {
	if len(n) == 0 {
		return false
	}
	if _, ok := n[string(form)]; ok {
		return true
	}
	stem, ok := bytes.CutSuffix(form, []byte("s"))
	if !ok {
		return false
	}
	_, ok = n[string(bytes.TrimSuffix(stem, []byte("'")))]
	return ok
}

// namesOf reads the names of a source whose prose the blocks are.
func namesOf(source []byte, blocks []*Block) Names {
	names := Names{}
	at := 0
	for _, s := range proseOf(blocks) {
		if s[0] > at {
			names.read(source[at:s[0]])
		}
		at = max(at, s[1])
	}
	names.read(source[min(at, len(source)):])
	return names
}

// proseOf returns the stretches of the source that are the blocks' text, code inside
// a sentence aside, in order: a block may stand inside another (a footnote).
func proseOf(blocks []*Block) [][2]int {
	var all [][2]int
	for _, b := range blocks {
		base := int(b.offset)
		if b.spans == nil {
			all = append(all, [2]int{base, base + len(b.source)})
		}
		for _, s := range b.spans {
			if string(b.Text[s.text:s.textEnd]) != placeholder {
				all = append(all, [2]int{base + s.source, base + s.sourceEnd})
			}
		}
	}
	slices.SortFunc(all, func(a, b [2]int) int { return cmp.Compare(a[0], b[0]) })
	return all
}

// read takes the words of a stretch: runs of ASCII letters. Comments of markup hold
// prose, and so do directives to foulcase itself: they are left out.
func (n Names) read(code []byte) {
	for len(code) > 0 && len(n) < mostNames {
		switch {
		case bytes.HasPrefix(code, []byte("<!--")):
			_, code, _ = bytes.Cut(code, []byte("-->"))
		case bytes.HasPrefix(code, []byte(directiveSign)):
			_, code, _ = bytes.Cut(code, []byte("\n"))
		case isLetterByte(code[0]):
			word := code[:letters(code)]
			n[string(bytes.ToLower(word))] = struct{}{}
			code = code[len(word):]
		default:
			code = code[1:]
		}
	}
}

// letters counts the ASCII letters that b begins with.
func letters(b []byte) int {
	n := 0
	for n < len(b) && isLetterByte(b[n]) {
		n++
	}
	return n
}

func isLetterByte(c byte) bool {
	c |= 0x20
	return 'a' <= c && c <= 'z'
}
