package main

import (
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
	"unicode/utf16"
	"unicode/utf8"
)

// slip is a form of the demo document that is marked, and the correction of it that
// comes first.
type slip struct{ observed, corrected string }

// demoSlips are those of testdata/clients/watch-note.md, in the order of the text. On
// most of their lines astral or combining characters stand before them.
var demoSlips = []slip{
	{"hydralic", "hydraulic"},
	{"maintainance", "maintenance"},
	{"the the", "the"},
	demoRetyped,
	{demoHouseWord, "lookout"},
}

// demoHouseWord is a form of the demo document that is made a house word.
const demoHouseWord = "lookoute"

// demoRetyped is corrected by hand.
var demoRetyped = slip{"alot", "a lot"}

// shown is what an editor shows at some moment.
type shown struct {
	Text  string
	Marks []shownMark
}

// shownMark is a mark: its line and columns from 0, in the units of the editor, and
// what it covers as the editor sees it.
type shownMark struct {
	Line, Start, Stop int
	Covers, Message   string
}

// session is what an editor reports: what it shows when the document is open, when the
// first slip is corrected, when demoHouseWord is a house word besides, and when a hand
// has changed every line and retyped a slip, which a session need not do.
type session struct{ Opened, Corrected, Housed, Typed shown }

// TestNeovim: a session of neovim, whose columns are bytes, set up as the README says.
func TestNeovim(t *testing.T) {
	nvim := client(t, "nvim")
	for name, lineEnd := range map[string]string{"LF": "\n", "CRLF": "\r\n"} {
		t.Run(name, func(t *testing.T) {
			p := newProject(t, "watch-note.md", lineEnd)
			var s session
			p.run(t, &s, nvim, "--headless", "-i", "NONE", "-n",
				"-u", clientFile(t, "neovim.lua"), "-S", clientFile(t, "neovim-session.lua"))
			text := s.checkTyped(t, func(before string) int { return len(before) })
			p.checkFiles(t, text, lineEnd)
		})
	}
}

// TestNeovimFileTypes: documents and source code are read by the types that neovim knows
// them by, and marked in their prose alone.
func TestNeovimFileTypes(t *testing.T) {
	nvim := client(t, "nvim")
	const prose, misspelt = "The hydralic pump of the ladder is slow.", "hydralic"
	files := map[string]string{
		"note.txt":           prose,
		"note.md":            "# The watch\n\n`untill` " + prose,
		"note.rst":           "The watch\n=========\n\n``untill`` " + prose,
		"note.adoc":          "= The watch\n\n`+untill+` " + prose,
		"paper.tex":          "\\documentclass{article}\n\\begin{document}\n\\label{untill}" + prose + "\n\\end{document}\n",
		"part.tex":           "\\label{untill}" + prose,
		"note.html":          "<p class='untill'>" + prose + "</p>",
		"mutt-pilots-1000-7": "Message-ID: <untill@pilots.example>\nSubject: The watch\n\n" + prose,
		"COMMIT_EDITMSG":     prose,
		"pump.c":             "int untill; /* " + prose + " */\n",
		"pump.go":            "package untill\n\n// " + prose + "\n",
		"pump.js":            "let untill // " + prose + "\n",
		"pump.py":            "untill = 1 # " + prose + "\n",
		"pump.sh":            "untill=1 # " + prose + "\n",
	}
	p := newFolder(t, files)
	marked := map[string][]string{}
	p.run(t, &marked, nvim, "--headless", "-i", "NONE", "-n",
		"-u", clientFile(t, "neovim.lua"), "-S", clientFile(t, "neovim-types.lua"))
	for name := range files {
		if got := marked[name]; !slices.Equal(got, []string{misspelt}) {
			t.Errorf("%s: marked %q, want %q", name, got, misspelt)
		}
	}
}

// TestEmacs: a session of emacs with eglot, whose columns are code points, set up as
// the README says.
func TestEmacs(t *testing.T) {
	emacs := client(t, "emacs")
	p := newProject(t, "watch-note.txt", "\n")
	load := "(progn (package-activate-all) (unless (locate-library \"eglot\") (kill-emacs 77)))"
	if out, err := p.command(t, emacs, "--batch", "-q", "--no-site-file", "--eval", load).CombinedOutput(); err != nil {
		missing(t, "emacs has no eglot: %v\n%s", err, out)
	}
	var s session
	p.run(t, &s, emacs, "--batch", "-q", "--no-site-file", "--eval", load, "-l", clientFile(t, "emacs.el"), "-l", clientFile(t, "emacs-session.el"))
	text := s.checkTyped(t, utf8.RuneCountInString)
	p.checkFiles(t, text, "\n")
}

// TestProtocolClient: a session of the client library of the protocol's authors, which
// pulls diagnostics, cancels, and counts columns in bytes, then in UTF-16.
func TestProtocolClient(t *testing.T) {
	npm, node := client(t, "npm"), client(t, "node")
	library := t.TempDir()
	for _, name := range []string{"package.json", "package-lock.json", "protocol-session.mjs"} {
		copyFile(t, clientFile(t, name), filepath.Join(library, name))
	}
	install := exec.Command(npm, "ci", "--ignore-scripts", "--no-audit", "--no-fund")
	install.Dir = library
	if out, err := install.CombinedOutput(); err != nil {
		missing(t, "npm ci: %v\n%s", err, out)
	}
	for unit, width := range map[string]func(string) int{
		"utf-8":  func(before string) int { return len(before) },
		"utf-16": func(before string) int { return len(utf16.Encode([]rune(before))) },
	} {
		t.Run(unit, func(t *testing.T) {
			p := newProject(t, "watch-note.md", "\r\n")
			var s session
			p.run(t, &s, node, filepath.Join(library, "protocol-session.mjs"), unit)
			s.check(t, width)
		})
	}
}

// client finds the program of an editor.
func client(t *testing.T, name string) string {
	t.Helper()
	if testing.Short() {
		t.Skip("starts an editor")
	}
	path, err := exec.LookPath(name)
	if err != nil {
		missing(t, "%v", err)
	}
	return path
}

// missing skips a test for want of a program; with FOULCASE_CLIENTS=1 in the
// environment, the test fails.
func missing(t *testing.T, format string, args ...any) {
	t.Helper()
	if os.Getenv("FOULCASE_CLIENTS") == "1" {
		t.Fatalf(format, args...)
	}
	t.Skipf(format, args...)
}

// clientFile is the path of a file in testdata/clients.
func clientFile(t *testing.T, name string) string {
	t.Helper()
	return filepath.Join(projectRoot(t), "cmd", "foulcase", "testdata", "clients", name)
}

func copyFile(t *testing.T, from, to string) {
	t.Helper()
	data, err := os.ReadFile(from)
	if err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(to, data, 0o644); err != nil {
		t.Fatal(err)
	}
}

// check compares what an editor showed with the demo document, whose columns width
// counts. It returns the text when the house word is one, and the slips left.
func (s session) check(t *testing.T, width func(before string) int) (string, []slip) {
	t.Helper()
	text := demoText(t)
	s.Opened.check(t, "opened", text, demoSlips, width)
	text = demoSlips[0].correct(text)
	s.Corrected.check(t, "corrected", text, demoSlips[1:], width)
	left := slices.DeleteFunc(slices.Clone(demoSlips[1:]), func(s slip) bool { return s.observed == demoHouseWord })
	s.Housed.check(t, "with a house word", text, left, width)
	return text, left
}

// checkTyped is check for a session in which a hand changed the text at last. It returns
// the text at the end.
func (s session) checkTyped(t *testing.T, width func(before string) int) string {
	t.Helper()
	text, left := s.check(t, width)
	text = demoRetyped.correct(regexp.MustCompile("(?m)^.").ReplaceAllString(text, "🪢 $0"))
	left = slices.DeleteFunc(left, func(s slip) bool { return s == demoRetyped })
	s.Typed.check(t, "typed", text, left, width)
	return text
}

// correct corrects the slip where it stands first.
func (s slip) correct(text string) string {
	return strings.Replace(text, s.observed, s.corrected, 1)
}

// check compares what is shown with a text, whose lines end with LF, and its slips.
func (s shown) check(t *testing.T, when, text string, slips []slip, width func(before string) int) {
	t.Helper()
	if s.Text != text {
		t.Errorf("%s: the text is\n%q, want\n%q", when, s.Text, text)
	}
	if len(s.Marks) != len(slips) {
		t.Fatalf("%s: %d marks, want %d: %+v", when, len(s.Marks), len(slips), s.Marks)
	}
	for i, got := range s.Marks {
		at := strings.Index(text, slips[i].observed)
		lineStart := strings.LastIndexByte(text[:at], '\n') + 1
		want := shownMark{
			Line:    strings.Count(text[:at], "\n"),
			Start:   width(text[lineStart:at]),
			Stop:    width(text[lineStart : at+len(slips[i].observed)]),
			Covers:  slips[i].observed,
			Message: got.Message,
		}
		if got != want {
			t.Errorf("%s: shown is %+v, want %+v", when, got, want)
		}
		for _, form := range []string{slips[i].observed, slips[i].corrected} {
			if !strings.Contains(got.Message, `"`+form+`"`) {
				t.Errorf("%s: the message %q does not name %q", when, got.Message, form)
			}
		}
	}
}
