package text

import "io"

// readMarkdown reads the whole document.
func readMarkdown(r io.Reader, o Options, yield func(*Block, error) bool) {
	readPlain(r, o, yield)
}
