package lexicon_test

import (
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/candidates/lexicon"
)

func TestReadWords(t *testing.T) {
	in := "\ufeff# words of the pilot office\nSkarrow\n\n  fairway \t# the dredged one\r\nC#\nKirkhaven Sound\n"
	got, err := lexicon.ReadWords(strings.NewReader(in), "house.txt")
	want := []string{"Skarrow", "fairway", "C#", "Kirkhaven Sound"}
	if err != nil || !slices.Equal(got, want) {
		t.Errorf("got %q, %v; want %q", got, err, want)
	}
}

func TestReadWordsErrors(t *testing.T) {
	tests := []struct{ name, in, want string }{
		{"not UTF-8", "Skarrow\nK\xf6ln\n", "house.txt:2: the line is not UTF-8: save the list as UTF-8 text, one word a line"},
		{"a long line", "Skarrow\n" + strings.Repeat("x", 70_000), "house.txt:2: the line is longer than 65536 bytes: put one word on a line"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			_, err := lexicon.ReadWords(strings.NewReader(tt.in), "house.txt")
			if err == nil || err.Error() != tt.want {
				t.Errorf("got %v, want %s", err, tt.want)
			}
		})
	}
}

func TestFromWords(t *testing.T) {
	l, err := lexicon.FromWords([]string{"Skarrow", "skarrow-bound", "McAuley's", "Kirkhaven Sound", "VTS", "fairway", "O\u2019Rourke"})
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for id := range uint32(l.Len()) {
		got = append(got, l.Canonical(id))
		if e := l.Entry(id); !e.Listed || e.Variety != lexicon.Both {
			t.Errorf("%s: %+v", l.Canonical(id), e)
		}
	}
	want := []string{"bound", "fairway", "Kirkhaven", "McAuley", "O'Rourke", "skarrow", "Sound", "VTS"}
	if !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
	if id, _ := l.ID([]byte("skarrow")); l.Entry(id).Cases != lexicon.LowerCase|lexicon.TitleCase {
		t.Errorf("cases of skarrow: %v", l.Entry(id).Cases)
	}
	if _, err := lexicon.FromWords([]string{strings.Repeat("z", 200)}); err == nil {
		t.Error("a word of 200 letters is no error")
	}
}
