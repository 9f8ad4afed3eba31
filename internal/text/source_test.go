package text_test

import (
	"go/ast"
	"go/parser"
	"go/token"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"unicode"

	"example.org/foulcase/internal/text"
)

// TestComments: which lines of comments are read, and which together.
func TestComments(t *testing.T) {
	for _, c := range []struct {
		name   string
		format text.Format
		source string
		want   string // blocks parted by bars
	}{
		{"lines join", "go", "// The pilot\n// boards.\n\n// The tug waits.\n", "The pilot\nboards.|The tug waits."},
		{"another column is another comment", "c", "// The pilot\n  // boards.\n", "The pilot|boards."},
		{"behind code", "c", "int a; // the pilot\nint b; // boards\n", "the pilot|boards"},
		{"below one behind code", "c", "int a; // the pilot\n       // boards\n", "the pilot\nboards"},
		{"paragraphs", "python", "# The pilot\n# boards.\n#\n# The tug waits.\n", "The pilot\nboards.|The tug waits."},
		{"lists", "go", "// Wanted:\n//   - a pilot\n//     with a boat\n//   - a tug\n", "Wanted:|- a pilot\nwith a boat|- a tug"},
		{"boxes", "c", "/**********\n * Pilots *\n **********/\n//-------\n// Tugs\n//=======\n", "Pilots *|Tugs"},
		{"code by indentation", "go", "// Moor it:\n//\n//\tm := moor(boat)\n//\tm.hold()\n//\n// Then wait.\n", "Moor it:|Then wait."},
		{"code between fences", "rust", "/// Moor it:\n/// ```\n/// the wrng code\n/// ```\n/// Then wait.\n", "Moor it:|Then wait."},
		{"code that was commented out", "c", "// x = moor(y);\n// if (x == 0) {\n// return;\n// }\n// Then wait for it.\n", "Then wait for it."},
		{"prose with code in it", "go", "// The boat is moored when x == y and the tide is out;\n// then wait.\n", "The boat is moored when x == y and the tide is out;\nthen wait."},
		{"directives", "go", "//go:build linux\n\n//nolint:all // why\n\n//lint:file-ignore X\n\n// +build linux\n\n// Wait.\n", "Wait."},
		{"tools", "python", "#!/bin/python\n# -*- coding: utf-8 -*-\n# vim: set ts=4:\n# type: ignore\n# fmt: off\n# check8: nocheck\n# check: disable=unused-thing\n#noqa\n# Wait.\n", "Wait."},
		{"tools by hyphen", "javascript", "/* check-disable no-console */\n// check-disable-next-line\n// Well-known pilots wait.\n", "Well-known pilots wait."},
		{"names", "c", "// Copyright 2031 Mirel Tollgarth\n// SPDX-License-Identifier: X\n/* @author Mirel Tollgarth */\n", ""},
		{"tags", "java", "/**\n * Moors it.\n * @param bxt the boat\n * @return {boolean} true when moored\n * @throws Xyz when not\n * @see Abc\n */", "Moors it.|the boat|true when moored|when not"},
		{"tags with backslashes", "cpp", "//! \\brief Moors it.\n//! \\param[in] bxt the boat\n//! as \\c bxt is.\n//! \\defgroup bxts The boats\n", "Moors it.|the boat\nas ￼ is.|The boats"},
		{"fields", "python", "\"\"\"Moor it.\n\n:param bxt: the boat\n:returns: the berth\n\"\"\"\n", "Moor it.|the boat|the berth"},
		{"members", "python", "\"\"\"Moor it.\n\nArgs:\n    bxt: the boat\n    tgs (list): the tugs\n        in a row\n\nNote: it waits.\n\"\"\"\n", "Moor it.|the boat|the tugs\nin a row|Note: it waits."},
		{"members with rules", "python", "\"\"\"Moor it.\n\nParameters\n----------\nbxt : int\n    The boat.\n\"\"\"\n", "Moor it.|The boat."},
		{"notes to do", "go", "// TODO(mtg): moor it.\n// NOTE: wait.\n", "moor it.\nNOTE: wait."},
		{"inline code", "go", "// Call `moor it` or ``x y``, not `this.\n", "Call ￼ or ￼, not `this."},
		{"chosen delimiters", "perl", "$a = q{don't}; $b =~ s/\"/it's/g; $b =~ tr{'} {\"}; @c = qw(a 'b); m!it's!; # The pilot\n$s = $y; %y = (q => 1); # boards\n", "The pilot|boards"},
		{"chosen delimiters of Ruby", "ruby", "a = %w[a 'b] + %(don't \"go) # The pilot\nb = c % 2; d = ?\" # boards\n", "The pilot|boards"},
		{"chosen delimiters not closed", "perl", "$a = q{don;\n# The pilot boards\n", "The pilot boards"},
		{"characters with question marks", "lisp", "(list ?\" ?; ?\\\") ; The pilot\n", "The pilot"},
		{"raw strings", "python", "a = r'the \\d pilot boards', Rb\"the C:\\new pilot boards\", for_'the pilot\\nboards'\n", "the pilot\nboards"},
		{"text of elements", "typescript", "a = <p>Don't board, it's late</p>; b = 'the pilot boards';\n", "the pilot boards"},
		{"not closed", "c", "int a; /* The pilot\n", ""},
		{"a string that its line does not close", "javascript", "p = <p>Don't</p> // lost\n// Then wait.\n", "Then wait."},
	} {
		if got := strings.Join(texts(t, c.source, c.format), "|"); got != c.want {
			t.Errorf("%s: %q, want %q", c.name, got, c.want)
		}
		checkReader(t, c.format, []byte(c.source))
	}
}

// TestStrings: which strings are prose.
func TestStrings(t *testing.T) {
	for literal, want := range map[string]string{
		`"the pilot is aboard"`:          "the pilot is aboard",
		`"cannot open %s: %-5.2f%%"`:     "cannot open ￼: ￼%",
		`"moor %(name)s at {berth}"`:     "moor ￼ at ￼",
		`"the \"tug\" and\tthe \u00e9t"`: "the \"tug\" and\tthe \u00e9t",
		`"don't wait"`:                   "don't wait",
		`"the <b>pilot</b> is aboard"`:   "the <b>pilot</b> is aboard",
		`"pilot"`:                        "",
		`"encoding/json x/y"`:            "",
		`"%s %d"`:                        "",
		`"SELECT name FROM boats"`:       "",
		`"^the (?:pilot|tug) [a-z]+$"`:   "",
		`"2006-01-02 15:04"`:             "",
		`"btn btn-large px-4"`:           "",
		`"let x = 1; y = 2"`:             "",
		`"C:\\boats and tugs"`:           "",
	} {
		if got := strings.Join(texts(t, "x = "+literal+"\n", "python"), "|"); got != want {
			t.Errorf("%s is read as %q, want %q", literal, got, want)
		}
	}
}

// TestStringEscapes: corrections are spelled as the delimiters want it, or not at
// all.
func TestStringEscapes(t *testing.T) {
	for _, c := range []struct {
		format              text.Format
		source, words, want string // "" for none
	}{
		{"go", `x = "the pilot"`, `say "x"`, `say \"x\"`},
		{"go", `x = "the pilot"`, `don't`, `don't`},
		{"go", "x = `the pilot`", "don't", "don't"},
		{"go", "x = `the pilot`", "a`b", ""},
		{"javascript", `x = 'the pilot'`, "don't", `don\'t`},
		{"sql", `x = 'the pilot'`, "don't", "don''t"},
		{"yaml", `x: 'the pilot'`, "don't", "don''t"},
		{"shell", `x='the pilot'`, "don't", ""},
		{"shell", `x="the pilot"`, "don't", "don't"},
		{"powershell", "x = \"the pilot\"", `"`, "`\""},
		{"rust", `x = r#"the pilot"#`, `"`, ""},
		{"python", `x = "the pilot"`, "a{b}", ""},
		{"c", "/* the pilot */", "a*/b", ""},
		{"c", "/* the pilot */", `don't "x"`, `don't "x"`},
		{"c", "// the pilot", `*/ "x"`, `*/ "x"`},
		{"python", "\"\"\"The pilot.\"\"\"", `"`, ""},
	} {
		all := blocks(t, c.source, c.format)
		if len(all) != 1 {
			t.Fatalf("%s %s: %d blocks", c.format, c.source, len(all))
		}
		if got, ok := all[0].Escape(c.words); ok != (c.want != "") || ok && got != c.want {
			t.Errorf("%s %s: %q is spelled %q (%v), want %q", c.format, c.source, c.words, got, ok, c.want)
		}
	}
}

// TestGoAgainstParser: what is read of this package's files lies in a comment or
// string of the standard library's parser, and of its comments those that look like
// sentences are read, whole.
func TestGoAgainstParser(t *testing.T) {
	paths, err := filepath.Glob("*.go")
	if err != nil || len(paths) < 10 {
		t.Fatalf("%d files, %v", len(paths), err)
	}
	sentences := 0
	for _, path := range paths {
		source, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		sentences += checkAgainstParser(t, path, source)
	}
	if sentences < 80 {
		t.Errorf("%d comments compared", sentences)
	}
}

func checkAgainstParser(t *testing.T, path string, source []byte) (compared int) {
	files := token.NewFileSet()
	parsed, err := parser.ParseFile(files, path, source, parser.ParseComments)
	if err != nil {
		t.Fatal(err)
	}
	allowed, read := make([]bool, len(source)), make([]bool, len(source))
	mark := func(set []bool, from, to int) {
		for i := from; i < to; i++ {
			set[i] = true
		}
	}
	offset := func(p token.Pos) int { return files.Position(p).Offset }
	for _, g := range parsed.Comments {
		mark(allowed, offset(g.Pos()), offset(g.End()))
	}
	ast.Inspect(parsed, func(n ast.Node) bool {
		if l, ok := n.(*ast.BasicLit); ok && l.Kind == token.STRING {
			mark(allowed, offset(l.Pos())+1, offset(l.End())-1)
		}
		return true
	})
	for _, b := range blocks(t, string(source), "go") {
		from, to := b.Source(0, len(b.Text))
		mark(read, int(from), int(to))
		if slices.Contains(allowed[from:to], false) {
			t.Errorf("%s: %q is outside of comments and strings", path, b.Text)
		}
	}
	for _, g := range parsed.Comments {
		content := strings.TrimSpace(g.Text())
		if len(content) < 20 || !unicode.IsUpper(rune(content[0])) || !strings.HasSuffix(content, ".") || strings.Contains(content, "\n\n") {
			continue
		}
		compared++
		first, last := offset(g.Pos())+3, offset(g.End())-1
		if !read[first] || !read[last] {
			t.Errorf("%s: the comment %q is not read whole", path, content)
		}
	}
	return compared
}

// TestHostileSource: much of what only opens comes to an end, and what comes before it
// is read.
func TestHostileSource(t *testing.T) {
	for _, f := range sourceFormats() {
		for _, opening := range []string{"\"", "'", "`", "/*", "{-", "(*", "(/[", "\"${", "\"\\", "<<A\n", "r#", "\"{", "\"#{\"", "# `a ``", "// `", "--[=", "$a$", "@{ \\c "} {
			source := strings.Repeat(opening, 1<<15/len(opening))
			checkOrder(t, f, source)
			checkOrder(t, f, "// the pilot "+source+"\n")
		}
	}
}

// checkOrder reads all blocks and checks their order alone.
func checkOrder(t *testing.T, f text.Format, source string) {
	t.Helper()
	last := int64(-1)
	for _, b := range blocks(t, source, f) {
		from, to := b.Source(0, len(b.Text))
		if from <= last || to > int64(len(source)) {
			t.Fatalf("%s: block at %d..%d after %d", f, from, to, last)
		}
		last = from
	}
}

// FuzzSource reads the bytes as each language.
func FuzzSource(f *testing.F) {
	for _, s := range sourceSamples {
		f.Add([]byte(s.source))
	}
	f.Add([]byte("0\x83"))
	formats := sourceFormats()
	f.Fuzz(func(t *testing.T, source []byte) {
		for _, format := range formats {
			checkReader(t, format, source)
		}
	})
}
