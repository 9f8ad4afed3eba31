package report

import (
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"example.org/foulcase"
)

// randomDocument is lines of words, some of which edits replace, with line ends
// of one sort, or mixed, and with or without the last.
func randomDocument(r *rand.Rand) (source string, edits []foulcase.Edit, want string) {
	words := []string{"pilot", "“fog”", "quay", "naïve", "-- deck", "+tug", "@@ 1 @@", "\\", "\tswell", "caf\xe9"}
	ends := [][]string{{"\n"}, {"\r\n"}, {"\n", "\r\n", "\r"}}[r.IntN(3)]
	var before, after strings.Builder
	for range 1 + r.IntN(60) {
		for range r.IntN(6) {
			word := words[r.IntN(len(words))]
			if r.IntN(12) == 0 {
				edits = append(edits, foulcase.Edit{Offset: int64(before.Len()), Length: int64(len(word)), Text: []byte("berth " + word[:1])})
				after.WriteString("berth " + word[:1])
			} else {
				after.WriteString(word)
			}
			before.WriteString(word)
			before.WriteByte(' ')
			after.WriteByte(' ')
		}
		end := ends[r.IntN(len(ends))]
		before.WriteString(end)
		after.WriteString(end)
	}
	source, want = before.String(), after.String()
	if r.IntN(2) == 0 {
		trimmed := strings.TrimRight(source, "\r\n")
		want, source = want[:len(want)-(len(source)-len(trimmed))], trimmed
	}
	return source, edits, want
}

// TestDiffsApply has git and patch apply diffs of random documents.
func TestDiffsApply(t *testing.T) {
	names := []string{"watch.txt", "two words.txt", "naïve.txt", "say \"mayday\".txt", "tab\there.txt"}
	applied := 0
	for _, tool := range [][]string{{"git", "apply"}, {"patch", "-p1", "--binary", "-s"}} {
		program, err := exec.LookPath(tool[0])
		if err != nil {
			t.Logf("no %s here", tool[0])
			continue
		}
		r := rand.New(rand.NewPCG(1, 2))
		for i := range 60 {
			source, edits, want := randomDocument(r)
			if len(edits) == 0 {
				continue
			}
			dir, name := t.TempDir(), names[i%len(names)]
			text, err := Diff(name, []byte(source), edits)
			if err != nil {
				t.Fatal(err)
			}
			path := filepath.Join(dir, name)
			if err := os.WriteFile(path, []byte(source), 0o600); err != nil {
				t.Skipf("no such names here: %v", err)
			}
			cmd := exec.Command(program, tool[1:]...)
			cmd.Dir, cmd.Stdin = dir, strings.NewReader(text)
			cmd.Env = append(os.Environ(), "GIT_CEILING_DIRECTORIES="+filepath.Dir(dir))
			if out, err := cmd.CombinedOutput(); err != nil {
				t.Fatalf("%s: %v\n%s\n%s", tool[0], err, out, text)
			}
			if got, err := os.ReadFile(path); err != nil || string(got) != want {
				t.Fatalf("%s gives %q, %v\nwant %q\n%s", tool[0], got, err, want, text)
			}
			applied++
		}
	}
	if applied == 0 {
		t.Skip("neither git nor patch is here")
	}
}

func TestDiffOfDocuments(t *testing.T) {
	text := written(t, "diff", papers()...)
	for _, want := range []string{
		"--- a/log/watch 3.txt\t\n+++ b/log/watch 3.txt\t\n@@ -1,2 +1 @@\n",
		"\n-The café at the pier recieved us",
		"\n+The café at the pier received us",
		"--- a/log/naïve.md\n",
		"\n\\ No newline at end of file\n",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q in\n%s", want, text)
		}
	}
	if strings.Contains(text, "good.txt") {
		t.Error("a document without marks has a diff")
	}
}

func TestDiffRefuses(t *testing.T) {
	for name, err := range map[string]error{
		"packed": second(Diff("a.odt", []byte("PK"), []foulcase.Edit{{Part: "content.xml"}})),
		"wide":   second(Diff("a.txt", []byte("\xFF\xFEa\x00"), []foulcase.Edit{{}})),
	} {
		if err == nil || !strings.Contains(err.Error(), "--apply") || !strings.HasPrefix(err.Error(), "a.") {
			t.Errorf("%s: %v, want an error that names the document and the remedy", name, err)
		}
	}
}

func second[T any](_ T, err error) error { return err }

func TestDiffName(t *testing.T) {
	for path, want := range map[string]string{
		"log/watch.txt":        "a/log/watch.txt",
		"./log//watch.txt":     "a/log/watch.txt",
		"two words":            "a/two words\t",
		"say \"may\\day\"\x01": `"a/say \"may\\day\"\001"`,
	} {
		if got := diffName("a/", path); got != want {
			t.Errorf("%q: %q, want %q", path, got, want)
		}
	}
	if got := diffName("b/", string(filepath.Separator)+"log"); got != "b/log" {
		t.Errorf("an absolute path: %q", got)
	}
}
