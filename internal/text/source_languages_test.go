package text_test

import (
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// sourceSamples are the comments and strings of a language as it writes them, with
// what must not end or begin one; and the blocks to be read, parted by bars.
var sourceSamples = map[text.Format]struct{ source, want string }{
	"go":         {"package p\n\n// Moor the launch.\nvar q = '\"' // stays moored\n\nvar s = \"no \\\"pilot\\\" aboard\" + `raw // words here`\n", `Moor the launch.|stays moored|no "pilot" aboard|raw // words here`},
	"c":          {"/* Moor the\n * launch. */\n#include \"a b.h\"\nchar c = '\"', d = '\\''; // stays moored\nputs(\"no \\\"pilot\\\" aboard\\n\");\n", "Moor the\nlaunch.|stays moored|no \"pilot\" aboard"},
	"cpp":        {"int n = 1'000'000; // stays moored\nauto s = R\"x(no )\" pilot aboard)x\"; auto c = L'\"';\n/// Moor it.\n", `stays moored|no )" pilot aboard|Moor it.`},
	"csharp":     {"/// Moor the launch.\nvar p = @\"c:\\\", s = @\"no \"\"pilot\"\" aboard\"; // stays moored\nvar t = $\"the {name} is here\";\n", `Moor the launch.|no "pilot" aboard|stays moored|the ￼ is here`},
	"clojure":    {"; Moor the launch.\n(def c \\\") (def s \"no pilot\naboard\") ;; stays moored\n", "Moor the launch.|no pilot\naboard|stays moored"},
	"css":        {"/* Moor the launch. */\na::after { content: \"no pilot aboard\"; background: url(http://x//y) }\n", "Moor the launch.|no pilot aboard"},
	"dart":       {"/* Moor /* the */ launch. */\nvar s = \"no ${f(\"x\")} pilot aboard\"; // stays moored\n", "Moor /* the */ launch.|no ￼ pilot aboard|stays moored"},
	"dockerfile": {"# Moor the launch.\nRUN echo \"it's # no comment\"\n", "Moor the launch."},
	"elixir":     {"# Moor the launch.\n@doc \"\"\"\nno pilot aboard\n\"\"\"\ns = \"the #{f(\"x\")} is here\" # stays moored\n", "Moor the launch.|no pilot aboard|the ￼ is here|stays moored"},
	"erlang":     {"%% Moor the launch.\nf() -> 'it''s', \"no pilot aboard\". % stays moored\n", "Moor the launch.|no pilot aboard|stays moored"},
	"fortran":    {"! Moor the launch.\nprint *, 'the pilot''s boat' ! stays moored\n", "Moor the launch.|the pilot's boat|stays moored"},
	"fsharp":     {"(* Moor (* the *) launch. *)\nlet f (x: 'a) = '\"' // stays moored\nlet s = \"no pilot aboard\"\n", "Moor (* the *) launch.|stays moored|no pilot aboard"},
	"graphql":    {"\"\"\"\nMoor the launch.\n\"\"\"\ntype A { b: C } # stays moored\n", "Moor the launch.|stays moored"},
	"groovy":     {"/* Moor the launch. */\ndef s = \"no ${x} aboard the launch\" // stays moored\n", "Moor the launch.|no ￼ aboard the launch|stays moored"},
	"haskell":    {"-- | Moor the launch.\nfoldl' f '\"' {- stays {- well -} moored -} = \"no pilot aboard\"\n", "Moor the launch.|stays {- well -} moored|no pilot aboard"},
	"ini":        {"; Moor the launch.\nkey = it's ; no comment\n# stays moored\n", "Moor the launch.|stays moored"},
	"java":       {"/**\n * Moor {@code x} the launch.\n * @param n the number of boats\n */\nchar c = '\"'; String s = \"no pilot aboard\"; // stays moored\n", "Moor ￼ the launch.|the number of boats|no pilot aboard|stays moored"},
	"javascript": {"const r = /[\"'/]/g; // Moor the launch.\nconst s = `the ${f(`a ${b}`)} is here`, t = 'it\\'s no pilot';\na = b / c; // stays moored\n", "Moor the launch.|the ￼ is here|it's no pilot|stays moored"},
	"julia":      {"#= Moor the launch. =#\nb = a' # stays moored\n\"\"\"\nno pilot aboard\n\"\"\"\nc = '\"'\n", "Moor the launch.|stays moored|no pilot aboard"},
	"kotlin":     {"/* Moor /* the */ launch. */\nval s = \"no ${m[\"x\"]} is aboard\" // stays moored\nval c = '\"'\n", "Moor /* the */ launch.|no ￼ is aboard|stays moored"},
	"lisp":       {";;; Moor the launch.\n(setq c ?\\\" s \"no pilot aboard\") ; stays moored\n", "Moor the launch.|no pilot aboard|stays moored"},
	"lua":        {"--[==[ Moor ]] the launch. ]==]\nx = [[no pilot aboard]] -- stays moored\n", "Moor ]] the launch.|no pilot aboard|stays moored"},
	"make":       {"# Moor the launch.\nall: it's # stays moored\n\techo \\# it is none\n", "Moor the launch.|stays moored"},
	"ocaml":      {"(* Moor the launch. *)\nlet f (x : 'a) = '\"' and s = {q|no pilot aboard|q}\n", "Moor the launch.|no pilot aboard"},
	"pascal":     {"{ Moor the launch. }\ns := 'the pilot''s boat'; // stays moored\n", "Moor the launch.|the pilot's boat|stays moored"},
	"perl":       {"# Moor the launch.\n$n = $#list; $s =~ /it's #x/; print \"no pilot aboard\"; # stays moored\n=pod\n\nHear the pilot.\n\n=cut\n", "Moor the launch.|no pilot aboard|stays moored|Hear the pilot."},
	"php":        {"<p>It's no comment // here</p>\n<?php // Moor the launch.\n#[Attribute(\"x y\")]\n$s = 'no pilot aboard'; # stays moored\n?>\n<p>don't</p>\n", "Moor the launch.|no pilot aboard|stays moored"},
	"powershell": {"<# Moor the launch. #>\n$s = \"no `\"pilot`\" aboard $(f \"x\")\" # stays moored\n", "Moor the launch.|no \"pilot\" aboard ￼|stays moored"},
	"proto":      {"// Moor the launch.\nmessage A { string b = 1; } /* stays moored */\n", "Moor the launch.|stays moored"},
	"python":     {"#!/usr/bin/env python3\n\"\"\"Moor the launch.\n\n    code = here\n\"\"\"\ns = 'it\\'s no pilot' # stays moored\nt = f\"the {name} is here\"\n", "Moor the launch.|it's no pilot|stays moored|the ￼ is here"},
	"r":          {"#' Moor the launch.\ns <- 'no pilot aboard' # stays moored\n", "Moor the launch.|no pilot aboard|stays moored"},
	"ruby":       {"=begin\nMoor the launch.\n=end\ns = \"the #{h[\"x\"]} is here\" # stays moored\nt = <<~EOS\n  it's # no comment\nEOS\nu = x =~ /it's/ # at the quay\n", "Moor the launch.|the ￼ is here|stays moored|at the quay"},
	"rust":       {"/* Moor /* the */ launch. */\nfn f<'a>(x: &'a str) -> char { '\"' } // stays moored\nlet s = r#\"no \"pilot\" aboard\"#;\n", "Moor /* the */ launch.|stays moored|no \"pilot\" aboard"},
	"scala":      {"/* Moor /* the */ launch. */\nval s = \"\"\"no \"pilot\" aboard\"\"\" // stays moored\n", "Moor /* the */ launch.|no \"pilot\" aboard|stays moored"},
	"scss":       {"// Moor the launch.\n$a: 'no pilot aboard'; /* stays moored */\n", "Moor the launch.|no pilot aboard|stays moored"},
	"shell":      {"#!/bin/sh\n# Moor the launch.\necho \"no $pilot is aboard $(f \"x\")\" ${a#b} \\' # stays moored\ncat <<EOF\nit's # no comment\nEOF\necho 'it is here' # at the quay\n", "Moor the launch.|no ￼ is aboard ￼|stays moored|it is here|at the quay"},
	"sql":        {"-- Moor the launch.\nINSERT INTO \"a -- b\" VALUES ('the pilot''s boat'); /* stays moored */\n", "Moor the launch.|the pilot's boat|stays moored"},
	"swift":      {"/* Moor /* the */ launch. */\nlet s = \"no \\(m[\"x\"]) is aboard\", t = #\"raw \"words\" here\"# // stays moored\n", "Moor /* the */ launch.|no ￼ is aboard|raw \"words\" here|stays moored"},
	"terraform":  {"# Moor the launch.\ndescription = \"no ${var.x} is aboard\" // stays moored\n", "Moor the launch.|no ￼ is aboard|stays moored"},
	"toml":       {"# Moor the launch.\np = 'c:\\' # stays moored\nb = \"\"\"\nthe \"pilot\" is here\"\"\"\n", "Moor the launch.|stays moored|the \"pilot\" is here"},
	"typescript": {"// Moor the launch.\nconst s: string = `the ${f({a: 1})} is here`; // stays moored\n", "Moor the launch.|the ￼ is here|stays moored"},
	"yaml":       {"# Moor the launch.\na: it's none#x\nb: 'the pilot''s boat' # stays moored\n", "Moor the launch.|the pilot's boat|stays moored"},
	"zig":        {"/// Moor the launch.\nconst s =\n    \\\\it's // none\n;\nconst c = '\"'; // stays moored\n", "Moor the launch.|stays moored"},
}

// sourceFormats are the formats of source code.
func sourceFormats() []text.Format {
	return slices.DeleteFunc(text.Formats(), func(f text.Format) bool {
		return !strings.HasPrefix(f.About(), "comments and strings of ")
	})
}

func TestSourceLanguages(t *testing.T) {
	formats := sourceFormats()
	if len(formats) < 40 {
		t.Fatalf("%d languages", len(formats))
	}
	for _, f := range formats {
		sample, ok := sourceSamples[f]
		if !ok {
			t.Errorf("%s: no sample", f)
			continue
		}
		for _, source := range []string{sample.source, strings.ReplaceAll(sample.source, "\n", "\r\n"), "\uFEFF" + sample.source} {
			got := strings.ReplaceAll(strings.Join(texts(t, source, f), "|"), "\r", "")
			if got != sample.want {
				t.Errorf("%s: %q gives\n%q, want\n%q", f, source, got, sample.want)
			}
			checkReader(t, f, []byte(source))
		}
		checkEdits(t, f, []byte(sample.source))
	}
}

// TestFormatsAreApart: no two formats go by the same name of a file or
// identifier of a language.
func TestFormatsAreApart(t *testing.T) {
	for _, f := range text.Formats() {
		for _, e := range f.Extensions() {
			if got, ok := text.FormatOf("a" + strings.ToUpper(e)); !ok || got != f {
				t.Errorf("%s: the extension %s is of %s", f, e, got)
			}
		}
	}
	for name, want := range map[string]text.Format{
		"src/Makefile": "make", "GNUmakefile": "make", "Dockerfile": "dockerfile", "Gemfile": "ruby",
		"a.tsx": "typescript", "b.R": "r", "c.HPP": "cpp", "notes": text.Plain, "Makefile.bak": text.Plain,
	} {
		if got, ok := text.FormatOf(name); got != want || ok != (want != text.Plain) {
			t.Errorf("%s is %s, want %s", name, got, want)
		}
	}
	for id, want := range map[string]text.Format{
		"javascriptreact": "javascript", "typescriptreact": "typescript", "shellscript": "shell", "makefile": "make",
		"objective-c": "c", "csharp": "csharp", "less": "scss", "go": "go", "python": "python",
	} {
		if got, _ := text.FormatOfLanguage(id); got != want {
			t.Errorf("the language %s is %s, want %s", id, got, want)
		}
	}
}
