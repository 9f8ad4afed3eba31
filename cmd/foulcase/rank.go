package main

import (
	"bufio"
	"errors"
	"fmt"
	"io"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/internal/report"
	"github.com/spf13/pflag"
)

func rankVerb() verb {
	return verb{
		name:     "rank",
		operands: "[WORD...]",
		summary:  "list what a word may have been meant to be",
		about: `
Prints the candidates of each word, best first, with their probability and the
two parts of it: channel, how likely the intended word is written so, and lm,
how likely that word is here; both are natural logarithms. Without a WORD, words
are read from standard input, one a line, and answered as they come.

--emit jsonl prints an object a word, in the order of the words: word, known
(the lexicon has it) and candidates ({text, p, channel, lm}, best first).`,
		examples: `
			foulcase rank sikology
			foulcase rank --left "the tug left her" --right "at noon" -k 3 birth`,
		declare: declareRank,
	}
}

// rankFlags are what the user asked of rank.
type rankFlags struct {
	engine      engineFlags
	left, right string
	k           count
	emit        *choice
	color       *choice
}

func declareRank(fs *pflag.FlagSet) action {
	f := &rankFlags{k: 20}
	f.engine.declare(fs)
	fs.StringVar(&f.left, "left", "", "`TEXT` that stands before the word")
	fs.StringVar(&f.right, "right", "", "`TEXT` that follows the word")
	fs.VarP(&f.k, "count", "k", "how many candidates at most")
	f.emit = emitFlag(fs)
	f.color = colorFlag(fs)
	return f.run
}

func (f *rankFlags) run(c *console, words []string) (status, error) {
	e, o, err := f.engine.open()
	if err != nil {
		return trouble, err
	}
	defer e.Close()
	options := foulcase.RankOptions{K: int(f.k), Left: f.left, Right: f.right, Variety: o.Variety, House: o.House}
	print := f.printer(c)
	for _, word := range words {
		if err := print(e.Rank(word, options)); err != nil {
			return trouble, err
		}
	}
	if len(words) > 0 {
		return clean, nil
	}
	return clean, eachLine(c.in, c.out.Flush, func(word string) error {
		return print(e.Rank(word, options))
	})
}

func (f *rankFlags) printer(c *console) func(foulcase.Ranking) error {
	if f.emit.value == "jsonl" {
		enc := report.JSONLines(c.out)
		return func(r foulcase.Ranking) error { return enc.Encode(r) }
	}
	p := choosePalette(f.color.value, c.out.terminal)
	return func(r foulcase.Ranking) error {
		_, err := io.WriteString(c.out, rankingLines(r, p))
		return err
	}
}

// rankingLines prints a word and, under it, a line for each candidate.
func rankingLines(r foulcase.Ranking, p report.Palette) string {
	note := "not in the lexicon"
	if r.Known {
		note = "in the lexicon"
	}
	width := 0
	for _, candidate := range r.Candidates {
		width = max(width, len([]rune(candidate.Text)))
	}
	var b strings.Builder
	fmt.Fprintf(&b, "%s %s\n", p.Paint(report.Bold, report.Quoted(r.Word)), p.Paint(report.Dim, note))
	for i, candidate := range r.Candidates {
		text := fmt.Sprintf("%-*s", width, candidate.Text)
		if i == 0 {
			text = p.Paint(report.Green, text)
		}
		fmt.Fprintf(&b, "  %s  %.4f  %s\n", text, candidate.P,
			p.Paint(report.Dim, fmt.Sprintf("channel %7.2f  lm %7.2f", candidate.Channel, candidate.LM)))
	}
	return b.String()
}

// maxLine is the longest line of words that is read, in bytes.
const maxLine = 64 << 10

// eachLine calls do with every line of r, white space around it trimmed. It
// calls flush before it waits for more input, so that a program that asks word
// by word gets its answers.
func eachLine(r io.Reader, flush func() error, do func(line string) error) error {
	lines := bufio.NewReaderSize(r, maxLine)
	for n := 1; ; n++ {
		if lines.Buffered() == 0 {
			if err := flush(); err != nil {
				return err
			}
		}
		line, err := lines.ReadSlice('\n')
		switch {
		case errors.Is(err, bufio.ErrBufferFull):
			return fmt.Errorf("standard input:%d: line longer than %s; give one word a line", n, formatSize(maxLine))
		case err != nil && err != io.EOF:
			return fmt.Errorf("standard input:%d: %w", n, err)
		case err == io.EOF && len(line) == 0:
			return nil
		}
		if err := do(strings.TrimSpace(string(line))); err != nil {
			return err
		}
	}
}
