package text_test

import (
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

func TestNames(t *testing.T) {
	for _, c := range []struct {
		name      string
		format    text.Format
		source    string
		has, hasn []string
	}{
		{
			"code spans, code blocks and addresses", text.Markdown,
			"The hul of `tidetab` at [quay](http://skarrow.example/brths).\n\n```\nvar rng = soundng()\n```\n",
			[]string{"tidetab", "skarrow", "brths", "rng", "soundng", "rngs", "rng's"},
			[]string{"hul", "quay", "the", "soundn", "s"},
		},
		{
			"comments and directives hold prose", text.Markdown,
			"Fog.\n\n<!-- the hul -->\n\n<img src=buoi.png>\n\n    % foulcase: stet recieved\n    cod\n",
			[]string{"buoi", "cod"},
			[]string{"hul", "recieved", "stet"},
		},
		{"front matter", text.Markdown, "---\nauthr: nobody\n---\nThe authr.\n", []string{"authr"}, nil},
		{"code between comments", text.Format("go"), "package p\n\n// The bufr is emty.\nvar bufR, x int\n", []string{"bufr", "x", "x's"}, []string{"emty"}},
		{"plain text tells none", text.Plain, "The hul.", nil, []string{"hul", ""}},
	} {
		names := blocks(t, c.source, c.format)[0].Names
		for _, form := range c.has {
			if !names.Has([]byte(form)) {
				t.Errorf("%s: %q is no name", c.name, form)
			}
		}
		for _, form := range c.hasn {
			if names.Has([]byte(form)) {
				t.Errorf("%s: %q is a name", c.name, form)
			}
		}
	}
}

// TestNamesBounded: a document of nothing but names takes bounded memory, and all
// blocks share them.
func TestNamesBounded(t *testing.T) {
	var source strings.Builder
	source.WriteString("Fog.\n\n```\n")
	for i := range 200_000 {
		source.WriteString(strings.Repeat(string(rune('a'+i%26)), 1+i/26%40))
		source.WriteByte(byte('a' + i/1040%26))
		source.WriteByte(byte('a' + i/27040%26))
		source.WriteByte('\n')
	}
	source.WriteString("```\n\nIce.\n")
	all := blocks(t, source.String(), text.Markdown)
	if n := len(all[0].Names); n < 1000 || n > 1<<16 {
		t.Errorf("%d names", n)
	}
	if slices.ContainsFunc(all, func(b *text.Block) bool { return len(b.Names) != len(all[0].Names) }) {
		t.Error("blocks of one document have different names")
	}
}
