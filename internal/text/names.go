package text

import (
	"bytes"
	"iter"
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
	for from, to := range proseOf(blocks) {
		if from > at {
			names.read(source[at:from])
		}
		at = max(at, to)
	}
	names.read(source[min(at, len(source)):])
	return names
}

// proseOf yields the stretches of the source that are the blocks' text, code inside a
// sentence aside. Blocks that stand inside others come after what of those stands before.
func proseOf(blocks []*Block) iter.Seq2[int, int] {
	return func(yield func(int, int) bool) {
		for _, b := range blocks {
			base := int(b.offset)
			if b.spans == nil && !yield(base, base+len(b.source)) {
				return
			}
			for _, s := range b.spans {
				if string(b.Text[s.text:s.textEnd]) != placeholder && !yield(base+s.source, base+s.sourceEnd) {
					return
				}
			}
		}
	}
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
