package train

import (
	"bufio"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"example.org/foulcase/lm"
)

// WriteARPA writes a model in the ARPA n-gram format, values as log10. word
// gives the spelling of an id; spellings must be free of white space.
func WriteARPA(w io.Writer, t lm.Tables, word func(id uint32) string) error {
	out := bufio.NewWriterSize(w, 1<<16)
	out.WriteString("\\data\\\n")
	for k := range t {
		fmt.Fprintf(out, "ngram %d=%d\n", k+1, t.Len(k))
	}
	for k := range t {
		fmt.Fprintf(out, "\n\\%d-grams:\n", k+1)
		a := arpaWriter{tables: t, order: k, word: word, out: out}
		for id := range uint32(t.Len(0)) {
			if err := a.walk(0, id, id); err != nil {
				return err
			}
		}
	}
	out.WriteString("\n\\end\\\n")
	return out.Flush()
}

// arpaWriter writes the n-grams of one order.
type arpaWriter struct {
	tables lm.Tables
	order  int // 0-based
	word   func(uint32) string
	out    *bufio.Writer
	path   [lm.MaxOrder]uint32 // words so far, last first
	line   []byte
}

// walk goes down from n-gram i of level k, whose leftmost word is id.
func (a *arpaWriter) walk(k int, i, id uint32) error {
	a.path[k] = id
	if k == a.order {
		return a.write(i)
	}
	t := &a.tables[k]
	for c := t.First[i]; c < t.First[i+1]; c++ {
		if err := a.walk(k+1, c, a.tables[k+1].Word[c]); err != nil {
			return err
		}
	}
	return nil
}

func (a *arpaWriter) write(i uint32) error {
	t := &a.tables[a.order]
	a.line = appendLog10(a.line[:0], t.LogProb[i])
	for k := a.order; k >= 0; k-- {
		a.line = append(a.line, " \t"[btoi(k == a.order)])
		word := a.word(a.path[k])
		if word == "" || strings.ContainsAny(word, " \t\r\n") {
			return fmt.Errorf("train: an ARPA file cannot hold the word %q", word)
		}
		a.line = append(a.line, word...)
	}
	if t.Backoff != nil {
		a.line = append(a.line, '\t')
		a.line = appendLog10(a.line, t.Backoff[i])
	}
	_, err := a.out.Write(append(a.line, '\n'))
	return err
}

func btoi(b bool) int {
	if b {
		return 1
	}
	return 0
}

// appendLog10 appends nats as log10 with the digits of single precision.
func appendLog10(dst []byte, nats float32) []byte {
	return strconv.AppendFloat(dst, float64(nats)/math.Ln10+0, 'g', 8, 64)
}
