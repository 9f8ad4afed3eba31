package text_test

import (
	"math/rand/v2"
	"slices"
	"strings"
	"testing"
	"unicode"

	"github.com/clipperhouse/uax29/v2/words"

	"example.org/foulcase/internal/text"
)

// The oracle of these tests is an implementation of UAX #29 (Unicode 17) that
// passes the Unicode standard's WordBreakTest. What this package tailors is kept
// out of the random text: apostrophes between other things than letters, colon,
// point, underscore, digits, hyphens, and scripts other than Latin.

// TestWordsAreUAX29 compares words on random text of Latin letters with
// ALetter, Extend, Format and ZWJ among them, apostrophes (Single_Quote and
// MidNumLet), white space (WSegSpace) and punctuation.
func TestWordsAreUAX29(t *testing.T) {
	letters := []rune("abcxyzABCXYZ\u00E9\u00C9\u00DF\u00F8\u0133\u0153\u017F\u01C6\u0250\u1E9E\u1EC7\u2C60\uA722")
	marks := []rune("\u0301\u0327\u0308\u00AD\u200D\u2060")
	others := []rune(" \t\n,;!?)\u201C\u201D\u2014\u2026\u00A0\u00D7\u00F7\u20AC")
	rng := rand.New(rand.NewPCG(1, 2))
	pick := func(from []rune) rune { return from[rng.IntN(len(from))] }
	for range 50000 {
		var b strings.Builder
		for range 1 + rng.IntN(12) {
			switch n := rng.IntN(10); {
			case n < 6:
				b.WriteRune(pick(letters))
				if rng.IntN(4) == 0 {
					b.WriteRune(pick(marks))
				}
			case n < 7:
				b.WriteRune(pick(letters))
				b.WriteRune(pick([]rune("'\u2019")))
				b.WriteRune(pick(letters))
			default:
				b.WriteRune(pick(others))
			}
		}
		in := b.String()
		if got, want := latinWords(in), oracleWords(in); !slices.Equal(got, want) {
			t.Fatalf("%q: got %q, want %q", in, got, want)
		}
	}
}

// latinWords returns the tokens that begin with a letter.
func latinWords(in string) []string {
	var s text.Segmenter
	var all []string
	for sentence := range s.Sentences([]byte(in)) {
		for _, k := range sentence.Tokens {
			if w := in[k.Start:k.End]; beginsWithLetter(w) {
				all = append(all, w)
			}
		}
	}
	return all
}

func oracleWords(in string) []string {
	var all []string
	for it := words.FromString(in); it.Next(); {
		if w := it.Value(); beginsWithLetter(w) {
			all = append(all, w)
		}
	}
	return all
}

func beginsWithLetter(w string) bool {
	r := []rune(w)[0]
	return unicode.IsLetter(r)
}

// TestRunesAreUAX29 holds every letter, mark, format character and space between
// two letters to the oracle: what UAX #29 keeps inside a word is kept, what it
// breaks at is a break. Punctuation and symbols, tailored, all break but for
// apostrophes and the middle dot.
func TestRunesAreUAX29(t *testing.T) {
	for r := rune(0x80); r <= unicode.MaxRune; r++ {
		in := "a" + string(r) + "b"
		switch {
		case brokenByCharacter(r), r == '\uFFFC': // the second stands for code
		case unicode.In(r, unicode.L, unicode.M, unicode.Cf, unicode.Z) && r != '\u202F': // U+202F is ExtendNumLet
			if got, want := len(latinWords(in)) == 1, len(oracleWords(in)) == 1; got != want {
				t.Errorf("%U %q: one word is %v, UAX #29 says %v", r, in, got, want)
			}
		case unicode.In(r, unicode.P, unicode.S):
			kept := strings.ContainsRune("\u00B4\u00B7\u2018\u2019\u201B\u2032\uFF07\u1FEF\u1FFD", r)
			if got := len(latinWords(in)) == 1; got != kept {
				t.Errorf("%U %q: one word is %v", r, in, got)
			}
		}
	}
}

// brokenByCharacter reports letters of scripts that UAX #29 does not keep
// together; a word with one is left alone as a whole here.
func brokenByCharacter(r rune) bool {
	return unicode.IsLetter(r) && !unicode.In(r, unicode.Latin, unicode.Greek, unicode.Cyrillic) && r >= 0x300 &&
		len(oracleWords("a"+string(r)+"b")) != 1
}
