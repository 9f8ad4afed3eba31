// Package lm scores words in context with a back-off n-gram model that is
// used in place from a byte slice.
//
// A model is a reversed trie: the root's children are the predicted words, and
// each step down reads one word further to the left, so the whole of a query
// is one descent: the deepest n-gram that ends in the word is found on the
// way, and the back-off weights of the word as a context are collected for
// the next query (Heafield 2011, "KenLM: Faster and Smaller Language Model
// Queries"; Germann, Joanis and Larkin 2009 for the suffix trie). Each level is
// sorted and cut into blocks of 64 n-grams with keys and child ranges in
// Elias-Fano coding (Pibiri and Venturini 2017); log probabilities and back-offs
// are codes into learned codebooks (Federico and Bertoldi 2006).
//
// Word ids are dense, 0..Vocabulary()-1. Every word has a unigram, so every
// word has a finite score. All scores are natural logarithms (nats).
//
// A Model is immutable and safe for concurrent use. It keeps the section it
// was opened from, which must not change while the model is in use.
package lm
