package main

import (
	"os"
	"runtime"
)

// Colours as SGR parameters (ECMA-48).
const (
	red    = "31"
	green  = "32"
	yellow = "33"
	bold   = "1"
	dim    = "2"
)

// palette paints text for a terminal, or leaves it alone.
type palette bool

func (p palette) paint(sgr, text string) string {
	if !p {
		return text
	}
	return "\x1b[" + sgr + "m" + text + "\x1b[0m"
}

// choosePalette decides whether to paint: --color first, then NO_COLOR,
// CLICOLOR_FORCE and TERM, then whether someone looks.
func choosePalette(color string, terminal bool) palette {
	switch {
	case color != "auto":
		return color == "always"
	case os.Getenv("NO_COLOR") != "":
		return false
	case os.Getenv("CLICOLOR_FORCE") != "" && os.Getenv("CLICOLOR_FORCE") != "0":
		return true
	case os.Getenv("TERM") == "dumb":
		return false
	case runtime.GOOS == "windows" && os.Getenv("WT_SESSION") == "" && os.Getenv("TERM") == "":
		return false // an old console would print the escapes
	}
	return palette(terminal)
}
