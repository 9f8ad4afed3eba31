package modelfile

import (
	"fmt"
	"os"
)

// OpenPath opens the model at path, memory-mapped where the platform can and
// read whole elsewhere. Errors name the file. The caller calls Close when no
// section is used any more.
func OpenPath(path string) (*File, error) {
	data, unmap, err := load(path)
	if err != nil {
		return nil, err
	}
	f, err := Open(data)
	if err != nil {
		if unmap != nil {
			unmap()
		}
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	f.unmap = unmap
	return f, nil
}

func readAll(path string) ([]byte, func() error, error) {
	data, err := os.ReadFile(path)
	return data, nil, err
}
