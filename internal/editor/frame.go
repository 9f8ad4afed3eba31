package editor

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"
)

const (
	// maxFrame is the most bytes of one message. Longer ones are read past.
	maxFrame = 64 << 20
	// keptFrame is the most bytes that are held for the next message.
	keptFrame = 1 << 20
	// maxHeader is the most bytes of the header of a message.
	maxHeader = 8 << 10
)

// frameReader reads messages that each come after a header with their length.
type frameReader struct {
	in     *bufio.Reader
	buffer bytes.Buffer
}

func newFrameReader(in io.Reader) *frameReader {
	return &frameReader{in: bufio.NewReaderSize(in, maxHeader)}
}

// longFrame is the error for a message above maxFrame, which was read past.
type longFrame struct{ length int64 }

func (e longFrame) Error() string {
	return fmt.Sprintf("a message of %d bytes was left unread: the most is %d", e.length, maxFrame)
}

// next returns the next message, which is valid until the call after; io.EOF when
// the stream ends between messages. After a longFrame there may be more messages,
// after any other error there are none. Memory grows with what arrives, not with
// what a header claims.
func (f *frameReader) next() ([]byte, error) {
	length, err := f.header()
	if err != nil {
		return nil, err
	}
	if f.buffer.Reset(); f.buffer.Cap() > keptFrame {
		f.buffer = bytes.Buffer{}
	}
	into := io.Writer(&f.buffer)
	if length > maxFrame {
		into = io.Discard
	}
	if _, err := io.CopyN(into, f.in, length); err != nil {
		if errors.Is(err, io.EOF) {
			err = io.ErrUnexpectedEOF
		}
		return nil, fmt.Errorf("in a message of %d bytes: %w", length, err)
	}
	if length > maxFrame {
		return nil, longFrame{length}
	}
	return f.buffer.Bytes(), nil
}

// header reads the lines before a message and returns its length.
func (f *frameReader) header() (int64, error) {
	length, read := int64(-1), 0
	for {
		line, err := f.in.ReadSlice('\n')
		read += len(line)
		switch {
		case errors.Is(err, io.EOF) && read > 0:
			return 0, fmt.Errorf("in the header of a message: %w", io.ErrUnexpectedEOF)
		case errors.Is(err, bufio.ErrBufferFull) || err == nil && read > maxHeader:
			return 0, fmt.Errorf("the header of a message has more than %d bytes", maxHeader)
		case err != nil:
			return 0, err
		}
		field := strings.TrimRight(string(line), "\r\n")
		if field == "" {
			break
		}
		name, value, _ := strings.Cut(field, ":")
		if !strings.EqualFold(strings.TrimSpace(name), "Content-Length") {
			continue
		}
		if length, err = strconv.ParseInt(strings.TrimSpace(value), 10, 64); err != nil || length < 0 {
			return 0, fmt.Errorf("Content-Length %.40q is no length", value)
		}
	}
	if length < 0 {
		return 0, errors.New("the header of a message has no Content-Length")
	}
	return length, nil
}

// writeFrame writes one message in one call.
func writeFrame(out io.Writer, message []byte) error {
	frame := make([]byte, 0, len(message)+32)
	frame = fmt.Appendf(frame, "Content-Length: %d\r\n\r\n", len(message))
	_, err := out.Write(append(frame, message...))
	return err
}
