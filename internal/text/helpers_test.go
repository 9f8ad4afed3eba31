package text_test

import (
	"fmt"
	"strings"
	"testing"
	"unicode"

	"example.org/foulcase/internal/text"
)

// show writes tokens on one line: a word as it stands, others as Kind(text),
// with + before what is glued to the token before it.
func show(block []byte, tokens []text.Token) string {
	var parts []string
	for i, t := range tokens {
		s := string(block[t.Start:t.End])
		if t.Kind != text.Word {
			s = fmt.Sprintf("%v(%s)", t.Kind, s)
		}
		if t.Glued && i > 0 {
			s = "+" + s
		}
		parts = append(parts, s)
	}
	return strings.Join(parts, " ")
}

// sentences cuts a block and shows each sentence.
func sentences(block string) []string {
	var s text.Segmenter
	var all []string
	for sentence := range s.Sentences([]byte(block)) {
		all = append(all, show([]byte(block), sentence.Tokens))
	}
	return all
}

// bounds returns the text of each sentence.
func bounds(block string) []string {
	var s text.Segmenter
	var all []string
	for sentence := range s.Sentences([]byte(block)) {
		all = append(all, block[sentence.Start:sentence.End])
	}
	return all
}

// norms returns the normal forms of a block's tokens, "" for tokens without.
func norms(block string) []string {
	var s text.Segmenter
	var all []string
	for sentence := range s.Sentences([]byte(block)) {
		for _, t := range sentence.Tokens {
			all = append(all, string(t.Norm))
		}
	}
	return all
}

// blocks reads a document and returns its blocks.
func blocks(t testing.TB, source string, f text.Format) []*text.Block {
	t.Helper()
	var all []*text.Block
	for b, err := range text.Blocks(strings.NewReader(source), f, text.Options{}) {
		if err != nil {
			t.Fatal(err)
		}
		all = append(all, b)
	}
	return all
}

// texts returns the text of each block.
func texts(t testing.TB, source string, f text.Format) []string {
	t.Helper()
	var all []string
	for _, b := range blocks(t, source, f) {
		all = append(all, string(b.Text))
	}
	return all
}

// checkTokens fails when the tokens of a block are not in order, not inside it,
// or leave out anything but white space and the line ends.
func checkTokens(t testing.TB, block []byte) {
	t.Helper()
	var s text.Segmenter
	last := 0
	for sentence := range s.Sentences(block) {
		if len(sentence.Tokens) == 0 {
			t.Fatalf("%q: a sentence without tokens", block)
		}
		if first := sentence.Tokens[0]; first.Start != sentence.Start {
			t.Fatalf("%q: the sentence begins at %d, its first token at %d", block, sentence.Start, first.Start)
		}
		for _, k := range sentence.Tokens {
			if k.Start < last || k.End <= k.Start || k.End > len(block) {
				t.Fatalf("%q: token %d..%d after %d", block, k.Start, k.End, last)
			}
			if gap := string(block[last:k.Start]); strings.TrimFunc(gap, isSpace) != "" {
				t.Fatalf("%q: %q is in no token", block, gap)
			}
			if (k.Kind == text.Word) != (k.Kind == text.Word && len(k.Norm) > 0) {
				t.Fatalf("%q: the word %q has no normal form", block, block[k.Start:k.End])
			}
			last = k.End
		}
		if sentence.End != last {
			t.Fatalf("%q: the sentence ends at %d, its last token at %d", block, sentence.End, last)
		}
	}
	if gap := string(block[last:]); strings.TrimFunc(gap, isSpace) != "" {
		t.Fatalf("%q: %q is in no token", block, gap)
	}
}

func isSpace(r rune) bool {
	return unicode.IsSpace(r) || r == '\u200B'
}
