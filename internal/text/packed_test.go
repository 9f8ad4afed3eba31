package text_test

import (
	"archive/zip"
	"bytes"
	"fmt"
	"io"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// part is a file of a packed document.
type part struct{ name, content string }

// pack makes an archive of parts; the one named mimetype is stored, as
// OpenDocument wants it.
func pack(t testing.TB, parts ...part) string {
	t.Helper()
	var out bytes.Buffer
	w := zip.NewWriter(&out)
	for _, p := range parts {
		method := zip.Deflate
		if p.name == "mimetype" {
			method = zip.Store
		}
		f, err := w.CreateHeader(&zip.FileHeader{Name: p.name, Method: method})
		if err == nil {
			_, err = io.WriteString(f, p.content)
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

// unpack reads all parts, their checksums included.
func unpack(t testing.TB, source []byte) map[string]string {
	t.Helper()
	r, err := zip.NewReader(bytes.NewReader(source), int64(len(source)))
	if err != nil {
		t.Fatal(err)
	}
	parts := map[string]string{}
	for _, f := range r.File {
		in, err := f.Open()
		if err != nil {
			t.Fatal(err)
		}
		content, err := io.ReadAll(in)
		if err != nil {
			t.Fatalf("%s: %v", f.Name, err)
		}
		parts[f.Name] = string(content)
	}
	return parts
}

// showPacked writes each block with its part (less the folder) and place.
func showPacked(t testing.TB, source string, f text.Format) string {
	t.Helper()
	var all []string
	for _, b := range blocks(t, source, f) {
		at := b.Position(0)
		name := b.Part[strings.LastIndexByte(b.Part, '/')+1:]
		all = append(all, fmt.Sprintf("%s %d:%d %s", strings.TrimSuffix(name, ".xml"), at.Line, at.Column, b.Text))
	}
	return strings.Join(all, "\n")
}

// checkPacked is checkReader for a packed document: blocks of a part come in order,
// point into it and do not overlap.
func checkPacked(t testing.TB, f text.Format, source []byte) {
	t.Helper()
	var parts map[string]string
	ends := map[string]int64{}
	for b, err := range text.Blocks(bytes.NewReader(source), f, text.Options{}) {
		if err != nil {
			return
		}
		if parts == nil {
			parts = unpackAny(source)
		}
		from, to := b.Source(0, len(b.Text))
		if from < ends[b.Part] || to > int64(len(parts[b.Part])) {
			t.Fatalf("%s: block %q at %d..%d after %d", b.Part, b.Text, from, to, ends[b.Part])
		}
		ends[b.Part] = to
		if got := string(b.Raw(0, len(b.Text))); got != parts[b.Part][from:to] {
			t.Fatalf("%s: block %q: raw %q", b.Part, b.Text, got)
		}
		checkTokens(t, b.Text)
		last := from
		for i := range b.Text {
			begin, end := b.Source(i, i+1)
			if begin < last || end < begin || end > to {
				t.Fatalf("%s: block %q: byte %d is at %d..%d after %d", b.Part, b.Text, i, begin, end, last)
			}
			last = begin
		}
	}
}

// unpackAny reads the parts that can be read.
func unpackAny(source []byte) map[string]string {
	parts := map[string]string{}
	r, err := zip.NewReader(bytes.NewReader(source), int64(len(source)))
	if err != nil {
		return parts
	}
	for _, f := range r.File {
		if in, err := f.Open(); err == nil {
			content, _ := io.ReadAll(io.LimitReader(in, 1<<20))
			parts[f.Name] = string(content)
		}
	}
	return parts
}

// find returns the block that holds words, and where.
func find(t testing.TB, source string, f text.Format, words string) (b *text.Block, start, end int) {
	t.Helper()
	for _, b := range blocks(t, source, f) {
		if i := strings.Index(string(b.Text), words); i >= 0 {
			return b, i, i + len(words)
		}
	}
	t.Fatalf("no block holds %q", words)
	return nil, 0, 0
}

// replace makes one correction the way the engine does.
func replace(t testing.TB, source string, f text.Format, observed, intended string) []byte {
	t.Helper()
	b, start, end := find(t, source, f, observed)
	if b.Interrupted(start, end) {
		t.Fatalf("%q is interrupted by markup", observed)
	}
	from, to := b.Source(start, end)
	spelled, ok := b.Escape(intended)
	if !ok {
		t.Fatalf("no spelling for %q", intended)
	}
	out, err := text.Splice([]byte(source), f, []text.Edit{{Part: b.Part, Start: from, End: to, Text: []byte(spelled)}})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// checkSplice holds an edit to what a packed document wants: all other parts keep
// the bytes they are packed in, and the order, methods and times are the same.
func checkSplice(t testing.TB, source string, f text.Format, observed, intended string) {
	t.Helper()
	out := replace(t, source, f, observed, intended)
	b, start, end := find(t, source, f, observed)
	find(t, string(out), f, intended)
	before, after := unpack(t, []byte(source)), unpack(t, out)
	from, to := b.Source(start, end)
	spelled, _ := b.Escape(intended)
	if was := before[b.Part]; after[b.Part] != was[:from]+spelled+was[to:] {
		t.Errorf("%s: %q", b.Part, after[b.Part])
	}
	a, err := zip.NewReader(strings.NewReader(source), int64(len(source)))
	if err != nil {
		t.Fatal(err)
	}
	z, err := zip.NewReader(bytes.NewReader(out), int64(len(out)))
	if err != nil {
		t.Fatal(err)
	}
	for i, f := range z.File {
		was := a.File[i]
		if f.Name != was.Name || f.Method != was.Method || !f.Modified.Equal(was.Modified) {
			t.Errorf("entry %d is %s (%d), was %s (%d)", i, f.Name, f.Method, was.Name, was.Method)
		}
		if f.Name != b.Part && !bytes.Equal(rawOf(t, f), rawOf(t, was)) {
			t.Errorf("%s was packed anew", f.Name)
		}
	}
	if same, err := text.Splice([]byte(source), f, nil); err != nil || string(same) != source {
		t.Errorf("no edits give another document (%v)", err)
	}
	if _, err := text.Splice([]byte(source), f, []text.Edit{{Part: "none.xml"}}); err == nil || !strings.Contains(err.Error(), "none.xml") {
		t.Errorf("an edit of a part that is not there: %v", err)
	}
	if _, err := text.Splice([]byte(source), f, []text.Edit{{Part: b.Part, Start: 0, End: 1 << 40}}); err == nil {
		t.Error("an edit beyond the end of a part is made")
	}
}

func rawOf(t testing.TB, f *zip.File) []byte {
	t.Helper()
	r, err := f.OpenRaw()
	if err != nil {
		t.Fatal(err)
	}
	content, err := io.ReadAll(r)
	if err != nil {
		t.Fatal(err)
	}
	return content
}

// readError reads a document until its error.
func readError(source string, f text.Format, o text.Options) error {
	for _, err := range text.Blocks(strings.NewReader(source), f, o) {
		if err != nil {
			return err
		}
	}
	return nil
}

// TestPackedRefuses: what is no such document, or one made to fill the memory, is
// an error that says so.
func TestPackedRefuses(t *testing.T) {
	bomb := pack(t, part{"mimetype", odtType}, part{"content.xml", "<a>" + strings.Repeat(" ", 4<<20) + "</a>"})
	deep := pack(t, part{"mimetype", odtType}, part{"content.xml", strings.Repeat("<a>", 5000) + strings.Repeat("</a>", 5000)})
	crowd := make([]part, 10001)
	for i := range crowd {
		crowd[i] = part{fmt.Sprint(i), ""}
	}
	const fromHeader = 46 // bytes from an entry in the archive's directory to its name; its flags are the ninth
	encrypted := []byte(odtSample(t))
	encrypted[bytes.LastIndex(encrypted, []byte("content.xml"))-fromHeader+8] |= 1
	for _, c := range []struct {
		name, source string
		format       text.Format
		options      text.Options
		want         string
	}{
		{"plain text", "The pilot boards.", "docx", text.Options{}, "is no DOCX"},
		{"an old document", "\xD0\xCF\x11\xE0\xA1\xB1\x1A\xE1" + strings.Repeat("x", 600), "docx", text.Options{}, "without a password"},
		{"another archive", pack(t, part{"a", "b"}), "docx", text.Options{}, "[Content_Types].xml"},
		{"another archive", pack(t, part{"a", "b"}), "odt", text.Options{}, "mimetype"},
		{"a table", pack(t, part{"mimetype", "application/vnd.oasis.opendocument.spreadsheet"}), "odt", text.Options{}, "spreadsheet"},
		{"no content", pack(t, part{"mimetype", odtType}), "odt", text.Options{}, "content.xml"},
		{"no main part", pack(t, part{"[Content_Types].xml", "<Types/>"}), "docx", text.Options{}, "word/document.xml"},
		{"broken XML", pack(t, part{"mimetype", odtType}, part{"content.xml", "<a><b"}), "odt", text.Options{}, "content.xml"},
		{"an end tag too many", pack(t, part{"mimetype", odtType}, part{"content.xml", "</a>"}), "odt", text.Options{}, "closes nothing"},
		{"a bomb", bomb, "odt", text.Options{}, "more than documents do"},
		{"too long", odtSample(t), "odt", text.Options{MaxBytes: 1000}, "1000"},
		{"unpacks too long", pack(t, part{"mimetype", odtType}, part{"content.xml", "<a>" + strings.Repeat("the pilot ", 500) + "</a>"}), "odt", text.Options{MaxBytes: 2000}, "content.xml"},
		{"too deep", deep, "odt", text.Options{}, "elements in each other"},
		{"too many", pack(t, crowd...), "odt", text.Options{}, "10001"},
		{"twice", pack(t, part{"mimetype", odtType}, part{"content.xml", ""}, part{"content.xml", ""}), "odt", text.Options{}, "twice"},
		{"by its manifest encrypted", pack(t, part{"mimetype", odtType}, part{"META-INF/manifest.xml", "<m:encryption-data/>"}), "odt", text.Options{}, "password"},
		{"encrypted", string(encrypted), "odt", text.Options{}, "encrypted"},
	} {
		if err := readError(c.source, c.format, c.options); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v, want %q", c.name, err, c.want)
		}
	}
}

// TestPackedDamage: a document with any byte of it changed, or cut anywhere, is read
// without harm.
func TestPackedDamage(t *testing.T) {
	for f, sample := range map[text.Format]string{"docx": docxSample(t), "odt": odtSample(t)} {
		for i := 0; i < len(sample); i += 3 {
			damaged := []byte(sample)
			damaged[i] ^= 0x55
			checkPacked(t, f, damaged)
			checkPacked(t, f, []byte(sample[:i]))
		}
		whole := blocks(t, sample, f)
		if len(whole) < 5 || !slices.ContainsFunc(whole, func(b *text.Block) bool { return b.Heading }) {
			t.Errorf("%s: %d blocks, or no heading", f, len(whole))
		}
	}
}

func FuzzDocx(f *testing.F) {
	f.Add([]byte(docxSample(f)))
	f.Add([]byte(pack(f, part{"[Content_Types].xml", docxTypes}, part{"word/document.xml", "<w:p><w:r><w:t>a</w:t></w:r></w:p>"})))
	f.Fuzz(func(t *testing.T, source []byte) { checkPacked(t, "docx", source) })
}

func FuzzOdt(f *testing.F) {
	f.Add([]byte(odtSample(f)))
	f.Fuzz(func(t *testing.T, source []byte) { checkPacked(t, "odt", source) })
}

// FuzzDocxBody and FuzzOdtBody fuzz the part that is read, which bytes of an archive
// seldom reach.
func FuzzDocxBody(f *testing.F) {
	f.Add(docxBody)
	f.Fuzz(func(t *testing.T, body string) {
		checkPacked(t, "docx", []byte(pack(t, part{"[Content_Types].xml", docxTypes}, part{"word/document.xml", body})))
	})
}

func FuzzOdtBody(f *testing.F) {
	f.Add(odtContent)
	f.Fuzz(func(t *testing.T, body string) {
		checkPacked(t, "odt", []byte(pack(t, part{"mimetype", odtType}, part{"content.xml", body})))
	})
}
