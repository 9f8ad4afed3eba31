package main

import (
	"errors"
	"fmt"
	"io"
	"strings"

	"github.com/spf13/pflag"
)

// status is the exit code of the program.
type status int

const (
	clean   status = iota // nothing was marked; the job is done
	marked                // something was marked
	trouble               // something could not be done, and was reported
)

// An action does a verb's work on its operands, once the flags are read. An
// error it returns is reported and makes the status trouble.
type action func(c *console, operands []string) (status, error)

// run is the whole program: it finds the verb that args begin with, reads its
// flags and takes its action. It returns the exit code.
func run(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	c := newConsole(stdin, stdout, stderr)
	s, err := dispatch(c, args)
	s = c.close(s, err)
	return int(s)
}

func dispatch(c *console, args []string) (status, error) {
	if len(args) == 0 {
		printOverview(c.err, "")
		return trouble, nil
	}
	v, rest, ok := findVerb(args)
	if !ok {
		return notAVerb(c, args)
	}
	fs, act := v.flagSet()
	switch err := fs.Parse(rest); {
	case errors.Is(err, pflag.ErrHelp):
		printHelp(c.out, v, fs)
		return clean, nil
	case err != nil:
		return trouble, usageError(v.name, "%v", err)
	}
	s, err := act(c, fs.Args())
	if misused := (misuse{}); errors.As(err, &misused) {
		return trouble, usageError(v.name, "%s", misused.what)
	}
	return s, err
}

// notAVerb answers arguments that begin with no verb: a call for help, the
// first word of a family ("lm"), or a slip.
func notAVerb(c *console, args []string) (status, error) {
	first := args[0]
	switch {
	case first == "help" && len(args) > 1:
		return dispatch(c, append(args[1:len(args):len(args)], "--help"))
	case first == "help" || first == "--help" || first == "-h":
		printOverview(c.out, "")
		return clean, nil
	case first == "--version":
		return clean, printVersion(c.out)
	case isFamily(first) && len(args) == 1:
		printOverview(c.err, first)
		return trouble, nil
	case isFamily(first) && (args[1] == "--help" || args[1] == "-h"):
		printOverview(c.out, first)
		return clean, nil
	case isFamily(first):
		return trouble, usageError(first, "no verb %q", first+" "+args[1])
	case strings.HasPrefix(first, "-"):
		return trouble, usageError("", "%s stands before the verb; write the verb first", first)
	}
	return trouble, usageError("", "no verb %q", first)
}

// misuse is an error of the command line that only an action can see.
type misuse struct{ what string }

func (m misuse) Error() string { return m.what }

func misusef(format string, args ...any) error {
	return misuse{fmt.Sprintf(format, args...)}
}

// usageError says what is wrong with the command line and where the right
// form is told.
func usageError(verb, format string, args ...any) error {
	name := strings.TrimSpace("foulcase " + verb)
	return fmt.Errorf("%s; see `%s --help`", fmt.Sprintf(format, args...), name)
}
