package eval

import (
	"slices"
	"strings"
)

// Replaced aligns two versions of a text, given as their sentences, and returns
// the words that were replaced, those with a space put in or taken out included.
// Sentences that both versions have once, and in one order, hold them together; what
// stands between is aligned word by word. Others counts the other changes: words put
// in or left out, figures, signs, and stretches too long and too unlike to be aligned.
func Replaced(before, after []string) (replaced []Pair, others int) {
	i, j := 0, 0
	for _, a := range append(anchors(before, after), anchor{len(before), len(after)}) {
		pairs, n := replacedIn(before[i:a.before], after[j:a.after])
		replaced, others = append(replaced, pairs...), others+n
		i, j = a.before+1, a.after+1
	}
	return replaced, others
}

func replacedIn(before, after []string) (replaced []Pair, others int) {
	source, corrected := tokenizeAll(before), tokenizeAll(after)
	for _, e := range align(source, corrected) {
		from, to := source[e.i:e.i2], corrected[e.j:e.j2]
		if e.unaligned() || !allWords(from) || !allWords(to) {
			others++
			continue
		}
		replaced = append(replaced, Pair{Observed: spell(from), Intended: spell(to), Count: 1, Spaces: len(from) != len(to)})
	}
	return replaced, others
}

func tokenizeAll(sentences []string) []token {
	var tokens []token
	for _, s := range sentences {
		tokens = append(tokens, tokenize(s)...)
	}
	return tokens
}

// allWords reports whether there are tokens, and all are words without figures.
func allWords(tokens []token) bool {
	return len(tokens) > 0 && !slices.ContainsFunc(tokens, func(t token) bool { return !t.word || t.digits })
}

func spell(tokens []token) string {
	words := make([]string, len(tokens))
	for i, t := range tokens {
		words[i] = t.text
	}
	return strings.Join(words, " ")
}

// anchor is a sentence that stands in both versions, by its indexes.
type anchor struct{ before, after int }

// anchors finds the longest run of sentences that each version has once, in one
// order (patience sorting): time grows with n log n, whatever the texts.
func anchors(before, after []string) []anchor {
	places := map[string]int{} // of sentences that stand once in after
	for j, s := range after {
		if _, again := places[s]; again {
			j = -1
		}
		places[s] = j
	}
	times := map[string]int{}
	for _, s := range before {
		times[s]++
	}
	var piles []int // the best end of a run of each length, an index into list
	type link struct {
		anchor
		previous int
	}
	var list []link
	for i, s := range before {
		j, ok := places[s]
		if !ok || j < 0 || times[s] > 1 {
			continue
		}
		k, _ := slices.BinarySearchFunc(piles, j, func(at, j int) int { return list[at].after - j })
		previous := -1
		if k > 0 {
			previous = piles[k-1]
		}
		if k == len(piles) {
			piles = append(piles, 0)
		}
		piles[k] = len(list)
		list = append(list, link{anchor{i, j}, previous})
	}
	var run []anchor
	if len(piles) > 0 {
		for at := piles[len(piles)-1]; at >= 0; at = list[at].previous {
			run = append(run, list[at].anchor)
		}
	}
	slices.Reverse(run)
	return run
}
