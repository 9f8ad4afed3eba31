package editor

import (
	"encoding/json"
	"fmt"
	"slices"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/internal/house"
)

// The kinds of code actions.
const (
	quickFix = "quickfix"
	fixAll   = "source.fixAll.foulcase"
)

// Why a client asks for code actions (LSP 3.17, CodeActionTriggerKind).
const triggeredByEditor = 2

// codeAction offers what can be done about the marks at a place.
func (s *Server) codeAction(c *call, params json.RawMessage) {
	var p codeActionParams
	if f := decode(params, &p); f != nil {
		c.reply(nil, f)
		return
	}
	s.hand(c, p.TextDocument.URI, func(d *document) {
		if f := d.judge(c.ctx); f != nil {
			c.reply(nil, f)
			return
		}
		c.reply(d.actions(p), nil)
	})
}

// wants tells whether actions of a kind are asked for: any, or those of the kinds in
// only and the kinds under them.
func wants(only []string, kind string) bool {
	return len(only) == 0 || slices.ContainsFunc(only, func(o string) bool {
		return o == "" || o == kind || strings.HasPrefix(kind, o+".")
	})
}

func (d *document) actions(p codeActionParams) []codeAction {
	all := []codeAction{}
	if d.draft == nil {
		return all
	}
	if wants(p.Context.Only, quickFix) {
		known := ours(p.Context.Diagnostics)
		for _, m := range d.marksIn(p.Range) {
			all = append(all, d.actionsOn(m, known)...)
		}
	}
	onlyAsked := len(p.Context.Only) == 0 && p.Context.TriggerKind == triggeredByEditor
	if wants(p.Context.Only, fixAll) && !onlyAsked {
		if a, ok := d.fixing(codeAction{Title: "Correct every mark in this document", Kind: fixAll}, fix{Which: fixEvery}); ok {
			all = append(all, a)
		}
	}
	return all
}

// mostOffered is the most marks of a range that have actions: each has several, and a
// menu has room for few.
const mostOffered = 20

// marksIn are the marks that a range touches, the first of them if there are many.
func (d *document) marksIn(s span) []foulcase.Mark {
	start, _ := d.lines.offset(d.draft.Source(), s.Start)
	end, _ := d.lines.offset(d.draft.Source(), s.End)
	var touched []foulcase.Mark
	for _, m := range d.marks {
		if int(m.Offset) <= max(start, end) && min(start, end) <= int(m.Offset+m.Length) {
			touched = append(touched, m)
		}
	}
	return touched[:min(len(touched), mostOffered)]
}

// actionsOn are the quick fixes of a mark.
func (d *document) actionsOn(m foulcase.Mark, known map[span][]json.RawMessage) []codeAction {
	at := d.cursor()
	base := codeAction{Kind: quickFix, Diagnostics: known[at.span(m)]}
	var all []codeAction
	add := func(title string, f fix) {
		a := base
		a.Title, a.IsPreferred = title, len(all) == 0 && f.Which == fixOne
		f.Offset, f.Length = m.Offset, m.Length
		if a, ok := d.fixing(a, f); ok {
			all = append(all, a)
		}
	}
	for i, c := range m.Corrections {
		add("Correct to "+quote(c.Text), fix{Which: fixOne, Choice: i})
	}
	if n := d.alike(m); n > 1 && len(m.Corrections) > 0 {
		add(fmt.Sprintf("Correct every %s here to %s (%d)", quote(m.Observed), quote(m.Corrections[0].Text), n), fix{Which: fixAlike})
	}
	if d.settings == nil {
		return all
	}
	order := func(title, name string, argument any) {
		a := base
		a.Title, a.Command = title, &command{title, name, []any{argument}}
		all = append(all, a)
	}
	form := quote(m.Observed)
	if m.Rule == "" && (m.Kind == foulcase.Nonword || m.Kind == foulcase.Runon) {
		order("Add "+form+" to house words", addWordCommand, houseWord{d.uri, m.Observed})
	}
	order("Let "+form+" stand here", letStandCommand, stet{d.uri, house.DecisionOn(d.path, m, house.Stet, house.Here)})
	order("Let "+form+" stand everywhere", letStandCommand, stet{d.uri, house.DecisionOn(d.path, m, house.Stet, house.Everywhere)})
	return all
}

// ours picks the diagnostics of ours, as the client has them, by their places.
func ours(diagnostics []json.RawMessage) map[span][]json.RawMessage {
	picked := map[span][]json.RawMessage{}
	for _, raw := range diagnostics {
		var d struct {
			Range  span   `json:"range"`
			Source string `json:"source"`
		}
		if json.Unmarshal(raw, &d) == nil && d.Source == source {
			picked[d.Range] = append(picked[d.Range], raw)
		}
	}
	return picked
}
