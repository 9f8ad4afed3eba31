package foulcase

import (
	"context"
	"fmt"
	"strings"
	"testing"
)

const pilotHouse = `# House words of Skarrow Sound Pilots.
Tollgarth
pilot boat, not pilotboat, not pilot-boat   # as one sees it at sea
without, not with out
Skarrow Sound, not Sound
ETA, not eta
Hesper, not hesper
quay, not key
`

func readPilotHouse(t testing.TB) *House {
	t.Helper()
	house, err := ReadHouse("list", strings.NewReader(pilotHouse))
	if err != nil {
		t.Fatal(err)
	}
	return house
}

func TestHousePreferences(t *testing.T) {
	e := openTiny(t, nil)
	house := readPilotHouse(t)
	for _, tt := range []struct{ text, want string }{
		{"The pilotboat left.", `runon "pilotboat" -> "pilot boat"`},
		{"Pilot-boat Hesper left.", `runon "Pilot-boat" -> "Pilot boat"`},
		{"THE PILOTBOAT IS LATE TODAY.", `runon "PILOTBOAT" -> "PILOT BOAT"`},
		{"The tug towed the ship to the pier at high water before dawn, with\nout the pilot.", `split "with\nout" -> "without"`},
		{"The Sound is wide.", `nonword "Sound" -> "Skarrow Sound"`},
		{"The Skarrow Sound is wide.", ""},
		{"Her eta is noon, her ETA was ten.", `nonword "eta" -> "ETA"`},
		{"The HESPER is late, not the ETA.", ""},
		{"They boarded hesper.", `nonword "hesper" -> "Hesper"`},
		{"They boarded the pilot boat.", ""},
		{"She lies at the key.", `"key" -> "quay"`},
	} {
		var got []string
		for m, err := range e.Proof(context.Background(), strings.NewReader(tt.text), Options{House: house}) {
			if err != nil {
				t.Fatal(err)
			}
			if c := m.Corrections[0]; c.P > .99 {
				got = append(got, fmt.Sprintf("%s %q -> %q", m.Kind, m.Observed, c.Text))
			}
		}
		if s := strings.Join(got, "; "); s != tt.want && (tt.want == "" || !strings.HasSuffix(s, tt.want)) {
			t.Errorf("%q: %s, want %s", tt.text, s, tt.want)
		}
	}
}

func TestRankPutsWhatTheHouseWritesFirst(t *testing.T) {
	e := openTiny(t, nil)
	house := readPilotHouse(t)
	for word, want := range map[string]string{"Pilotboat": "Pilot boat", "with out": "without", "key": "quay", "Sound": "Skarrow Sound"} {
		r := e.Rank(word, RankOptions{House: house})
		sum := 0.0
		for _, c := range r.Candidates {
			sum += c.P
		}
		if len(r.Candidates) == 0 || r.Candidates[0].Text != want || sum > 1+1e-9 {
			t.Errorf("%q: %v, want %q first", word, r.Candidates, want)
		}
	}
}

func TestHousePreferencesThatContradict(t *testing.T) {
	for list, want := range map[string]string{
		"quay, not key\nkey, not quay":                 `list:1: "quay" is a house word, but list:2 has "key" written for "quay"`,
		"quay, not key\nkey":                           `list:2: "key" is a house word, but list:1 has "quay" written for "key"`,
		"quay, not key\nberth, not Key\nstem, not key": `list:3: "key" is to be written "stem" here, but "quay" by list:1`,
		"boat, not launch\npilot launch, not barge":    `list:2: "pilot launch" is a house word, but list:1 has "boat" written for "launch"`,
		"quay, not quay":                               `list:1: "quay" is to be written for itself`,
		"quay, not a b c d e":                          `list:1: "a b c d e" is of 5 words`,
		"quay, not ":                                   "",
		"quay, not ...":                                `list:1: "..." cannot be read as words`,
		"Go. Stop, not d":                              `list:1: "Go. Stop" cannot be read as words`,
		"quay, not key, not key\nQuay, not Key":        "",
	} {
		_, err := ReadHouse("list", strings.NewReader(list))
		if want == "" && err != nil || want != "" && (err == nil || !strings.HasPrefix(err.Error(), want)) {
			t.Errorf("%q: %v, want %s", list, err, want)
		}
	}
}

func TestHousePreferencesThatBeginAlike(t *testing.T) {
	var list strings.Builder
	for i := range maxAlike {
		fmt.Fprintf(&list, "quay %d, not key %d\n", i, i)
	}
	if _, err := ReadHouse("list", strings.NewReader(list.String())); err != nil {
		t.Error(err)
	}
	list.WriteString("quay, not key")
	want := fmt.Sprintf(`list:%d: more than %d forms not to write begin with "key"`, maxAlike+1, maxAlike)
	if _, err := ReadHouse("list", strings.NewReader(list.String())); err == nil || !strings.HasPrefix(err.Error(), want) {
		t.Errorf("error %v, want %s", err, want)
	}
}

func TestHouseListsAreHeldAgainstEachOther(t *testing.T) {
	_, err := ReadHouseLists(HouseList{"a.txt", strings.NewReader("\nquay, not key")}, HouseList{"b.txt", strings.NewReader("key")})
	if err == nil || !strings.HasPrefix(err.Error(), "b.txt:1: ") || !strings.Contains(err.Error(), "a.txt:2") {
		t.Errorf("%v", err)
	}
}

// FuzzHouse holds the reader of lists to errors that name a line, and what it took to
// being usable.
func FuzzHouse(f *testing.F) {
	f.Add(pilotHouse, "The pilotboat lies at the key.")
	f.Add("a, not b\nb, not c", "a b c")
	e := openTiny(f, nil)
	f.Fuzz(func(t *testing.T, list, text string) {
		house, err := ReadHouse("list", strings.NewReader(list))
		if err != nil {
			if !strings.HasPrefix(err.Error(), "list:") {
				t.Errorf("%q names no line", err)
			}
			return
		}
		for m, err := range e.Proof(context.Background(), strings.NewReader(text), Options{House: house}) {
			if err != nil {
				t.Fatal(err)
			}
			if m.Observed == m.Corrections[0].Text {
				t.Errorf("%q is to be written for itself", m.Observed)
			}
		}
	})
}
