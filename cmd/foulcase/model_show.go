package main

import (
	"fmt"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/internal/report"
	"github.com/spf13/pflag"
)

func modelShowVerb() verb {
	return verb{
		name:     "model show",
		operands: "[FILE]",
		summary:  "tell what a model is made of, with its card",
		about: `
Prints the model's hash, its sections with their sizes, and its card: sources,
licences, recipe and figures. Without FILE it is the English model inside
foulcase. --emit jsonl prints one object: hash, sections ({name, bytes,
summary}) and card.`,
		examples: `
			foulcase model show`,
		declare: declareModelShow,
	}
}

func declareModelShow(fs *pflag.FlagSet) action {
	emit := emitFlag(fs)
	return func(c *console, operands []string) (status, error) {
		path, err := oneModel(operands)
		if err != nil {
			return trouble, err
		}
		e, err := openEngine(path)
		if err != nil {
			return trouble, err
		}
		defer e.Close()
		if emit.value == "jsonl" {
			return clean, report.JSONLines(c.out).Encode(modelObject{e.Hash(), e.Describe(), e.Card()})
		}
		_, err = fmt.Fprintf(c.out, "model %s\n\n%s\n%s", e.Hash(), sectionTable(e.Describe()), e.Card())
		return clean, err
	}
}

func modelCheckVerb() verb {
	return verb{
		name:     "model check",
		operands: "[FILE]",
		summary:  "tell whether a model file is sound",
		about: `
Reads every byte of the model file: layout, checksums, and whether its parts
belong together. Prints a line and ends with 0 if the model can be used, with 2
and what to do about it if not. Without FILE it is the English model inside
foulcase.`,
		examples: `
			foulcase model check`,
		declare: declareModelCheck,
	}
}

func declareModelCheck(*pflag.FlagSet) action {
	return func(c *console, operands []string) (status, error) {
		path, err := oneModel(operands)
		if err != nil {
			return trouble, err
		}
		e, err := openEngine(path)
		if err != nil {
			return trouble, err
		}
		defer e.Close()
		_, err = fmt.Fprintf(c.out, "%s: sound, %d sections, model %s\n", modelName(path), len(e.Describe()), e.Hash())
		return clean, err
	}
}

// modelObject is a model as --emit jsonl prints it.
type modelObject struct {
	Hash     string             `json:"hash"`
	Sections []foulcase.Section `json:"sections"`
	Card     string             `json:"card"`
}

// oneModel takes at most one operand, the path of a model.
func oneModel(operands []string) (string, error) {
	if len(operands) > 1 {
		return "", misusef("one model at a time, not %d", len(operands))
	}
	return strings.Join(operands, ""), nil
}

func sectionTable(sections []foulcase.Section) string {
	var b strings.Builder
	for _, s := range sections {
		line := fmt.Sprintf("  %-12s %10s  %s", s.Name, formatSize(int64(s.Bytes)), s.Summary)
		b.WriteString(strings.TrimRight(line, " ") + "\n")
	}
	return b.String()
}
