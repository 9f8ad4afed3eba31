package text_test

import (
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

func TestSentences(t *testing.T) {
	for _, want := range [][]string{
		{"The tide turned.", "The boat left."},
		{"Mr. Brook met Dr. Hale at St. Anne's Quay.", "They left."},
		{"J. Brook and A. B. Hale signed it.", "It was late."},
		{"A. Brook signed."},
		{"The draught was 4.5 m.", "The bar had 3.2 m."},
		{"Well... Perhaps not."},
		{"Well\u2026 Perhaps not."},
		{"He waited . . . and then left.", "Nobody came."},
		{"He waited. . . .", "Nobody came."},
		{"Is it fog?", "It is!", "Then wait."},
		{"\u201CIs it fog?\u201D he asked.", "\u201CNo.\u201D", "\u201CGood.\u201D"},
		{"\"Wait!\" he said.", "(They waited.)", "Then it cleared."},
		{"He flew to the U.S. in May."},
		{"She left the U.S.", "The fog stayed."},
		{"Report at 5 p.m. on Monday.", "Bring rope, chain, etc. and paint.", "Bring rope, etc.", "Pilots must report."},
		{"See fig. 3 and no. 7 and p. 12 of vol. 2.", "He said no.", "She left."},
		{"Signed in Jan. 2020 by Harbour Ltd. for the office.", "The march.", "They sat.", "Nobody came."},
		{"Use e.g. Dover, i.e. the port.", "Then stop."},
		{"1. Slow down.", "2. Sound the horn."},
		{"a. Slow down."},
		{"Take plan B.", "Then leave.", "Take vitamin C.", "It helps."},
		{"See tides.csv.", "Then www.skarrow.example/x.", "Done."},
		{"in lower case all the way.", "nobody minds.", "so be it."},
		{"The first line\ngoes on here.", "Then stops."},
		{"She said so.[3]", "Then left."},
		{"Stop.", "Go!", "What?!", "Yes."},
		{"They asked for nos. 4 and 5.", "There were none."},
		{"The capt. said so."},
	} {
		if got := bounds(strings.Join(want, " ")); !slices.Equal(got, want) {
			t.Errorf("got %q, want %q", got, want)
		}
	}
}

// TestSentenceBreaks has the breaks that no single space stands for.
func TestSentenceBreaks(t *testing.T) {
	for _, c := range []struct {
		in   string
		want []string
	}{
		{"A heading\n\nThe tide turned", []string{"A heading", "The tide turned"}},
		{"A heading\r\n\r\nThe tide", []string{"A heading", "The tide"}},
		{"A heading\r\rThe tide", []string{"A heading", "The tide"}},
		{"one\r\nline", []string{"one\r\nline"}},
		{"A heading\n \t\nThe tide", []string{"A heading", "The tide"}},
		{"one\u2029two", []string{"one", "two"}},
		{"The tide turned.The boat left!They stayed.", []string{"The tide turned.", "The boat left!", "They stayed."}},
		{"He said , \" No . \" Then he left .", []string{"He said , \" No . \"", "Then he left ."}},
		{"He left . \" Then go , \" she said .", []string{"He left .", "\" Then go , \" she said ."}},
		{"", nil},
		{" \n\t\n", nil},
	} {
		if got := bounds(c.in); !slices.Equal(got, c.want) {
			t.Errorf("%q: got %q, want %q", c.in, got, c.want)
		}
	}
}

// TestAbbreviationPoint: the point of an abbreviation is Other, and that of an
// initial is part of it.
func TestAbbreviationPoint(t *testing.T) {
	got := sentences("Mr. J. Brook left.")
	want := []string{"Mr +Other(.) Acronym(J.) Brook left +Terminal(.)"}
	if !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}

// TestLongSentence: text without an end is cut.
func TestLongSentence(t *testing.T) {
	in := strings.Repeat("fog ", 5000)
	n := 0
	var s text.Segmenter
	for sentence := range s.Sentences([]byte(in)) {
		if n += len(sentence.Tokens); len(sentence.Tokens) > 1100 {
			t.Errorf("a sentence of %d tokens", len(sentence.Tokens))
		}
	}
	if n != 5000 {
		t.Errorf("%d tokens, want 5000", n)
	}
}

// TestLongRuns: runs of marks without white space are read in good time.
func TestLongRuns(t *testing.T) {
	for _, unit := range []string{"=", "=>", ":=", "/=", "'='", "(=", ",=", ".=", "a=,", "<", "`", "''", "a.", ".a", "-a", "a/", "\u2019", "\u20AC", "_", "@", "1.", "1-", "x1-", "a'", "\u0301", "\xff"} {
		checkTokens(t, []byte(strings.Repeat(unit, 100_000/len(unit))))
	}
}

// TestStopEarly: the loop may end before the text does, and begin anew.
func TestStopEarly(t *testing.T) {
	var s text.Segmenter
	block := []byte("One tide. Two tides.")
	for range 2 {
		for sentence := range s.Sentences(block) {
			if sentence.Start != 0 {
				t.Fatalf("began at %d", sentence.Start)
			}
			break
		}
	}
}

func TestSegmenterAllocatesNothing(t *testing.T) {
	block := []byte("The Pilot's cafe\u0301 \u2014 \u201CNa\u00EFve?\u201D \u2014 in the U.S. at 10:30 of foo_bar, J. Brook\u2019s HMS well-known https://x.y/z \u0130I. " +
		"On 12.05.2021 at 192.168.0.1 the AT&T <a b> {c} `d e` $f --g h/i j.k (l()) XIV PCs McDonald 1.2.3 5\u00D710\u00B3 km\u00B2 'tis \u20187\u2019. " +
		"NOTICE TO MASTERS, e.g. 5kg of \u6E2F\u53E3 and \U0001F600.")
	var s text.Segmenter
	run := func() {
		for sentence := range s.Sentences(block) {
			_ = sentence
		}
	}
	run()
	if n := testing.AllocsPerRun(100, run); n != 0 {
		t.Errorf("%v allocations a run, want 0", n)
	}
}
