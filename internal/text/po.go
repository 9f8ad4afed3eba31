package text

import (
	"bytes"
	"io"
	"slices"
	"strings"
)

// readPO reads a gettext catalogue. Which of its strings are read depends on the
// Language of its header:
//
//   - that of the options: the translations (msgstr) that there are;
//   - another one: the originals (msgid, msgid_plural);
//   - none, as in a template: the translation of an entry, or its original where
//     it has none.
//
// An original is the key by which the program looks its translation up, so it
// has to be corrected in the source of the program: no block of originals has a
// spelling for another word. Comments, contexts, the header and obsolete entries
// are left out. What is read of a string says poText.
func readPO(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		c := catalogue{emitter: e, options: o}
		c.read()
		return nil
	})
}

type catalogue struct {
	*emitter
	options  Options
	entry    poEntry
	into     *[]poString // whose last string continued lines belong to; nil: none that is read
	context  bool        // an entry has begun with its context
	header   bool        // the header was read
	language string      // what it names
}

// poEntry is what is read of an entry, in the order of the source.
type poEntry struct{ originals, translations []poString }

// poString is a string that may stand on several lines: what is between the
// quotes of each.
type poString []piece

// piece is a stretch of the source.
type piece struct{ from, to int }

func (s poString) len() int {
	n := 0
	for _, p := range s {
		n += p.to - p.from
	}
	return n
}

func (c *catalogue) read() {
	for l := range linesOf(c.source, c.at) {
		if c.stopped {
			return
		}
		line := c.source[l.start:l.end]
		quote := bytes.IndexByte(line, '"')
		if quote < 0 || line[0] == '#' {
			continue
		}
		c.keyword(string(bytes.TrimSpace(line[:quote])))
		if end := bytes.LastIndexByte(line, '"'); c.into != nil && end > quote {
			last := &(*c.into)[len(*c.into)-1]
			*last = append(*last, piece{l.start + quote + 1, l.start + end})
		}
	}
	c.finish()
}

// keyword begins the string that word stands before; where none stands, the
// string at hand goes on.
func (c *catalogue) keyword(word string) {
	switch {
	case word == "":
		return
	case word == "msgctxt", word == "msgid" && !c.context:
		c.finish()
	}
	switch {
	case word == "msgid", word == "msgid_plural":
		c.into = &c.entry.originals
	case word == "msgstr", strings.HasPrefix(word, "msgstr["):
		c.into = &c.entry.translations
	default:
		c.into = nil
	}
	if c.context = word == "msgctxt"; c.into != nil {
		*c.into = append(*c.into, nil)
	}
}

// finish yields what is read of the entry at hand.
func (c *catalogue) finish() {
	e := c.entry
	c.entry = poEntry{}
	translated := slices.ContainsFunc(e.translations, func(s poString) bool { return s.len() > 0 })
	switch {
	case len(e.originals) == 0:
	case e.originals[0].len() == 0:
		c.settle(e.translations)
	case !c.options.reads(c.language), !translated && c.language == "":
		c.strings(e.originals, func(string) (string, bool) { return "", false })
	default:
		c.strings(e.translations, func(words string) (string, bool) { return poEscapes.Replace(words), true })
	}
}

// settle reads the header, the translation of the empty string.
func (c *catalogue) settle(translations []poString) {
	if c.header || len(translations) == 0 {
		return
	}
	c.header = true
	t := newPOText(c.source, translations[0])
	for line := range bytes.Lines(t.text) {
		if name, value, _ := strings.Cut(string(line), ":"); strings.EqualFold(name, "Language") {
			c.language = strings.TrimSpace(value)
		}
	}
}

// strings yields strings.
func (c *catalogue) strings(list []poString, escape func(string) (string, bool)) {
	for _, s := range list {
		t := newPOText(c.source, s)
		c.emitPlain(&t.prose, escape)
	}
}

// poEscapes are what must be escaped between quotes.
var poEscapes = strings.NewReplacer(`"`, `\"`, `\`, `\\`, "\n", `\n`, "\t", `\t`, "\r", `\r`)
