package text

import (
	"bytes"
	"io"
)

// readJSONLines reads JSON Lines: one value a line, RFC 8259 each. See jsonScan
// for what is read of a value. A line that is none is an error, which comes
// after what stands before it.
func readJSONLines(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		j := newJSONScan(e, o.Fields)
		for l := range linesOf(e.source, e.at) {
			if l.blank() {
				continue
			}
			j.pos, j.end = l.start, l.end
			if err := j.document("a line of JSON Lines holds one value"); err != nil || e.stopped {
				return err
			}
		}
		return nil
	})
}

// readJSON reads one value, RFC 8259. Comments and a comma behind the last
// member, as settings often have them, are borne.
func readJSON(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		j := newJSONScan(e, o.Fields)
		j.pos, j.end, j.lenient = e.at, len(e.source), true
		if j.space(); j.pos == j.end {
			return nil
		}
		return j.document("a JSON document holds one value")
	})
}

// text yields the string between source[from:to], its quotes left out, if it is
// wanted. Its lines are those of plain text.
func (j *jsonScan) text(from, to int) {
	if !j.wanted() {
		return
	}
	p := j.decoded(from, to)
	if len(j.fields) > 0 || holdsProse(&j.segmenter, p.text) {
		j.emitPlain(&p, func(words string) (string, bool) { return jsonSpelled(words, j.ascii), true })
	}
}

// decoded returns source[from:to] with its escapes, which are sound, resolved.
func (j *jsonScan) decoded(from, to int) prose {
	p := prose{source: j.source}
	for from < to {
		i := bytes.IndexByte(j.source[from:to], '\\')
		if i < 0 {
			p.verbatim(from, to)
			break
		}
		p.verbatim(from, from+i)
		from += i
		text, n := jsonEscape(j.source[from:to])
		p.standIn(text, from, from+n)
		from += n
	}
	return p
}
