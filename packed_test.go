package foulcase_test

import (
	"archive/zip"
	"bytes"
	"fmt"
	"io"
	"strings"
	"testing"

	"example.org/foulcase"
)

// TestPackedDocuments: marks in parts of a packed document, corrections put in their
// place, and what is left then.
func TestPackedDocuments(t *testing.T) {
	const space = `xmlns:w="http://schemas.openxmlformats.org/wordprocessingml/2006/main"`
	docx := archive(t, "[Content_Types].xml", `<Types><Override PartName="/word/document.xml" ContentType="application/vnd.openxmlformats-officedocument.wordprocessingml.document.main+xml"/>`+
		`<Override PartName="/word/footer1.xml" ContentType="application/vnd.openxmlformats-officedocument.wordprocessingml.footer+xml"/></Types>`,
		"word/document.xml", `<w:document `+space+`><w:body><w:p><w:r><w:t>Notice</w:t></w:r></w:p><w:p><w:r><w:t>The café &amp; the captian</w:t></w:r>`+
			`<w:r><w:t xml:space="preserve"> wait at the </w:t></w:r><w:r><w:t>stat</w:t></w:r><w:r w:rsidR="1"><w:t>oin</w:t></w:r><w:r><w:t xml:space="preserve"> for the boat.</w:t></w:r>`+
			`<w:r><w:t xml:space="preserve"> It is definat</w:t></w:r><w:r><w:rPr><w:b/></w:rPr><w:t>ely late.</w:t></w:r></w:p></w:body></w:document>`,
		"word/footer1.xml", `<w:ftr `+space+`><w:p><w:r><w:t>Printed for the comittee.</w:t></w:r></w:p></w:ftr>`)
	odt := archive(t, "mimetype", "application/vnd.oasis.opendocument.text", "content.xml",
		`<office:document-content xmlns:office="urn:oasis:names:tc:opendocument:xmlns:office:1.0" xmlns:text="urn:oasis:names:tc:opendocument:xmlns:text:1.0">`+
			`<office:body><office:text><text:p>The pilots recieved the order<text:s text:c="2"/>at noon.</text:p><text:p>The comit<text:span>tee</text:span> met.</text:p></office:text></office:body></office:document-content>`)
	for _, c := range []struct{ format, document, want, left string }{
		{
			"docx", docx,
			"word/document.xml 2:16 captian>captain; word/document.xml 2:36 stat…oin>station; word/document.xml 2:64 definat…ely>definitely by hand; word/footer1.xml 1:17 comittee>committee",
			"word/document.xml 2:64 definat…ely>definitely by hand",
		},
		{
			"odt", odt,
			"content.xml 1:12 recieved>received; content.xml 2:5 comit…tee>committee by hand",
			"content.xml 2:5 comit…tee>committee by hand",
		},
	} {
		marks := proof(t, c.document, foulcase.Options{Format: c.format})
		if got := showMarks(marks); got != c.want {
			t.Errorf("%s: %s\nwant %s", c.format, got, c.want)
		}
		var edits []foulcase.Edit
		for _, m := range marks {
			if !m.ByHand {
				edits = append(edits, foulcase.Edit{Part: m.Part, Offset: m.Offset, Length: m.Length, Text: []byte(m.Corrections[0].Spelled())})
			}
		}
		out, err := foulcase.Splice([]byte(c.document), c.format, edits)
		if err != nil {
			t.Fatal(err)
		}
		if got := showMarks(proof(t, string(out), foulcase.Options{Format: c.format})); got != c.left {
			t.Errorf("%s: %s is left, want %s", c.format, got, c.left)
		}
	}
}

// showMarks writes the places of marks, with markup inside as an ellipsis.
func showMarks(marks []foulcase.Mark) string {
	var all []string
	for _, m := range marks {
		observed := m.Observed
		if i, j := strings.IndexByte(observed, '<'), strings.LastIndexByte(observed, '>'); i >= 0 {
			observed = observed[:i] + "…" + observed[j+1:]
		}
		s := fmt.Sprintf("%s %d:%d %s>%s", m.Part, m.Line, m.Column, observed, m.Corrections[0].Text)
		if m.ByHand {
			s += " by hand"
		}
		all = append(all, s)
	}
	return strings.Join(all, "; ")
}

// archive packs files, given by name and content in turn.
func archive(t testing.TB, files ...string) string {
	t.Helper()
	var out bytes.Buffer
	w := zip.NewWriter(&out)
	for i := 0; i < len(files); i += 2 {
		f, err := w.Create(files[i])
		if err == nil {
			_, err = io.WriteString(f, files[i+1])
		}
		if err != nil {
			t.Fatal(err)
		}
	}
	if err := w.Close(); err != nil {
		t.Fatal(err)
	}
	return out.String()
}
