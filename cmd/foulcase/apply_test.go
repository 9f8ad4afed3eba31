package main

import (
	"archive/zip"
	"bytes"
	"io"
	"io/fs"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
)

// applied puts the marks of a document right with --apply and returns what the
// file holds then.
func applied(t *testing.T, name string, document []byte) []byte {
	t.Helper()
	t.Setenv("FOULCASE_CONFIG", "none")
	path := filepath.Join(t.TempDir(), name)
	if err := os.WriteFile(path, document, 0o600); err != nil {
		t.Fatal(err)
	}
	if err := os.Chmod(path, 0o604); err != nil {
		t.Fatal(err)
	}
	mustRun(t, "proof", "--apply", path)
	if info, err := os.Stat(path); err != nil || runtime.GOOS != "windows" && info.Mode() != 0o604 {
		t.Errorf("%s: mode %v, %v", name, info.Mode(), err)
	}
	now, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	return now
}

// All bytes but those of the marks stay, whatever they are.
func TestApplyKeepsAllElse(t *testing.T) {
	for name, test := range map[string]struct{ document, want string }{
		"mark.txt":   {"\xEF\xBB\xBFIt was recieved.\r\n\r\nAll well.", "\xEF\xBB\xBFIt was received.\r\n\r\nAll well."},
		"mixed.txt":  {"It was recieved.\rAll\r\n\n\nwell \t\n", "It was received.\rAll\r\n\n\nwell \t\n"},
		"odd.txt":    {"It was recieved.\n\xff\xfe\x00", "It was received.\n\xff\xfe\x00"},
		"entity.htm": {"<p title='x'>It was\nrec&#105;eved &amp; <b>h</b>eld</P>", "<p title='x'>It was\nreceived &amp; <b>h</b>eld</P>"},
	} {
		if got := applied(t, name, []byte(test.document)); string(got) != test.want {
			t.Errorf("%s holds %q, want %q", name, got, test.want)
		}
	}
}

const wordText = `<w:document xmlns:w="http://schemas.openxmlformats.org/wordprocessingml/2006/main"><w:body>` +
	`<w:p><w:r><w:t>The master recieved it.</w:t></w:r></w:p></w:body></w:document>`

// A packed document comes back packed, its other parts as they were.
func TestApplyRepacks(t *testing.T) {
	var packed bytes.Buffer
	w := zip.NewWriter(&packed)
	for _, part := range [][2]string{
		{"[Content_Types].xml", `<Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types"><Default Extension="xml" ContentType="application/xml"/></Types>`},
		{"word/document.xml", wordText},
		{"word/media/chart.png", "recieved"},
	} {
		f, err := w.Create(part[0])
		if err != nil {
			t.Fatal(err)
		}
		if _, err := io.WriteString(f, part[1]); err != nil {
			t.Fatal(err)
		}
	}
	if err := w.Close(); err != nil {
		t.Fatal(err)
	}
	now := applied(t, "log.docx", packed.Bytes())
	r, err := zip.NewReader(bytes.NewReader(now), int64(len(now)))
	if err != nil {
		t.Fatal(err)
	}
	for name, want := range map[string]string{"word/document.xml": "received", "word/media/chart.png": "recieved"} {
		f, err := r.Open(name)
		if err != nil {
			t.Fatal(err)
		}
		got, err := io.ReadAll(f)
		if err != nil || !bytes.Contains(got, []byte(want)) {
			t.Errorf("%s holds %q, %v; want %q in it", name, got, err, want)
		}
	}
}

// What a dry run prints is what patch makes of the papers, and what --apply does.
func TestDryRunIsWhatApplyDoes(t *testing.T) {
	patch, err := exec.LookPath("patch")
	if err != nil {
		t.Skip("no patch here")
	}
	t.Setenv("FOULCASE_CONFIG", "none")
	papers := os.DirFS(filepath.Join(projectRoot(t), "testdata", "pilots", "papers"))
	root := t.TempDir()
	t.Chdir(root)
	for _, dir := range []string{"papers", "patched/papers"} {
		if err := os.CopyFS(dir, papers); err != nil {
			t.Fatal(err)
		}
	}
	diff := mustRun(t, "proof", "--apply", "--dry-run", "papers")
	cmd := exec.Command(patch, "-p1", "--binary", "-s")
	cmd.Dir, cmd.Stdin = "patched", strings.NewReader(diff)
	if out, err := cmd.CombinedOutput(); err != nil {
		t.Fatalf("patch: %v\n%s\n%s", err, out, diff)
	}
	mustRun(t, "proof", "--apply", "papers")
	names, err := fs.Glob(papers, "*")
	if err != nil || len(names) == 0 {
		t.Fatalf("no papers: %v", err)
	}
	changed := 0
	for _, name := range names {
		before, _ := fs.ReadFile(papers, name)
		now, err := os.ReadFile(filepath.Join("papers", name))
		if err != nil {
			t.Fatal(err)
		}
		if patched, err := os.ReadFile(filepath.Join("patched", "papers", name)); err != nil || !bytes.Equal(now, patched) {
			t.Errorf("%s: --apply gives\n%s\npatch gives\n%s", name, now, patched)
		}
		if !bytes.Equal(before, now) {
			changed++
		}
	}
	if changed == 0 {
		t.Error("no paper was changed")
	}
}

func TestRewritable(t *testing.T) {
	root := t.TempDir()
	t.Chdir(root)
	for _, dir := range []string{"tree/sub", "beside"} {
		if err := os.MkdirAll(dir, 0o700); err != nil {
			t.Fatal(err)
		}
	}
	for _, file := range []string{"tree/sub/a.txt", "beside/b.txt"} {
		if err := os.WriteFile(file, nil, 0o600); err != nil {
			t.Fatal(err)
		}
	}
	for link, target := range map[string]string{
		"tree/inside.txt":  "sub/a.txt",
		"tree/outside.txt": "../beside/b.txt",
		"tree/folder":      "../beside",
		"tree/dead.txt":    "gone.txt",
	} {
		if err := os.Symlink(filepath.FromSlash(target), link); err != nil {
			t.Skipf("no symbolic links here: %v", err)
		}
	}
	for _, test := range []struct {
		dir, path, operand, want string // want is "" where it is refused
	}{
		{".", "tree/sub/a.txt", "tree", "tree/sub/a.txt"},
		{".", "tree/inside.txt", "tree", "tree/sub/a.txt"},
		{".", "tree/outside.txt", "tree", ""},
		{".", "tree/folder/b.txt", "tree", ""},
		{".", "tree/outside.txt", "tree/outside.txt", "beside/b.txt"},
		{".", "tree/dead.txt", "tree", ""},
		{"tree", "outside.txt", "outside.txt", ""},
		{"tree", "folder/b.txt", "folder/b.txt", ""},
		{"tree", "inside.txt", ".", "tree/sub/a.txt"},
		{"tree", "../beside/b.txt", "../beside/b.txt", "beside/b.txt"},
		{"tree", filepath.Join(root, "beside", "b.txt"), filepath.Join(root, "beside", "b.txt"), "beside/b.txt"},
	} {
		t.Chdir(filepath.Join(root, test.dir))
		got, err := rewritable(test.path, foldersAmong([]string{test.operand}))
		if (err == nil) != (test.want != "") {
			t.Errorf("in %s, %s of %s: %q, %v", test.dir, test.path, test.operand, got, err)
			continue
		}
		if err != nil {
			continue
		}
		a, err := os.Stat(got)
		if err != nil {
			t.Fatal(err)
		}
		if b, err := os.Stat(filepath.Join(root, test.want)); err != nil || !os.SameFile(a, b) {
			t.Errorf("in %s, %s is %s, want %s", test.dir, test.path, got, test.want)
		}
	}
}
