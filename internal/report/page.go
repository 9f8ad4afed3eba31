package report

import (
	_ "embed"
	"fmt"
	"html/template"
	"io"
	"slices"
	"strings"
	"sync"

	"example.org/foulcase"
)

// page is one HTML page of all documents: the text of each with its marks in
// place, and a list of them. It needs nothing from elsewhere and runs no scripts.
type page struct {
	settings  Settings
	templates *template.Template
	mu        sync.Mutex
	contents  []entry // a document that has marks; in any order until the tail
}

// entry is a document in the table of contents.
type entry struct {
	Number         int
	Path           string
	Marks, Queries int
}

//go:embed page.css
var pageStyle string

//go:embed page.tmpl
var pageTemplate string

func newPage(s Settings) *page {
	return &page{settings: s, templates: template.Must(template.New("page").Funcs(template.FuncMap{
		"style":       func() template.CSS { return template.CSS(pageStyle) },
		"path":        breakable,
		"seen":        func(s string) string { return strings.Map(seen, s) },
		"probability": Probability,
		"certain":     func(g foulcase.Grade) bool { return g == foulcase.GradeMark },
		"about":       func(k foulcase.Kind) string { return kindAbout[k] },
	}).Parse(pageTemplate))}
}

// breakable is a path that lines may be broken in after each slash.
func breakable(path string) template.HTML {
	escaped := template.HTMLEscapeString(Visible(path))
	return template.HTML(strings.ReplaceAll(escaped, "/", "/<wbr>"))
}

// Whole is true: the page shows the documents.
func (p *page) Whole() bool     { return true }
func (p *page) Between() string { return "" }

func (p *page) Head(w io.Writer) error {
	return p.templates.ExecuteTemplate(w, "head", p.settings)
}

// Tail writes the table of contents; the style sheet puts it beside the texts.
func (p *page) Tail(w io.Writer, complete bool) error {
	slices.SortFunc(p.contents, func(a, b entry) int { return a.Number - b.Number })
	return p.templates.ExecuteTemplate(w, "tail", struct {
		Entries  []entry
		Complete bool
	}{p.contents, complete})
}

func (p *page) Page(w io.Writer, d Document) Page {
	return &article{page: p, w: w, document: d}
}

// article is the page's part on one document.
type article struct {
	page     *page
	w        io.Writer
	document Document
	marks    []foulcase.Mark
}

func (a *article) Mark(m foulcase.Mark) error {
	a.marks = append(a.marks, m)
	return nil
}

// Close writes the article. A document without marks has none.
func (a *article) Close(bool) error {
	if len(a.marks) == 0 {
		return nil
	}
	e := entry{Number: a.document.Number, Path: a.document.Path}
	packed := false
	for _, m := range a.marks {
		if m.Grade == foulcase.GradeMark {
			e.Marks++
		} else {
			e.Queries++
		}
		packed = packed || m.Part != ""
	}
	view := articleView{entry: e, ID: fmt.Sprintf("d%d", e.Number)}
	for i, m := range a.marks {
		view.Items = append(view.Items, item{m, view.ID, i + 1})
	}
	if !packed {
		text, err := highlighted(a.document, view.Items)
		if err != nil {
			return err
		}
		view.Text = text
	}
	a.page.mu.Lock()
	a.page.contents = append(a.page.contents, e)
	a.page.mu.Unlock()
	return a.page.templates.ExecuteTemplate(a.w, "article", view)
}

// articleView is what the template shows of a document.
type articleView struct {
	entry
	ID    string
	Text  template.HTML // "" where the document is packed
	Items []item
}

// item is a mark on the page.
type item struct {
	foulcase.Mark
	Document string // the identifier of the article
	Number   int    // from 1
}

// ID identifies the mark in the text; the entry in the list has an "l" behind it.
func (i item) ID() string { return fmt.Sprintf("%sm%d", i.Document, i.Number) }

// Class is the style of the mark.
func (i item) Class() string { return i.Grade.String() }
