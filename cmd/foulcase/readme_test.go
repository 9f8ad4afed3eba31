package main

import (
	"flag"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"strings"
	"sync"
	"testing"
)

var update = flag.Bool("update", false, "write what the examples of the README print into it")

// binary is foulcase as the README has it built, made once for all tests.
var binary struct {
	sync.Once
	dir string
	err error
	out []byte
}

// builtBinary builds foulcase and returns the folder that holds it.
func builtBinary(t *testing.T) string {
	t.Helper()
	binary.Do(func() {
		if binary.dir, binary.err = os.MkdirTemp("", "foulcase-*"); binary.err != nil {
			return
		}
		build := exec.Command("go", "build", "-buildvcs=auto", "-o", filepath.Join(binary.dir, exe("foulcase")), ".")
		binary.out, binary.err = build.CombinedOutput()
	})
	if binary.err != nil {
		t.Fatalf("go build: %v\n%s", binary.err, binary.out)
	}
	return binary.dir
}

func exe(name string) string {
	if runtime.GOOS == "windows" {
		return name + ".exe"
	}
	return name
}

// TestReadme runs the command lines that README.md shows in blocks marked
// "console", after "$ ", and compares what they print with what it shows below
// them. A line "..." stands for any lines. With -update it writes what they
// print into README.md instead, blocks with "..." aside.
func TestReadme(t *testing.T) {
	path := filepath.Join(projectRoot(t), "README.md")
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	dir := workFolder(t)
	ran := 0
	var rewritten strings.Builder
	for _, part := range splitConsole(string(data)) {
		if part.command == "" {
			rewritten.WriteString(part.text)
			continue
		}
		ran++
		got, _ := shell(t, dir, part.command)
		switch {
		case *update && !strings.Contains(part.text, "\n...\n"):
			part.text = got
		case !matchesShown(got, part.text):
			t.Errorf("$ %s\nprints\n%s\nand README.md shows\n%s", part.command, got, part.text)
		}
		rewritten.WriteString("$ " + part.command + "\n" + part.text)
	}
	if ran == 0 {
		t.Error("README.md shows no command line")
	}
	if *update && rewritten.String() != string(data) {
		if err := os.WriteFile(path, []byte(rewritten.String()), 0o644); err != nil {
			t.Fatal(err)
		}
	}
}

// consolePart is a stretch of README.md: a command line with what it prints,
// or, where command is empty, anything else.
type consolePart struct{ command, text string }

// splitConsole cuts a Markdown text at the command lines of its console blocks.
// The parts, put together again, are the text.
func splitConsole(markdown string) []consolePart {
	parts := []consolePart{{}}
	inside := false
	for line := range strings.Lines(markdown) {
		command, isCommand := strings.CutPrefix(line, "$ ")
		switch {
		case strings.HasPrefix(line, "```"):
			if inside {
				parts = append(parts, consolePart{})
			}
			inside = strings.TrimSpace(line) == "```console"
		case inside && isCommand:
			parts = append(parts, consolePart{command: strings.TrimSuffix(command, "\n")})
			continue
		}
		parts[len(parts)-1].text += line
	}
	return parts
}

// matchesShown tells whether a command printed what is shown of it.
func matchesShown(got, shown string) bool {
	pieces := strings.Split("\n"+shown, "\n...\n")
	rest := "\n" + got
	for i, piece := range pieces {
		last := i == len(pieces)-1
		switch {
		case i == 0 && last:
			return rest == piece
		case i == 0:
			if !strings.HasPrefix(rest, piece+"\n") {
				return false
			}
			rest = rest[len(piece):]
		case last:
			return strings.HasSuffix(rest, "\n"+piece)
		default:
			at := strings.Index(rest, "\n"+piece+"\n")
			if at < 0 {
				return false
			}
			rest = rest[at+1+len(piece):]
		}
	}
	return true
}

func TestMatchesShown(t *testing.T) {
	for _, test := range []struct {
		got, shown string
		want       bool
	}{
		{"a\nb\n", "a\nb\n", true},
		{"a\nb\n", "a\n", false},
		{"", "", true},
		{"a\nb\nc\n", "a\n...\n", true},
		{"a\nb\nc\n", "...\nc\n", true},
		{"a\nb\nc\n", "a\n...\nc\n", true},
		{"a\nb\nc\nd\n", "a\n...\nc\n...\n", true},
		{"a\nb\nc\n", "b\n...\n", false},
		{"a\nb\nc\n", "a\n...\nb\n", false},
		{"a\nb\nc\n", "...\nx\n...\n", false},
	} {
		if got := matchesShown(test.got, test.shown); got != test.want {
			t.Errorf("matchesShown(%q, %q) = %v", test.got, test.shown, got)
		}
	}
}

func TestSplitConsole(t *testing.T) {
	text := "# A\n```sh\n$ not this\n```\n```console\n$ one\n1\n$ two\n```\nend\n"
	parts := splitConsole(text)
	var again, commands strings.Builder
	for _, p := range parts {
		if p.command != "" {
			again.WriteString("$ " + p.command + "\n")
			commands.WriteString(p.command + "=" + p.text + ";")
		}
		again.WriteString(p.text)
	}
	if again.String() != text {
		t.Errorf("put together again: %q", again.String())
	}
	if got, want := commands.String(), "one=1\n;two=;"; got != want {
		t.Errorf("commands %q, want %q", got, want)
	}
}
