package charset

import "sort"

// spacing is how many bytes of a source, about, lie between two places whose
// offsets are kept: the rest is counted anew when asked for.
const spacing = 1 << 10

// Text is a source decoded to UTF-8. Its methods are for one goroutine.
type Text struct {
	encoding *Encoding
	source   []byte
	utf8     []byte
	places   []place // ascending, the first at the start; none for UTF-8
}

// place is where a character begins.
type place struct{ utf8, source int64 }

// Decode reads a source in the encoding of that label, see Find; a byte order mark
// overrides the label, and is kept as U+FEFF. Bytes that are no text become
// U+FFFD. A UTF-8 source is not copied, nor checked.
func Decode(source []byte, label string) (*Text, error) {
	e, err := Find(label)
	if err != nil {
		return nil, err
	}
	return e.Detect(source).Decode(source), nil
}

// Decode reads a source, or a stretch of one that is cut between characters. The
// text holds on to it.
func (e *Encoding) Decode(source []byte) *Text {
	t := &Text{encoding: e, source: source, utf8: source}
	if e.IsUTF8() {
		return t
	}
	t.utf8 = make([]byte, 0, len(source)+len(source)/8)
	read := e.codec.reader()
	next := 0
	for at := 0; at < len(source); {
		if at >= next {
			t.places = append(t.places, place{int64(len(t.utf8)), int64(at)})
			next = at + spacing
		}
		var n int
		t.utf8, n = read(t.utf8, source[at:])
		at += n
	}
	return t
}

// Bytes is the text in UTF-8. It is the text's own, to be read only.
func (t *Text) Bytes() []byte { return t.utf8 }

// Encoding is the one that the source was read in.
func (t *Text) Encoding() *Encoding { return t.encoding }

// Encode is Encoding.Encode for the encoding of the text.
func (t *Text) Encode(s string) ([]byte, error) { return t.encoding.Encode(s) }

// Offset returns where in the source the character stands that holds the byte of
// the text at the offset; the length of the source for the end of the text and
// beyond.
func (t *Text) Offset(utf8 int64) int64 {
	if utf8 >= int64(len(t.utf8)) {
		return int64(len(t.source))
	}
	if t.encoding.IsUTF8() || utf8 < 0 {
		return max(utf8, 0)
	}
	i := sort.Search(len(t.places), func(i int) bool { return t.places[i].utf8 > utf8 }) - 1
	at := t.places[i]
	read := t.encoding.codec.reader()
	var character [16]byte
	for {
		c, n := read(character[:0], t.source[at.source:])
		if at.utf8+int64(len(c)) > utf8 {
			return at.source
		}
		at.utf8 += int64(len(c))
		at.source += int64(n)
	}
}
