package main

import (
	"bufio"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"runtime"
	"strings"
	"syscall"

	"golang.org/x/term"
)

// console is the outside of the program: what it reads, where results go and
// where messages go. Its methods are for one goroutine, progress aside.
type console struct {
	in       io.Reader
	out      *output
	raw      io.Writer // standard output for who writes whole messages himself
	err      io.Writer
	progress *progress
	troubled bool            // something was reported by complain
	told     map[string]bool // what complain reported
}

func newConsole(stdin io.Reader, stdout, stderr io.Writer) *console {
	p := newProgress(stderr, isTerminal(stderr))
	return &console{
		in:       stdin,
		raw:      stdout,
		out:      &output{buf: bufio.NewWriterSize(stdout, 64<<10), progress: p, terminal: isTerminal(stdout)},
		err:      &message{w: stderr, progress: p},
		progress: p,
		told:     map[string]bool{},
	}
}

// complain reports what went wrong while the work goes on. What is wrong with many
// documents at once, such as their settings, is told once.
func (c *console) complain(err error) {
	c.troubled = true
	if what := describe(err); !c.told[what] {
		c.told[what] = true
		fmt.Fprintf(c.err, "foulcase: %s\n", what)
	}
}

// close reports err, writes what is buffered and returns the final status. A
// reader that went away (a closed pipe) is no trouble: it has what it wanted.
func (c *console) close(s status, err error) status {
	if flushErr := c.out.Flush(); flushErr != nil {
		err = flushErr
	}
	c.progress.Stop()
	switch {
	case isClosedPipe(err):
		return s
	case err != nil:
		c.complain(err)
	}
	if c.troubled {
		return trouble
	}
	return s
}

// output is standard output, buffered. Its first error stays: every later
// call returns it.
type output struct {
	buf      *bufio.Writer
	progress *progress
	terminal bool
	err      error
}

func (o *output) Write(p []byte) (int, error) {
	if o.err != nil {
		return 0, o.err
	}
	if o.buf.Available() < len(p) {
		o.progress.clear()
	}
	n, err := o.buf.Write(p)
	return n, o.keep(err)
}

// Flush hands on what is buffered.
func (o *output) Flush() error {
	if o.err != nil || o.buf.Buffered() == 0 {
		return o.err
	}
	o.progress.clear()
	return o.keep(o.buf.Flush())
}

func (o *output) keep(err error) error {
	if err != nil && o.err == nil {
		o.err = outputError{err}
	}
	return o.err
}

// outputError is a failure to write results; nothing more can be done then.
type outputError struct{ err error }

func (e outputError) Error() string {
	return fmt.Sprintf("standard output: %v; the results are incomplete, make room and run again", cause(e.err))
}

func (e outputError) Unwrap() error { return e.err }

// message is standard error, written around the progress line.
type message struct {
	w        io.Writer
	progress *progress
}

func (m *message) Write(p []byte) (int, error) {
	m.progress.clear()
	return m.w.Write(p)
}

// describe words an error for the user. Those of the file system get the path
// first and a remedy; all others are worded where they arise.
func describe(err error) string {
	var path *fs.PathError
	if !errors.As(err, &path) || errors.As(err, new(outputError)) {
		return err.Error()
	}
	remedy := ""
	switch {
	case errors.Is(err, fs.ErrNotExist):
		remedy = "; check the path"
	case errors.Is(err, fs.ErrPermission):
		remedy = "; check its permissions"
	case errors.Is(err, syscall.ENOSPC):
		remedy = "; make room and run again"
	}
	whole, inner := err.Error(), path.Error()
	return strings.Replace(whole, inner, fmt.Sprintf("%s: %v%s", path.Path, path.Err, remedy), 1)
}

// cause strips the operation and path of a file system error.
func cause(err error) error {
	if path := (*fs.PathError)(nil); errors.As(err, &path) {
		return path.Err
	}
	return err
}

// isClosedPipe tells whether the reader of our output has gone away. On Unix
// the signal SIGPIPE ends the program before it sees this for standard output.
func isClosedPipe(err error) bool {
	if errors.Is(err, syscall.EPIPE) || errors.Is(err, io.ErrClosedPipe) {
		return true
	}
	const brokenPipe, noData = syscall.Errno(109), syscall.Errno(232) // ERROR_BROKEN_PIPE, ERROR_NO_DATA
	return runtime.GOOS == "windows" && (errors.Is(err, brokenPipe) || errors.Is(err, noData))
}

// isTerminal tells whether stream is a file that someone looks at or types in.
func isTerminal(stream any) bool {
	f, ok := stream.(*os.File)
	return ok && term.IsTerminal(int(f.Fd()))
}
