package main

import (
	"bytes"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"strings"
	"syscall"
	"testing"
	"time"

	"example.org/foulcase/internal/report"
)

// failing is a stream that nothing can be written to.
type failing struct{ err error }

func (f failing) Write([]byte) (int, error) { return 0, f.err }

func TestOutputKeepsItsError(t *testing.T) {
	c := newConsole(nil, failing{syscall.ENOSPC}, new(bytes.Buffer))
	fmt.Fprint(c.out, "a")
	if err := c.out.Flush(); !errors.Is(err, syscall.ENOSPC) {
		t.Fatalf("Flush = %v, want a full disk", err)
	}
	if _, err := c.out.Write([]byte("b")); !errors.Is(err, syscall.ENOSPC) {
		t.Errorf("Write after it = %v, want a full disk", err)
	}
}

func TestCloseReports(t *testing.T) {
	for _, test := range []struct {
		name    string
		out     error
		err     error
		want    status
		message string
	}{
		{"nothing wrong", nil, nil, marked, ""},
		{"an error", nil, errors.New("no luck"), trouble, "foulcase: no luck\n"},
		{"full disk", syscall.ENOSPC, nil, trouble, "foulcase: standard output: no space left on device"},
		{"closed pipe", syscall.EPIPE, nil, marked, ""},
	} {
		var messages bytes.Buffer
		var out interface {
			Write([]byte) (int, error)
		} = new(bytes.Buffer)
		if test.out != nil {
			out = failing{test.out}
		}
		c := newConsole(nil, out, &messages)
		fmt.Fprint(c.out, "result\n")
		if got := c.close(marked, test.err); got != test.want {
			t.Errorf("%s: status %d, want %d", test.name, got, test.want)
		}
		if got := messages.String(); !strings.HasPrefix(got, test.message) || test.message == "" && got != "" {
			t.Errorf("%s: messages %q, want %q", test.name, got, test.message)
		}
	}
}

func TestDescribe(t *testing.T) {
	missing := &fs.PathError{Op: "open", Path: "watch.txt", Err: syscall.ENOENT}
	for _, test := range []struct {
		err  error
		want string
	}{
		{missing, "watch.txt: no such file or directory; check the path"},
		{fmt.Errorf("house words: %w", missing), "house words: watch.txt: no such file or directory; check the path"},
		{&fs.PathError{Op: "open", Path: "a", Err: syscall.EACCES}, "a: permission denied; check its permissions"},
		{&fs.PathError{Op: "write", Path: "a", Err: syscall.ENOSPC}, "a: no space left on device; make room and run again"},
		{errors.New("anything else"), "anything else"},
	} {
		if got := describe(test.err); got != test.want {
			t.Errorf("describe(%v) = %q, want %q", test.err, got, test.want)
		}
	}
}

func TestChoosePalette(t *testing.T) {
	for _, test := range []struct {
		color    string
		terminal bool
		env      string
		want     report.Palette
	}{
		{"auto", true, "", true},
		{"auto", false, "", false},
		{"never", true, "", false},
		{"always", false, "", true},
		{"auto", true, "NO_COLOR=1", false},
		{"always", true, "NO_COLOR=1", true},
		{"auto", true, "TERM=dumb", false},
		{"auto", false, "CLICOLOR_FORCE=1", true},
		{"auto", false, "CLICOLOR_FORCE=0", false},
		{"auto", false, "CLICOLOR_FORCE=1 NO_COLOR=1", false},
		{"never", false, "CLICOLOR_FORCE=1", false},
	} {
		t.Run(fmt.Sprint(test), func(t *testing.T) {
			for _, name := range []string{"NO_COLOR", "CLICOLOR_FORCE"} {
				t.Setenv(name, "")
			}
			t.Setenv("TERM", "xterm")
			for _, setting := range strings.Fields(test.env) {
				name, value, _ := strings.Cut(setting, "=")
				t.Setenv(name, value)
			}
			if got := choosePalette(test.color, test.terminal); got != test.want {
				t.Errorf("got %v", got)
			}
		})
	}
}

func TestProgress(t *testing.T) {
	var screen bytes.Buffer
	p := newProgress(&screen, true)
	p.Set("proof", 200)
	p.Add(50)
	began := p.since
	p.paint(began.Add(time.Second))
	if screen.Len() > 0 {
		t.Errorf("after a second the screen shows %q", screen.String())
	}
	p.paint(began.Add(3 * time.Second))
	if got := screen.String(); !strings.Contains(got, "proof: 25 % of 200 B") {
		t.Errorf("after three seconds the screen shows %q", got)
	}
	screen.Reset()
	fmt.Fprintln(&message{&screen, p}, "foulcase: something")
	if got, want := screen.String(), "\r\x1b[Kfoulcase: something\n"; got != want {
		t.Errorf("a message is written as %q, want %q", got, want)
	}
	p.Stop()
	screen.Reset()
	p.paint(began.Add(time.Hour))
	if screen.Len() > 0 {
		t.Errorf("after Stop the screen shows %q", screen.String())
	}
}

func TestProgressWithoutTerminal(t *testing.T) {
	p := newProgress(os.Stderr, false)
	p.Set("proof", 10)
	p.Add(5)
	p.clear()
	p.Stop()
	if p != nil {
		t.Error("there is progress to show, and nobody who looks")
	}
}
