package text

import (
	"bytes"
	"io"
)

// readVTT reads the text of WebVTT subtitles (W3C): the header, identifiers,
// times, settings, tags and the blocks NOTE, STYLE and REGION are left out. What
// is in another language than the one that is read, <lang fr>, is one U+FFFC.
// Another voice, <v Name>, begins a new block.
func readVTT(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		v := vtt{subtitles: subtitles{emitter: e, marks: "<&", prose: prose{source: e.source}}, options: o}
		v.mark = v.taken
		v.escape = escapeCharData
		v.read()
		return nil
	})
}

type vtt struct {
	subtitles
	options Options
	voice   string // who spoke last, as the tag names them
	foreign int    // how many tags <lang> are open, from one of another language on
	since   int    // where that one stands
}

func (v *vtt) read() {
	inside := false
	for pos := v.at; pos < len(v.source) && !v.stopped; {
		l := lineAt(v.source, pos)
		pos = l.next
		switch {
		case v.timing(l):
			v.endCue()
			inside, v.opens = true, true
		case l.blank():
			inside = false
		case inside:
			v.line(l)
		}
	}
	v.endCue()
	v.finish()
}

// endCue closes the tags that are open.
func (v *vtt) endCue() {
	v.close(v.last.end)
	v.foreign = 0
}

// taken takes the tag or character reference at from.
func (v *vtt) taken(from, to int) (n int) {
	b := v.source[from:to]
	if b[0] == '&' {
		text, n := resolve(b)
		if n == 1 {
			return 0
		}
		if !v.hidden {
			v.prose.standIn(text, from, from+n)
		}
		return n
	}
	if n = angled(b); n > 0 {
		v.tag(b[1:n-1], from, from+n)
	}
	return n
}

// tag takes a tag, whose inside is given and which stands in source[from:to].
func (v *vtt) tag(inside []byte, from, to int) {
	name, about, _ := bytes.Cut(inside, []byte(" "))
	name, _, _ = bytes.Cut(name, []byte("."))
	switch string(name) {
	case "lang":
		if v.foreign == 0 && !v.options.reads(string(about)) {
			v.since, v.hidden = from, true
		}
		if v.hidden {
			v.foreign++
		}
	case "/lang":
		if v.foreign == 1 {
			v.close(to)
		}
		v.foreign = max(v.foreign-1, 0)
	case "v":
		if string(about) != v.voice && !v.hidden {
			v.finish()
		}
		v.voice = string(about)
	}
}

// close ends what is in another language.
func (v *vtt) close(at int) {
	if v.hidden {
		v.hidden = false
		v.prose.standIn(placeholder, v.since, at)
	}
}
