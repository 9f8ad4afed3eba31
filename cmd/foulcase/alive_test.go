//go:build unix

package main

import (
	"os"
	"os/exec"
	"testing"
)

func TestIsAlive(t *testing.T) {
	if !isAlive(os.Getpid()) {
		t.Error("this process is not alive")
	}
	dead := exec.Command(os.Args[0], "-test.list=^$")
	if err := dead.Run(); err != nil {
		t.Fatal(err)
	}
	if isAlive(dead.Process.Pid) {
		t.Error("a process that ended and was waited for is alive")
	}
}
