package text_test

import (
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

// TestPackedAgainstConverter: documents that another program wrote are read whole,
// and it reads what we wrote.
func TestPackedAgainstConverter(t *testing.T) {
	converter, err := exec.LookPath("pandoc")
	if err != nil {
		t.Skip("pandoc is not installed")
	}
	const source = "# Boarding notes\n\nThe *pilot* boards at the **station**[^1] & waits; see `code here`.\n\n" +
		"- a first tug\n- a second tug\n\n| berth | depth |\n|---|---|\n| inner quay | low water |\n\n```\nno prose\n```\n\n[^1]: Off the bar.\n"
	want := strings.Fields("Boarding notes The pilot boards at the station & waits; see . a first tug a second tug berth depth inner quay low water Off the bar.")
	for _, f := range []text.Format{"docx", "odt"} {
		folder := t.TempDir()
		name := filepath.Join(folder, "notes"+f.Extensions()[0])
		convert(t, converter, source, "-f", "markdown", "-o", name)
		document, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		got := strings.Fields(strings.ReplaceAll(strings.Join(texts(t, string(document), f), " "), "\uFFFC", " "))
		if missing := without(want, got); len(missing) > 0 {
			t.Errorf("%s: not read: %q", f, missing)
		}
		if more := without(got, want); len(more) > 0 {
			t.Errorf("%s: read besides: %q", f, more)
		}
		checkPacked(t, f, document)
		checkSplice(t, string(document), f, "second", "third & last")
		if err := os.WriteFile(name, replace(t, string(document), f, "second", "third & last"), 0o600); err != nil {
			t.Fatal(err)
		}
		if back := convert(t, converter, "", "-f", string(f), "-t", "plain", name); !strings.Contains(back, "a third & last tug") || !strings.Contains(back, "no prose") {
			t.Errorf("%s: it comes back as\n%s", f, back)
		}
	}
}

func convert(t *testing.T, converter, input string, arguments ...string) string {
	t.Helper()
	c := exec.Command(converter, arguments...)
	c.Stdin = strings.NewReader(input)
	out, err := c.CombinedOutput()
	if err != nil {
		t.Fatalf("%v: %v\n%s", c.Args, err, out)
	}
	return string(out)
}

// without returns the words of a that b lacks.
func without(a, b []string) []string {
	count := map[string]int{}
	for _, w := range b {
		count[w]++
	}
	var missing []string
	for _, w := range a {
		if count[w]--; count[w] < 0 {
			missing = append(missing, w)
		}
	}
	return missing
}
