//go:build !unix

package modelfile

// load reads the file: this platform has no mapping the standard library knows.
func load(path string) ([]byte, func() error, error) { return readAll(path) }
