// Package text turns bytes into prose: blocks free of markup, sentences, and
// tokens with a normal form.
//
// The path is one way and every step keeps byte offsets into what it read:
//
//	io.Reader --Blocks--> Block.Text --Segmenter.Sentences--> Sentence.Tokens
//
// Coordinates. A [Token] and a [Sentence] hold byte offsets into Block.Text;
// [Block.Source] turns those into byte offsets into the source, from its first
// byte, a byte order mark included. A [Position] counts lines and columns from
// one, columns in code points; lines end with LF, CRLF or a lone CR.
//
// What is a word and what is left alone is decided by shape only, in rules.go;
// no word list is consulted, so that the same bytes always give the same
// tokens. The one word list here, of abbreviations, serves sentence ends.
package text
