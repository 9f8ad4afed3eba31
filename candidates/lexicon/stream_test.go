package lexicon_test

import (
	"strings"
	"testing"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
)

// streamLexicon knows the words of the stream tests.
func streamLexicon(t testing.TB) *lexicon.Lexicon {
	t.Helper()
	var b lexicon.Builder
	for _, w := range strings.Fields("'s 'll n't do don't it it's known london nasa pilot well what") {
		b.Add(w, lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase}, "")
	}
	b.Add("iphone", lexicon.Entry{Variety: lexicon.Both, Cases: lexicon.MixedCase, Usual: lexicon.MixedCase}, "iPhone")
	section, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	l, err := lexicon.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// show writes a stream as words and classes.
func show(l *lexicon.Lexicon, ids []uint32) string {
	var out []string
	for _, id := range ids {
		if int(id) < l.Len() {
			out = append(out, string(l.AppendForm(nil, id)))
		} else {
			out = append(out, lexicon.Class(id-l.ClassID(0)).String())
		}
	}
	return strings.Join(out, " ")
}

func TestRead(t *testing.T) {
	word := func(norm string, c text.Case) text.Token {
		return text.Token{Kind: text.Word, Case: c, Norm: []byte(norm)}
	}
	tests := []struct {
		name string
		tok  text.Token
		want string
	}{
		{"form", word("pilot", text.Lower), "pilot"},
		{"form with a capital", word("pilot", text.Title), "pilot"},
		{"contraction", word("it's", text.Lower), "it's"},
		{"contraction", word("don't", text.Lower), "don't"},
		{"possessive", word("pilot's", text.Lower), "pilot 's"},
		{"possessive of a name", word("skarrow's", text.Title), "<name> 's"},
		{"possessive of an abbreviation", word("vhf's", text.Upper), "<acronym> 's"},
		{"other clitic", word("pilot'll", text.Lower), "pilot 'll"},
		{"clitic alone", word("'s", text.Lower), "'s"},
		{"unknown", word("quoin", text.Lower), "<unknown>"},
		{"unknown with an apostrophe", word("quo'in", text.Lower), "<unknown>"},
		{"name", word("skarrow", text.Title), "<name>"},
		{"mixed name", word("mcdougal", text.Mixed), "<name>"},
		{"shouted", word("skarrow", text.Upper), "<acronym>"},
		{"known abbreviation", text.Token{Kind: text.Acronym, Case: text.Upper, Norm: []byte("nasa")}, "nasa"},
		{"abbreviation", text.Token{Kind: text.Acronym, Case: text.Upper, Norm: []byte("vts")}, "<acronym>"},
		{"known literal", text.Token{Kind: text.Literal, Case: text.Mixed, Norm: []byte("iphone")}, "iphone"},
		{"literal that spells a word", text.Token{Kind: text.Literal, Case: text.Mixed, Norm: []byte("pilot")}, "<literal>"},
		{"literal", text.Token{Kind: text.Literal}, "<literal>"},
		{"number", text.Token{Kind: text.Number}, "<number>"},
		{"comma", text.Token{Kind: text.Comma}, "<comma>"},
		{"stop", text.Token{Kind: text.Stop}, "<stop>"},
		{"open", text.Token{Kind: text.Open}, "<open>"},
		{"close", text.Token{Kind: text.Close}, "<close>"},
		{"hyphen", text.Token{Kind: text.Hyphen}, "<hyphen>"},
		{"quote", text.Token{Kind: text.Quote}, ""},
		{"terminal", text.Token{Kind: text.Terminal}, ""},
		{"other", text.Token{Kind: text.Other}, ""},
	}
	l := streamLexicon(t)
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			if got := show(l, l.Read(nil, tt.tok)); got != tt.want {
				t.Errorf("%q: got %q, want %q", tt.tok.Norm, got, tt.want)
			}
		})
	}
}

func TestReadText(t *testing.T) {
	tests := []struct{ in, want string }{
		{"It's London's well-known pilot, isn't it?", "it's london 's well <hyphen> known pilot <comma> <unknown> n't it"},
		{"What 's it do n't", "what 's it do n't"},
	}
	l := streamLexicon(t)
	for _, tt := range tests {
		var seg text.Segmenter
		var ids []uint32
		for s := range seg.Sentences([]byte(tt.in)) {
			for _, tok := range s.Tokens {
				ids = l.Read(ids, tok)
			}
		}
		if got := show(l, ids); got != tt.want {
			t.Errorf("%q:\n got %q\nwant %q", tt.in, got, tt.want)
		}
	}
}

func TestClasses(t *testing.T) {
	l := streamLexicon(t)
	if got, want := int(l.ClassID(lexicon.Begin)), l.Len(); got != want {
		t.Errorf("first class has id %d, want %d", got, want)
	}
	if got, want := int(l.ClassID(lexicon.Hyphen))+1, l.Vocabulary(); got != want {
		t.Errorf("last class has id %d, want %d", got-1, want-1)
	}
	seen := map[string]bool{}
	for c := lexicon.Begin; c <= lexicon.Hyphen; c++ {
		if seen[c.String()] {
			t.Errorf("two classes are called %s", c)
		}
		seen[c.String()] = true
	}
}

func TestReadNoAllocation(t *testing.T) {
	l := streamLexicon(t)
	dst := make([]uint32, 0, 16)
	tokens := []text.Token{
		{Kind: text.Word, Norm: []byte("pilot's")},
		{Kind: text.Word, Norm: []byte("skarrow's"), Case: text.Title},
		{Kind: text.Word, Norm: []byte("quo'in")},
		{Kind: text.Literal, Norm: []byte("iphone")},
		{Kind: text.Number},
	}
	if n := testing.AllocsPerRun(100, func() {
		dst = dst[:0]
		for _, tok := range tokens {
			dst = l.Read(dst, tok)
		}
	}); n != 0 {
		t.Errorf("%v allocations", n)
	}
}
