package eval_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/eval"
)

func TestReplaced(t *testing.T) {
	before := []string{
		"The pilot recieved the mesage.", "All was well.", "The tug lay alot nearer.",
		"She left at 4.", "They was in the fog.", "All was well.", "The ketle boiled.",
	}
	after := []string{
		"A new beginning.", "The pilot received the message.", "All was well.", "The tug lay a lot nearer.",
		"She left at 5.", "They were in the fog today.", "All was well.",
	}
	replaced, others := eval.Replaced(before, after)
	var got []string
	for _, p := range replaced {
		got = append(got, fmt.Sprintf("%s>%s %v", p.Observed, p.Intended, p.Spaces))
	}
	want := []string{"recieved>received false", "mesage>message false", "alot>a lot true", "was>were false"}
	if !slices.Equal(got, want) {
		t.Errorf("replaced %q, want %q", got, want)
	}
	if others < 3 { // the new sentence, the figure, the word put in, the sentence left out
		t.Errorf("%d other changes", others)
	}
}

// Whatever was moved or is said twice, sentences that both have are aligned with
// each other, and nothing takes long.
func TestReplacedOfLongTexts(t *testing.T) {
	var before, after []string
	for i := range 20000 {
		s := fmt.Sprintf("Vessel number %d came in.", i)
		before, after = append(before, s), append(after, s)
	}
	after[9000] = strings.Replace(after[9000], "Vessel", "Vesel", 1)
	after[3], after[15000] = after[15000], after[3]
	replaced, _ := eval.Replaced(after, before)
	if len(replaced) != 1 || replaced[0].Observed != "Vesel" || replaced[0].Intended != "Vessel" {
		t.Errorf("replaced %+v", replaced)
	}
	if replaced, others := eval.Replaced(nil, nil); len(replaced)+others != 0 {
		t.Errorf("of nothing: %v, %d", replaced, others)
	}
}
