package text_test

import (
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"
	"testing"
	"testing/iotest"

	"example.org/foulcase/internal/text"
)

func documents(t *testing.T, r io.Reader) []string {
	t.Helper()
	var docs []string
	for doc, err := range text.Documents(r) {
		if err != nil {
			t.Fatal(err)
		}
		docs = append(docs, string(doc))
	}
	return docs
}

func TestDocuments(t *testing.T) {
	long := strings.Repeat("pilot ", 40_000) // longer than any read buffer
	tests := []struct {
		name, in string
		want     []string
	}{
		{"empty", "", nil},
		{"blank lines only", "\n \n\r\n", nil},
		{"two", "One ship.\nTwo.\n\nThree.\n", []string{"One ship.\nTwo.\n", "Three.\n"}},
		{"no last line end", "One.\n\nTwo", []string{"One.\n", "Two"}},
		{"many blanks", "\n\nOne.\n\n \t\n\nTwo.\n\n", []string{"One.\n", "Two.\n"}},
		{"carriage returns", "One.\r\nTwo.\r\n\r\nThree.\r\n", []string{"One.\nTwo.\n", "Three.\n"}},
		{"long line", long + "\n\nTwo.\n", []string{long + "\n", "Two.\n"}},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			if got := documents(t, strings.NewReader(tt.in)); !slices.Equal(got, tt.want) {
				t.Errorf("got %q, want %q", got, tt.want)
			}
			if got := documents(t, iotest.OneByteReader(strings.NewReader(tt.in))); !slices.Equal(got, tt.want) {
				t.Errorf("read byte by byte: got %q, want %q", got, tt.want)
			}
		})
	}
}

func TestDocumentsBounded(t *testing.T) {
	r := io.LimitReader(strings.NewReader(strings.Repeat("a", 40<<20)), 40<<20)
	total := 0
	for doc, err := range text.Documents(r) {
		if err != nil {
			t.Fatal(err)
		}
		if len(doc) > 17<<20 {
			t.Errorf("a document of %d bytes", len(doc))
		}
		total += len(doc)
	}
	if total != 40<<20 {
		t.Errorf("%d bytes in all, want %d", total, 40<<20)
	}
}

func TestDocumentsReadError(t *testing.T) {
	broken := errors.New("broken")
	r := io.MultiReader(strings.NewReader("One.\n\nTwo.\n"), iotest.ErrReader(broken))
	var last error
	for _, err := range text.Documents(r) {
		last = err
	}
	if !errors.Is(last, broken) {
		t.Errorf("got error %v, want %v", last, broken)
	}
}

func TestHeldOut(t *testing.T) {
	// FNV-1a 64 of "" is 14695981039346656037 (the offset basis of the FNV
	// specification) and of "a" 12638187200555641996; their last digits decide.
	if text.HeldOut(nil) || text.HeldOut([]byte("a")) {
		t.Error("a hash that ends in 7 or 6 is held out")
	}
	n := 0
	for i := range 10_000 {
		if text.HeldOut(fmt.Appendf(nil, "Log of watch %d.\n", i)) {
			n++
		}
	}
	if n < 900 || n > 1100 {
		t.Errorf("%d of 10,000 documents held out, want about 1,000", n)
	}
}
