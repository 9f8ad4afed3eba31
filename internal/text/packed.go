package text

import (
	"archive/zip"
	"bytes"
	"cmp"
	"compress/flate"
	"errors"
	"fmt"
	"hash/crc32"
	"io"
)

// Bounds on packed documents, against archives made to fill the memory.
const (
	// packedMaxBytes is the most bytes of a document, and of what is unpacked of
	// it, when the options do not say.
	packedMaxBytes = 64 << 20
	mostEntries    = 10000
	// A part beyond this size may not be more than mostRatio times what it is packed
	// in. Deflate reaches 1032 at most (RFC 1951: 258 bytes in two bits); documents,
	// some ten.
	ratioFrom = 1 << 20
	mostRatio = 200
)

// packed is an archive of the ZIP format whose entries are the parts of a document.
type packed struct {
	kind    string // of the document, for errors
	archive *zip.Reader
	entries map[string]*zip.File
	left    int64 // bytes that may yet be unpacked
}

// openPacked opens a document of that kind. Together its parts may have as many
// bytes as the options allow a document.
func openPacked(source []byte, kind string, o Options) (*packed, error) {
	if bytes.HasPrefix(source, []byte("\xD0\xCF\x11\xE0\xA1\xB1\x1A\xE1")) { // OLE 2 compound file
		return nil, unreadable("is no %s: it is encrypted or in a binary format of older programs; save it as %s without a password", kind, kind)
	}
	archive, err := zip.NewReader(bytes.NewReader(source), int64(len(source)))
	if err != nil {
		return nil, unreadable("is no %s: %w; save it anew as %s, or say with --as what it is", kind, err, kind)
	}
	if n := len(archive.File); n > mostEntries {
		return nil, TooLarge("is no %s that is read: it packs %d files, more than %d", kind, n, mostEntries)
	}
	p := &packed{kind: kind, archive: archive, entries: make(map[string]*zip.File, len(archive.File)), left: cmp.Or(o.MaxBytes, packedMaxBytes)}
	for _, f := range archive.File {
		if p.entries[f.Name] != nil {
			return nil, unreadable("is no %s: it packs %q twice", kind, f.Name)
		}
		p.entries[f.Name] = f
	}
	return p, nil
}

// errNoPart says that the document lacks a part.
var errNoPart = errors.New("is not in it")

// part unpacks a part. Each part that is unpacked counts towards the bound.
func (p *packed) part(name string) ([]byte, error) {
	f := p.entries[name]
	if f == nil {
		return nil, unreadable("is no %s: the part %q %w", p.kind, name, errNoPart)
	}
	size := f.UncompressedSize64
	switch {
	case f.Flags&1 != 0:
		return nil, unreadable("the part %q is encrypted; save the document without a password", name)
	case size > ratioFrom && size/mostRatio > f.CompressedSize64:
		return nil, TooLarge("the part %q unpacks %d bytes to %d, more than documents do; it is not read", name, f.CompressedSize64, size)
	case size > uint64(p.left):
		return nil, TooLarge("the part %q would unpack to %d bytes, which is beyond the most that is read of a document; split it", name, size)
	}
	r, err := f.Open()
	if err != nil {
		return nil, unreadable("the part %q: %w", name, err)
	}
	defer r.Close()
	content, err := io.ReadAll(io.LimitReader(r, int64(size)+1)) // one more, so that the checksum is looked at
	if err != nil {
		return nil, unreadable("the part %q: %w", name, err)
	}
	p.left -= int64(len(content))
	return content, nil
}

// splicePacked makes the splice of a kind of packed documents. Parts without edits
// keep the bytes that they are packed in, and all keep their order.
func splicePacked(kind string) func(source []byte, edits []Edit) ([]byte, error) {
	return func(source []byte, edits []Edit) ([]byte, error) {
		p, err := openPacked(source, kind, Options{})
		if err != nil {
			return nil, err
		}
		changed := map[string][]Edit{}
		for _, e := range edits {
			if p.entries[e.Part] == nil {
				return nil, fmt.Errorf("an edit is of the part %q, which %w", e.Part, errNoPart)
			}
			changed[e.Part] = append(changed[e.Part], e)
		}
		var out bytes.Buffer
		w := zip.NewWriter(&out)
		for _, f := range p.archive.File {
			if err := p.repack(w, f, changed[f.Name]); err != nil {
				return nil, err
			}
		}
		if err := w.SetComment(p.archive.Comment); err != nil {
			return nil, err
		}
		if err := w.Close(); err != nil {
			return nil, err
		}
		return out.Bytes(), nil
	}
}

// repack writes an entry with the edits made.
func (p *packed) repack(w *zip.Writer, f *zip.File, edits []Edit) error {
	if len(edits) == 0 {
		return w.Copy(f)
	}
	content, err := p.part(f.Name)
	if err != nil {
		return err
	}
	if content, err = spliceBytes(content, edits); err != nil {
		return fmt.Errorf("the part %q: %w", f.Name, err)
	}
	header := f.FileHeader
	header.Flags &^= 8 // the sizes stand before the bytes, not behind
	header.CRC32 = crc32.ChecksumIEEE(content)
	header.UncompressedSize64 = uint64(len(content))
	body := content
	if header.Method == zip.Deflate {
		if body, err = deflate(content); err != nil {
			return err
		}
	}
	header.CompressedSize64 = uint64(len(body))
	to, err := w.CreateRaw(&header)
	if err != nil {
		return err
	}
	_, err = to.Write(body)
	return err
}

func deflate(content []byte) ([]byte, error) {
	var out bytes.Buffer
	w, err := flate.NewWriter(&out, flate.DefaultCompression)
	if err != nil {
		return nil, err
	}
	if _, err := w.Write(content); err != nil {
		return nil, err
	}
	err = w.Close()
	return out.Bytes(), err
}

// packedFormats are the entries of the registry for packed documents.
func packedFormats() []format {
	return []format{
		{
			name: "docx", about: "text, headers, footers, notes, comments; not what was deleted, other languages, code",
			extensions: []string{".docx", ".docm", ".dotx"}, read: readPacked("DOCX", parseDocx), splice: splicePacked("DOCX"),
		},
		{
			name: "odt", about: "text, headers, footers, notes, comments; not what was deleted, other languages, code",
			extensions: []string{".odt", ".ott"}, read: readPacked("ODT", parseOdt), splice: splicePacked("ODT"),
		},
	}
}

// readPacked is the reader of a kind of packed documents: parse gives the blocks,
// part by part.
func readPacked(kind string, parse func(*packed, Options) ([]*Block, error)) func(io.Reader, Options, func(*Block, error) bool) {
	return func(r io.Reader, o Options, yield func(*Block, error) bool) {
		o.MaxBytes = cmp.Or(o.MaxBytes, packedMaxBytes)
		source, err := readAll(r, o)
		var blocks []*Block
		var p *packed
		if err == nil {
			p, err = openPacked(source, kind, o)
		}
		if err == nil {
			blocks, err = parse(p, o)
		}
		for _, b := range blocks {
			if !yield(b, nil) {
				return
			}
		}
		if err != nil {
			yield(nil, err)
		}
	}
}
