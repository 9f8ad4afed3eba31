package main

import (
	"context"
	"errors"
	"fmt"
	"os"
	"os/signal"
	"strings"

	"example.org/foulcase"
	"github.com/spf13/pflag"
)

func modelBuildVerb() verb {
	return verb{
		name:     "model build",
		operands: "",
		summary:  "make a model file from its parts",
		about: `
Writes a model file. --text and --words give the lexicon, --pairs the channel;
--from takes over the sections that another model file has, and a part given by
its own flag replaces one taken over. Built twice from the same parts, the files
are the same byte for byte.

Texts are plain: a paragraph a line, blank lines between documents; every tenth
document is left out, to measure on. Word lists have a word a line. Pairs are
lines of observed, intended and count, parted by tabs. Edits are lines of
observed and intended letters and a count. Homophones are lines of words parted
by commas.

The model notes, as hashes, which pairs its channel was learned from, so that
eval can refuse to measure on them. For a model made before this was noted, name
them again: --from OLD.fcm --fitted PAIRS -o NEW.fcm changes nothing else.`,
		examples: `
			foulcase model build --text testdata/tiny/corpus.txt --words en-GB=testdata/tiny/words-en-GB.txt --words en-US=testdata/tiny/words-en-US.txt --pairs testdata/tiny/pairs.tsv -o base.fcm`,
		declare: declareModelBuild,
	}
}

// modelParts are what a model is built from.
type modelParts struct {
	texts      []string // plain text, files or folders
	words      []wordList
	pairs      []string // tab-separated
	fitted     []string // likewise; what a channel taken over was fitted to
	edits      string   // counts of single-letter edits
	homophones string
	from       []string // model files whose sections are taken over, later ones first
	judgement  string   // JSON
	calibrated string   // JSON
	card       string
	output     string
}

// wordList is a file of words of one variety, or of any.
type wordList struct {
	variety foulcase.Variety
	path    string
}

func declareModelBuild(fs *pflag.FlagSet) action {
	p := new(modelParts)
	fs.StringArrayVar(&p.texts, "text", nil, "`FILE` or folder of text to count words in; may be repeated")
	fs.Var((*wordLists)(&p.words), "words", "word list of a variety: en-US=FILE, en-GB=FILE or any=FILE; may be repeated")
	fs.StringArrayVar(&p.pairs, "pairs", nil, "`FILE` of corrections to learn the channel from; may be repeated")
	fs.StringArrayVar(&p.fitted, "fitted", nil, "`FILE` of corrections that a channel taken over was learned from; only noted")
	fs.StringVar(&p.edits, "edits", "", "`FILE` of counts of single-letter edits to smooth the channel with")
	fs.StringVar(&p.homophones, "homophones", "", "`FILE` of words that sound alike")
	fs.StringArrayVar(&p.from, "from", nil, "model `FILE` to take sections from; of several, the last that has one gives it")
	fs.StringVar(&p.judgement, "judgement", "", "`FILE` of weights and thresholds, JSON")
	fs.StringVar(&p.calibrated, "calibration", "", "`FILE` that model calibrate wrote for these parts, JSON")
	fs.StringVar(&p.card, "card", "", "`FILE` with the model card")
	fs.StringVarP(&p.output, "output", "o", "", "model `FILE` to write (must be given)")
	return func(c *console, operands []string) (status, error) {
		switch {
		case p.output == "":
			return trouble, misusef("say with -o which file to write")
		case len(p.pairs) > 0 && len(p.fitted) > 0:
			return trouble, misusef("--fitted is for a channel taken over; --pairs learns one, and notes its pairs itself")
		case len(operands) > 0:
			return trouble, misusef("%q is no flag; every part has its own", operands[0])
		}
		ctx, cancel := signal.NotifyContext(context.Background(), os.Interrupt)
		defer cancel()
		err := buildModel(ctx, c, p)
		if errors.Is(err, context.Canceled) {
			err = fmt.Errorf("interrupted; %s was not written", p.output)
		}
		return clean, err
	}
}

// wordLists is the flag --words.
type wordLists []wordList

func (l *wordLists) Type() string { return "VARIETY=FILE" }

func (l *wordLists) String() string {
	var all []string
	for _, w := range *l {
		all = append(all, w.variety.String()+"="+w.path)
	}
	return strings.Join(all, " ")
}

func (l *wordLists) Set(s string) error {
	name, path, ok := strings.Cut(s, "=")
	if !ok || path == "" {
		return errors.New("want a variety and a file, such as en-GB=words.txt")
	}
	variety, err := foulcase.ParseVariety(name)
	if err != nil {
		return err
	}
	*l = append(*l, wordList{variety, path})
	return nil
}
