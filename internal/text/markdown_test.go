package text_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

func TestMarkdownBlocks(t *testing.T) {
	for _, c := range []struct {
		name, in string
		want     []string
	}{
		{"empty", "", nil},
		{"paragraphs", "Fog at\nthe bar.\n\nIce.", []string{"Fog at\nthe bar.", "Ice."}},
		{"headings", "# Fog\n\nIce\n===\n\n## *Bar* ##\ntext", []string{"Fog", "Ice", "Bar", "text"}},
		{"emphasis inside a word", "**b**erth and b*ir*th and ~~no~~w", []string{"berth and birth and now"}},
		{"escapes and entities", `\*no\* caf&eacute; &amp; &#x41; \q &bogus; a&b`, []string{`*no* café & A \q &bogus; a&b`}},
		{"code", "Use `foo bar`s or ``a`b``.", []string{"Use \uFFFCs or \uFFFC."}},
		{"code blocks", "a\n\n```\ncode\n```\n\n    indented\n\n~~~go\nx\n~~~\n\nb", []string{"a", "b"}},
		{"links", `A [quay](http://x.y "title")s, ![a buoy](b.png "t"), [ref][r], <https://x.y>.` + "\n\n[r]: http://z \"title\"", []string{"A quays, a buoy, ref, https://x.y."}},
		{"html", "a <b>bo</b>ld <!-- note --> word<br>next\n\n<pre>\nhidden\n</pre>\n\nb", []string{"a bold  word\nnext", "b"}},
		{"hard break", "Harbour Office  \nSkarrow\\\nSound and\nthe long  \nway", []string{"Harbour Office", "Skarrow", "Sound and\nthe long\nway"}},
		{"lists", "- rope\n- chain\n  that holds\n\n1. one\n   - two\n", []string{"rope", "chain\nthat holds", "one", "two"}},
		{"tasks", "- [ ] rope\n- [x] chain", []string{"rope", "chain"}},
		{"quote", "> fog\n> and ice\n>\n> > bar", []string{"fog\nand ice", "bar"}},
		{"lazy quote", "> fog\nand ice", []string{"fog\nand ice"}},
		{"table", "| hour | *tide* |\n|---|---|\n| `1` | low \\| high |\n| 2 |", []string{"hour", "tide", "\uFFFC", "low | high", "2"}},
		{"footnote", "Fog.[^1] Ice.\n\n[^1]: The *note*.\n\nAfter.", []string{"Fog. Ice.", "The note.", "After."}},
		{"definition", "Bar\n: a bank of sand", []string{"Bar", "a bank of sand"}},
		{"HTML", "<details>\n<summary>The <b>log</b></summary>\n\nFog &amp; *ice*.\n\n</details>\n\n<!-- no\nwords -->\n<p lang=\"fr\">Le port</p>\n\n> <p>no\n> words</p>\n\nSea", []string{"The log", "Fog & ice.", "Sea"}},
		{"attributes", "# Fog {#fog_1_a .wide key=\"two words\"}\n\n[Ice](x){.red} and `a`{.rb key=\"b\"} {: .note}\nis {not .one} {} {a}", []string{"Fog", "Ice and \uFFFC \nis {not .one} {} {a}"}},
		{"templates", "The {{ site.pilot_name_a }} and <%= x %> {% if a %}come{% endif %} {{x", []string{"The \uFFFC and \uFFFC \uFFFCcome\uFFFC {{x"}},
		{"containers", "::: {.note #a}\nFog\n::: tip On *ice*\nIce\n:::\n\n:::warning\n\nSea :::\n\n:::", []string{"Fog", "On ice", "Ice", "Sea :::"}},
		{"front matter", "---\ntitle: hidden\n---\n# Fog", []string{"Fog"}},
		{"front matter with plus", "+++\ntitle = 'hidden'\n+++\nFog", []string{"Fog"}},
		{"front matter behind a mark", "\uFEFF---\na: b\n...\nFog", []string{"Fog"}},
		{"no front matter", "---\n\nfog", []string{"fog"}},
		{"byte order mark", "\uFEFF# Fog", []string{"Fog"}},
		{"CRLF", "# Fog\r\n\r\nIce at\r\nthe bar.\r\n", []string{"Fog", "Ice at\nthe bar."}},
		{"NUL and bad UTF-8", "fog\x00 \xff *\xfe*", []string{"fog\x00 \xff \xfe"}},
	} {
		if got := texts(t, c.in, text.Markdown); !slices.Equal(got, c.want) {
			t.Errorf("%s: got %q, want %q", c.name, got, c.want)
		}
		for _, b := range blocks(t, c.in, text.Markdown) {
			checkBlock(t, b, []byte(c.in))
		}
	}
}

// TestMarkdownSource finds the source of words that markup is in or around.
func TestMarkdownSource(t *testing.T) {
	source := "---\nx: y\n---\n# The **b**erth\n\nA caf&eacute;, \\*two\\* `code`s\n> of [quay](http://x)s.\n"
	want := map[string]string{
		"The": "The", "berth": "b**erth", "café": "caf&eacute;", "two": "two", "\uFFFCs": "`code`s", "quays": "quay](http://x)s",
	}
	found := 0
	var s text.Segmenter
	for _, b := range blocks(t, source, text.Markdown) {
		for sentence := range s.Sentences(b.Text) {
			for _, k := range sentence.Tokens {
				raw, ok := want[string(b.Text[k.Start:k.End])]
				if !ok {
					continue
				}
				found++
				from, to := b.Source(k.Start, k.End)
				if got := source[from:to]; got != raw || string(b.Raw(k.Start, k.End)) != raw {
					t.Errorf("%q comes from %q, want %q", b.Text[k.Start:k.End], got, raw)
				}
				if got, want := b.Position(k.Start), position([]byte(source), int(from)); got != want {
					t.Errorf("%q is at %v, want %v", raw, got, want)
				}
			}
		}
	}
	if found != len(want) {
		t.Errorf("%d of %d words found", found, len(want))
	}
}

func TestMarkdownHeading(t *testing.T) {
	var got []bool
	for _, b := range blocks(t, "# Fog\n\nIce\n\nBar\n---\n", text.Markdown) {
		got = append(got, b.Heading)
	}
	if want := []bool{true, false, true}; !slices.Equal(got, want) {
		t.Errorf("headings %v, want %v", got, want)
	}
}

func TestMarkdownTooLong(t *testing.T) {
	for b, err := range text.Blocks(strings.NewReader(strings.Repeat("fog ", 300)), text.Markdown, text.Options{MaxBytes: 1000}) {
		if b != nil || err == nil || !strings.Contains(err.Error(), "1000 bytes") {
			t.Errorf("block %v, error %v", b, err)
		}
	}
}

// TestMarkdownBounds: documents whose markup grows beyond all measure keep their
// words, and those with long lists and tables their markup.
func TestMarkdownBounds(t *testing.T) {
	hostile := map[string]string{
		"brackets": strings.Repeat("[fog](b ", 20000),
		"quotes":   strings.Repeat("> ", 20000) + "fog",
		"lists":    strings.Repeat("- ", 20000) + "fog",
		"table":    strings.Repeat("fog|", 500) + "\n" + strings.Repeat("-|", 500) + "\n" + strings.Repeat("fog\n", 20000),
		"ticks":    strings.Repeat("`fog ``", 20000),
		"emphasis": strings.Repeat("*fog_ ", 20000),
	}
	for name, source := range hostile {
		words := 0
		for _, f := range read(t, strings.NewReader(source), []byte(source), text.Markdown, text.Options{}) {
			if f.norm == "fog" {
				words++
			}
		}
		if words == 0 {
			t.Errorf("%s: no word left", name)
		}
	}
	var list strings.Builder
	for i := range 400 {
		fmt.Fprintf(&list, "- [berth](http://x.y/%d) *%d*\n", i, i)
	}
	for _, got := range texts(t, list.String(), text.Markdown) {
		if !strings.HasPrefix(got, "berth ") {
			t.Fatalf("an item reads %q", got)
		}
	}
}

// TestMarkdownInterrupted: a stretch over a line end can be replaced where a quotation goes on
// in the next line, and cannot where emphasis begins there.
func TestMarkdownInterrupted(t *testing.T) {
	for source, want := range map[string]bool{
		"over the\nthe bar":            false,
		"> over the\n> the bar":        false,
		"- over the\n  the bar":        false,
		"over the\n**the** bar":        true,
		"over *the*\nthe bar":          true,
		"> over the\n> *the* bar":      true,
		"over the [the](http://x) bar": true,
	} {
		b := blocks(t, source, text.Markdown)[0]
		at := strings.Index(string(b.Text), "the")
		if got := b.Interrupted(at, at+len("the the")); got != want {
			t.Errorf("%q: %v", source, got)
		}
	}
}

// TestMarkdownReferences: the text of a link is not to be corrected by a program
// where it names the target.
func TestMarkdownReferences(t *testing.T) {
	source := "At the [quay][] or [pier] or [berth][b] at ![noon] [x](y).\n\n[quay]: q\n[pier]: p\n[b]: b\n[noon]: n\n"
	b := blocks(t, source, text.Markdown)[0]
	for word, want := range map[string]bool{"quay": true, "pier": true, "noon": true, "berth": false, "At": false, "x": false} {
		at := strings.Index(string(b.Text), word)
		if got := b.Interrupted(at, at+len(word)); got != want {
			t.Errorf("%s is interrupted: %v", word, got)
		}
	}
}
