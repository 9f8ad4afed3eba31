package main

import (
	"os"
	"runtime"

	"example.org/foulcase/internal/report"
)

// choosePalette decides whether to paint: --color first, then NO_COLOR,
// CLICOLOR_FORCE and TERM, then whether someone looks.
func choosePalette(color string, terminal bool) report.Palette {
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
	return report.Palette(terminal)
}
