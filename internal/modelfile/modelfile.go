// Package modelfile reads and writes the one file a model is: named sections
// of bytes behind a table, each with its checksum, used in place.
//
// Layout, little-endian throughout:
//
//	offset  bytes  what
//	0       8      magic "FOULCASE"
//	8       4      version of this layout (see Version)
//	12      4      number of sections n
//	16      8      length of the whole file
//	24      4      CRC-32C of the table
//	28      4      zero
//	32      32*n   table: name (12 bytes, zero-padded), CRC-32C of the body (4),
//	               offset of the body (8), length of the body (8)
//	...            bodies, each at a multiple of 64, zero-padded between
//
// The table's checksum covers the header too (with its own field as zero), and
// the padding must be zero, so that no bit of the file can flip unseen.
// Readers skip sections they do not know.
package modelfile

import (
	"crypto/sha256"
	"encoding/binary"
	"encoding/hex"
	"errors"
	"fmt"
	"hash/crc32"
)

// Version is the layout this package writes. History of the layout:
//
//	1  first
const Version = 1

const (
	magic      = "FOULCASE"
	headerSize = 32
	entrySize  = 32
	nameSize   = 12
	alignment  = 64
	// maxSections bounds the table a hostile file can claim.
	maxSections = 64
)

// Errors of Open, to be told apart with errors.Is. Each is wrapped with what
// was found and what to do about it.
var (
	// ErrForeign: the bytes are not a model file.
	ErrForeign = errors.New("not a foulcase model")
	// ErrNewer: the file was written for a later version of the layout.
	ErrNewer = errors.New("model is newer than this program")
	// ErrDamaged: the file was cut or altered after it was written.
	ErrDamaged = errors.New("model is damaged")
)

var castagnoli = crc32.MakeTable(crc32.Castagnoli)

// File is an opened model file. It holds the caller's bytes and never writes
// to them; it is safe for concurrent use. Sections stay valid until Close.
type File struct {
	data     []byte
	sections []section
	unmap    func() error
}

type section struct {
	name string
	body []byte
}

// Open checks data as a whole, every section's checksum included, and returns
// it opened in place. The caller must not change data afterwards.
func Open(data []byte) (*File, error) {
	n, err := checkHeader(data)
	if err != nil {
		return nil, err
	}
	f := &File{data: data}
	end := headerSize + n*entrySize
	for i := range n {
		var s section
		if s, end, err = readEntry(data, i, end); err != nil {
			return nil, err
		}
		f.sections = append(f.sections, s)
	}
	if end != len(data) {
		return nil, damaged("%d bytes follow the last section", len(data)-end)
	}
	return f, nil
}

// checkHeader verifies everything before the section bodies and returns the
// number of sections.
func checkHeader(data []byte) (int, error) {
	if len(data) < len(magic) || string(data[:len(magic)]) != magic {
		return 0, fmt.Errorf("%w: it does not begin with %q; name a file made by `foulcase model build`", ErrForeign, magic)
	}
	if len(data) < headerSize {
		return 0, damaged("it ends inside its header")
	}
	if v := binary.LittleEndian.Uint32(data[8:]); v > Version {
		return 0, fmt.Errorf("%w: layout %d, this program reads up to %d; update foulcase or rebuild the model", ErrNewer, v, Version)
	} else if v == 0 {
		return 0, damaged("layout version 0")
	}
	n := int(binary.LittleEndian.Uint32(data[12:]))
	if n > maxSections || headerSize+n*entrySize > len(data) {
		return 0, damaged("its table of %d sections does not fit", n)
	}
	if size := binary.LittleEndian.Uint64(data[16:]); size != uint64(len(data)) {
		return 0, damaged("it has %d bytes, its header says %d", len(data), size)
	}
	if got, want := tableSum(data[:headerSize+n*entrySize]), binary.LittleEndian.Uint32(data[24:]); got != want {
		return 0, damaged("its table has checksum %08x, expected %08x", got, want)
	}
	return n, nil
}

// readEntry reads table entry i, whose body must start at the first aligned
// offset from `from` on, and returns the section and where its body ends.
func readEntry(data []byte, i, from int) (section, int, error) {
	e := data[headerSize+i*entrySize:][:entrySize]
	name := string(e[:nameSize])
	for name != "" && name[len(name)-1] == 0 {
		name = name[:len(name)-1]
	}
	offset, length := binary.LittleEndian.Uint64(e[16:]), binary.LittleEndian.Uint64(e[24:])
	start := align(from)
	if offset != uint64(start) || offset > uint64(len(data)) || length > uint64(len(data))-offset {
		return section{}, 0, damaged("section %q lies outside the file", name)
	}
	for _, b := range data[from:start] {
		if b != 0 {
			return section{}, 0, damaged("the padding before section %q is not empty", name)
		}
	}
	body := data[start : start+int(length) : start+int(length)]
	if got, want := crc32.Checksum(body, castagnoli), binary.LittleEndian.Uint32(e[12:]); got != want {
		return section{}, 0, damaged("section %q has checksum %08x, expected %08x", name, got, want)
	}
	return section{name, body}, start + int(length), nil
}

func damaged(format string, args ...any) error {
	return fmt.Errorf("%w: %s; copy or rebuild it anew", ErrDamaged, fmt.Sprintf(format, args...))
}

// tableSum is the CRC-32C of the header and table, the checksum's own four
// bytes taken as zero.
func tableSum(table []byte) uint32 {
	sum := crc32.Checksum(table[:24], castagnoli)
	sum = crc32.Update(sum, castagnoli, make([]byte, 4))
	return crc32.Update(sum, castagnoli, table[28:])
}

func align(n int) int { return (n + alignment - 1) / alignment * alignment }

// Section returns the body of the named section, in place.
func (f *File) Section(name string) ([]byte, bool) {
	for _, s := range f.sections {
		if s.name == name {
			return s.body, true
		}
	}
	return nil, false
}

// Names lists the sections in file order.
func (f *File) Names() []string {
	names := make([]string, len(f.sections))
	for i, s := range f.sections {
		names[i] = s.name
	}
	return names
}

// Hash identifies the file's contents: the first 16 hexadecimal digits of its
// SHA-256. It reads the whole file.
func (f *File) Hash() string {
	sum := sha256.Sum256(f.data)
	return hex.EncodeToString(sum[:8])
}

// Size is the length of the file in bytes.
func (f *File) Size() int { return len(f.data) }

// Close releases the mapping of a file opened by OpenPath; sections must not
// be used afterwards. For a file opened from bytes it does nothing.
func (f *File) Close() error {
	if f.unmap == nil {
		return nil
	}
	unmap := f.unmap
	f.unmap = nil
	return unmap()
}
