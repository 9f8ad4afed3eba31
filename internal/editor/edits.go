package editor

import "unicode/utf8"

// maxDocument is the most bytes of a document that is judged.
const maxDocument = 32 << 20

// edited makes the changes of a version.
func (d *document) edited(version int, changes []contentChange) {
	if version <= d.version {
		d.s.log(loudWarning, "%s: version %d after version %d", d.uri, version, d.version)
	}
	d.version = version
	for _, c := range changes {
		d.change(c)
	}
	d.stale = true
}

func (d *document) change(c contentChange) {
	switch {
	case c.Range == nil && d.draft == nil:
		d.begin([]byte(c.Text))
	case c.Range == nil:
		start, end, added := difference(d.draft.Source(), []byte(c.Text))
		d.splice(start, end, added)
	case d.draft != nil:
		source := d.draft.Source()
		start, ok := d.lines.offset(source, c.Range.Start)
		end, okEnd := d.lines.offset(source, c.Range.End)
		if !ok || !okEnd || end < start {
			d.s.log(loudWarning, "%s: a change from %d:%d to %d:%d reaches out of the document, which was made within it",
				d.uri, c.Range.Start.Line, c.Range.Start.Character, c.Range.End.Line, c.Range.End.Character)
		}
		d.splice(min(start, end), max(start, end), []byte(c.Text))
	}
}

// begin makes the draft of a text, unless that is too large.
func (d *document) begin(source []byte) {
	d.draft, d.stale, d.judged = nil, true, false
	if len(source) > maxDocument {
		d.refuse(len(source))
		return
	}
	o := d.options()
	draft, err := d.s.config.Engine.NewDraft(source, o)
	if d.report(err); err != nil {
		return
	}
	d.draft, d.format, d.fields = draft, o.Format, o.Fields
	d.lines.reset(source)
}

// refuse gives a document up until its whole text is sent anew.
func (d *document) refuse(size int) {
	if d.draft != nil {
		d.draft.Close()
	}
	d.draft = nil
	d.s.show(loudWarning, "foulcase: %s has %d bytes, the most that is judged is %d: nothing is marked in it", nameOf(d.uri), size, maxDocument)
}

func (d *document) splice(start, end int, added []byte) {
	if size := len(d.draft.Source()) + len(added) - (end - start); size > maxDocument {
		d.refuse(size)
		return
	}
	if err := d.draft.Edit(start, end, added); err != nil {
		d.s.log(loudError, "%s: %v", d.uri, err)
		return
	}
	d.lines.edit(d.draft.Source(), start, end, len(added))
}

// difference is the least stretch of old, in whole code points, whose replacement
// makes it new.
func difference(old, new []byte) (start, end int, added []byte) {
	most := min(len(old), len(new))
	for start < most && old[start] == new[start] {
		start++
	}
	for start > 0 && (start < len(old) && !utf8.RuneStart(old[start]) || start < len(new) && !utf8.RuneStart(new[start])) {
		start--
	}
	same := 0
	for same < most-start && old[len(old)-1-same] == new[len(new)-1-same] {
		same++
	}
	for same > 0 && !utf8.RuneStart(old[len(old)-same]) {
		same--
	}
	return start, len(old) - same, new[start : len(new)-same]
}
