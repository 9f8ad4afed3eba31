package main

import (
	"io"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/internal/report"
	"github.com/spf13/pflag"
)

func ledgerVerb() verb {
	return verb{
		name:     "ledger",
		operands: "SENTENCE",
		summary:  "take the scores of a sentence apart",
		about: `
Prints, for each word of the sentence, the candidates that were weighed: how the
channel comes from what was intended to what was written, which n-grams the
language model used, the weights, the probability and the threshold it was held
against. Without a SENTENCE, or with "-", it is read from standard input.
--emit jsonl prints the same as one object.`,
		examples: `
			foulcase ledger "The launch will birth at noon."`,
		declare: declareLedger,
	}
}

// maxSentence is how much of standard input is taken as the sentence, in bytes.
const maxSentence = 64 << 10

func declareLedger(fs *pflag.FlagSet) action {
	var engine engineFlags
	engine.declare(fs)
	fs.Var(new(rate), "budget", "false alarms to bear in 1,000 words of good text (default: the model's own)")
	emit := emitFlag(fs)
	return func(c *console, words []string) (status, error) {
		sentence := strings.Join(words, " ")
		if sentence == "" || sentence == standardInput {
			data, err := io.ReadAll(io.LimitReader(c.in, maxSentence))
			if err != nil {
				return trouble, err
			}
			sentence = string(data)
		}
		if strings.TrimSpace(sentence) == "" {
			return trouble, misusef("no sentence to take apart")
		}
		e, o, err := engine.open()
		if err != nil {
			return trouble, err
		}
		defer e.Close()
		return clean, printLedger(c.out, e.Ledger(sentence, o), emit.value)
	}
}

func printLedger(w io.Writer, l foulcase.Ledger, emit string) error {
	if emit == "jsonl" {
		return report.JSONLines(w).Encode(l)
	}
	_, err := io.WriteString(w, l.String())
	return err
}
