package report

import "io"

// Writer puts a report together. It is for one goroutine.
type Writer struct {
	w     io.Writer
	form  Form
	pages int // that are not empty
}

// NewWriter begins a report: it writes the head.
func NewWriter(w io.Writer, f Form) (*Writer, error) {
	return &Writer{w: w, form: f}, f.Head(w)
}

// Add writes the finished page of the next document.
func (w *Writer) Add(page []byte) error {
	if len(page) == 0 {
		return nil
	}
	if w.pages++; w.pages > 1 {
		if _, err := io.WriteString(w.w, w.form.Between()); err != nil {
			return err
		}
	}
	_, err := w.w.Write(page)
	return err
}

// Close ends the report; complete tells that every document could be read, to its end.
func (w *Writer) Close(complete bool) error { return w.form.Tail(w.w, complete) }
