package text_test

import (
	"testing"

	"example.org/foulcase/internal/text"
)

const (
	odtType = "application/vnd.oasis.opendocument.text"

	odtSpaces = `xmlns:office="urn:oasis:names:tc:opendocument:xmlns:office:1.0" xmlns:text="urn:oasis:names:tc:opendocument:xmlns:text:1.0" ` +
		`xmlns:style="urn:oasis:names:tc:opendocument:xmlns:style:1.0" xmlns:fo="urn:oasis:names:tc:opendocument:xmlns:xsl-fo-compatible:1.0" ` +
		`xmlns:draw="urn:oasis:names:tc:opendocument:xmlns:drawing:1.0" xmlns:svg="urn:oasis:names:tc:opendocument:xmlns:svg-compatible:1.0" xmlns:dc="http://purl.org/dc/elements/1.1/"`

	odtContent = `<?xml version="1.0" encoding="UTF-8"?><office:document-content ` + odtSpaces + `><office:automatic-styles>` +
		`<style:style style:name="T1"><style:text-properties fo:language="de"/></style:style><style:style style:name="T2" style:parent-style-name="Source_20_Text"/>` +
		`<style:style style:name="T3"><style:text-properties fo:language="zxx"/></style:style><style:style style:name="P1" style:parent-style-name="German"/></office:automatic-styles>` +
		`<office:body><office:text><text:tracked-changes><text:p>gone</text:p></text:tracked-changes>` +
		`<text:h text:style-name="H">Boarding</text:h>` +
		`<text:p>The pi<text:span text:style-name="T9">lot</text:span> &amp;<text:s text:c="2"/>tug<text:tab/>wait<text:line-break/>here.</text:p>` +
		`<text:p>Not <text:span text:style-name="T1">fremde Wörter</text:span>, <text:span text:style-name="T2">code</text:span> or <text:span text:style-name="T3">xqz</text:span>.</text:p>` +
		`<text:p>Before<text:note><text:note-citation>1</text:note-citation><text:note-body><text:p>A note.</text:p></text:note-body></text:note> and after` +
		`<office:annotation><dc:creator>Mirel</dc:creator><text:p>A remark.</text:p></office:annotation> too` +
		`<draw:frame><draw:text-box><text:p>boxed</text:p></draw:text-box><svg:desc>no text</svg:desc></draw:frame>.</text:p>` +
		`<text:p text:style-name="P1">Fremder <text:span text:style-name="Bare">Absatz</text:span></text:p><text:list><text:list-item><text:p>An item</text:p></text:list-item></text:list>` +
		`</office:text></office:body></office:document-content>`

	odtStyles = `<office:document-styles ` + odtSpaces + `><office:styles><style:default-style style:family="paragraph"><style:text-properties fo:language="en"/></style:default-style>` +
		`<style:style style:name="German"><style:text-properties fo:language="de"/></style:style><style:style style:name="Bare"/></office:styles>` +
		`<office:master-styles><style:master-page><style:header><text:p>The office</text:p></style:header></style:master-page></office:master-styles></office:document-styles>`
)

func odtSample(t testing.TB) string {
	return pack(t, part{"mimetype", odtType}, part{"content.xml", odtContent}, part{"styles.xml", odtStyles},
		part{"META-INF/manifest.xml", "<manifest/>"})
}

func TestOdt(t *testing.T) {
	const want = "content 1:1 Boarding\n" +
		"content 2:1 The pilot &  tug\twait\nhere.\n" +
		"content 3:1 Not \uFFFC, \uFFFC or \uFFFC.\n" +
		"content 4:1 Before\n" +
		"content 5:1 A note.\n" +
		"content 4:7  and after\n" +
		"content 6:1 A remark.\n" +
		"content 4:17  too\n" +
		"content 7:1 boxed\n" +
		"content 4:21 .\n" +
		"content 8:1 \uFFFC\n" +
		"content 9:1 An item\n" +
		"styles 1:1 The office"
	sample := odtSample(t)
	if got := showPacked(t, sample, "odt"); got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
	checkPacked(t, "odt", []byte(sample))
	checkEdits(t, "odt", []byte(sample))
	checkSplice(t, sample, "odt", "Boarding", "Boards & <more>")
	checkSplice(t, sample, "odt", "office", "quay")
	if b, start, end := find(t, sample, "odt", "pilot"); !b.Interrupted(start, end) {
		t.Error("a span may be lost")
	}
	b, start, _ := find(t, sample, "odt", "wait")
	if got := b.Position(start); got != (text.Position{Line: 2, Column: 18}) {
		t.Errorf("a word in a paragraph is at %v", got)
	}
}
