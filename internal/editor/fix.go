package editor

import (
	"encoding/json"

	"example.org/foulcase"
)

// fix says what a code action corrects, so that its edit can be made when the client
// asks for it.
type fix struct {
	URI     string `json:"uri"`
	Version int    `json:"version"`
	Which   string `json:"which"`  // fixOne, fixAlike or fixEvery
	Offset  int64  `json:"offset"` // of the mark, and its length, in bytes
	Length  int64  `json:"length"`
	Choice  int    `json:"choice"` // of its corrections
}

const (
	fixOne   = "one"   // the mark
	fixAlike = "alike" // the marks of the same form, too
	fixEvery = "every" // all marks, queries left out, by their first correction
)

// fixing completes a code action by its edit, or by what that is made from when the
// client asks later; ok is false when there is nothing to edit.
func (d *document) fixing(a codeAction, f fix) (codeAction, bool) {
	f.URI, f.Version = d.uri, d.version
	edit := d.edit(f)
	if edit == nil {
		return a, false
	}
	if d.s.client.resolvesEdits() {
		a.Data = &f
	} else {
		a.Edit = edit
	}
	return a, true
}

// resolve fills in the edit of a code action.
func (s *Server) resolve(c *call, params json.RawMessage) {
	var a codeAction
	if f := decode(params, &a); f != nil {
		c.reply(nil, f)
		return
	}
	if a.Data == nil { // it has all it needs
		c.reply(a, nil)
		return
	}
	s.hand(c, a.Data.URI, func(d *document) {
		f := d.judge(c.ctx)
		if f == nil && d.version != a.Data.Version {
			f = failf(contentModified, "the document is at version %d, the code action was for %d", d.version, a.Data.Version)
		}
		if f != nil {
			c.reply(nil, f)
			return
		}
		a.Edit = d.edit(*a.Data)
		c.reply(a, nil)
	})
}

// edit makes the edit of a fix; nil when there is nothing to do.
func (d *document) edit(f fix) *workspaceEdit {
	var edits []textEdit
	at := d.cursor()
	for m, c := range d.corrections(f) {
		edits = append(edits, textEdit{at.span(m), c.Spelled()})
	}
	if len(edits) == 0 {
		return nil
	}
	if !d.s.client.Workspace.WorkspaceEdit.DocumentChanges {
		return &workspaceEdit{Changes: map[string][]textEdit{d.uri: edits}}
	}
	e := documentEdit{Edits: edits}
	e.TextDocument.URI, e.TextDocument.Version = d.uri, d.version
	return &workspaceEdit{DocumentChanges: []documentEdit{e}}
}

// corrections yields the marks of a fix, each with what to put in its place. Marks
// that only a hand should correct are left out, and those that overlap one before.
func (d *document) corrections(f fix) func(func(foulcase.Mark, foulcase.Correction) bool) {
	return func(yield func(foulcase.Mark, foulcase.Correction) bool) {
		meant, ok := d.markAt(f)
		if !ok && f.Which != fixEvery {
			return
		}
		end := int64(0)
		for _, m := range d.marks {
			c, ok := f.applies(m, meant)
			if !ok || m.ByHand || m.Offset < end {
				continue
			}
			if end = m.Offset + m.Length; !yield(m, c) {
				return
			}
		}
	}
}

// markAt is the mark that a fix was offered for.
func (d *document) markAt(f fix) (foulcase.Mark, bool) {
	for _, m := range d.marks {
		if m.Offset == f.Offset && m.Length == f.Length && 0 <= f.Choice && f.Choice < len(m.Corrections) {
			return m, true
		}
	}
	return foulcase.Mark{}, false
}

// applies picks the correction of a mark when the fix, which was offered for another
// or the same, corrects it too.
func (f fix) applies(m, meant foulcase.Mark) (foulcase.Correction, bool) {
	switch f.Which {
	case fixEvery:
		if m.Grade == foulcase.GradeMark && len(m.Corrections) > 0 {
			return m.Corrections[0], true
		}
	case fixOne:
		if m.Offset == meant.Offset && m.Length == meant.Length {
			return m.Corrections[f.Choice], true
		}
	case fixAlike:
		for _, c := range m.Corrections {
			if m.Observed == meant.Observed && c.Text == meant.Corrections[f.Choice].Text {
				return c, true
			}
		}
	}
	return foulcase.Correction{}, false
}

// alike counts the marks that are corrected along with m.
func (d *document) alike(m foulcase.Mark) int {
	n := 0
	for range d.corrections(fix{Which: fixAlike, Offset: m.Offset, Length: m.Length}) {
		n++
	}
	return n
}
