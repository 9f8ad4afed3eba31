package eval

import (
	_ "embed"
	"fmt"
	"html/template"
	"io"
	"strings"
)

// A NamedResult is a result and what a page calls it.
type NamedResult struct {
	Name   string
	Result *Result
}

// Pictures draws results, each by itself and, when there are several, those of
// one task together. Names differ within one call.
func Pictures(results []NamedResult) []Picture {
	pictures := overlaid(results)
	for i, r := range results {
		for _, p := range picturesOf(r.Result) {
			if len(results) > 1 {
				p.Name = fmt.Sprintf("%d-%s", i+1, p.Name)
			}
			pictures = append(pictures, p)
		}
	}
	return pictures
}

// picturesOf draws what one result has data for.
func picturesOf(r *Result) []Picture {
	switch r.Task {
	case TaskList:
		return append([]Picture{accuracyPicture("accuracy-at-k", "Accuracy at k", listSeries(r))}, classPicture(r.Report)...)
	case TaskClean:
		return alarmsPicture(r.Report)
	}
	pictures := recallPicture("precision-recall", "Precision against recall", kindCurves(r.Places))
	pictures = append(pictures, errorsPicture(r.Places)...)
	pictures = append(pictures, reliabilityPictures(r.Places)...)
	return append(pictures, alarmsPicture(r.Report)...)
}

// overlaid draws results of one task in one picture.
func overlaid(results []NamedResult) []Picture {
	if len(results) < 2 {
		return nil
	}
	var curves []recallCurve
	var series []accuracySeries
	for _, n := range results {
		r := n.Result
		switch r.Task {
		case TaskList:
			series = append(series, newAccuracySeries(fmt.Sprintf("%s (%d pairs)", n.Name, len(r.Pairs)), r.Pairs, r.Report))
		case TaskText, TaskNoise:
			if c := newRecallCurve(n.Name, r.Places, ""); len(c.points) > 0 {
				curves = append(curves, c)
			}
		}
	}
	var pictures []Picture
	if len(curves) > 1 {
		pictures = recallPicture("together-precision-recall", "Precision against recall, all kinds", curves)
	}
	if len(series) > 1 {
		pictures = append(pictures, accuracyPicture("together-accuracy-at-k", "Accuracy at k", series))
	}
	return pictures
}

//go:embed page.html
var pageHTML string

//go:embed page.css
var pageStyle string

var pageTemplate = template.Must(template.New("page").Funcs(template.FuncMap{
	"drawn":  func(p Picture) template.HTML { return template.HTML(p.svg) },
	"short":  func(hash string) string { return hash[:min(len(hash), 16)] },
	"typed":  commandLine,
	"joined": func(list []string) string { return strings.Join(list[:min(len(list), 3)], ", ") },
}).Parse(pageHTML))

// WritePage writes a page about results: their pictures, their metrics, what was
// found and missed, and where the figures come from. It is one HTML file that
// needs no other, without scripts; what comes from documents is escaped.
func WritePage(w io.Writer, results []NamedResult) error {
	page := struct {
		Style    template.CSS
		Title    string
		Together []Picture
		Sections []pageSection
	}{template.CSS(pageStyle + chartStyle), "", overlaid(results), nil}
	var names []string
	for _, r := range results {
		names = append(names, r.Name)
		page.Sections = append(page.Sections, newSection(r))
	}
	page.Title = strings.Join(names, ", ")
	return pageTemplate.Execute(w, page)
}

// pageSection is what a page says of one result.
type pageSection struct {
	Name       string
	Result     *Result
	Pictures   []Picture
	Metrics    metricTable
	Files      metricTable // by file of data, when there are several
	Mistakes   pairTable   // errors by what stands there and what was meant
	Confusions pairTable   // words by what they were taken for
	Alarms     placeList
	Misses     placeList
	Pairs      pairList // of isolated pairs, those whose intended form is farthest down
}

func newSection(n NamedResult) pageSection {
	r := n.Result
	s := pageSection{
		Name: n.Name, Result: r, Pictures: picturesOf(r),
		Metrics: newMetricTable(r.Report),
	}
	if len(r.Data) > 1 {
		s.Files = newFileTable(r.Data)
	}
	if r.Task == TaskList {
		s.Confusions, s.Pairs = pairConfusions(r.Pairs), worstPairs(r.Pairs)
		return s
	}
	s.Mistakes, s.Confusions = mistakes(r.Places), confusions(r.Places)
	s.Alarms, s.Misses = worstAlarms(r), worstMisses(r)
	return s
}

// commandLine writes a command as a shell would read it.
func commandLine(words []string) string {
	quoted := make([]string, len(words))
	for i, w := range words {
		quoted[i] = w
		if w == "" || strings.ContainsAny(w, " \t\n'\"\\$`*?[](){}<>|&;#~!") {
			quoted[i] = "'" + strings.ReplaceAll(w, "'", `'\''`) + "'"
		}
	}
	return strings.Join(quoted, " ")
}
