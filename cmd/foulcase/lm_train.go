package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"

	"example.org/foulcase"
	"example.org/foulcase/internal/modelfile"
	"example.org/foulcase/lm/train"
	"github.com/spf13/pflag"
)

// sectionVocabulary holds the words of a model trained on raw text, which has
// no lexicon.
const sectionVocabulary = "vocabulary"

func lmTrainVerb() verb {
	return verb{
		name:     "lm train",
		operands: "TEXT...",
		summary:  "learn a language model from text",
		about: `
Counts the n-grams of plain text (files, folders or "-"; a paragraph a line,
blank lines between documents), smooths them by interpolated modified
Kneser-Ney, prunes them to a size and writes a model file that holds the
language model and the lexicon whose words it speaks of. "foulcase model build
--from" puts it together with the other parts.

With --raw there is no lexicon: a line is a sentence, white space parts the
words, and the words themselves are stored.`,
		examples: `
			foulcase lm train --lexicon base.fcm --order 3 --size 1MiB --hold-out -o lm.fcm testdata/tiny/corpus.txt`,
		declare: declareLMTrain,
	}
}

// lmTrainFlags are what the user asked of lm train.
type lmTrainFlags struct {
	lexicon string
	raw     bool
	order   count
	size    size
	memory  size
	temp    string
	holdOut bool
	output  string
}

func declareLMTrain(fs *pflag.FlagSet) action {
	f := &lmTrainFlags{order: 4, memory: 1 << 30}
	fs.StringVar(&f.lexicon, "lexicon", "", "model `FILE` whose lexicon is used (default: the English model inside foulcase)")
	fs.BoolVar(&f.raw, "raw", false, "use the words of the text as they stand, without a lexicon")
	fs.Var(&f.order, "order", "words in the longest n-gram")
	fs.Var(&f.size, "size", "prune the model to this many bytes (default: no pruning)")
	fs.Var(&f.memory, "memory", "memory for counting; what does not fit goes to disk")
	fs.StringVar(&f.temp, "temp", "", "`FOLDER` for what goes to disk (default: that of the system)")
	fs.BoolVar(&f.holdOut, "hold-out", false, "leave every tenth document out, to measure on")
	fs.StringVarP(&f.output, "output", "o", "", "model `FILE` to write (must be given)")
	return f.run
}

func (f *lmTrainFlags) run(c *console, operands []string) (status, error) {
	switch {
	case f.output == "":
		return trouble, misusef("say with -o which file to write")
	case f.raw && (f.lexicon != "" || f.holdOut):
		return trouble, misusef("--raw goes with neither --lexicon nor --hold-out")
	}
	text, err := openCorpus(c, operands)
	if err != nil {
		return trouble, err
	}
	ctx, cancel := signal.NotifyContext(context.Background(), os.Interrupt)
	defer cancel()
	learn := f.fromText
	if f.raw {
		learn = f.fromRaw
	}
	w := modelfile.NewWriter()
	result, err := learn(ctx, text, w)
	if errors.Is(err, context.Canceled) {
		return trouble, fmt.Errorf("interrupted; %s was not written", f.output)
	}
	if err != nil {
		return trouble, err
	}
	if err := w.WriteFile(f.output); err != nil {
		return trouble, err
	}
	return clean, printTraining(c.out, result)
}

// fromText learns from prose, over the ids of a lexicon.
func (f *lmTrainFlags) fromText(ctx context.Context, text *corpus, w *modelfile.Writer) (*train.Result, error) {
	file, err := openModelFile(f.lexicon)
	if err != nil {
		return nil, err
	}
	defer file.Close()
	lex, section, err := lexiconOf(file, f.lexicon)
	if err != nil {
		return nil, err
	}
	part := train.Whole
	if f.holdOut {
		part = train.Training
	}
	text.start("lm train")
	result, err := train.Train(ctx, text.sentences(part, lex), train.TextOptions(lex, f.options(text.progress)))
	if err != nil {
		return nil, err
	}
	return result, errors.Join(
		w.Set(foulcase.SectionLexicon, append([]byte(nil), section...)), // outlives the mapping
		w.Set(foulcase.SectionLM, result.Section))
}

// fromRaw learns from words parted by white space.
func (f *lmTrainFlags) fromRaw(ctx context.Context, text *corpus, w *modelfile.Writer) (*train.Result, error) {
	text.start("lm train")
	result, words, err := train.TrainRaw(ctx, text.reader(), f.options(text.progress))
	if err != nil {
		return nil, err
	}
	return result, errors.Join(
		w.Set(sectionVocabulary, words.Section()),
		w.Set(foulcase.SectionLM, result.Section))
}

func (f *lmTrainFlags) options(p *progress) train.Options {
	return train.Options{
		Order:    int(f.order),
		Size:     int64(f.size),
		Memory:   int64(f.memory),
		TempDir:  f.temp,
		Progress: trainingProgress(p),
	}
}

// trainingProgress shows the stages of training. Counting is followed by the
// bytes read.
func trainingProgress(p *progress) func(train.Progress) {
	return func(at train.Progress) {
		switch {
		case at.Stage == "count":
		case at.Order > 0:
			p.Set(fmt.Sprintf("lm train: %s, order %d", at.Stage, at.Order), 0)
		default:
			p.Set("lm train: "+at.Stage, 0)
		}
	}
}

// printTraining gives an account of a trained model.
func printTraining(w io.Writer, r *train.Result) error {
	_, err := fmt.Fprintf(w, "%d sentences, %d tokens, %s\n", r.Sentences, r.Tokens, formatSize(int64(len(r.Section))))
	for k := range r.Kept {
		if err == nil {
			_, err = fmt.Fprintf(w, "order %d: %d n-grams counted, %d kept\n", k+1, r.Counted[k], r.Kept[k])
		}
	}
	return err
}
