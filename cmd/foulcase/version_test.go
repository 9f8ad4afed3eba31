package main

import (
	"os/exec"
	"path/filepath"
	"runtime/debug"
	"strings"
	"testing"
	"time"

	"example.org/foulcase"
	"example.org/foulcase/lm/english"
)

func TestVersionOf(t *testing.T) {
	setting := func(key, value string) debug.BuildSetting { return debug.BuildSetting{Key: key, Value: value} }
	for _, test := range []struct {
		info debug.BuildInfo
		want string
	}{
		{debug.BuildInfo{}, "unknown"},
		{debug.BuildInfo{Main: debug.Module{Version: "v1.2.0"}}, "v1.2.0"},
		{debug.BuildInfo{
			Main:     debug.Module{Version: "(devel)"},
			Settings: []debug.BuildSetting{setting("vcs", "git"), setting("vcs.revision", "4f1e"), setting("vcs.modified", "false")},
		}, "(devel) 4f1e"},
		{debug.BuildInfo{
			Main:     debug.Module{Version: "(devel)"},
			Settings: []debug.BuildSetting{setting("vcs.revision", "4f1e"), setting("vcs.modified", "true")},
		}, "(devel) 4f1e modified"},
	} {
		if got := versionOf(&test.info); got != test.want {
			t.Errorf("version %q, want %q", got, test.want)
		}
	}
}

// TestVersion asks the program, and compares with the stamp that the go command
// reads in it.
func TestVersion(t *testing.T) {
	got, code := shell(t, t.TempDir(), "foulcase --version")
	e, err := foulcase.Open(english.Model())
	if err != nil {
		t.Fatal(err)
	}
	defer e.Close()
	if code != int(clean) || !strings.HasPrefix(got, "foulcase ") || !strings.Contains(got, "\nbuilt with go1.") ||
		!strings.HasSuffix(got, "\nEnglish model "+e.Hash()+"\n") {
		t.Errorf("exit code %d\n%s", code, got)
	}
	stamp, err := exec.Command("go", "version", "-m", filepath.Join(builtBinary(t), exe("foulcase"))).Output()
	if err != nil {
		t.Fatal(err)
	}
	_, rest, ok := strings.Cut(string(stamp), "vcs.revision=")
	if !ok {
		t.Skip("the program was built without the commit")
	}
	if revision, _, _ := strings.Cut(rest, "\n"); !strings.Contains(got, " "+revision) {
		t.Errorf("the version lacks the commit %s:\n%s", revision, got)
	}
}

func TestManualDate(t *testing.T) {
	now := time.Date(2026, 5, 6, 7, 8, 9, 0, time.UTC)
	got, err := manualDate("86400", now)
	if err != nil || got.Format(time.DateOnly) != "1970-01-02" {
		t.Errorf("the date is %v, %v", got, err)
	}
	for _, epoch := range []string{"yesterday", "1e9", "99999999999999999999"} {
		if _, err := manualDate(epoch, now); err == nil || !strings.Contains(err.Error(), "want seconds since 1970") {
			t.Errorf("%q: error %v", epoch, err)
		}
	}
}

// TestManual has mandoc look for faults of the manual page.
func TestManual(t *testing.T) {
	t.Setenv("SOURCE_DATE_EPOCH", "1000000000")
	text := mustRun(t, "manual")
	if again := mustRun(t, "manual"); again != text {
		t.Error("two pages differ")
	}
	if !strings.HasPrefix(text, ".Dd September 9, 2001\n.Dt FOULCASE 1\n") {
		t.Errorf("the page begins with %.60q", text)
	}
	for _, title := range []string{"NAME", "SYNOPSIS", "DESCRIPTION", "EXIT STATUS"} {
		if !strings.Contains(text, "\n.Sh "+title+"\n") {
			t.Errorf("man knows no section %s", title)
		}
	}
	if _, err := exec.LookPath("mandoc"); err != nil {
		t.Skip("mandoc is not installed")
	}
	lint := exec.Command("mandoc", "-T", "lint", "-W", "warning")
	lint.Stdin = strings.NewReader(text)
	if out, err := lint.CombinedOutput(); err != nil || len(out) > 0 {
		t.Errorf("%v\n%s", err, out)
	}
	show := exec.Command("mandoc", "-T", "ascii", "-O", "width=200")
	show.Stdin = strings.NewReader(text)
	page, err := show.Output()
	if err != nil {
		t.Fatal(err)
	}
	shown := overstruck.ReplaceAllString(string(page), "")
	for _, v := range verbs() {
		if want := strings.TrimSpace("foulcase " + v.name + " " + v.operands); !strings.Contains(shown, "\n   "+want+"\n") {
			t.Errorf("the page lacks %q", want)
		}
		for _, line := range v.exampleLines() {
			if !strings.Contains(shown, line) {
				t.Errorf("the page lacks the example %q", line)
			}
		}
		for _, f := range completedFlagsOf(v) {
			if !strings.Contains(shown, "--"+f+" ") && !strings.Contains(shown, "--"+f+"\n") {
				t.Errorf("the page lacks --%s of %s", f, v.name)
			}
		}
	}
}
