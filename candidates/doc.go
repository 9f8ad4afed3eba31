// Package candidates finds what may have been meant by what was typed: it
// searches the lexicon for the cheapest words under the error model and the
// prior of words, cheapest first, and gives the readings in which a space was
// left out, put in, or an apostrophe lost.
//
// The search is best first (A*: Hart, Nilsson & Raphael 1968) over pairs of a
// path of the lexicon's automaton and a place in the observed word. What the
// letters so far have cost, plus a floor under what the rest of the observed
// word must cost, plus the best prior of any word below the path, never exceeds
// the final score, so words come out in exact order and no distance limit
// decides what can be found. The floor looks one letter ahead: it knows the next
// letter meant and the one before, and is tabulated for each place of the
// observed word, so that most branches are refused by their label alone.
package candidates
