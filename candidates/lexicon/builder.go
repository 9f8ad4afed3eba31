package lexicon

import (
	"encoding/binary"
	"fmt"
	"maps"
	"slices"
	"unicode/utf8"
)

// Builder collects forms and writes them as a section. The section's bytes
// depend on the forms and entries alone, not on the order of adding.
type Builder struct {
	entries map[string]builderEntry
}

type builderEntry struct {
	Entry
	spelled string // with its usual capitals, for Usual == MixedCase
}

// Add enters a form in normal form, or replaces its entry. The spelled form is
// needed, and used, only where e.Usual is MixedCase; "" otherwise.
func (b *Builder) Add(form string, e Entry, spelled string) {
	if b.entries == nil {
		b.entries = map[string]builderEntry{}
	}
	b.entries[form] = builderEntry{e, spelled}
}

// AddLexicon enters all forms of l as they are, to build a larger lexicon: house
// words into a general one. Ids change.
func (b *Builder) AddLexicon(l *Lexicon) {
	for id := range l.forms {
		b.Add(string(l.AppendForm(nil, id)), l.Entry(id), l.Canonical(id))
	}
}

// Section writes the section. It fails on forms that are empty, longer than
// MaxForm or not UTF-8, and on more than 16 million.
func (b *Builder) Section() ([]byte, error) {
	forms := slices.Sorted(maps.Keys(b.entries))
	c := newCompiler()
	var priors, attrs, spelled []byte
	for id, form := range forms {
		if !utf8.ValidString(form) {
			return nil, fmt.Errorf("lexicon: form %q is not UTF-8", form)
		}
		if err := c.add([]byte(form)); err != nil {
			return nil, err
		}
		e := b.entries[form]
		if e.Usual == MixedCase {
			mask := capitalsOf(form, e.spelled)
			spelled = binary.LittleEndian.AppendUint32(spelled, uint32(id))
			spelled = binary.LittleEndian.AppendUint32(spelled, mask)
		}
		priors = append(priors, priorCost(float64(e.Prior)))
		attrs = append(attrs, e.pack())
	}
	states, err := pack(c.finish())
	if err != nil {
		return nil, err
	}
	section := make([]byte, 0, headerSize+len(states)+2*len(forms)+len(spelled))
	section = append(section, magic...)
	for _, n := range []int{len(forms), len(states), len(spelled) / spelledLen} {
		section = binary.LittleEndian.AppendUint32(section, uint32(n))
	}
	for _, part := range [][]byte{states, priors, attrs, spelled} {
		section = append(section, part...)
	}
	return section, nil
}

// capitalsOf finds the mask with which capitalise makes spelled of form; where
// none does (a fold that changes the number of letters), that of the first letter.
func capitalsOf(form, spelled string) uint32 {
	var mask uint32
	folded := []rune(form)
	for i, r := range []rune(spelled) {
		if i < len(folded) && folded[i] != r {
			mask |= 1 << min(i, 31)
		}
	}
	if capitalise([]byte(form), mask) != spelled {
		return 1
	}
	return mask
}
