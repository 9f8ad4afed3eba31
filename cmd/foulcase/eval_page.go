package main

import (
	"os"
	"path/filepath"
	"strings"

	"example.org/foulcase/eval"
	"github.com/spf13/pflag"
)

func evalPageVerb() verb {
	return verb{
		name:     "eval page",
		operands: "RESULT.json...",
		summary:  "draw results: one HTML page, and pictures as SVG",
		about: `
Makes one page of results that eval list, text or noise wrote with --results:
precision against recall with what was reported, reliability of the
probabilities, accuracy at k, what became of the errors of each kind, words
taken for others, the worst false alarms and misses, all metrics with their
intervals, and where the figures come from. The page is one file without
scripts, for screen, telephone and paper; it needs no network. It quotes the
text that was measured.

Several results stand one below the other, those of one task also in one
picture. --pictures writes each picture as an SVG file too.`,
		examples: `
			foulcase eval page -o page.html before.json
			foulcase eval page -o page.html --pictures pictures before.json after.json`,
		declare: declareEvalPage,
	}
}

func declareEvalPage(fs *pflag.FlagSet) action {
	var output, pictures string
	fs.StringVarP(&output, "output", "o", "", "`FILE` to write the page to (default: standard output)")
	fs.StringVar(&pictures, "pictures", "", "`FOLDER` to write each picture to as well; made if it is missing")
	return func(c *console, paths []string) (status, error) {
		if len(paths) == 0 {
			return trouble, misusef("no result to draw; eval list, text and noise write one with --results")
		}
		var results []eval.NamedResult
		for _, path := range paths {
			r, err := readResult(path)
			if err != nil {
				return trouble, err
			}
			results = append(results, eval.NamedResult{Name: resultName(path), Result: r})
		}
		if pictures != "" {
			if err := writePictures(pictures, eval.Pictures(results)); err != nil {
				return trouble, err
			}
		}
		if output == "" {
			return clean, eval.WritePage(c.out, results)
		}
		var page strings.Builder
		if err := eval.WritePage(&page, results); err != nil {
			return trouble, err
		}
		return clean, os.WriteFile(output, []byte(page.String()), 0o644)
	}
}

// resultName is what a page calls the result at path.
func resultName(path string) string {
	return strings.TrimSuffix(filepath.Base(path), filepath.Ext(path))
}

func writePictures(folder string, pictures []eval.Picture) error {
	if err := os.MkdirAll(folder, 0o755); err != nil {
		return err
	}
	for _, p := range pictures {
		if err := os.WriteFile(filepath.Join(folder, p.Name+".svg"), []byte(p.SVG()), 0o644); err != nil {
			return err
		}
	}
	return nil
}
