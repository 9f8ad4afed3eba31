package text_test

import (
	"testing"

	"example.org/foulcase/internal/text"
)

// TestLeftAlone holds each rule to the runs it takes as one token.
func TestLeftAlone(t *testing.T) {
	for kind, runs := range map[text.Kind][]string{
		text.Literal: {
			"https://skarrow.example/a?b=c&d=(e)", "ftp://x.y", "www.skarrow.example/notices", "mailto:watch@skarrow.example",
			"watch.room@skarrow.example", "skarrow.example", "notices.skarrow.example.org", "@duty_pilot", "#fog", "#include",
			"/etc/fstab", "/var/log/pilot/", "~/notices", "./run", "../run", `C:\Logs\fog.txt`, "C:/Logs", `\\server\share`,
			"docs/", "src/main.go", "log-2.txt", "a//b", "I/O", "n/a",
			"camelCase", "tideTable", "HTTPServer", "iPhone", "GitHub", "TideTable's",
			"snake_case", "__init__", "MAX_DRAUGHT", "_private_name", "tide.height.max", "tides.csv", ".gitignore", "os.Open",
			"--like-this", "-x", "-rf", "--depth=3", "$HOME", "${HOME}", "%s", "%20d", "tide()", "tide.at()", "std::vector", "x=5", "a+b", "Ctrl+C",
			"C++", "F#", "x^2", "a|b", "p<0.05", "5->7",
			"1.2.3", "v2.0", "v1.2.3-rc1", "192.168.0.1", "2.0.1",
			"550e8400-e29b-41d4-a716-446655440000", "deadbeef01", "0x1F4a", "dGlkZQ0=", "H2O", "B2B", "COVID-19", "F-16", "A4", "mp3", "3D",
			"<name>", `<a href="x y">`, "<your name>", "{berth}", "{{ berth }}", "`go run`", "``x`y``",
			"x", "B", "iv", "xiii", "\uFFFC", "\uFFFCs",
			"caf\xe9", "\xffabc", "naïve\u043d",
		},
		text.Number: {
			"7", "1,000", "1,000,000.5", "3.14", ".5", "-5", "\u22125", "+3", "\u00B12", "<5", "\u22656", "~20", "1e-6", "5\u00D710\u00B3", "\u00BD", "3\u00BD", "10^6",
			"15%", "20\u00B0C", "46\u00B0", "10km", "5kg", "12kn", "60km/h", "12m\u00B2", "2x", "100k+", "3rd", "21st", "1980s", "'80s", "\u201990s", "1990's",
			"10:30", "10.30pm", "5pm", "12/05/2021", "12.05.2021", "2021-05-12", "2021-05-12T10:00Z", "2-16-02", "1990\u20132000", "9-5", "3:1", "24/7",
			"$5", "US$1,200.50", "\u00A33.50m", "\u20AC20", "20\u20AC", "$5-$10", "#1", "1920x1080", "5'10",
			"II", "XIV", "MCMXCIV", "VIII",
		},
		text.Acronym: {
			"NASA", "PC", "PCs", "NASAs", "NASA's", "NASA\u2019s", "USA", "R&D", "Q&A", "U.S.", "U.S", "U.S.A.", "e.g.", "i.e.", "a.m.", "p.m.", "a.k.a.",
			"Ph.D.", "M.Sc.", "U.N.'s", "MIX", "CD", "IDs", "BBSes",
		},
		text.Word: {
			"berth", "Berth", "caf\u00E9", "cafe\u0301", "na\u00EFve", "\u00D8re", "McDonald", "MacGregor", "O'Neill", "O\u2019Neill\u2019s", "D'Artagnan", "DeVito",
			"don't", "don\u2019t", "don`t", "don\u00B4t", "DON'T", "dog's", "o'clock", "rock'n'roll", "'tis", "\u2019Tis", "\u2018twas", "'em", "n't", "'s", "'ll",
			"NOTICE", "UNESCO", "a", "A", "I", "i", "co\u00ADop", "Hawai\u02BBi", "l\u00B7l",
		},
		text.Other: {"&", "=", "\U0001F600", "\U0001F469\u200D\U0001F680", "\u6E2F\u53E3", "\u03BB\u03CC\u03B3\u03BF\u03C2", "\u0440\u0435\u043A\u0430", "\u00A9", "\x00", "\x1b", "\xf0\x28\x8c"[:1]},
		text.Stop:  {":", ";", "/", "\u2014", "--", "...", "\u2026", "-", ". . ."},
	} {
		for _, run := range runs {
			if got := sentences(run); len(got) != 1 || got[0] != wrapped(kind, run) {
				t.Errorf("%q: got %q, want one %v", run, got, kind)
			}
		}
	}
}

func wrapped(kind text.Kind, run string) string {
	if kind == text.Word {
		return run
	}
	return kind.String() + "(" + run + ")"
}

// TestParts holds runs to the tokens they fall into.
func TestParts(t *testing.T) {
	for _, c := range []struct{ in, want string }{
		{"well-known", "well +Hyphen(-) +known"},
		{"well\u2010known", "well +Hyphen(\u2010) +known"},
		{"Dover\u2013Calais", "Dover +Hyphen(\u2013) +Calais"},
		{"pre- and", "pre +Hyphen(-) and"},
		{"-ish", "Hyphen(-) +ish"},
		{"quay - berth", "quay Stop(-) berth"},
		{"quay\u2014berth", "quay +Stop(\u2014) +berth"},
		{"quay--berth", "quay +Stop(--) +berth"},
		{"and/or", "and +Stop(/) +or"},
		{"TCP/IP", "Acronym(TCP) +Stop(/) +Acronym(IP)"},
		{"dogs'", "dogs +Quote(')"},
		{"'quay'", "Quote(') +quay +Quote(')"},
		{"'em'", "Quote(') +em +Quote(')"},
		{"\u201Cquay,\u201D", "Quote(\u201C) +quay +Comma(,) +Quote(\u201D)"},
		{"(see", "Open(() +see"},
		{"pilot(s)", "pilot +Open(() +Literal(s) +Close())"},
		{"5-101(a)(2)", "Number(5-101) +Open(() +a +Close()) +Open(() +Number(2) +Close())"},
		{"(1914\u20131918),", "Open(() +Number(1914\u20131918) +Close()) +Comma(,)"},
		{"\"U.S", "Quote(\") +Acronym(U.S)"},
		{"10-knot", "Number(10) +Hyphen(-) +knot"},
		{"5-year-old", "Number(5) +Hyphen(-) +year +Hyphen(-) +old"},
		{"20th-century", "Number(20th) +Hyphen(-) +century"},
		{"mid-1990s", "mid +Hyphen(-) +Number(1990s)"},
		{"U.S.-led", "Acronym(U.S.) +Hyphen(-) +led"},
		{"non-U.S.", "non +Hyphen(-) +Acronym(U.S.)"},
		{"10 kg", "Number(10) Literal(kg)"},
		{"*very*", "Other(*) +very +Other(*)"},
		{"_very_", "Other(_) +very +Other(_)"},
		{"https://x.y/z.", "Literal(https://x.y/z) +Terminal(.)"},
		{"(www.skarrow.example)", "Open(() +Literal(www.skarrow.example) +Close())"},
		{"<https://x.y>,", "Literal(<https://x.y>) +Comma(,)"},
		{"tide.csv,", "Literal(tide.csv) +Comma(,)"},
		{"...Berth", "Stop(...) +Berth"},
		{"word,word", "word +Comma(,) +word"},
		{"note:this", "note +Stop(:) +this"},
		{"the `tide max` is", "the Literal(`tide max`) is"},
		{"``quoted''", "Quote(``) +quoted +Quote('')"},
		{"a {b c} d", "a Open({) +Literal(b) Literal(c) +Close(}) Literal(d)"},
		{"do n't , what 's", "do n't Comma(,) what 's"},
		{"the dogs ' bowl", "the dogs Quote(') bowl"},
		{"b\u00ADerth \u00A0quay\u2003pier\u200Bbow", "b\u00ADerth quay pier bow"},
	} {
		got := sentences(c.in)
		if len(got) != 1 || got[0] != c.want {
			t.Errorf("%q: got %q, want %q", c.in, got, c.want)
		}
	}
}

// TestCapitalHeading: the short words of a heading in capitals are words.
func TestCapitalHeading(t *testing.T) {
	for in, want := range map[string]string{
		"NOTICE TO ALL MASTERS":    "NOTICE TO ALL MASTERS",
		"NOTICE to NASA":           "NOTICE to Acronym(NASA)",
		"NASA AND EU":              "Acronym(NASA) Acronym(AND) Acronym(EU)",
		"WHAT IS THE R&D FOR":      "WHAT IS THE Acronym(R&D) FOR",
		"NASA, ESA, EU, UN":        "Acronym(NASA) +Comma(,) Acronym(ESA) +Comma(,) Acronym(EU) +Comma(,) Acronym(UN)",
		"MASTERS OF THE U.S. NAVY": "MASTERS OF THE Acronym(U.S.) NAVY",
	} {
		if got := sentences(in); len(got) != 1 || got[0] != want {
			t.Errorf("%q: got %q, want %q", in, got, want)
		}
	}
}
