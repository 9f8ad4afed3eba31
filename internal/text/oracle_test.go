package text_test

import (
	"bytes"
	"encoding/xml"
	"io"
	"os/exec"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// TestRSTOracle compares the words of a document with those of docutils.
func TestRSTOracle(t *testing.T) {
	const document = "Fog *at* sea\n============\n\n:Author: A Pilot\n\nThe **bar** was closed; send ``untill noon`` as\none word [1]_. See `the quay <http://x.example/a>`_, say|so|.\n\n" +
		".. |so| replace:: so they\n.. a comment\n   that is long\n\n- rope\n\n  1. one\n  2. two more\n\nterm : kind\n   A bank of sand::\n\n     no words\n\n   after it\n\n" +
		"+------+-------------+\n| hour | *entry*     |\n+======+=============+\n| one  | the pilot   |\n|      | came aboard |\n+------+-------------+\n\n" +
		"=====  ======\nfirst  second\n=====  ======\nlow    high\n       water\n=====  ======\n\n| The tide\n| is out\n\n-a  all of it\n\n.. note:: The ladder\n   is safe.\n\n.. figure:: a.png\n\n   The caption\n\n" +
		".. code:: text\n\n   hidden words\n\n>>> hidden too\n\n.. [1] The note.\n\nOver\\ s and \\*not\\* and x_y.\n"
	compareWords(t, text.RST, document, []string{"rst2xml", "--no-doc-title", "--quiet", "-"},
		"literal", "literal_block", "doctest_block", "comment", "field_name", "option_string", "author", "classifier", "label", "footnote_reference", "image", "target", "substitution_reference")
}

// TestAsciiDocOracle compares the words of a document with those of asciidoctor.
func TestAsciiDocOracle(t *testing.T) {
	const document = "= Fog at sea\n:attr: hidden words\n\n== The _bar_\n\nThe *bar* was closed; send `untill noon` as\none word. See link:a.html[the quay], <<x,the pier>> footnote:[The note.].\n// a comment\nStill the same.\n\n" +
		"* rope\n** chain\n. one\n\nterm:: A bank\nof sand\n\nNOTE: The ladder is safe.\n\n----\nhidden code\n----\n\n.A title\n====\nAn example.\n====\n\n literal here\n\n" +
		"|===\n|hour |entry\n\n|one\n|the pilot came\naboard\n\n2+|both of them\n|===\n\n[quote]\n____\nSaid the master.\n____\n\n[source]\nmore hidden\n\nH~2~O and \"`quoted`\" **un**constrained.\n"
	compareWords(t, text.AsciiDoc, document, []string{"asciidoctor", "-b", "docbook5", "-o", "-", "-"},
		"literal", "screen", "programlisting", "literallayout", "date", "author", "authorinitials")
}

// compareWords holds the words that are read of a document to those of the XML
// that a program makes of it, less the text of some elements.
func compareWords(t *testing.T, f text.Format, document string, program []string, hidden ...string) {
	t.Helper()
	path, err := exec.LookPath(program[0])
	if err != nil {
		t.Skipf("%s is not installed: its reading of the document is not compared", program[0])
	}
	command := exec.Command(path, program[1:]...)
	command.Stdin = strings.NewReader(document)
	out, err := command.Output()
	if err != nil {
		t.Fatalf("%s: %v", program[0], err)
	}
	var got []string
	for _, b := range blocks(t, document, f) {
		got = append(got, lettered(string(b.Text))...)
	}
	want := lettered(visibleText(t, out, hidden))
	slices.Sort(got)
	slices.Sort(want)
	if !slices.Equal(got, want) {
		t.Errorf("read:\n%q\n%s reads:\n%q", got, program[0], want)
	}
}

// lettered returns the words of letters in a text.
func lettered(s string) []string {
	return strings.FieldsFunc(s, func(r rune) bool { return !('a' <= r && r <= 'z' || 'A' <= r && r <= 'Z') })
}

// visibleText returns the character data of XML less that of hidden elements, with
// a space at each tag of another element than those inside a sentence.
func visibleText(t *testing.T, document []byte, hidden []string) string {
	t.Helper()
	inline := []string{"emphasis", "strong", "subscript", "superscript", "link", "reference", "quote"}
	var b strings.Builder
	decoder := xml.NewDecoder(bytes.NewReader(document))
	decoder.Strict = false
	depth := 0 // of hidden elements
	for {
		switch token, err := decoder.Token(); k := token.(type) {
		case xml.StartElement:
			if depth > 0 || slices.Contains(hidden, k.Name.Local) {
				depth++
			}
			if !slices.Contains(inline, k.Name.Local) {
				b.WriteByte(' ')
			}
		case xml.EndElement:
			depth = max(depth-1, 0)
			if !slices.Contains(inline, k.Name.Local) {
				b.WriteByte(' ')
			}
		case xml.CharData:
			if depth == 0 {
				b.Write(k)
			}
		case nil:
			if err != io.EOF {
				t.Fatal(err)
			}
			return b.String()
		}
	}
}
