package train

import (
	"bufio"
	"bytes"
	"context"
	"encoding/binary"
	"errors"
	"fmt"
	"io"
	"strings"
)

// The first ids of a Vocabulary.
const (
	UnknownID = iota
	BeginID
	EndID
)

// Vocabulary numbers whitespace-separated words in the order of their first
// appearance: what a model of raw text has in place of a lexicon. Words
// "<unk>", "<s>" and "</s>" have the ids UnknownID, BeginID and EndID.
type Vocabulary struct {
	words []string
	ids   map[string]uint32
}

// NewVocabulary returns one that holds the three special words.
func NewVocabulary() *Vocabulary {
	v := &Vocabulary{ids: map[string]uint32{}}
	for _, w := range []string{"<unk>", "<s>", "</s>"} {
		v.Add(w)
	}
	return v
}

// Add returns the id of a word, new or known.
func (v *Vocabulary) Add(word string) uint32 {
	id, ok := v.ids[word]
	if !ok {
		id = uint32(len(v.words))
		word = strings.Clone(word)
		v.words = append(v.words, word)
		v.ids[word] = id
	}
	return id
}

// ID returns the id of a word, UnknownID if it has none.
func (v *Vocabulary) ID(word string) uint32 { return v.ids[word] }

// Word returns the word of an id below Len.
func (v *Vocabulary) Word(id uint32) string { return v.words[id] }

// Len returns the number of words, the special ones included.
func (v *Vocabulary) Len() int { return len(v.words) }

// Section returns the words as bytes for OpenVocabulary: their number, then
// each with its length in front, as unsigned varints.
func (v *Vocabulary) Section() []byte {
	out := binary.AppendUvarint(nil, uint64(len(v.words)))
	for _, w := range v.words {
		out = binary.AppendUvarint(out, uint64(len(w)))
		out = append(out, w...)
	}
	return out
}

// ErrVocabulary is wrapped by the errors of OpenVocabulary.
var ErrVocabulary = errors.New("train: not a usable vocabulary section")

// OpenVocabulary reads what Section wrote, copying it.
func OpenVocabulary(section []byte) (*Vocabulary, error) {
	r := bytes.NewReader(section)
	n, err := binary.ReadUvarint(r)
	if err != nil || n > uint64(len(section)) {
		return nil, fmt.Errorf("%w: number of words", ErrVocabulary)
	}
	v := &Vocabulary{ids: make(map[string]uint32, n)}
	for i := range n {
		length, err := binary.ReadUvarint(r)
		if err != nil || length > uint64(r.Len()) {
			return nil, fmt.Errorf("%w: word %d of %d is cut", ErrVocabulary, i, n)
		}
		word := make([]byte, length)
		if _, err := io.ReadFull(r, word); err != nil {
			return nil, fmt.Errorf("%w: %v", ErrVocabulary, err)
		}
		if v.Add(string(word)) != uint32(i) {
			return nil, fmt.Errorf("%w: %q twice", ErrVocabulary, word)
		}
	}
	if r.Len() != 0 || len(v.words) <= EndID {
		return nil, fmt.Errorf("%w: %d words and %d bytes more", ErrVocabulary, n, r.Len())
	}
	return v, nil
}

// RawText yields the lines of text as sentences of ids, each with begin and
// end. With grow, new words enter the vocabulary; without, they are UnknownID.
// Empty lines are sentences of no words.
func RawText(text io.Reader, v *Vocabulary, grow bool) Sentences {
	return func(yield func([]uint32, error) bool) {
		lines := bufio.NewReaderSize(text, 1<<16)
		var sentence []uint32
		for number := 1; ; number++ {
			line, err := lines.ReadString('\n')
			if err != nil && err != io.EOF {
				yield(nil, fmt.Errorf("line %d: %w", number, err))
				return
			}
			if line == "" && err == io.EOF {
				return
			}
			sentence = append(sentence[:0], BeginID)
			for word := range strings.FieldsSeq(line) {
				id, known := v.ids[word]
				if !known && grow {
					id = v.Add(word)
				}
				sentence = append(sentence, id)
			}
			if !yield(append(sentence, EndID), nil) {
				return
			}
		}
	}
}

// TrainRaw trains on whitespace-separated words, a sentence a line, and
// returns the vocabulary that the text gave. It sets Options.Begin and End.
func TrainRaw(ctx context.Context, text io.Reader, o Options) (*Result, *Vocabulary, error) {
	v := NewVocabulary()
	o.Vocabulary, o.Begin, o.End = 0, BeginID, EndID
	r, err := Train(ctx, RawText(text, v, true), o)
	return r, v, err
}
