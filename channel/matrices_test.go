package channel_test

import (
	"bufio"
	"math"
	"os"
	"slices"
	"strconv"
	"strings"
	"testing"

	"example.org/foulcase/channel"
)

// readMatrices reads the published confusion counts (Kernighan, Church & Gale 1990).
func readMatrices(t testing.TB) *channel.Matrices {
	t.Helper()
	f, err := os.Open(shared(t, "reference/kernighan1990-counts.txt"))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	var m channel.Matrices
	var rows func(row int) []float64
	for lines := bufio.NewScanner(f); lines.Scan(); {
		line := lines.Text()
		switch {
		case strings.HasPrefix(line, "# DEL"):
			rows = func(row int) []float64 { return m.Del[row][:] }
		case strings.HasPrefix(line, "# ADD"):
			rows = func(row int) []float64 { return m.Add[row][:] }
		case strings.HasPrefix(line, "# SUB"):
			rows = func(row int) []float64 { return m.Sub[row][:] }
		case strings.HasPrefix(line, "# REV"):
			rows = func(row int) []float64 { return m.Rev[row][:] }
		case !strings.HasPrefix(line, "#"):
			fillRow(t, rows, line)
		}
	}
	return &m
}

func fillRow(t testing.TB, rows func(int) []float64, line string) {
	name, numbers, ok := strings.Cut(line, " ")
	if !ok {
		return
	}
	row := 26 // '@', the start of the word
	if name != "@" {
		row = int(name[0] - 'a')
	}
	for i, field := range strings.Split(numbers, ",") {
		n, err := strconv.ParseFloat(field, 64)
		if err != nil {
			t.Fatal(err)
		}
		rows(row)[i] = n
	}
}

func letter(s string) int {
	if s == "@" {
		return 26
	}
	return int(s[0] - 'a')
}

// The counts and totals are those of the paper.
func TestMatricesAreRead(t *testing.T) {
	m := readMatrices(t)
	total := func(rows ...[26]float64) (sum float64) {
		for _, r := range rows {
			for _, n := range r {
				sum += n
			}
		}
		return sum
	}
	for name, pair := range map[string][2]float64{
		"SUB[a][e]":  {m.Sub[letter("a")][letter("e")], 342},
		"SUB[e][a]":  {m.Sub[letter("e")][letter("a")], 388},
		"SUB[e][o]":  {m.Sub[letter("e")][letter("o")], 93},
		"ADD[e][s]":  {m.Add[letter("e")][letter("s")], 417},
		"ADD[s][s]":  {m.Add[letter("s")][letter("s")], 205},
		"DEL[c][t]":  {m.Del[letter("c")][letter("t")], 54},
		"deletions":  {total(m.Del[:]...), 10645},
		"insertions": {total(m.Add[:]...), 6810},
		"reversals":  {total(m.Rev[:]...), 1535},
	} {
		if pair[0] != pair[1] {
			t.Errorf("%s is %v, want %v", name, pair[0], pair[1])
		}
	}
}

// acress: probabilities of the typed form and counts of the words in 404,253,213
// words (Jurafsky & Martin, app. B). The letter counts behind the probabilities
// are not printed; they follow from the published counts, or half a count where
// that is 0. Getting the orientation of a matrix wrong changes every value.
func TestAcress(t *testing.T) {
	m := readMatrices(t)
	pairs := func(l, c string, n float64) { m.Pairs[letter(l)][letter(c)] = n }
	letters := func(c string, n float64) { m.Letters[letter(c)] = n }
	pairs("c", "t", 54/.000117)
	letters("@", 46/.00000144)
	pairs("c", "a", .5/.00000164)
	letters("c", .5/.000000209)
	letters("o", 93/.0000093)
	letters("e", 417/.0000321)
	letters("s", 205/.0000342)
	for i := range 27 {
		if m.Letters[i] == 0 {
			m.Letters[i] = 2e7
		}
		for j := range 26 {
			if m.Pairs[i][j] == 0 {
				m.Pairs[i][j] = 1e7
			}
		}
	}
	model, err := channel.FromCounts(m)
	if err != nil {
		t.Fatal(err)
	}
	type candidate struct {
		word    string
		p       float64 // P(typed|word)
		count   float64
		product float64 // 10^9 P(typed|word)P(word)
	}
	candidates := []candidate{
		{"actress", .000117, 9321, 2.70},
		{"cress", .00000144, 220, .00078},
		{"caress", .00000164, 686, .0028},
		{"access", .000000209, 37038, .019},
		{"across", .0000093, 120844, 2.78},
		{"acres", .0000342, 12874, 1.09}, // by the likelier of two paths
	}
	scores := map[string]float64{}
	for _, c := range candidates {
		p := math.Exp(-model.Cost("acress", c.word))
		// Replacements and insertions are kept to a sixteenth of a nat.
		if ratio := p / c.p; math.Abs(math.Log(ratio)) > 1.0/32+.01 {
			t.Errorf("P(acress|%s) = %.3g, want %.3g", c.word, p, c.p)
		}
		scores[c.word] = 1e9 * p * c.count / 404253213
		if math.Abs(math.Log(scores[c.word]/c.product)) > .06 {
			t.Errorf("%s: 10^9 P(acress|w)P(w) = %.3g, want %.3g", c.word, scores[c.word], c.product)
		}
	}
	slices.SortFunc(candidates, func(a, b candidate) int { return int(math.Copysign(1, scores[b.word]-scores[a.word])) })
	for i, want := range []string{"across", "actress", "acres", "access", "caress", "cress"} {
		if candidates[i].word != want {
			t.Errorf("number %d is %s, want %s", i, candidates[i].word, want)
		}
	}
	// With words around it, versatile ... whose, the order turns (ibid.).
	if scores["actress"]*.000021*.0010 < scores["across"]*.000021*.000006 {
		t.Error("in context across beats actress")
	}
}
