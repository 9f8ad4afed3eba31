package text

// Kind says what a token is.
type Kind uint8

// The kinds. Word, Acronym and Literal may carry a Norm, see [Token].
const (
	Other    Kind = iota // symbols, emoji, letters of other scripts, the point of an abbreviation
	Word                 // a word in Latin letters
	Number               // digits with their signs, units, separators; roman numerals
	Literal              // left alone: code, URL, mail address, path, identifier, version, hash, single letter
	Acronym              // NASA, PCs, U.S., e.g., the initial "J."
	Hyphen               // - U+2010 U+2011, and U+2013 between letters
	Comma                // ,
	Stop                 // ; : / dashes, ellipses
	Open                 // ( [ {
	Close                // ) ] }
	Quote                // quotation marks, an apostrophe outside words
	Terminal             // . ! ? that is no part of a word or number
)

var kindNames = [...]string{
	"Other", "Word", "Number", "Literal", "Acronym", "Hyphen",
	"Comma", "Stop", "Open", "Close", "Quote", "Terminal",
}

// String returns the name of the constant.
func (k Kind) String() string {
	if int(k) < len(kindNames) {
		return kindNames[k]
	}
	return "Kind?"
}

// Token is one unit of a sentence.
//
// Norm is the normal form (see [Fold]) of words, of acronyms, and of those
// literals that consist of letters alone (camelCase, single letters); it is nil
// for all other tokens. It aliases the block or the segmenter's arena and lives
// as long as the sentence does.
type Token struct {
	Start, End int    // byte offsets into the block's text
	Norm       []byte // normal form, or nil
	Kind       Kind
	Case       Case
	Glued      bool // no white space stands between the token before and this one
}

// Sentence is a run of tokens that are read together. Start and End are byte
// offsets into the block's text; white space around it is left out. Tokens
// belongs to the segmenter and is valid until its next sentence.
type Sentence struct {
	Start, End int
	Tokens     []Token
}
