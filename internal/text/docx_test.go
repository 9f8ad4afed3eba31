package text_test

import (
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

const (
	docxTypes = `<?xml version="1.0" encoding="UTF-8"?><Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types">` +
		`<Override PartName="/word/header1.xml" ContentType="application/vnd.openxmlformats-officedocument.wordprocessingml.header+xml"/>` +
		`<Override PartName="/word/document.xml" ContentType="application/vnd.openxmlformats-officedocument.wordprocessingml.document.main+xml"/>` +
		`<Override PartName="/word/styles.xml" ContentType="application/vnd.openxmlformats-officedocument.wordprocessingml.styles+xml"/>` +
		`<Override PartName="/word/footnotes.xml" ContentType="application/vnd.openxmlformats-officedocument.wordprocessingml.footnotes+xml"/></Types>`

	docxSpace = `xmlns:w="http://schemas.openxmlformats.org/wordprocessingml/2006/main" xmlns:mc="http://schemas.openxmlformats.org/markup-compatibility/2006"`

	docxBody = `<?xml version="1.0" encoding="UTF-8"?><w:document ` + docxSpace + `><w:body>` +
		`<w:p><w:pPr><w:pStyle w:val="Heading1"/><w:tabs><w:tab w:val="left"/></w:tabs></w:pPr><w:r><w:t>Boarding</w:t></w:r></w:p>` +
		`<w:p><w:r><w:t xml:space="preserve">The pi</w:t></w:r><w:proofErr w:type="spellStart"/><w:r w:rsidR="1"><w:t xml:space="preserve">lot &amp; the </w:t></w:r>` +
		`<w:r><w:rPr><w:b/></w:rPr><w:t>la</w:t></w:r><w:r><w:t>unch</w:t></w:r><w:r><w:tab/><w:t>wait</w:t><w:br/><w:t>here</w:t><w:noBreakHyphen/><w:t>after.</w:t></w:r></w:p>` +
		`<w:p><w:del><w:r><w:delText>gone</w:delText><w:t>gone</w:t></w:r></w:del><w:moveFrom><w:r><w:t>moved</w:t></w:r></w:moveFrom>` +
		`<w:ins><w:r><w:t xml:space="preserve">New words </w:t></w:r></w:ins><w:r><w:fldChar w:fldCharType="begin"/><w:instrText>PAGE</w:instrText></w:r>` +
		`<w:r><w:rPr><w:lang w:val="de-DE"/></w:rPr><w:t>und fremde </w:t></w:r><w:r><w:rPr><w:noProof/></w:rPr><w:t>xqz</w:t></w:r>` +
		`<w:r><w:rPr><w:rStyle w:val="Foreign"/></w:rPr><w:t>Hafen</w:t></w:r><w:r><w:t xml:space="preserve"> stay.</w:t></w:r></w:p>` +
		`<w:p><w:pPr><w:pStyle w:val="SourceCode"/></w:pPr><w:r><w:t>go run</w:t></w:r></w:p>` +
		`<w:tbl><w:tr><w:tc><w:p><w:r><w:t>Before</w:t></w:r><mc:AlternateContent><mc:Choice><w:r><w:txbxContent><w:p><w:r><w:t>boxed</w:t></w:r></w:p></w:txbxContent></w:r></mc:Choice>` +
		`<mc:Fallback><w:r><w:t>boxed</w:t></w:r></mc:Fallback></mc:AlternateContent><w:r><w:t xml:space="preserve"> and after</w:t></w:r></w:p></w:tc></w:tr></w:tbl>` +
		`<w:p/></w:body></w:document>`

	docxStyles = `<w:styles ` + docxSpace + `><w:docDefaults><w:rPrDefault><w:rPr><w:lang w:val="en-GB"/></w:rPr></w:rPrDefault></w:docDefaults>` +
		`<w:style w:styleId="Base"><w:rPr><w:lang w:val="de-DE"/></w:rPr></w:style><w:style w:styleId="Foreign"><w:basedOn w:val="Base"/></w:style>` +
		`<w:style w:styleId="A"><w:basedOn w:val="B"/></w:style><w:style w:styleId="B"><w:basedOn w:val="A"/></w:style></w:styles>`
)

func docxSample(t testing.TB) string {
	return pack(
		t, part{"[Content_Types].xml", docxTypes},
		part{"word/header1.xml", `<w:hdr ` + docxSpace + `><w:p><w:r><w:t>The office</w:t></w:r></w:p></w:hdr>`},
		part{"word/document.xml", docxBody}, part{"word/styles.xml", docxStyles},
		part{"word/footnotes.xml", `<x:footnotes xmlns:x="http://purl.oclc.org/ooxml/wordprocessingml/main"><x:p><x:r><x:t>A note.</x:t></x:r></x:p></x:footnotes>`},
	)
}

func TestDocx(t *testing.T) {
	const want = "document 1:1 Boarding\n" +
		"document 2:1 The pilot & the launch\twait\nhere\u2011after.\n" +
		"document 3:1 New words \uFFFC stay.\n" +
		"document 4:1 \uFFFC\n" +
		"document 5:1 Before\n" +
		"document 6:1 boxed\n" +
		"document 5:7  and after\n" +
		"header1 1:1 The office\n" +
		"footnotes 1:1 A note."
	sample := docxSample(t)
	if got := showPacked(t, sample, "docx"); got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
	checkPacked(t, "docx", []byte(sample))
	checkEdits(t, "docx", []byte(sample))
	checkSplice(t, sample, "docx", "Boarding", "Boards & <more>")
	checkSplice(t, sample, "docx", "note", "book")
	checkSplice(t, sample, "docx", "pilot", "skipper") // two runs of the same kind
	if b, start, end := find(t, sample, "docx", "launch"); !b.Interrupted(start, end) {
		t.Error("runs of two kinds are one")
	}
	if b, start, end := find(t, sample, "docx", "launch\twait"); !b.Interrupted(start, end) {
		t.Error("a tab may be lost")
	}
	b, start, _ := find(t, sample, "docx", "wait")
	if got := b.Position(start); got != (text.Position{Line: 2, Column: 24}) {
		t.Errorf("a word in a paragraph is at %v", got)
	}
}

// TestDocxRuns: which runs are read as one.
func TestDocxRuns(t *testing.T) {
	const bold, text1, text2 = "<w:rPr><w:b/></w:rPr>", "<w:t>pi</w:t>", "<w:t>lot</w:t>"
	for between, want := range map[string]bool{
		"<w:r>" + text1 + "</w:r><w:r>" + text2 + "</w:r>":                                                                              false,
		"<w:r w:rsidR='1'>" + bold + text1 + "</w:r><w:proofErr/><w:r w:rsidR='2'>" + bold + text2 + "</w:r>":                           false,
		"<w:r>" + text1 + text2 + "</w:r>":                                                                                              false,
		"<w:r>" + bold + text1 + "</w:r><w:r>" + text2 + "</w:r>":                                                                       true,
		"<w:r>" + text1 + "</w:r><w:r>" + bold + text2 + "</w:r>":                                                                       true,
		"<w:r><w:t xml:space='preserve'>pi</w:t></w:r><w:r>" + text2 + "</w:r>":                                                         true,
		"<w:r>" + text1 + "</w:r><w:bookmarkStart w:id='1'/><w:r>" + text2 + "</w:r>":                                                   true,
		"<w:r>" + text1 + "</w:r><w:ins><w:r>" + text2 + "</w:r></w:ins>":                                                               true,
		"<w:hyperlink><w:r>" + text1 + "</w:r></w:hyperlink><w:r>" + text2 + "</w:r>":                                                   true,
		"<w:r>" + text1 + "</w:r><!-- x --><w:r>" + text2 + "</w:r>":                                                                    true,
		"<w:r>" + text1 + "</w:r><w:del><w:r><w:delText>x</w:delText></w:r></w:del><w:r>" + text2 + "</w:r>":                            true,
		"<w:r>" + text1 + "</w:r><w:r><w:fldChar w:fldCharType='begin'/></w:r><w:r>" + text2 + "</w:r>":                                 true,
		"<w:r>" + text1 + "<w:footnoteReference w:id='2'/></w:r><w:r>" + text2 + "</w:r>":                                               true,
		"<w:r>" + bold + text1 + "</w:r><w:r><w:rPr><w:b/><w:rPrChange><w:rPr/></w:rPrChange></w:rPr>" + text2 + "</w:r>":               true,
		"<w:r>" + text1 + "</w:r><w:r><w:drawing><wp:docPr/></w:drawing></w:r><w:r>" + text2 + "</w:r>":                                 true,
		"<w:r>" + text1 + "</w:r></w:p><w:p><w:r>" + strings.Replace(text2, "lot", "pilot", 1) + "</w:r>":                               false,
		"<w:r>" + text1 + "</w:r><w:r><w:rPr><w:b/></w:rPr></w:r><w:r>" + text2 + "</w:r>":                                              false,
		"<w:r>" + text1 + "</w:r><w:smartTag><w:r>" + text2 + "</w:r></w:smartTag>":                                                     true,
		"<w:r>" + text1 + "</w:r><w:r><w:t><![CDATA[lot]]></w:t></w:r>":                                                                 true,
		"<w:r><w:t>pi</w:t></w:r><w:r><w:rPr><w:lang w:val='en-US'/></w:rPr><w:t>lot</w:t></w:r>":                                       true,
		"<w:r><w:rPr><w:lang w:val='en-US'/></w:rPr><w:t>pi</w:t></w:r><w:r><w:rPr><w:lang w:val='en-US'/></w:rPr><w:t>lot</w:t></w:r>": false,
	} {
		body := "<w:document " + docxSpace + "><w:p>" + between + "</w:p></w:document>"
		source := pack(t, part{"[Content_Types].xml", docxTypes}, part{"word/document.xml", body}, part{"word/styles.xml", "<w:styles/>"},
			part{"word/header1.xml", "<w:hdr/>"}, part{"word/footnotes.xml", "<w:footnotes/>"})
		b, start, end := find(t, source, "docx", "pilot")
		if got := b.Interrupted(start, end); got != want {
			t.Errorf("%s: interrupted %v, want %v", between, got, want)
		}
	}
}

// TestDocxNested: a text box has its own style, and the paragraph around it keeps its.
func TestDocxNested(t *testing.T) {
	body := "<w:document " + docxSpace + "><w:p><w:pPr><w:pStyle w:val='SourceCode'/></w:pPr><w:r><w:t>code</w:t></w:r>" +
		"<w:r><w:txbxContent><w:p><w:r><w:t>boxed</w:t></w:r></w:p></w:txbxContent></w:r><w:r><w:t>more code</w:t></w:r></w:p></w:document>"
	source := pack(t, part{"[Content_Types].xml", "<Types/>"}, part{"word/document.xml", body})
	const want = "document 1:1 \uFFFC\ndocument 2:1 boxed\ndocument 1:2 \uFFFC"
	if got := showPacked(t, source, "docx"); got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}
