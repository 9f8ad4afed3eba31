package text_test

import (
	"testing"

	"example.org/foulcase/internal/text"
)

func TestAsciiDocBlocks(t *testing.T) {
	checkReadings(t, text.AsciiDoc, []reading{
		{"empty", "", nil},
		{"paragraphs", "Fog at\nthe bar.\n\nIce.", []string{"Fog at\nthe bar.", "Ice."}},
		{"header", "= The *log*\nA Pilot <a@b.c>\nv1.0, 2020-01-01\n:toc:\n:long: some words \\\n  more\n:description: About fog\n\n== Ice ==\ntext", []string{"The log", "About fog", "Ice", "text"}},
		{"underlined", "Fog\n===\n\nThe bar\n-------\ntext", []string{"Fog", "The bar", "text"}},
		{"inline", "**b**erth and *The bar!* _now_ a_b_c 2 * 3 \\*no H~2~O 10^th^ [.red]#quay#s", []string{"berth and The bar! now a_b_c 2 * 3 *no H2O 10th quays"}},
		{"signs", "C# and #5 at 5^ ~ 3 ~x", []string{"C# and #5 at 5^ ~ 3 ~x"}},
		{"code", "Use `foo *bar*`s or ``a``b +x y+ pass:[q r] kbd:[Ctrl] a + b", []string{"Use \uFFFCs or \uFFFCb \uFFFC \uFFFC \uFFFC a + b"}},
		{"quotes", "\"`fog`\" and '`ice`' {apos} {ssp} &amp; &#233;", []string{"“fog” and ‘ice’ ’ \uFFFC & é"}},
		{"links", "See https://x.y[the quay^], link:a.html[ice, role=x], <<id,the bar>>, <<id>> xref:x[sea] or https://x.y now.", []string{"See the quay, ice, the bar, \uFFFC sea or https://x.y now."}},
		{"anchors", "[[id]]Fog [[x]]at ((sea)) (((fog, ice)))now", []string{"Fog at sea now"}},
		{"footnote", "Fog.footnote:[The _note_.] Ice image:a.png[A buoy,10] end", []string{"Fog. Ice \uFFFC end", "The note.", "A buoy"}},
		{"lists", "* rope\n* chain\n  that holds\n** links\n- [x] done\n\n. one\n.. two\n1. three\n<1> four\n+\nmore", []string{"rope", "chain\nthat holds", "links", "done", "one", "two", "three", "four", "more"}},
		{"terms", "Fog:: thick air\nIce::\n  cold water\nstd::x is", []string{"Fog", "thick air", "Ice", "cold water\nstd::x is"}},
		{"admonitions", "NOTE: Fog.\n\n[WARNING]\n====\nIce.\n\nSea.\n====", []string{"Fog.", "Ice.", "Sea."}},
		{"no prose", "a\n\n----\ncode = x\n----\n\n....\nx y\n....\n\n++++\n<b>\n++++\n\n////\nhid\n////\n\n```go\nx y\n```\n\n[source,go]\nx y\nz\n\n[stem]\n--\nx y\n--\n\n literal one\n\nb", []string{"a", "b"}},
		{"blocks", "--\nfog\n--\n\n****\nice\n****\n\n[quote, A Pilot]\n____\nsea\n____", []string{"fog", "ice", "sea"}},
		{"block title", ".The *bar*\nimage::a.png[A buoy, 100]\n\ninclude::x.adoc[]\n\nifdef::y[]\nfog\nendif::[]", []string{"The bar", "A buoy", "fog"}},
		{"comments", "fog\n// a comment\nice\n// b\n\nsea", []string{"fog\nice", "sea"}},
		{"hard break", "Harbour Office +\nSkarrow +\nSound and +\nthe way", []string{"Harbour Office", "Skarrow", "Sound and\nthe way"}},
		{"breaks", "fog\n\n'''\n\nice\n\n<<<\n\nsea", []string{"fog", "ice", "sea"}},
		{"table", "[cols=\"1,2\"]\n|===\n|fog |*ice*\n\n|sea\n2+|the \\| bar\nand pier\n\na|* rope\n* chain\nl|x y\n|end\n|===\nafter", []string{"fog", "ice", "sea", "the | bar\nand pier", "rope", "chain", "end", "after"}},
		{"table of values", ",===\na,b c\n,===\n\nfog", []string{"fog"}},
		{"CRLF", "= Fog\r\n\r\nIce at\r\nthe *bar*.\r\n", []string{"Fog", "Ice at\nthe bar."}},
		{"byte order mark", "\uFEFF= Fog", []string{"Fog"}},
		{"signs around markup", "(e.g.\u00A0`x y`) “+z w+” ice–*bar*–sea", []string{"(e.g.\u00A0\uFFFC) “\uFFFC” ice–bar–sea"}},
		{"a footnote at a word", "Ice 4footnote:[The _note_.] and fogfootnote:[Thick.]", []string{"Ice 4 and fog", "The note.", "Thick."}},
		{"not closed", "`fog +ice *sea {bar <<x [[y link:a[z", []string{"`fog +ice sea {bar <<x [[y link:a[z"}},
		{"block not closed", "fog\n\n----\nice", []string{"fog"}},
	})
}

func TestAsciiDocEscape(t *testing.T) {
	checkEscapes(t, text.AsciiDoc, "a_b", map[string]string{"fog": "-"})
	checkEscapes(t, text.AsciiDoc, "a & b", map[string]string{"fog": "a & b"})
}

func TestAsciiDocBounds(t *testing.T) {
	checkBounds(t, text.AsciiDoc, "*", "`", "``a", "+", "+a ", "#", "#a ", "^", "{", "<<", "[", "[[", "(", "((", "\\", ":", "link:", "link:a[", "footnote:[",
		"* ", "* a\n", ". ", "a:: ", "a::\n", "----\n", "====\n", "|===\n", "|===\n|", "a|", "\\|", ".a\n", "[a]\n", "= ", "//\n", "&", "\"`", "a +\n")
}

func FuzzAsciiDoc(f *testing.F) {
	fuzzFormat(f, text.AsciiDoc, "= T\n\na *b* `c` link:d[e] footnote:[f] {g} +\nh\n\n* i\nj:: k\n\n----\nl\n----\n\n|===\n|m a|* n\n|===\n\n[o]\nNOTE: p <<q,r>> \"`s`\"\n")
}
