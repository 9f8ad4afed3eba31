package text_test

import (
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// reading is a document with the texts of the blocks that are read of it.
type reading struct {
	name, in string
	want     []string
}

// checkReadings reads documents of a format and compares their blocks.
func checkReadings(t *testing.T, f text.Format, readings []reading) {
	t.Helper()
	for _, c := range readings {
		if got := texts(t, c.in, f); !slices.Equal(got, c.want) {
			t.Errorf("%s:\n got %q\nwant %q", c.name, got, c.want)
		}
		checkReader(t, f, []byte(c.in))
	}
}

func TestHTMLBlocks(t *testing.T) {
	checkReadings(t, text.HTML, []reading{
		{"empty", "", nil},
		{"paragraphs", "<p>Fog at\n   the bar.</p>\n\n<P>Ice.", []string{"Fog at\nthe bar.", "Ice."}},
		{"text alone", "fog < ice & <3", []string{"fog < ice & <3"}},
		{"optional end tags", "<p>fog<p>ice<ul><li>rope<li>chain<ul><li>links</ul></ul>bar", []string{"fog", "ice", "rope", "chain", "links", "bar"}},
		{"headings", "<title>Log</title><h1>Fog <em>at</em> sea</h1>text", []string{"Log", "Fog at sea", "text"}},
		{"inline", "<b>b</b>erth and b<i>ir</i>th and <a href='x' >quay</a>s", []string{"berth and birth and quays"}},
		{"references", "caf&eacute; &amp; &#x41;&nbsp;b &bogus; a&b", []string{"café & A\u00a0b &bogus; a&b"}},
		{"code", "<p>Use <code>foo <b>bar</b></code>s or <kbd>x</kbd>.", []string{"Use \uFFFCs or \uFFFC."}},
		{"code alone", "fog<pre>some code</pre><script>if (a</b) x('</scrip');</script><style>b{}</style>ice", []string{"fog", "ice"}},
		{"script in a comment", "<script><!-- </script> fog --> ice", []string{"fog --> ice"}},
		{"text area", "<p>fog <textarea>some <b> text</textarea> ice", []string{"fog", "ice"}},
		{"comments", "fog<!-- a > b --> at<!DOCTYPE html> <?php echo ?>sea", []string{"fog at sea"}},
		{"comment without end", "fog<!-- ice", []string{"fog"}},
		{"tag without end", "fog <b title='ice", []string{"fog", "ice"}},
		{"attributes", `<p>fog <img alt="A buoy" src=x title='it&#39;s red'> at <a aria-label=pier placeholder>sea</a></p>`, []string{"fog \uFFFC at sea", "A buoy", "it's red", "pier"}},
		{"description", `<meta name="viewport" content="width=9"><meta content="About fog" name=Description>`, []string{"About fog"}},
		{"options", `<label>Berth <select><option label="at sea">one<option>two</select></label>`, []string{"Berth", "at sea", "one", "two"}},
		{"line breaks", "Harbour Office<br>Skarrow<br/>Sound and<br>the way", []string{"Harbour Office", "Skarrow", "Sound and\nthe way"}},
		{"rule", "fog<hr>ice", []string{"fog", "ice"}},
		{"table", "<table><tr><td>fog<td>ice<tr><th>sea<td>bar</table>", []string{"fog", "ice", "sea", "bar"}},
		{"language", `<p lang=de>Nebel <b lang=en-GB>fog</b> und <b lang="en">ice</b><p>bar <i lang=fr>mot juste</i>s <i lang="">sea</i>`, []string{"fog\uFFFCice", "bar \uFFFCs sea"}},
		{"language of the page", `<html lang="de"><body><p title="Nebel">Nebel<p xml:lang="EN-us" title="fog">ice</body></html>`, []string{"fog", "ice"}},
		{"not translated", `fog <b translate=no>Lisk</b> ice<div translate="no"><p lang=de>x</p></div>`, []string{"fog \uFFFC ice"}},
		{"XHTML", "<?xml version='1.0'?><p>fog <br />at</p><p/><![CDATA[a < b]]>", []string{"fog \nat", "a < b"}},
		{"byte order mark", "\uFEFF<p>Fog", []string{"Fog"}},
		{"CRLF", "<p>Ice at\r\n the\r\n\r\nbar.\r\n", []string{"Ice at\nthe\nbar."}},
		{"templates and deletions", "<p>The {{ site.pilot }} <del>ice</del> <%= x > y %> fog {{x", []string{"The \uFFFC \uFFFC \uFFFC fog {{x"}},
		{"bad UTF-8", "fog\x00 \xff<b>\xfe</b>", []string{"fog\x00 \xff\xfe"}},
		{"end tags alone", "</p>fog</b></body></html> ice", []string{"fog ice"}},
	})
}

func TestHTMLLanguage(t *testing.T) {
	const source = `<p lang=en>fog<p lang="de-AT">Nebel <code>x</code><p>See`
	var got []string
	for b, err := range text.Blocks(strings.NewReader(source), text.HTML, text.Options{Language: "de"}) {
		if err != nil {
			t.Fatal(err)
		}
		got = append(got, string(b.Text))
	}
	if want := []string{"Nebel \uFFFC", "See"}; !slices.Equal(got, want) {
		t.Errorf("read as German: %q, want %q", got, want)
	}
}

// escapes gives the spelling of words in the first block of each document; "-"
// is none.
func checkEscapes(t *testing.T, f text.Format, words string, want map[string]string) {
	t.Helper()
	for in, spelled := range want {
		got, ok := blocks(t, in, f)[0].Escape(words)
		if !ok {
			got = "-"
		}
		if got != spelled {
			t.Errorf("%s: %q is spelled %q, want %q", in, words, got, spelled)
		}
	}
}

func TestHTMLEscape(t *testing.T) {
	checkEscapes(t, text.HTML, `a & "b's"`, map[string]string{
		"<p>fog":         `a &amp; "b's"`,
		"<img alt='fog'": "a &amp; &#34;b&#39;s&#34;",
		`<img alt="fog"`: "a &amp; &#34;b's&#34;",
		"<img alt=fog":   "-",
	})
	checkEscapes(t, text.XML, "a & b", map[string]string{"<a>the <![CDATA[fog]]></a>": "-", "<a>the fog</a>": "a &amp; b"})
}

func TestHTMLHeading(t *testing.T) {
	var got []bool
	for _, b := range blocks(t, "<h2>Fog <i>at</i> sea</h2><p>Ice<div>bar</div>", text.HTML) {
		got = append(got, b.Heading)
	}
	if want := []bool{true, false, false}; !slices.Equal(got, want) {
		t.Errorf("headings %v, want %v", got, want)
	}
}

func TestXMLBlocks(t *testing.T) {
	checkReadings(t, text.XML, []reading{
		{"empty", "", nil},
		{"records", "<log><id>SSP 0417</id><by>Tollgarth</by><note>Fog at\n  the bar</note></log>", []string{"Fog at\nthe bar"}},
		{"title", "<book><title>Tides</title></book>", []string{"Tides"}},
		{"mixed content", "<para>Fog <emphasis>at</emphasis> the<footnote><para>The bar is near.</para></footnote> bar.</para>", []string{"Fog at the", "The bar is near."}},
		{"list in a sentence", "<p>Bring these things: <ul><li>two ropes</li><li>some chain</li></ul></p>", []string{"Bring these things:", "two ropes", "some chain"}},
		{"code", "<p>Set the <codeph>x</codeph>s and go.</p><codeblock>not a word here</codeblock>", []string{"Set the \uFFFCs and go."}},
		{"prefixes", "<d:para>Fog <d:literal>x y</d:literal> here</d:para>", []string{"Fog \uFFFC here"}},
		{"entities", "<!DOCTYPE a [<!ENTITY ssp \"Sound > Pilots\">]><a>the &ssp; desk &lt; caf&#233;</a>", []string{"the \uFFFC desk < café"}},
		{"sections", "<a>the <![CDATA[fog & <ice>]]> bar<!-- no <b> --><?x a > b?></a>", []string{"the fog & <ice> bar"}},
		{"references", "<a>see <xref to='x'/> for fog</a>", []string{"see \uFFFC for fog"}},
		{"language", "<a xml:lang='de'>der Nebel kommt<b xml:lang='en'>the fog comes</b></a>", []string{"the fog comes"}},
		{"not translated", "<a its:translate='no'>the fog comes</a><b>the ice comes</b>", []string{"the ice comes"}},
		{"case matters", "<Code>the fog comes</Code>", []string{"the fog comes"}},
		{"not well formed", "<a>the fog</b> comes <c", []string{"the fog comes"}},
	})
}

// TestTagsBounds: hostile documents come to an end, and to the word in them.
func TestTagsBounds(t *testing.T) {
	for _, f := range []text.Format{text.HTML, text.XML} {
		checkBounds(t, f, "<", "<a ", "<a>", "</a>", "<!", "<!--", "<?", "<![CDATA[", "<a b='", "&", "&#", "<p>", "<li><p>",
			"<title>", "<script>", "<a lang=de>", "<b>x</c>", "</script", "<pre>", "<br>x", "]]>", "<!DOCTYPE [")
	}
}

// checkBounds reads 100 kB of each unit, with and without a word before.
func checkBounds(t *testing.T, f text.Format, units ...string) {
	t.Helper()
	for _, unit := range units {
		source := "fog and ice\n\n" + strings.Repeat(unit, 100_000/len(unit))
		if !strings.HasPrefix(strings.Join(texts(t, source, f), " "), "fog and ice") {
			t.Errorf("%s: %q repeated hides what stands before it", f, unit)
		}
		texts(t, source[len("fog and ice\n\n"):], f)
	}
}

func FuzzHTML(f *testing.F) {
	fuzzFormat(f, text.HTML, `<p lang=de>x<b lang=en title="a&amp;b">y</b><code>z</code> <br> Q<li>a<li>b<script>c</script>`)
}

func FuzzXML(f *testing.F) {
	fuzzFormat(f, text.XML, `<?x?><!DOCTYPE a [<!ENTITY b "c">]><a xml:lang="en">one two <b>x</b>&b;<![CDATA[y]]></a>`)
}
