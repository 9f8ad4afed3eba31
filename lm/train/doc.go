// Package train estimates n-gram models: it counts sentences of word ids in
// sorted runs that spill to disk, smooths the counts by interpolated modified
// Kneser-Ney (Chen and Goodman 1998), prunes to a size, quantises, and writes
// the section that package lm opens. It also reads and writes the ARPA
// interchange format and measures perplexity.
//
// Probabilities and back-offs are natural logarithms (nats) everywhere but in
// ARPA files, which hold log10. The same input and options give the same bytes,
// whatever the memory budget and the number of workers.
package train
