package main

import (
	"os"
	"path/filepath"
	"slices"
	"testing"
)

// Bytes that are no UTF-8 are left out of a document's sentences.
func TestSentencesOf(t *testing.T) {
	path := filepath.Join(t.TempDir(), "log.txt")
	if err := os.WriteFile(path, []byte("The \xfftug \xe9came in. All was w\xc3ell."), 0o644); err != nil {
		t.Fatal(err)
	}
	got, err := sentencesOf(path)
	if want := []string{"The tug came in.", "All was well."}; err != nil || !slices.Equal(got, want) {
		t.Errorf("%q (%v), want %q", got, err, want)
	}
	if _, err := sentencesOf(t.TempDir()); err == nil {
		t.Error("a folder was read as a document")
	}
}
