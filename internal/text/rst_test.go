package text_test

import (
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

func TestRSTBlocks(t *testing.T) {
	checkReadings(t, text.RST, []reading{
		{"empty", "", nil},
		{"paragraphs", "Fog at\nthe bar.\n\n  Ice\n  comes.", []string{"Fog at\nthe bar.", "Ice\ncomes."}},
		{"titles", "=====\n Fog\n=====\n\nThe *bar*\n---------\ntext\n\n----\n\nIce\n~~~", []string{"Fog", "The bar", "text", "Ice"}},
		{"no title", "Fog comes\n..", []string{"Fog comes\n.."}},
		{"inline", "**b**\\ erth and *The bar!* 2 * 3 a*b \\*no\\* foo_ anonymous__ :sub:`2`", []string{"berth and The bar! 2 * 3 a*b *no* foo anonymous 2"}},
		{"literals", "Use ``foo `bar` *``\\ s or `x` or :code:`a b`.", []string{"Use \uFFFCs or \uFFFC or \uFFFC."}},
		{"links", "See `the quay <http://x.y>`__, `Harbour Office`_, :ref:`the berth <b-1>`\nand :doc:`x/y` or http://x.y/_a. _`Target here`", []string{"See the quay, Harbour Office, the berth\nand \uFFFC or http://x.y/_a. Target here"}},
		{"references", "Fog [1]_ and [#a]_ |ssp| [x] a | b", []string{"Fog  and  \uFFFC [x] a | b"}},
		{"lists", "- rope\n- chain\n  that holds\n\n  - links\n\n1. one\n2. two\n   more\n\n#. auto\n\n(a) Listen", []string{"rope", "chain\nthat holds", "links", "one", "two\nmore", "auto", "Listen"}},
		{"no list", "-not one\n\n1.5 m of water", []string{"-not one", "1.5 m of water"}},
		{"definitions", "bar : classifier\n  A bank\n  of sand.\n\nterm\n    body", []string{"bar", "A bank\nof sand.", "term", "body"}},
		{"fields", ":Author: A Pilot\n:Long name: the fog\n   comes", []string{"A Pilot", "the fog\ncomes"}},
		{"options", "-a, --all  Show the fog\n--long\n   Show ice", []string{"Show the fog", "Show ice"}},
		{"literal block", "Run this::\n\n   no words\n\n   more\n\nFog::\n\n> quoted\n> too\n\nIce\n\n::\n\n  x y\n\nend", []string{"Run this:", "Fog:", "Ice", "end"}},
		{"doctest", ">>> print('fog')\nfog\n\nIce", []string{"Ice"}},
		{"comments", ".. a comment\n   goes on\n\nFog\n\n..\n   hidden\n\n..\n\n   quote", []string{"Fog", "quote"}},
		{"targets", ".. _the quay: http://x.y\n__ http://z\n\nFog", []string{"Fog"}},
		{"footnotes", ".. [1] The *note*\n   goes on.\n.. [CIT2002] A book.", []string{"The note\ngoes on.", "A book."}},
		{"admonitions", ".. note:: The fog\n   comes.\n\n   Again.\n\n.. warning::\n   :class: x\n\n   Ice.\n\n.. admonition:: On *tides*\n\n   Low.", []string{"The fog\ncomes.", "Again.", "Ice.", "On tides", "Low."}},
		{"no prose", ".. code-block:: python\n   :caption: x\n\n   fog ice\n\n.. math:: a + b\n\n.. image:: a.png\n   :alt: A buoy\n\nend", []string{"A buoy", "end"}},
		{"figure", ".. figure:: a b.png\n   :width: 10\n   :alt: The pier\n\n   The caption.\n\n   The legend.", []string{"The pier", "The caption.", "The legend."}},
		{"versions", ".. versionadded:: 1.2 The fog\n   signal.", []string{"The fog\nsignal."}},
		{"substitutions", ".. |ssp| replace:: Skarrow *Sound*\n.. |img| image:: x.png", []string{"Skarrow Sound"}},
		{"domains", ".. py:function:: berth(x)\n   :module: m\n\n   Gives the berth.\n\n.. unknown:: a b\n\n   c d", []string{"Gives the berth."}},
		{"list table", ".. list-table:: The *tides*\n   :header-rows: 1\n\n   * - hour\n     - height of\n       water\n   * - one\n     - ``x``", []string{"The tides", "hour", "height of\nwater", "one", "\uFFFC"}},
		{"line block", "| The tide is out\n| the moon", []string{"The tide is out", "the moon"}},
		{"grid table", "+------+--------+\n| hour | *tide* |\n+======+========+\n| one  | low    |\n+------+--------+\n| a b  | high   |\n| more | water  |\n+------+--------+\n\nend", []string{"hour", "tide", "one", "low", "a b\nmore", "high\nwater", "end"}},
		{"simple table", "=====  ======\nhour   tide\n=====  ======\none    low\n       water\ntwo    high and long\n=====  ======\n\nend", []string{"hour", "tide", "one", "low\nwater", "two", "high and long", "end"}},
		{"indented table", "  ====  ====\n  fog   ice\n  ====  ====\n", []string{"fog", "ice"}},
		{"CRLF", "Fog\r\n===\r\n\r\nIce at\r\n*the* bar.\r\n", []string{"Fog", "Ice at\nthe bar."}},
		{"byte order mark", "\uFEFFFog\n===", []string{"Fog"}},
		{"signs around markup", "(e.g.\u00A0``x y``) “``z w``” — foo_—and *bar*…", []string{"(e.g.\u00A0\uFFFC) “\uFFFC” — foo—and bar…"}},
		{"a target on a line of its own", "See `the long quay\n<http://x.y>`_, and `a\n<http://z>`__.", []string{"See the long quay, and a."}},
		{"options under a long argument", ".. rubric:: The long\n   title\n   :name: hidden\n\n.. admonition:: On the\n   tides\n   :class: hidden\n\n   Low.\n\n.. figure:: a\n   b.png\n   :alt: The pier\n\n   The caption.", []string{"The long\ntitle", "On the\ntides", "Low.", "The pier", "The caption."}},
		{"not closed", "``fog *sea |bar [x :ref:`", []string{"``fog sea |bar [x :ref:`"}},
	})
}

// TestRSTCells: a word pair over the lines of a cell has another cell between.
func TestRSTCells(t *testing.T) {
	for _, b := range blocks(t, "+-----+-----+\n| a b | c d |\n| e f | g h |\n+-----+-----+\n", text.RST) {
		if got := string(b.Text); got != "a b\ne f" && got != "c d\ng h" || !b.Interrupted(2, 5) || b.Interrupted(0, 3) {
			t.Errorf("%q: the lines are interrupted: %v", got, b.Interrupted(2, 5))
		}
	}
}

func TestRSTEscape(t *testing.T) {
	checkEscapes(t, text.RST, "a_b *c*", map[string]string{"fog": `a\_b \*c\*`})
}

func TestRSTBounds(t *testing.T) {
	checkBounds(t, text.RST, "*", "`", "``", "|", "[", "_", ":", ":a:`", "\\", "- ", "- - \n", "..", ".. a::\n", ".. note:: ", "+-+\n", "| ", "|a|\n",
		"= =\n", "==\n", ":a: ", "a::\n\n", "> ", "(", "-a  ", "a\n b\n  c\n", " \n", "`a <", "[1]_", "a\n  ")
}

func FuzzRST(f *testing.F) {
	fuzzFormat(f, text.RST, "T\n==\n\na *b* `c <d>`_ :ref:`e` ``f``::\n\n  g\n\n- h\n\n  i\n:j: k\n\n.. note:: l\n   :m: n\n\n   o\n\n+--+\n|p |\n+--+\n\n== ==\nq  r\n== ==\n")
}

// TestRSTReferences: the text of a reference is not to be corrected by a program
// where it names the target.
func TestRSTReferences(t *testing.T) {
	b := blocks(t, "At `the quay`_ or `a berth`__ or :term:`pier` or `the bar <b>`_ in *fog*.\n", text.RST)[0]
	for word, want := range map[string]bool{"quay": true, "pier": true, "berth": false, "bar": false, "fog": false} {
		at := strings.Index(string(b.Text), word)
		if got := b.Interrupted(at, at+len(word)); got != want {
			t.Errorf("%s is interrupted: %v", word, got)
		}
	}
}
