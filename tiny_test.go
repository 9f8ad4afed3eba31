package foulcase

import (
	"bytes"
	"context"
	"iter"
	"os"
	"path/filepath"
	"strings"
	"sync"
	"testing"

	"example.org/foulcase/candidates"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
	"example.org/foulcase/internal/modelfile"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/lm/train"
)

// tinyOrder is the length of the longest n-grams of the small model: long enough
// that a change bears on several words behind it.
const tinyOrder = 4

// tiny is the small model of testdata/tiny, section by section, made once for
// all tests that look inside the engine. It has no calibration.
var tiny = sync.OnceValues(func() (map[string][]byte, error) {
	corpus, err := os.ReadFile(filepath.Join("testdata", "tiny", "corpus.txt"))
	if err != nil {
		return nil, err
	}
	documents := func() iter.Seq2[[]byte, error] { return text.Documents(bytes.NewReader(corpus)) }
	made := map[string][]byte{}
	lex, err := tinyLexicon(made, documents())
	if err != nil {
		return nil, err
	}
	slips, err := tinyChannel(made)
	if err != nil {
		return nil, err
	}
	result, err := train.Train(context.Background(), train.Text(documents(), lex, train.Training, 1), train.TextOptions(lex, train.Options{Order: tinyOrder}))
	if err != nil {
		return nil, err
	}
	made[SectionLM] = result.Section
	if made[SectionConfusables], err = candidates.BuildConfusables(context.Background(), lex, func() *candidates.Searcher {
		return candidates.NewSearcher(lex, slips, candidates.DefaultWeights)
	}, candidates.ConfusableOptions{}); err != nil {
		return nil, err
	}
	made[SectionJudgement], err = os.ReadFile(filepath.Join("testdata", "tiny", "judgement.json"))
	return made, err
})

// tinyLexicon makes the lexicon and what hangs on it alone.
func tinyLexicon(made map[string][]byte, documents iter.Seq2[[]byte, error]) (*lexicon.Lexicon, error) {
	counts, err := lexicon.CountDocuments(documents, 1)
	if err != nil {
		return nil, err
	}
	var lists []lexicon.WordList
	for name, variety := range map[string]lexicon.Variety{"words-en-GB.txt": lexicon.GB, "words-en-US.txt": lexicon.US} {
		words, err := readTiny(name, func(f *os.File) ([]string, error) { return lexicon.ReadWords(f, name) })
		if err != nil {
			return nil, err
		}
		lists = append(lists, lexicon.WordList{Name: name, Variety: variety, Words: words})
	}
	evidence, err := lexicon.NewEvidence(lists, counts)
	if err != nil {
		return nil, err
	}
	if made[SectionLexicon], err = evidence.Builder().Section(); err != nil {
		return nil, err
	}
	lex, err := lexicon.Open(made[SectionLexicon])
	if err != nil {
		return nil, err
	}
	if made[SectionMirror], err = candidates.BuildMirror(lex); err != nil {
		return nil, err
	}
	forms := func(yield func(string, int) bool) {
		for id := range uint32(lex.Len()) {
			if !yield(string(lex.AppendForm(nil, id)), 1) {
				return
			}
		}
	}
	made[SectionSpelling], err = train.Spelling(context.Background(), forms, 64<<10)
	return lex, err
}

func tinyChannel(made map[string][]byte) (*channel.Model, error) {
	pairs, err := readTiny("pairs.tsv", func(f *os.File) ([]channel.Pair, error) { return channel.ReadPairs(f) })
	if err != nil {
		return nil, err
	}
	m, _, err := channel.Fit(pairs, channel.FitOptions{})
	if err != nil {
		return nil, err
	}
	made[SectionChannel] = m.Section()
	return m, nil
}

func readTiny[T any](name string, read func(*os.File) (T, error)) (T, error) {
	f, err := os.Open(filepath.Join("testdata", "tiny", name))
	if err != nil {
		var none T
		return none, err
	}
	defer f.Close()
	return read(f)
}

// openTiny opens the small model with some sections replaced or added.
func openTiny(t testing.TB, instead map[string][]byte) *Engine {
	t.Helper()
	e, err := Open(tinyFile(t, instead))
	if err != nil {
		t.Fatal(err)
	}
	return e
}

func tinyFile(t testing.TB, instead map[string][]byte) []byte {
	t.Helper()
	sections, err := tiny()
	if err != nil {
		t.Fatal(err)
	}
	w := modelfile.NewWriter()
	for _, list := range []map[string][]byte{sections, instead} {
		for name, body := range list {
			if err := w.Set(name, body); err != nil {
				t.Fatal(err)
			}
		}
	}
	var model bytes.Buffer
	if _, err := w.WriteTo(&model); err != nil {
		t.Fatal(err)
	}
	return model.Bytes()
}

// tinyDocuments are the texts that the small model was made of.
func tinyDocuments(t testing.TB) []string {
	t.Helper()
	corpus, err := os.ReadFile(filepath.Join("testdata", "tiny", "corpus.txt"))
	if err != nil {
		t.Fatal(err)
	}
	var list []string
	for doc, err := range text.Documents(bytes.NewReader(corpus)) {
		if err != nil {
			t.Fatal(err)
		}
		list = append(list, string(doc))
	}
	if len(list) < 50 {
		t.Fatalf("%d documents in the small corpus", len(list))
	}
	return list
}

// marksOf proofs a plain text.
func marksOf(t testing.TB, e *Engine, document string, o Options) []Mark {
	t.Helper()
	var marks []Mark
	for m, err := range e.Proof(context.Background(), strings.NewReader(document), o) {
		if err != nil {
			t.Fatal(err)
		}
		marks = append(marks, m)
	}
	return marks
}

// eachSentence reads the sentences of a text into a judge, which has counted
// their words.
func eachSentence(t testing.TB, j *judge, document string, look func(s text.Sentence, block []byte)) {
	t.Helper()
	block := &text.Block{Text: []byte(document)}
	j.recurring.reset()
	j.count([]*text.Block{block})
	for s := range j.segmenter.Sentences(block.Text) {
		look(s, block.Text)
	}
}

func TestTinyModelIsWhole(t *testing.T) {
	e := openTiny(t, nil)
	if e.lm.Order() != tinyOrder || e.lexicon.Len() < 200 || e.calibration != nil {
		t.Errorf("order %d, %d words, calibration %v", e.lm.Order(), e.lexicon.Len(), e.calibration)
	}
	found := marksOf(t, e, "The tug let go her ancher near the pier.", Options{})
	if len(found) != 1 || found[0].Corrections[0].Text != "anchor" {
		t.Errorf("found %+v", found)
	}
}
