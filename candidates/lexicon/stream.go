package lexicon

import (
	"bytes"

	"example.org/foulcase/internal/text"
)

// Class is a symbol of the language model's stream that is no form.
type Class uint8

// The classes. Unknown, Name and Acronym stand for words the lexicon lacks, by
// their capitals: plain or mixed small letters, a capital first, all capitals.
const (
	Begin   Class = iota // before a sentence
	End                  // behind a sentence
	Unknown              // a word in small letters that is no form
	Name                 // one with a capital first, or mixed
	Acronym              // one in capitals
	Number
	Literal // code, address, path, identifier ...
	Comma
	Stop // semicolon, colon, dash
	Opening
	Closing
	Hyphen
	classes
)

var classNames = [classes]string{
	"<s>", "</s>", "<unknown>", "<name>", "<acronym>", "<number>", "<literal>",
	"<comma>", "<stop>", "<open>", "<close>", "<hyphen>",
}

// String gives the class's name as word lists and ledgers show it, like "<s>".
func (c Class) String() string {
	if c < classes {
		return classNames[c]
	}
	return "<?>"
}

// ClassID gives the id of a class: Len + c.
func (l *Lexicon) ClassID(c Class) uint32 { return l.forms + uint32(c) }

// Vocabulary is the number of ids in a stream, forms and classes.
func (l *Lexicon) Vocabulary() int { return int(l.forms) + int(classes) }

// clitic is an ending that the stream splits off a word that is no form.
type clitic struct {
	ending string
	id     uint32
}

// Clitics are forms of every lexicon built here from lists and counts: what
// remains of a word behind the stem, as pre-tokenised text writes it too.
var cliticEndings = [...]string{"'s", "n't", "'ll", "'d", "'ve", "'re", "'m"}

func (l *Lexicon) findClitics() []clitic {
	var found []clitic
	for _, ending := range cliticEndings {
		if id, ok := l.ID([]byte(ending)); ok {
			found = append(found, clitic{ending, id})
		}
	}
	return found
}

// Read appends the ids that a token adds to the stream, without allocation
// where dst has room (two ids):
//
//   - a word that is a form: its id ("dogs", "it's", "don't", "nasa");
//   - any other that ends in a clitic: the stem's id, or its class, and that of
//     the clitic ("dog's" is "dog" + "'s");
//   - any other word: Unknown, Name or Acronym by its capitals;
//   - a literal of letters alone that is known with mixed capitals ("iPhone"):
//     its id; any other literal, numbers and marks: their class;
//   - nothing for quotation marks, ends of sentences (End stands for them) and
//     other symbols.
func (l *Lexicon) Read(dst []uint32, tok text.Token) []uint32 {
	switch tok.Kind {
	case text.Word, text.Acronym:
		return l.readWord(dst, tok)
	case text.Literal:
		if id, ok := l.ID(tok.Norm); ok && l.Entry(id).Cases&MixedCase != 0 {
			return append(dst, id)
		}
	}
	if int(tok.Kind) < len(classOf) && classOf[tok.Kind] != 0 {
		return append(dst, l.ClassID(classOf[tok.Kind]))
	}
	return dst
}

// classOf gives the class of a kind of token that is no word; 0 (Begin, which
// no token is) for kinds that the stream leaves out.
var classOf = [...]Class{
	text.Number:  Number,
	text.Literal: Literal,
	text.Comma:   Comma,
	text.Stop:    Stop,
	text.Open:    Opening,
	text.Close:   Closing,
	text.Hyphen:  Hyphen,
}

func (l *Lexicon) readWord(dst []uint32, tok text.Token) []uint32 {
	if id, ok := l.ID(tok.Norm); ok {
		return append(dst, id)
	}
	shape := l.ClassID(shapeOf(tok))
	if bytes.IndexByte(tok.Norm, '\'') <= 0 {
		return append(dst, shape)
	}
	for _, c := range l.clitics {
		stem, ok := bytes.CutSuffix(tok.Norm, []byte(c.ending))
		if !ok || len(stem) == 0 {
			continue
		}
		if id, ok := l.ID(stem); ok {
			return append(dst, id, c.id)
		}
		return append(dst, shape, c.id)
	}
	return append(dst, shape)
}

// shapeOf classes a word the lexicon lacks by its capitals.
func shapeOf(tok text.Token) Class {
	switch {
	case tok.Kind == text.Acronym || tok.Case == text.Upper:
		return Acronym
	case tok.Case == text.Title || tok.Case == text.Mixed:
		return Name
	}
	return Unknown
}
