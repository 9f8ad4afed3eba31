package text_test

import (
	"bytes"
	"fmt"
	"path/filepath"
	"slices"
	"testing"

	"github.com/rogpeppe/go-internal/txtar"

	"example.org/foulcase/internal/text"
)

// samples returns the documents in testdata/proof of each format.
func samples(t *testing.T) map[text.Format][][]byte {
	t.Helper()
	paths, err := filepath.Glob("../../testdata/proof/*.txtar")
	if err != nil || len(paths) == 0 {
		t.Fatalf("no documents in testdata/proof: %v", err)
	}
	all := map[text.Format][][]byte{}
	for _, path := range paths {
		archive, err := txtar.ParseFile(path)
		if err != nil {
			t.Fatal(err)
		}
		for _, file := range archive.Files {
			if f, ok := text.FormatOf(file.Name); ok && file.Name != "house.txt" {
				all[f] = append(all[f], file.Data)
			}
		}
	}
	return all
}

func TestEdits(t *testing.T) {
	for f, documents := range samples(t) {
		t.Run(string(f), func(t *testing.T) {
			for _, source := range documents {
				checkEdits(t, f, source)
			}
		})
	}
}

// TestSpliceRefuses: edits that overlap or lie outside are errors.
func TestSpliceRefuses(t *testing.T) {
	for _, edits := range [][]text.Edit{
		{{Start: 0, End: 3}, {Start: 2, End: 4}},
		{{Start: 3, End: 2}},
		{{Start: -1, End: 2}},
		{{Start: 2, End: 9}},
	} {
		if out, err := text.Splice([]byte("fog"), text.Plain, edits); err == nil {
			t.Errorf("edits %v give %q", edits, out)
		}
	}
}

// placed is a token with what an edit of it needs.
type placed struct {
	word  string
	block *text.Block
	from  int // in the text of the block
	kind  text.Kind
}

func places(t testing.TB, f text.Format, source []byte) []placed {
	t.Helper()
	var all []placed
	var s text.Segmenter
	for b, err := range text.Blocks(bytes.NewReader(source), f, text.Options{}) {
		if err != nil {
			t.Fatal(err)
		}
		for sentence := range s.Sentences(b.Text) {
			for _, k := range sentence.Tokens {
				all = append(all, placed{string(b.Text[k.Start:k.End]), b, k.Start, k.Kind})
			}
		}
	}
	return all
}

// edit replaces the token by a word that the source spells as given.
func (p placed) edit(spelled string) text.Edit {
	from, to := p.block.Source(p.from, p.from+len(p.word))
	return text.Edit{Part: p.block.Part, Start: from, End: to, Text: []byte(spelled)}
}

// checkEdits holds a document with words in it to two rules: to replace each
// token by itself changes no byte, and a word that is replaced by another is
// read as that one, with nothing changed before it. (What follows may be read
// otherwise: "Args:" and the like announce what is no prose.)
func checkEdits(t testing.TB, f text.Format, source []byte) {
	t.Helper()
	all := places(t, f, source)
	var same []text.Edit
	var words []string
	for _, p := range all {
		same = append(same, p.edit(string(p.block.Raw(p.from, p.from+len(p.word)))))
		words = append(words, p.word)
	}
	if out, err := text.Splice(source, f, same); err != nil || !sameDocument(t, f, source, out) {
		t.Fatalf("every token by itself gives another document (%v)", err)
	}
	tried := 0
	for i, p := range all {
		word := []byte(p.word)
		if p.kind != text.Word || len(word) < 3 || p.block.Interrupted(p.from, p.from+len(word)) {
			continue
		}
		other := string(overwritten(word))
		spelled, ok := p.block.Escape(other)
		if !ok {
			continue
		}
		tried++
		out, err := text.Splice(source, f, []text.Edit{p.edit(spelled)})
		if err != nil {
			t.Fatal(err)
		}
		want := append(slices.Clone(words[:i]), other)
		var got []string
		for _, p := range places(t, f, out) {
			got = append(got, p.word)
		}
		if !slices.Equal(got[:min(len(got), len(want))], want) {
			t.Fatalf("%q for %q: got %s", other, word, firstDifference(got, want))
		}
	}
	if tried == 0 {
		t.Fatal("no word was replaced")
	}
}

// sameDocument compares bytes, and packed documents by what is read of them.
func sameDocument(t testing.TB, f text.Format, a, b []byte) bool {
	if bytes.Equal(a, b) {
		return true
	}
	before, after := places(t, f, a), places(t, f, b)
	return len(before) > 0 && before[0].block.Part != "" && slices.EqualFunc(before, after, func(x, y placed) bool {
		return x.word == y.word && x.edit("").Start == y.edit("").Start
	})
}

// overwritten puts an o for each letter and keeps length and capitals.
func overwritten(word []byte) []byte {
	other := bytes.Clone(word)
	for i, c := range other {
		switch {
		case 'a' <= c && c <= 'z':
			other[i] = 'o'
		case 'A' <= c && c <= 'Z':
			other[i] = 'O'
		}
	}
	return other
}

func firstDifference(got, want []string) string {
	for i := range min(len(got), len(want)) {
		if got[i] != want[i] {
			return fmt.Sprintf("%q, want %q in the place of token %d", got[i], want[i], i)
		}
	}
	return fmt.Sprintf("%d tokens, want %d", len(got), len(want))
}
