package lexicon

import (
	"bytes"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// tally is a corpus by hand: each form in so many documents, once in each.
type tally map[string]uint32

func (n tally) counter(pattern text.Case) *Counter {
	c := NewCounter()
	n.into(c, pattern)
	return c
}

func (n tally) into(c *Counter, pattern text.Case) {
	for form, times := range n {
		for range times {
			c.Documents++
			c.Words++
			c.add([]byte(form), pattern, false, false)
		}
	}
}

func evidence(t testing.TB, listed string, counts *Counter) *Evidence {
	t.Helper()
	e, err := NewEvidence([]WordList{{"list", Both, strings.Fields(listed)}}, counts)
	if err != nil {
		t.Fatal(err)
	}
	return e
}

func TestJudge(t *testing.T) {
	counts := tally{
		// misspellings as frequent as careless text has them
		"receive": 9000, "recieve": 300, "occurred": 3000, "occured": 200, "separate": 5000, "seperate": 250,
		"accommodate": 600, "accomodate": 60, "until": 9000, "untill": 90, "every": 9000, "time": 9000, "everytime": 90,
		"don't": 9000, "dont": 800, "company": 5000, "companys": 4, "lot": 9000, "alot": 60, "companies": 4000,
		// words the lists lack
		"blockchain": 60, "blockchains": 2, "smartphone": 90, "telehealth": 12, "block": 2000, "phone": 3000,
		"noticeable": 600, "noticable": 4, "containerise": 40, "containerize": 50, "container": 800, "containers": 700,
		// junk
		"qx": 200, "aaargh": 40, "xkcdqz": 40, "didn": 50, "didn't": 900, "αβγδ": 50, "pilot's": 30, "wxyz": 3, "rareness": 1,
	}.counter(text.Lower)
	tally{"skarrow": 5, "kirkhaven": 3, "kirkhaver": 1, "receiva": 2}.into(counts, text.Title)
	tally{"vts": 20, "ecdis": 9}.into(counts, text.Upper)
	tally{"getvesselname": 9, "mcauley": 3}.into(counts, text.Mixed)
	e := evidence(t, "receive occurred separate accommodate until every time don't company companies lot block phone "+
		"noticeable container containers didn't pilot abbey abbey's it's that's B b a London", counts)
	tests := []struct {
		form   string
		in     bool
		reason string
	}{
		{"receive", true, "list"},
		{"recieve", false, "slip of receive"},
		{"occured", false, "slip of occurred"},
		{"seperate", false, "slip of separate"},
		{"accomodate", false, "slip of accommodate"},
		{"untill", false, "slip of until"},
		{"dont", false, "slip of don't"},
		{"alot", false, "a + lot"},
		{"everytime", false, "every + time"},
		{"companys", false, "slip of company"},
		{"noticable", false, "slip of noticeable"},
		{"blockchain", true, "often"},
		{"blockchains", true, "inflection of blockchain"},
		{"smartphone", true, "often"},
		{"telehealth", true, "often"},
		{"containerise", true, "often"},
		{"containerize", true, "often"},
		{"skarrow", true, "often"},
		{"kirkhaven", true, "name"},
		{"kirkhaver", false, "seldom"},
		{"receiva", false, "seldom"},
		{"vts", true, "short"},
		{"ecdis", false, "seldom"},
		{"mcauley", true, "name"},
		{"getvesselname", false, "seldom"},
		{"qx", false, "two letters"},
		{"aaargh", false, "three times"},
		{"xkcdqz", false, "vowel"},
		{"didn", false, "didn't"},
		{"αβγδ", false, "Latin"},
		{"pilot's", false, "'s"},
		{"wxyz", false, ""},
		{"rareness", false, "seldom"},
		{"unheard", false, "never"},
		{"abbey", true, "list"},
		{"abbey's", false, "never"},
		{"it's", true, "list"},
		{"who's", true, "list"},
		{"'s", true, "list"},
		{"n't", true, "list"},
		{"b", false, ""},
		{"a", true, "list"},
	}
	for _, tt := range tests {
		v := e.Judge(tt.form)
		if v.In != tt.in || !strings.Contains(v.Reason, tt.reason) {
			t.Errorf("%s: %v (%s), want %v (%s)", tt.form, v.In, v.Reason, tt.in, tt.reason)
		}
	}
	if got, want := e.Judge("recieve").String(), `recieve: out, a slip of receive; 300 times in 300 documents; "receive" stands 9000 times, of which slips may reach 1.8e+03`; got != want {
		t.Errorf("got  %s\nwant %s", got, want)
	}
}

// TestKnownMisspellings gives each misspelling of the lists one occurrence for
// a hundred of its word, as careless text has of the commonest, and wants
// nearly all of those a single edit away kept out.
func TestKnownMisspellings(t *testing.T) {
	for _, name := range []string{"wikipedia-common", "toefl-spell"} {
		t.Run(name, func(t *testing.T) {
			path := filepath.Join("..", "..", "..", "shared", "data", "train", name+".tsv")
			data, err := os.ReadFile(path)
			if err != nil {
				t.Skip("the lists of misspellings are not here")
			}
			words, slips := tally{}, tally{}
			for line := range strings.Lines(strings.ToLower(string(data))) {
				f := strings.Split(line, "\t")
				if len(f) > 2 && len(f[0]) > 4 && f[0] != f[1] && !strings.ContainsAny(f[0]+f[1], " -") {
					words[f[1]], slips[f[0]] = 1000, 10
				}
			}
			for form := range words {
				delete(slips, form)
			}
			counts := words.counter(text.Lower)
			slips.into(counts, text.Lower)
			var list strings.Builder
			for form := range words {
				fmt.Fprintln(&list, form)
			}
			e := evidence(t, list.String(), counts)
			single, in := 0, 0
			for slip := range slips {
				isSingle := false
				near(e.near, slip, func(id uint32, _ editKind) {
					isSingle = isSingle || words[string(e.near.AppendForm(nil, id))] > 0
				})
				if isSingle {
					single++
					if e.Judge(slip).In {
						in++
					}
				}
			}
			t.Logf("%d of %d misspellings a single edit away got in", in, single)
			if single < 500 || in*20 > single {
				t.Errorf("%d of %d misspellings a single edit away got in, more than one in twenty", in, single)
			}
		})
	}
}

func TestBuild(t *testing.T) {
	lists := []WordList{
		{"us", US, strings.Fields("B B's color center Center organize travel pilot Pilot's pilots Auburn iPad NASA may May polish Polish analyzable O'Brien")},
		{"gb", GB, strings.Fields("colour centre Center organise travel pilot pilot's pilots iPad NASA may May polish Polish unseen O'Brien")},
	}
	counts := tally{"pilot": 80, "travel": 40, "may": 90, "polish": 2, "iphone": 0, "telehealth": 30, "colour": 1, "color": 1}.counter(text.Lower)
	tally{"polish": 50, "may": 10, "skarrow": 9, "obrien": 1}.into(counts, text.Title)
	tally{"nasa": 20}.into(counts, text.Upper)
	build := func() []byte {
		b, err := Build(lists, counts)
		if err != nil {
			t.Fatal(err)
		}
		section, err := b.Section()
		if err != nil {
			t.Fatal(err)
		}
		return section
	}
	section := build()
	for range 5 {
		if !bytes.Equal(section, build()) {
			t.Fatal("building twice gives different bytes")
		}
	}
	l, err := Open(section)
	if err != nil {
		t.Fatal(err)
	}
	tests := []struct {
		form, canonical string
		variety         Variety
		cases           Cases
		listed          bool
	}{
		{"color", "color", US, LowerCase, true},
		{"colour", "colour", GB, LowerCase, true},
		{"center", "center", US, LowerCase | TitleCase, true},
		{"centre", "centre", GB, LowerCase, true},
		{"auburn", "Auburn", Both, TitleCase, true},
		{"may", "may", Both, LowerCase | TitleCase, true},
		{"polish", "Polish", Both, LowerCase | TitleCase, true},
		{"nasa", "NASA", Both, UpperCase, true},
		{"ipad", "iPad", Both, MixedCase, true},
		{"o'brien", "O'Brien", Both, MixedCase, true},
		{"skarrow", "Skarrow", Both, TitleCase, false},
		{"telehealth", "telehealth", Both, LowerCase, false},
	}
	for _, tt := range tests {
		id, ok := l.ID([]byte(tt.form))
		if !ok {
			t.Errorf("no %s", tt.form)
			continue
		}
		e := l.Entry(id)
		if got := l.Canonical(id); got != tt.canonical || e.Variety != tt.variety || e.Cases != tt.cases || e.Listed != tt.listed {
			t.Errorf("%s: %q %+v, want %q, variety %d, cases %d, listed %v", tt.form, got, e, tt.canonical, tt.variety, tt.cases, tt.listed)
		}
	}
	for _, form := range []string{"pilot's", "obrien", "recieve", "b", "b's"} {
		if _, ok := l.ID([]byte(form)); ok {
			t.Errorf("%s is a form", form)
		}
	}
	prior := func(form string) float32 {
		id, _ := l.ID([]byte(form))
		return l.Prior(id)
	}
	if !(prior("may") > prior("travel") && prior("travel") > prior("colour") && prior("colour") > prior("unseen")) {
		t.Errorf("priors do not fall with the counts: %v %v %v %v", prior("may"), prior("travel"), prior("colour"), prior("unseen"))
	}
}
