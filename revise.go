package foulcase

import (
	"example.org/foulcase/internal/charset"
	"example.org/foulcase/internal/text"
)

// Revision is how the marks of a document are put right.
type Revision struct {
	Corrected []Mark // those that Edits put right, each with its first correction
	Left      []Mark // those left to do by hand, queries among them
	Edits     []Edit // one a mark of Corrected
	format    string
}

// Revise says how to put the marks of a document right. Options are those that
// Proof found the marks with. Marks of GradeMark are corrected; queries, marks
// ByHand and such as overlap one before them are left.
func Revise(document []byte, o Options, marks []Mark) (Revision, error) {
	r := Revision{format: o.formatName()}
	encoding, err := encodingOf(document, o)
	if err != nil {
		return r, err
	}
	for _, m := range marks {
		if m.Grade != GradeMark || m.ByHand || len(m.Corrections) == 0 || r.covers(m) {
			r.Left = append(r.Left, m)
			continue
		}
		spelled, err := encoding.Encode(m.Corrections[0].Spelled())
		if err != nil {
			r.Left = append(r.Left, m)
			continue
		}
		r.Corrected = append(r.Corrected, m)
		r.Edits = append(r.Edits, Edit{Part: m.Part, Offset: m.Offset, Length: m.Length, Text: spelled})
	}
	return r, nil
}

// Apply returns a copy of the document with the edits made.
func (r Revision) Apply(document []byte) ([]byte, error) {
	return Splice(document, r.format, r.Edits)
}

// covers tells whether a mark overlaps the one that was corrected last.
func (r Revision) covers(m Mark) bool {
	if len(r.Edits) == 0 {
		return false
	}
	last := r.Edits[len(r.Edits)-1]
	return last.Part == m.Part && m.Offset < last.Offset+last.Length
}

// DecodeText returns a stretch of a document, cut between characters, as UTF-8.
// Packed documents have none.
func DecodeText(document []byte, o Options, start, end int64) (string, error) {
	encoding, err := encodingOf(document, o)
	if err != nil {
		return "", err
	}
	return string(encoding.Decode(document[start:end]).Bytes()), nil
}

// encodingOf is the encoding that Proof reads the document in.
func encodingOf(document []byte, o Options) (*charset.Encoding, error) {
	format, err := text.ParseFormat(o.formatName())
	if err != nil {
		return nil, err
	}
	if format.Packed() {
		return charset.Find("")
	}
	encoding, err := charset.Find(o.Encoding)
	if err != nil {
		return nil, err
	}
	return encoding.Detect(document), nil
}
