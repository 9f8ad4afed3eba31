package main

import (
	"io"
	"path/filepath"
	"strings"

	"example.org/foulcase/eval"
	"github.com/spf13/pflag"
)

// The shapes of test data, for --as. The first is what a file is taken for
// whose extension says nothing.
var (
	listShapes = []dataShape{{"pairs", ".tsv"}, {"intended", ".dat"}, {"csv", ".csv"}}
	textShapes = []dataShape{{"sentences", ".tsv"}, {"m2", ".m2"}}
)

// dataShape is a shape of test data and the extension that stands for it.
type dataShape struct{ name, extension string }

// shapeFlag declares --as for data of one of the shapes.
func shapeFlag(fs *pflag.FlagSet, shapes []dataShape) *choice {
	names := []string{"auto"}
	for _, s := range shapes {
		names = append(names, s.name)
	}
	return choiceFlag(fs, "as", "shape of the data; auto goes by the extension", names...)
}

// shapeOf is the shape asked for, or that of the path's extension.
func shapeOf(path, asked string, shapes []dataShape) string {
	if asked != "auto" {
		return asked
	}
	for _, s := range shapes {
		if strings.EqualFold(filepath.Ext(path), s.extension) {
			return s.name
		}
	}
	return shapes[0].name
}

// pairReader returns the reader of pairs in one of listShapes.
func pairReader(shape string, columns eval.CSVColumns) reader[eval.Pair] {
	switch shape {
	case "intended":
		return eval.ReadIntended
	case "csv":
		return func(name string, r io.Reader) ([]eval.Pair, error) { return eval.ReadCSV(name, r, columns) }
	}
	return eval.ReadPairs
}

// sentenceReader returns the reader of sentences and their corrections in one of
// textShapes.
func sentenceReader(shape string, columns []eval.Column) reader[eval.Sentence] {
	if shape == "m2" {
		return eval.ReadM2
	}
	return func(name string, r io.Reader) ([]eval.Sentence, error) { return eval.ReadSentences(name, r, columns) }
}
