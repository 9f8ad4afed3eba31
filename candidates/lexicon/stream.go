package lexicon

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
