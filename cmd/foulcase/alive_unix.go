//go:build unix

package main

import (
	"errors"
	"syscall"
)

// isAlive tells whether there is a process of that number.
func isAlive(pid int) bool {
	return pid <= 0 || !errors.Is(syscall.Kill(pid, 0), syscall.ESRCH)
}
