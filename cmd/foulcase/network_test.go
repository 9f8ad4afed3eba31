package main

import (
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
)

// networkPackages reach a network, or serve to. The package net is not among them:
// flags that hold addresses link its parsers.
var networkPackages = []string{
	"net/http", "net/smtp", "net/rpc", "net/mail", "net/textproto", "crypto/tls", "crypto/x509", "expvar", "log/syslog", "golang.org/x/net",
}

// networkSymbols are functions without which no program reaches a network.
var networkSymbols = regexp.MustCompile(
	`^(net\.(Dial|Listen|Lookup|\(\*(Dialer|Resolver|ListenConfig|sysDialer|netFD)\))|net/http\.|crypto/tls\.|syscall\.(Socket|Connect|Bind|Listen)$)`)

// TestNoNetworkPackages looks at what the program is made of.
func TestNoNetworkPackages(t *testing.T) {
	if testing.Short() {
		t.Skip("the go command takes its time")
	}
	list := exec.Command("go", "list", "-deps", "-f", "{{.ImportPath}} {{.Standard}} {{join .Imports \" \"}}", ".")
	out, err := list.Output()
	if err != nil {
		t.Fatalf("go list: %v", err)
	}
	ours := 0
	for line := range strings.Lines(string(out)) {
		fields := strings.Fields(line)
		path, imports := fields[0], fields[2:]
		if slices.ContainsFunc(networkPackages, func(p string) bool { return path == p || strings.HasPrefix(path, p+"/") }) {
			t.Errorf("the program has the package %s in it", path)
		}
		if !strings.HasPrefix(path, "example.org/foulcase") {
			continue
		}
		ours++
		for _, imported := range imports {
			if imported == "net" || strings.HasPrefix(imported, "net/") {
				t.Errorf("%s imports %s", path, imported)
			}
		}
	}
	if ours < 10 {
		t.Errorf("only %d packages of ours were looked at", ours)
	}
}

// TestNoNetworkSymbols looks at the functions in the program, after a look at one
// that does dial, where they must be found.
func TestNoNetworkSymbols(t *testing.T) {
	if testing.Short() {
		t.Skip("the go command takes its time")
	}
	dir := t.TempDir()
	source := filepath.Join(dir, "dial.go")
	const dials = "package main\n\nimport \"net\"\n\nfunc main() { net.Dial(\"tcp\", \"127.0.0.1:1\") }\n"
	if err := os.WriteFile(source, []byte(dials), 0o644); err != nil {
		t.Fatal(err)
	}
	control := filepath.Join(dir, exe("dial"))
	if out, err := exec.Command("go", "build", "-o", control, source).CombinedOutput(); err != nil {
		t.Fatalf("go build: %v\n%s", err, out)
	}
	if found := networkIn(t, control); len(found) < 3 {
		t.Errorf("of a program that dials only %q is found", found)
	}
	if found := networkIn(t, filepath.Join(builtBinary(t), exe("foulcase"))); len(found) > 0 {
		t.Errorf("the program has functions of a network in it: %q", found)
	}
}

// networkIn lists the functions of a program that reach a network.
func networkIn(t *testing.T, program string) (found []string) {
	t.Helper()
	out, err := exec.Command("go", "tool", "nm", program).Output()
	if err != nil {
		t.Fatalf("go tool nm: %v", err)
	}
	symbols := 0
	for line := range strings.Lines(string(out)) {
		fields := strings.Fields(line)
		name := fields[len(fields)-1]
		symbols++
		if networkSymbols.MatchString(name) {
			found = append(found, name)
		}
	}
	if symbols < 500 {
		t.Fatalf("%s has %d symbols: it was stripped", program, symbols)
	}
	return found
}
