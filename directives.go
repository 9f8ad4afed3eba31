package foulcase

import (
	"errors"
	"io"
	"math"
	"sort"
	"strings"

	"example.org/foulcase/internal/text"
)

// maxDirectives bounds what a document may say about its marks: directives
// that let a stretch or a form stand, each; what is beyond is not heard.
const maxDirectives = 1 << 14

// directives are what a document's writer lets stand by comments in its source:
//
//	foulcase: stet WORD [WORD...]   these words, from here to the end
//	foulcase: off                   everything, from here
//	foulcase: on                    up to here
//
// To hear them while the document is read, read it through read; what was read says
// what stands. One goroutine uses them at a time.
type directives struct {
	scanner *text.DirectiveScanner
	stets   map[string]int64 // folded form: from which offset on it stands
	silent  []stretch        // ascending, the last one open while off
	off     bool
}

// stretch is a part of the source, in bytes.
type stretch struct{ from, to int64 }

func newDirectives() *directives {
	d := &directives{stets: map[string]int64{}}
	d.scanner = text.NewDirectiveScanner(d.take)
	return d
}

// directivesOf reads the directives of a document that is at hand.
func directivesOf(source []byte) *directives {
	d := newDirectives()
	if text.MayDirect(source) {
		d.scanner.Write(source)
		d.scanner.Close()
	}
	return d
}

// read returns a reader of r's bytes that hears the directives among them.
func (d *directives) read(r io.Reader) io.Reader { return &heard{r, d.scanner} }

type heard struct {
	io.Reader
	scanner *text.DirectiveScanner
}

func (h *heard) Read(p []byte) (int, error) {
	n, err := h.Reader.Read(p)
	h.scanner.Write(p[:n])
	if errors.Is(err, io.EOF) {
		h.scanner.Close()
	}
	return n, err
}

// take heeds one directive. Its own words stand in any case.
func (d *directives) take(said text.Directive) {
	switch said.Verb {
	case "stet":
		for _, word := range said.Words {
			form := foldedForm(word)
			if _, ok := d.stets[form]; !ok && len(d.stets) < maxDirectives {
				d.stets[form] = said.Start
			}
		}
	case "on":
		if d.off {
			d.silent[len(d.silent)-1].to = said.End
		}
		d.off = false
	}
	if d.off || len(d.silent) >= maxDirectives {
		return
	}
	own := stretch{said.Start, said.End}
	if d.off = said.Verb == "off"; d.off {
		own.to = math.MaxInt64 // until on
	}
	d.silent = append(d.silent, own)
}

// stand tells whether what is observed at source[from:to] stands: it lies in a stretch that is
// off, or all of its words were let stand before. The source must have been read up to there.
func (d *directives) stand(from, to int64, observed string) bool {
	if len(d.silent) == 0 {
		return false
	}
	if d.isSilent(from, to) {
		return true
	}
	words := strings.Fields(observed)
	for _, word := range words {
		form := foldedForm(word)
		since, ok := d.stets[form]
		if !ok {
			since, ok = d.stets[strings.TrimSuffix(form, "'s")]
		}
		if !ok || since > from {
			return false
		}
	}
	return len(words) > 0
}

// isSilent tells whether source[from:to] reaches into a stretch that is off.
func (d *directives) isSilent(from, to int64) bool {
	n := sort.Search(len(d.silent), func(i int) bool { return d.silent[i].from >= to })
	return n > 0 && d.silent[n-1].to > from
}

func foldedForm(word string) string { return string(text.Fold(nil, []byte(word))) }
