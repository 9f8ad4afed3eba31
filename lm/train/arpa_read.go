package train

import (
	"bufio"
	"bytes"
	"compress/gzip"
	"errors"
	"fmt"
	"io"
	"math"
	"math/bits"
	"strconv"

	"example.org/foulcase/lm"
)

// ErrARPA is wrapped by the errors of ReadARPA, which name the line.
var ErrARPA = errors.New("not a sound ARPA file")

// unknownNats prices unknown words in a file without "<unk>", and stands in
// where a file says that something cannot happen: 10^-99, as is usual there.
const unknownNats = -99 * math.Ln10

// ReadARPA reads a model in the ARPA n-gram format, plain or gzipped. Order and
// vocabulary are the file's. N-grams that others need as parent or context, and
// the file lacks, are added with the price that backing off gives them.
func ReadARPA(r io.Reader) (lm.Tables, *Vocabulary, error) {
	in := bufio.NewReaderSize(r, 1<<16)
	if head, _ := in.Peek(2); bytes.Equal(head, []byte{0x1f, 0x8b}) {
		z, err := gzip.NewReader(in)
		if err != nil {
			return nil, nil, fmt.Errorf("%w: %w", ErrARPA, err)
		}
		in = bufio.NewReaderSize(z, 1<<16)
	}
	a := &arpaReader{in: in, vocabulary: NewVocabulary()}
	if err := a.read(); err != nil {
		return nil, nil, err
	}
	t, err := a.tables()
	return t, a.vocabulary, err
}

// arpaGram is a line of the file.
type arpaGram struct {
	key           key
	prob, backoff float32 // nats; prob is NaN where it is to be filled in
	line          int
}

type arpaReader struct {
	in         *bufio.Reader
	line       int
	vocabulary *Vocabulary
	width      uint // of a word in a key
	counts     []int
	grams      [][]arpaGram
}

func (a *arpaReader) fail(format string, args ...any) error {
	return fmt.Errorf("%w: line %d: %s", ErrARPA, a.line, fmt.Sprintf(format, args...))
}

// next returns the next line that is not blank, without white space around it.
func (a *arpaReader) next() ([]byte, error) {
	for {
		text, err := a.in.ReadBytes('\n')
		if len(text) > 0 || err == nil {
			a.line++
		}
		if text = bytes.Trim(text, " \t\r\n"); len(text) > 0 {
			return text, nil
		}
		if err == io.EOF {
			return nil, a.fail("the file ends early; it should end with \\end\\")
		}
		if err != nil {
			return nil, a.fail("%v", err)
		}
	}
}

func (a *arpaReader) read() error {
	line, err := a.header()
	for order := 1; err == nil && order <= len(a.counts); order++ {
		if want := fmt.Sprintf("\\%d-grams:", order); string(line) != want {
			return a.fail("%q where %s should begin", line, want)
		}
		line, err = a.section(order)
	}
	if err == nil && string(line) != "\\end\\" {
		return a.fail("%q where \\end\\ should be", line)
	}
	return err
}

// header reads to the line behind the counts.
func (a *arpaReader) header() ([]byte, error) {
	line, err := a.next()
	for err == nil && string(line) != "\\data\\" { // text in front is allowed
		line, err = a.next()
	}
	if err != nil {
		return nil, err
	}
	for {
		if line, err = a.next(); err != nil {
			return nil, err
		}
		count, ok := bytes.CutPrefix(line, []byte("ngram "))
		if !ok {
			break
		}
		order, n, ok := bytes.Cut(count, []byte("="))
		k, err1 := strconv.Atoi(string(bytes.TrimSpace(order)))
		c, err2 := strconv.ParseUint(string(bytes.TrimSpace(n)), 10, 31)
		if !ok || err1 != nil || err2 != nil {
			return nil, a.fail("%q is no count of n-grams", line)
		}
		if k != len(a.counts)+1 {
			return nil, a.fail("count of %d-grams where that of %d-grams should be", k, len(a.counts)+1)
		}
		a.counts = append(a.counts, int(c))
	}
	if len(a.counts) == 0 || len(a.counts) > lm.MaxOrder {
		return nil, a.fail("order %d; this program handles 1 to %d", len(a.counts), lm.MaxOrder)
	}
	return line, nil
}

// section reads the n-grams of one order and returns the line behind them.
func (a *arpaReader) section(order int) ([]byte, error) {
	var grams []arpaGram
	var fields [][]byte
	for {
		line, err := a.next()
		if err != nil {
			return nil, err
		}
		if line[0] == '\\' {
			if len(grams) != a.counts[order-1] {
				return nil, a.fail("%d %d-grams, but the header counts %d", len(grams), order, a.counts[order-1])
			}
			a.grams = append(a.grams, grams)
			if order == 1 {
				err = a.sizeKeys()
			}
			return line, err
		}
		fields = split(fields[:0], line)
		gram, err := a.gram(order, fields)
		if err != nil {
			return nil, err
		}
		grams = append(grams, gram)
	}
}

// split cuts a line at spaces and tabs only: words may hold any other byte.
func split(fields [][]byte, line []byte) [][]byte {
	for len(line) > 0 {
		end := bytes.IndexAny(line, " \t")
		if end < 0 {
			end = len(line)
		}
		if end > 0 {
			fields = append(fields, line[:end])
		}
		line = line[min(end+1, len(line)):]
	}
	return fields
}

// sizeKeys sets the width of a word once all unigrams are known, each once.
func (a *arpaReader) sizeKeys() error {
	lines := make([]int, a.vocabulary.Len())
	for _, g := range a.grams[0] {
		if first := &lines[g.key.lo]; *first == 0 {
			*first = g.line
		} else {
			return a.fail("the unigram of line %d was in line %d before", g.line, *first)
		}
	}
	a.width = uint(bits.Len(uint(a.vocabulary.Len())))
	if len(a.counts) > 1 && a.width*uint(len(a.counts)) > 128 {
		return a.fail("%d words at order %d; this program handles %d bits of them an n-gram, not %d",
			a.vocabulary.Len(), len(a.counts), 128, a.width*uint(len(a.counts)))
	}
	return nil
}

func (a *arpaReader) gram(order int, fields [][]byte) (arpaGram, error) {
	g := arpaGram{line: a.line}
	if len(fields) != order+1 && (len(fields) != order+2 || order == len(a.counts)) {
		return g, a.fail("%d fields in the line of a %d-gram", len(fields), order)
	}
	prob, err := a.value(fields[0])
	if err != nil {
		return g, err
	}
	if prob > 0 {
		return g, a.fail("log probability %s is above zero", fields[0])
	}
	g.prob = prob
	if len(fields) == order+2 {
		if g.backoff, err = a.value(fields[order+1]); err != nil {
			return g, err
		}
	}
	words := make([]uint32, order)
	for i, field := range fields[1 : order+1] {
		if order == 1 {
			words[i] = a.vocabulary.Add(string(field))
			continue
		}
		id, known := a.vocabulary.ids[string(field)]
		if !known {
			return g, a.fail("the word %q is no unigram", field)
		}
		words[i] = id
	}
	if order == 1 {
		g.key.lo = uint64(words[0])
	} else {
		g.key = packer{order, a.width}.pack(words)
	}
	return g, nil
}

// value reads a log10 value as nats.
func (a *arpaReader) value(field []byte) (float32, error) {
	v, err := strconv.ParseFloat(string(field), 64)
	if err != nil && !errors.Is(err, strconv.ErrRange) || math.IsNaN(v) {
		return 0, a.fail("%q is no number", field)
	}
	return float32(min(max(v*math.Ln10, unknownNats), -unknownNats)), nil
}
