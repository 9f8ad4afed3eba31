package report

import "io"

type page struct {
	bare
	settings Settings
}

func (*page) Page(w io.Writer, d Document) Page { return nil }
