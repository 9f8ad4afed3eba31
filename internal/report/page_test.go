package report

import (
	stdhtml "html"
	"regexp"
	"strings"
	"testing"
	"unicode/utf8"

	"example.org/foulcase"
)

func TestPage(t *testing.T) {
	documents := append(papers(), Document{
		Path:   `x"><script>alert(1)</script>.txt`,
		Source: []byte("The <b>tug</b> & her \x1b[2J \u202e crew recieved\r\rit\x00.\n"),
	})
	html := written(t, "html", documents...)
	marks := 0
	for _, d := range documents {
		marks += len(marksOf(t, string(d.Source), d.Options))
	}
	for pattern, want := range map[string]int{
		`<article `:                        3,
		` id="d\d+m\d+"`:                   marks,
		`<li id="d\d+m\d+l"`:               marks,
		` role=tooltip `:                   marks,
		`<li><a href="#d[134]">`:           3,
		`(?i)<script|\x1b|\x00|\x{202E}`:   0,
		`&lt;b&gt;tug&lt;/b&gt; &amp; her`: 2, // in the text and in the list
		`good\.txt`:                        0,
		`</html>`:                          1,
	} {
		if got := len(regexp.MustCompile(pattern).FindAllString(html, -1)); got != want {
			t.Errorf("%d times %s, want %d", got, pattern, want)
		}
	}
	ids := map[string]bool{}
	for _, match := range regexp.MustCompile(` id="([^"]*)"`).FindAllStringSubmatch(html, -1) {
		if ids[match[1]] {
			t.Errorf("two elements are %s", match[1])
		}
		ids[match[1]] = true
	}
	for _, match := range regexp.MustCompile(`(?:href="#|(?:described|labelled)by=")([^"]*)"`).FindAllStringSubmatch(html, -1) {
		if !ids[match[1]] {
			t.Errorf("nothing is %s", match[1])
		}
	}
}

var (
	tags = regexp.MustCompile(`<[^>]*>`)
	tip  = regexp.MustCompile(`<span class=tip.*?</span>`)
	ours = regexp.MustCompile(`^(<span class=line>|</span>|</a>|<a class="query" href="#d1m\dl"[^<>]*>)$`)
)

// The page shows the text of a document and nothing else of it, line by line.
func TestPageShowsTheText(t *testing.T) {
	for source, want := range map[string]string{
		"The tug recieved it.\nAll well.\n":   "The tug recieved it.\nAll well.",
		"The tug recieved it.\r\n\r\nAll":     "The tug recieved it.\n\nAll",
		"It was the\nthe tug that recieved\r": "It was the\nthe tug that recieved",
		"a\rb\x07 recieved":                   "a\nb\u2407 recieved",
	} {
		d := Document{Path: "a", Source: []byte(source)}
		var items []item
		for i, m := range marksOf(t, source, foulcase.Options{}) {
			items = append(items, item{m, "d1", i + 1})
		}
		if len(items) == 0 {
			t.Fatalf("no marks in %q", source)
		}
		html, err := highlighted(d, items)
		if err != nil {
			t.Fatal(err)
		}
		text := tip.ReplaceAllString(string(html), "")
		if got := tags.ReplaceAllString(text, ""); strings.TrimSuffix(got, "\n") != want {
			t.Errorf("%q shows %q", source, got)
		}
		if opened, closed := strings.Count(string(html), "<span"), strings.Count(string(html), "</span>"); opened != closed {
			t.Errorf("%q: %d elements begin and %d end", source, opened, closed)
		}
	}
}

// FuzzHighlighted holds that the page shows every character of a document, in
// order, wherever marks stand, and lets no markup of it through.
func FuzzHighlighted(f *testing.F) {
	f.Add("The <b>tug</b> & her\r\ncrew\x1b\u202e\xff", uint8(4), uint8(9))
	f.Add("\r\r\n\n", uint8(0), uint8(2))
	f.Fuzz(func(t *testing.T, source string, start, length uint8) {
		from := min(int64(start), int64(len(source)))
		to := min(from+int64(length), int64(len(source)))
		m := foulcase.Mark{Offset: from, Length: to - from, Corrections: []foulcase.Correction{{Text: "<i>"}}}
		html, err := highlighted(Document{Source: []byte(source)}, []item{{m, "d1", 1}, {m, "d1", 2}})
		if err != nil {
			t.Fatal(err)
		}
		text := tip.ReplaceAllString(string(html), "")
		for _, tag := range tags.FindAllString(text, -1) {
			if !ours.MatchString(tag) {
				t.Fatalf("%q comes out as the tag %s", source, tag)
			}
		}
		if from == to || !utf8.ValidString(source[:from]) || !utf8.ValidString(source[from:to]) {
			return // the second mark shows nothing new, or a character is cut
		}
		shown := stdhtml.UnescapeString(tags.ReplaceAllString(text, ""))
		want := strings.Map(seen, strings.NewReplacer("\r\n", "\x00", "\n", "\x00", "\r", "\x00").Replace(source))
		shown = strings.ReplaceAll(shown, "\n", "\u2400")
		if shown != want {
			t.Fatalf("%q shows %q, want %q", source, shown, want)
		}
	})
}

func TestPageOfNothing(t *testing.T) {
	if html := written(t, "html", papers()[1]); !strings.Contains(html, "Nothing was marked") {
		t.Error("a page of nothing does not say so")
	}
}

func TestNamesAndForms(t *testing.T) {
	for _, name := range Names() {
		if text := written(t, name, papers()...); !strings.Contains(text, "recieved") {
			t.Errorf("%s shows no mark:\n%s", name, text)
		}
	}
	if _, err := New("morse", Settings{}); err == nil || !strings.Contains(err.Error(), "morse") {
		t.Errorf("an unknown form: %v", err)
	}
}
