package report

import (
	"encoding/json"
	"io"

	"example.org/foulcase"
)

// jsonl is a JSON object a line, one a mark.
type jsonl struct{ bare }

// markObject is a mark as jsonl prints it.
type markObject struct {
	Path string `json:"path"`
	foulcase.Mark
}

func (jsonl) Page(w io.Writer, d Document) Page {
	enc := JSONLines(w)
	return pageFunc(func(m foulcase.Mark) error {
		return enc.Encode(markObject{d.Path, m})
	})
}

// JSONLines returns an encoder that writes an object a line, with "<", ">" and
// "&" as they are.
func JSONLines(w io.Writer) *json.Encoder {
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	return enc
}
