package eval_test

import (
	"encoding/xml"
	"fmt"
	"io"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

// textResult is a result of invented places, enough for every picture.
func textResult(task string) *eval.Result {
	j := &eval.Judged{Items: 40, Units: []eval.Unit{{Document: "a", Line: 1, Words: 600}, {Document: "b", Line: 9, Words: 400}}}
	for i := range 40 {
		for k, place := range []eval.Place{
			found(eval.Nonword, .6+.01*float64(i), "mark", 1+i%2),
			found(eval.Realword, .02*float64(i), "query", 1),
			alarm(eval.Realword, .01*float64(i), "query"),
			missed(eval.Runon),
		} {
			place.Unit, place.Line = (i+k)%2, i
			j.Places = append(j.Places, place)
		}
	}
	r := &eval.Result{
		Format: 1, Task: task, Model: "0011223344556677", Version: "v0", Go: "go1.26",
		Command: []string{"foulcase", "eval", task, "--house=harbour words.txt", "log.tsv"},
	}
	rs := eval.Resampling{Resamples: 20}
	r.AddTexts(eval.DataFile{Name: "papers/log.tsv", SHA256: strings.Repeat("ab", 32)}, j, rs)
	r.Sum(rs)
	return r
}

func listResult() *eval.Result {
	r := &eval.Result{Format: 1, Task: eval.TaskList, Model: "0011223344556677"}
	var outcomes []eval.PairOutcome
	for i := range 30 {
		outcomes = append(outcomes, eval.PairOutcome{
			Line: i + 1, Observed: "bouy", Intended: "buoy", Rank: i % 5, Candidates: []string{"boy", "buoy"}, Classes: []string{"transposition", "nonword"},
		})
	}
	for _, name := range []string{"a.tsv", "b.tsv"} {
		r.AddPairs(eval.DataFile{Name: name}, outcomes, eval.Resampling{Resamples: 20})
	}
	r.Sum(eval.Resampling{Resamples: 20})
	return r
}

func page(t *testing.T, results ...*eval.Result) string {
	t.Helper()
	var b strings.Builder
	if err := eval.WritePage(&b, named(results...)); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func named(results ...*eval.Result) []eval.NamedResult {
	var list []eval.NamedResult
	for i, r := range results {
		list = append(list, eval.NamedResult{Name: fmt.Sprintf("%s %d", r.Task, i), Result: r})
	}
	return list
}

func TestPictures(t *testing.T) {
	text := []string{"precision-recall", "errors-by-kind", "reliability", "reliability-nonword", "reliability-realword", "false-alarms"}
	for _, test := range []struct {
		results []*eval.Result
		want    []string
	}{
		{[]*eval.Result{textResult(eval.TaskText)}, text},
		{[]*eval.Result{textResult(eval.TaskNoise)}, text},
		{[]*eval.Result{textResult(eval.TaskClean)}, []string{"false-alarms"}},
		{[]*eval.Result{listResult()}, []string{"accuracy-at-k", "accuracy-by-class"}},
		{
			[]*eval.Result{listResult(), listResult()},
			[]string{"together-accuracy-at-k", "1-accuracy-at-k", "1-accuracy-by-class", "2-accuracy-at-k", "2-accuracy-by-class"},
		},
		{
			[]*eval.Result{listResult(), textResult(eval.TaskText), textResult(eval.TaskNoise)}, slices.Concat([]string{"together-precision-recall"},
				[]string{"1-accuracy-at-k", "1-accuracy-by-class"}, prefixed("2-", text), prefixed("3-", text)),
		},
	} {
		var got []string
		for _, p := range eval.Pictures(named(test.results...)) {
			got = append(got, p.Name)
			wellFormed(t, p.Name, p.SVG())
		}
		if !slices.Equal(got, test.want) {
			t.Errorf("pictures %q, want %q", got, test.want)
		}
	}
}

func prefixed(prefix string, names []string) []string {
	var list []string
	for _, n := range names {
		list = append(list, prefix+n)
	}
	return list
}

func wellFormed(t *testing.T, name, svg string) {
	t.Helper()
	d := xml.NewDecoder(strings.NewReader(svg))
	for {
		if _, err := d.Token(); err == io.EOF {
			return
		} else if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
	}
}

func TestSameResultSameBytes(t *testing.T) {
	build := func() []*eval.Result {
		return []*eval.Result{listResult(), textResult(eval.TaskText), listResult(), textResult(eval.TaskNoise)}
	}
	a, b := eval.Pictures(named(build()...)), eval.Pictures(named(build()...))
	for i := range a {
		if a[i].SVG() != b[i].SVG() {
			t.Errorf("%s differs", a[i].Name)
		}
	}
	if before, after := page(t, build()...), page(t, build()...); before != after {
		t.Error("the page differs")
	}
}

func TestPageTells(t *testing.T) {
	text := page(t, textResult(eval.TaskText))
	for _, want := range []string{
		"<tr><td>bouy</td><td>buoy</td><td class=\"n\">120</td><td class=\"n\">80</td><td class=\"n\">60</td></tr>", // errors, found, corrected first
		"moor at the <mark>bouy</mark>",
		"<code>foulcase eval text &#39;--house=harbour words.txt&#39; log.tsv</code>",
		"SHA-256 <code>abababababababab…</code>",
		"1000 words in 2 documents",
		"and 15 more", // of 40 false alarms
		"detection.recall",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("the page lacks %q", want)
		}
	}
	list := page(t, listResult())
	for _, want := range []string{
		"<tr><td>buoy</td><td>boy</td><td class=\"n\">48</td></tr>", // of 60, a fifth are ranked first
		"<td>bouy</td><td>buoy</td><td class=\"n\">missing</td><td>boy, buoy</td>",
		"<td>b.tsv</td>",
		"transposition, 60",
	} {
		if !strings.Contains(list, want) {
			t.Errorf("the page of lists lacks %q", want)
		}
	}
}

// A page is made of other people's text: nothing of it may become markup, and
// nothing is to be fetched.
func TestPageEscapes(t *testing.T) {
	const hostile = "</pre></svg><script>alert('x')</script>\"><img src=x onerror=alert(1)>&\x00\x1b\xff]]>"
	r := textResult(eval.TaskText)
	r.Command = append(r.Command, hostile)
	r.Version, r.Model = hostile, hostile
	r.Data[0].Name, r.Data[0].SHA256 = hostile, hostile
	for i := range r.Places {
		p := &r.Places[i]
		p.Observed, p.Context, p.Ledger = hostile, "a "+hostile+" b", hostile
		if p.Flag != nil {
			p.Flag.Corrections, p.Flag.Grade = []string{hostile}, hostile
		}
		if p.Error != nil {
			p.Error.Corrections = []string{hostile}
		}
	}
	l := listResult()
	l.Data[0].Name = hostile
	for i := range l.Pairs {
		l.Pairs[i].Observed, l.Pairs[i].Intended, l.Pairs[i].Candidates = hostile, hostile+"x", []string{hostile}
	}
	results := []eval.NamedResult{{Name: hostile, Result: r}, {Name: hostile, Result: r}, {Name: hostile, Result: l}}
	var b strings.Builder
	if err := eval.WritePage(&b, results); err != nil {
		t.Fatal(err)
	}
	for _, markup := range []string{"<script", "<img", "</pre></svg>"} {
		if strings.Contains(b.String(), markup) {
			t.Errorf("%q got through", markup)
		}
	}
	for _, p := range eval.Pictures(results) {
		wellFormed(t, p.Name, p.SVG())
		if strings.Contains(p.SVG(), "<script") {
			t.Errorf("a script in %s", p.Name)
		}
	}
	plain := page(t, textResult(eval.TaskText), listResult())
	for _, outside := range []string{"src=", "href=", "url(", "@import", "<script", "<link"} {
		if strings.Contains(plain, outside) {
			t.Errorf("the page is not self-contained: %q", outside)
		}
	}
}

// What was measured on next to nothing has a page too.
func TestPageOfLittle(t *testing.T) {
	for _, task := range []string{eval.TaskText, eval.TaskNoise, eval.TaskClean, eval.TaskList} {
		r := &eval.Result{Format: 1, Task: task}
		if task == eval.TaskList {
			r.AddPairs(eval.DataFile{Name: "empty.tsv"}, nil, eval.Resampling{Resamples: 5})
		} else {
			r.AddTexts(eval.DataFile{Name: "empty.tsv"}, &eval.Judged{}, eval.Resampling{Resamples: 5})
		}
		r.Sum(eval.Resampling{Resamples: 5})
		if got := page(t, r); !strings.Contains(got, "<h3>Metrics</h3>") || strings.Contains(got, "NaN") {
			t.Errorf("%s: %s", task, got)
		}
	}
}

// Whatever ReadResult lets through can be drawn.
func FuzzPage(f *testing.F) {
	for _, r := range []*eval.Result{listResult(), textResult(eval.TaskNoise)} {
		r.Pairs, r.Places = r.Pairs[:min(len(r.Pairs), 3)], r.Places[:min(len(r.Places), 20)]
		var b strings.Builder
		if err := r.Write(&b); err != nil {
			f.Fatal(err)
		}
		f.Add(b.String())
	}
	f.Fuzz(func(t *testing.T, data string) {
		r, err := eval.ReadResult("fuzzed", strings.NewReader(data))
		if err != nil {
			return
		}
		page := page(t, r, r)
		if strings.Contains(page, "<script") {
			t.Error("a script got through")
		}
		for _, p := range eval.Pictures(named(r, r)) {
			wellFormed(t, p.Name, p.SVG())
		}
	})
}
