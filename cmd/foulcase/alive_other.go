//go:build !unix

package main

// isAlive cannot be known here; the end of standard input tells, too.
func isAlive(int) bool { return true }
