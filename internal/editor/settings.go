package editor

import (
	"encoding/json"
	"fmt"
	"maps"
	"math"
	"slices"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
	"example.org/foulcase/internal/text"
)

// Settings are what holds for a document by files, see house.Settings. They are safe for
// concurrent use where documents share them.
type Settings interface {
	Options(path string) foulcase.Options
	Stands(path string, m foulcase.Mark) bool
	AddWord(word string) (file string, err error)
	Record(d house.Decision) error
	Files() []string
}

// severity of a diagnostic (LSP 3.17, DiagnosticSeverity).
type severity int

var severities = map[string]severity{"error": 1, "warning": 2, "information": 3, "hint": 4}

// preferences are what the client's own settings say, under "foulcase". They win over
// the files.
type preferences struct {
	variety     *foulcase.Variety
	budget      float64         // 0: not said
	house       map[string]bool // folded forms that stand
	mark, query severity
}

func newPreferences() preferences {
	return preferences{mark: severities["warning"], query: severities["information"]}
}

func (p preferences) equal(q preferences) bool {
	sameVariety := p.variety == q.variety || p.variety != nil && q.variety != nil && *p.variety == *q.variety
	return sameVariety && p.budget == q.budget && p.mark == q.mark && p.query == q.query && maps.Equal(p.house, q.house)
}

func (p preferences) clone() preferences {
	p.house = maps.Clone(p.house)
	return p
}

// set reads settings, a JSON object; null, nothing and [], which some clients write for
// no settings, change nothing. What cannot be read is told to complain and left as it
// was.
func (p *preferences) set(raw json.RawMessage, complain func(string)) {
	var all map[string]json.RawMessage
	if s := string(raw); s == "" || s == "null" || s == "[]" {
		return
	}
	if json.Unmarshal(raw, &all) != nil {
		complain("the settings of foulcase are not an object")
		return
	}
	known := map[string]func(json.RawMessage) error{
		"variety":  p.setVariety,
		"budget":   p.setBudget,
		"house":    p.setHouse,
		"severity": p.setSeverity,
	}
	for _, key := range slices.Sorted(maps.Keys(all)) {
		set, ok := known[key]
		if !ok {
			complain(fmt.Sprintf("setting foulcase.%.50s is not known; there are %v", key, slices.Sorted(maps.Keys(known))))
		} else if err := set(all[key]); err != nil {
			complain(fmt.Sprintf("setting foulcase.%s: %v", key, err))
		}
	}
}

func (p *preferences) setVariety(raw json.RawMessage) error {
	var name string
	if json.Unmarshal(raw, &name) != nil {
		return fmt.Errorf("want en-US, en-GB or any")
	}
	v, err := foulcase.ParseVariety(name)
	if err == nil {
		p.variety = &v
	}
	return err
}

func (p *preferences) setBudget(raw json.RawMessage) error {
	var n float64
	if json.Unmarshal(raw, &n) != nil || !(n > 0) || math.IsInf(n, 0) {
		return fmt.Errorf("want a number above 0: false alarms in 1,000 words")
	}
	p.budget = n
	return nil
}

func (p *preferences) setHouse(raw json.RawMessage) error {
	var words []string
	if json.Unmarshal(raw, &words) != nil {
		return fmt.Errorf("want a list of words")
	}
	p.house = map[string]bool{}
	for _, w := range words {
		p.house[string(text.Fold(nil, []byte(w)))] = true
	}
	return nil
}

func (p *preferences) setSeverity(raw json.RawMessage) error {
	var names struct{ Mark, Query string }
	if err := json.Unmarshal(raw, &names); err != nil {
		return fmt.Errorf(`want an object: {"mark": "warning", "query": "information"}`)
	}
	for _, one := range []struct {
		name string
		into *severity
	}{{names.Mark, &p.mark}, {names.Query, &p.query}} {
		if one.name == "" {
			continue
		}
		v, ok := severities[one.name]
		if !ok {
			return fmt.Errorf("%.50q is none of error, warning, information and hint", one.name)
		}
		*one.into = v
	}
	return nil
}

// reportSetting logs what is wrong with the client's settings, once.
func (s *Server) reportSetting(what string) {
	if !s.reported[what] && len(s.reported) < 100 {
		s.reported[what] = true
		s.log(loudWarning, "%s", what)
	}
}

// reportFiles shows what is wrong with the files of settings: once, however many
// documents they are for, until they are read anew.
func (s *Server) reportFiles(err error) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if what := err.Error(); !s.faults[what] && len(s.faults) < 100 {
		s.faults[what] = true
		s.show(loudError, "foulcase: %s", what)
	}
}

// options is how the document is to be judged.
func (d *document) options() foulcase.Options {
	var o foulcase.Options
	if d.settings != nil {
		o = d.settings.Options(d.path)
		o.Encoding = "" // of the file; the client sends UTF-8
	}
	byName, named := foulcase.FormatOf(d.path)
	if o.Format == "" || o.Format == byName { // no settings say otherwise
		o.Format = byName
		if f, ok := foulcase.FormatOfLanguage(d.language); ok && (f != "plain" || !named) {
			o.Format = f
		}
	}
	if d.asked.variety != nil {
		o.Variety = *d.asked.variety
	}
	if d.asked.budget > 0 {
		o.Budget = d.asked.budget
	}
	return o
}

// load reads the settings that hold for the document.
func (d *document) load() {
	d.stands = map[mark]bool{}
	if d.s.config.Settings == nil {
		return
	}
	settings, err := d.s.config.Settings(d.path)
	if err != nil {
		d.s.reportFiles(err)
		return
	}
	d.settings = settings
	d.s.watch(settings.Files())
}

// restart has the document judged under what holds for it now: where it has marks, and
// later all of it if so wanted.
func (d *document) restart(all bool) {
	if d.draft == nil {
		return
	}
	o := d.options()
	if o.Format != d.format || !slices.Equal(o.Fields, d.fields) {
		old := d.draft
		d.begin(old.Source())
		old.Close()
		return
	}
	d.draft.SetOptions(o)
	d.stale, d.unsettled = true, d.unsettled || all
}
