// Package channel is the error model: how likely a writer who meant one word
// typed another, P(observed|intended).
//
// The model is generative and reads the intended word from left to right. In
// front of each letter, and at the end, any number of letters may be inserted;
// then the letter is kept, replaced, dropped, or swapped with the next one, or
// a rule rewrites up to four letters at once ("ph" to "f"). Every choice is
// priced by its neighbours in the intended word: the letter to the left, as in
// Kernighan, Church & Gale (1990), and the letter to the right; the edges of
// the word are neighbours like any other. Rules follow Brill & Moore (2000).
//
// All prices are costs in nats, -log p, never negative. They are conditional
// on the word being misspelt, because the pairs the model is fitted on are: the
// chance that a word is misspelt at all is the business of the caller. The
// probabilities of everything that could be observed for one intended word sum
// to at most one.
package channel
