package house

import (
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"

	"example.org/foulcase"
)

// own gives the test a folder of user's settings and returns it.
func own(t *testing.T) string {
	t.Helper()
	if runtime.GOOS == "windows" || runtime.GOOS == "darwin" || runtime.GOOS == "plan9" {
		t.Skip("XDG_CONFIG_HOME moves no folder of settings here")
	}
	dir := t.TempDir()
	t.Setenv("XDG_CONFIG_HOME", dir)
	return filepath.Join(dir, "foulcase")
}

// origins lists who says what of a key.
func origins(s *Settings, key string) string {
	var all []string
	for _, v := range s.Values() {
		if v.Key == key {
			all = append(all, filepath.Base(v.Text)+" by "+filepath.Base(v.Origin))
		}
	}
	return strings.Join(all, ", ")
}

func TestWhoWins(t *testing.T) {
	user := own(t)
	project := t.TempDir()
	write(t, user, FileName, "variety = 'en-US'\nbudget = 9\nfields = ['mine']\nhouse = ['mine.txt']\nencoding = 'latin1'\nformats = {'*.note' = 'markdown', '*.memo' = 'markdown'}")
	write(t, user, "mine.txt", "Oldmar\n")
	write(t, project, FileName, "variety = 'en-GB'\nbudget = 5\nfields = ['a', 'b']\nhouse = ['ours.txt']\nformats = {'*.note' = 'plain'}")
	write(t, project, "ours.txt", "Lisk\n")
	flagged := write(t, t.TempDir(), "flagged.txt", "Tolva\n")
	env := map[string]string{"FOULCASE_VARIETY": "any", "FOULCASE_BUDGET": "3"}
	s, err := NewResolver(Sources{
		Flags:  map[string][]string{"variety": {"en-US"}, "house": {flagged}},
		Getenv: func(name string) string { return env[name] },
	}).For(filepath.Join(project, "deep", "log.note"))
	if err != nil {
		t.Fatal(err)
	}
	for key, want := range map[string]string{
		"variety":  "en-US by --variety",
		"budget":   "3 by FOULCASE_BUDGET",
		"fields":   "a by foulcase.toml:3, b by foulcase.toml:3",
		"house":    "flagged.txt by --house, ours.txt by foulcase.toml:4, mine.txt by foulcase.toml:4",
		"encoding": "latin1 by foulcase.toml:5",
		"formats":  "plain by foulcase.toml:5, markdown by foulcase.toml:6, markdown by foulcase.toml:6",
		"known":    "none by default",
	} {
		if got := origins(s, key); got != want {
			t.Errorf("%s: %s, want %s", key, got, want)
		}
	}
	o := s.Options(filepath.Join(project, "deep", "log.note"))
	if o.Variety != foulcase.American || o.Budget != 3 || o.Encoding != "latin1" || o.Format != "plain" || len(o.Fields) != 2 || o.House == nil {
		t.Errorf("%+v", o)
	}
	if name, ok := s.Format(filepath.Join(project, "x.memo")); !ok || name != "markdown" {
		t.Errorf("the user's glob gave %s", name)
	}
}

func TestEachFolderHasItsSettings(t *testing.T) {
	own(t)
	root := t.TempDir()
	write(t, root, "a/"+FileName, "budget = 1")
	write(t, root, "a/b/"+FileName, "budget = 2")
	write(t, root, "a/c/.git/HEAD", "")
	write(t, root, "a/d/.git/HEAD", "")
	write(t, root, "a/d/"+FileName, "budget = 4")
	write(t, root, "a/bad/"+FileName, "budget = ")
	r := NewResolver(Sources{Getenv: func(string) string { return "" }})
	for path, want := range map[string]string{"a/x": "1", "a/e/f/x": "1", "a/b/x": "2", "a/b/e/x": "2", "a/c/x": "", "a/d/e/x": "4"} {
		s, err := r.For(filepath.Join(root, filepath.FromSlash(path)))
		if err != nil {
			t.Fatal(err)
		}
		if got := s.Get("budget"); got != want {
			t.Errorf("%s: budget %q, want %q", path, got, want)
		}
	}
	for range 2 {
		if _, err := r.For(filepath.Join(root, "a", "bad", "x")); err == nil {
			t.Error("a bad file is no error")
		}
	}
	one, _ := r.For(filepath.Join(root, "a", "x"))
	two, _ := r.For(filepath.Join(root, "a", "e", "x"))
	if one != two {
		t.Error("the file was read twice")
	}
	write(t, root, "a/"+FileName, "budget = 7")
	r.Forget()
	if s, err := r.For(filepath.Join(root, "a", "x")); err != nil || s.Get("budget") != "7" {
		t.Errorf("after Forget: %v", err)
	}
}

func TestSettingsThatCannotBeRead(t *testing.T) {
	own(t)
	dir := t.TempDir()
	none := func(string) string { return "" }
	for name, tt := range map[string]struct {
		sources Sources
		want    string
	}{
		"file":     {Sources{Config: filepath.Join(dir, "gone.toml"), Getenv: none}, "gone.toml"},
		"list":     {Sources{Flags: map[string][]string{"house": {filepath.Join(dir, "gone.txt")}}, Getenv: none}, "house words: "},
		"flag":     {Sources{Flags: map[string][]string{"encoding": {"klingon"}}, Getenv: none}, "--encoding: "},
		"variable": {Sources{Getenv: func(string) string { return "none" }}, "environment variable FOULCASE_VARIETY: "},
	} {
		if _, err := NewResolver(tt.sources).For("-"); err == nil || !strings.Contains(err.Error(), tt.want) {
			t.Errorf("%s: %v, want %s", name, err, tt.want)
		}
	}
	t.Setenv("XDG_CONFIG_HOME", "relative") // no folder of the user's own, and no error
	if _, err := NewResolver(Sources{Getenv: none}).For("-"); err != nil {
		t.Error(err)
	}
}

func TestAddWord(t *testing.T) {
	user := own(t)
	dir := t.TempDir()
	list := write(t, dir, "words.txt", "Lisk\nberth, not quay") // no line end
	write(t, dir, FileName, "house = ['words.txt']")
	s, err := Load(filepath.Join(dir, FileName))
	if err != nil {
		t.Fatal(err)
	}
	before := s.Options("x").House
	for _, word := range []string{"Tolva", " Gannel "} {
		if file, err := s.AddWord(word); err != nil || file != list {
			t.Errorf("%s: %s, %v", word, file, err)
		}
	}
	if got, _ := os.ReadFile(list); string(got) != "Lisk\nberth, not quay\nTolva\nGannel\n" {
		t.Errorf("%q", got)
	}
	if s.Options("x").House == before {
		t.Error("the settings do not heed the new word")
	}
	for word, want := range map[string]string{
		"quay": `new entry:1: "quay" is a house word, but`, "a\nb": "cannot be a house word", "": "cannot be", "# x": "cannot be",
	} {
		if _, err := s.AddWord(word); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q: %v, want %s", word, err, want)
		}
	}

	if s, err = Load(""); err != nil {
		t.Fatal(err)
	}
	if file, err := s.AddWord("Tolva"); err != nil || file != filepath.Join(user, "house-words.txt") {
		t.Errorf("without a list: %s, %v", file, err)
	}
	if s, err = NewResolver(Sources{Config: None}).For("-"); err != nil {
		t.Fatal(err)
	}
	if _, err := s.AddWord("Tolva"); err == nil {
		t.Error("a word was added nowhere")
	}
}

func TestFilesToWatch(t *testing.T) {
	user := own(t)
	dir := t.TempDir()
	file := write(t, dir, FileName, "house = ['words.txt']\nstets = 'stets.jsonl'")
	words := write(t, dir, "words.txt", "")
	s, err := Load(file)
	if err != nil {
		t.Fatal(err)
	}
	want := []string{
		file, filepath.Join(user, FileName), words, filepath.Join(user, "house-words.txt"), filepath.Join(dir, "stets.jsonl"),
	}
	if got := strings.Join(s.Files(), "\n"); got != strings.Join(want, "\n") {
		t.Errorf("%s", got)
	}
}

func TestProjectsWriteInsideAlone(t *testing.T) {
	own(t)
	dir := t.TempDir()
	write(t, dir, "words.txt", "")
	write(t, dir, "p/.git/HEAD", "")
	write(t, dir, "p/inner.txt", "")
	if err := os.Symlink(filepath.Join(dir, "words.txt"), filepath.Join(dir, "p", "link.txt")); err != nil {
		t.Skipf("no symbolic links here: %v", err)
	}
	for _, tt := range []struct {
		house, stets string
		ok           bool
	}{
		{"../inner.txt", "../new/stets.jsonl", true},
		{"../../words.txt", "../../stets.jsonl", false},
		{"../link.txt", "../link.txt", false},
	} {
		file := write(t, dir, "p/q/"+FileName, "house = ['"+tt.house+"']\nstets = '"+tt.stets+"'")
		s, err := Load(file)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := s.AddWord("Tolva"); (err == nil) != tt.ok {
			t.Errorf("%s: %v", tt.house, err)
		}
		if err := s.Record(Decision{Decision: Stet, Scope: Everywhere, Observed: "Tolva"}); (err == nil) != tt.ok {
			t.Errorf("%s: %v", tt.stets, err)
		}
	}
	if got, _ := os.ReadFile(filepath.Join(dir, "words.txt")); len(got) > 0 {
		t.Errorf("written outside: %q", got)
	}
}

func TestProjectsNamePlainFiles(t *testing.T) {
	own(t)
	for _, setting := range []string{"house = ['d']", "stets = 'd'", "known = 'd'", "model = 'd'"} {
		dir := t.TempDir()
		write(t, dir, "d/words.txt", "") // a folder stands for pipes and devices
		file := write(t, dir, FileName, setting)
		if _, err := Load(file); err == nil || !strings.Contains(err.Error(), "named by "+file+":1, but no plain file") {
			t.Errorf("%s: error %v", setting, err)
		}
	}
}

func TestFilesWithByteOrderMarks(t *testing.T) {
	own(t)
	dir := t.TempDir()
	file := write(t, dir, FileName, byteOrderMark+"house = ['words.txt']\r\nstets = 'stets.jsonl'\r\n")
	write(t, dir, "words.txt", byteOrderMark+"Tolva\r\n")
	write(t, dir, "stets.jsonl", byteOrderMark+`{"decision":"stet","scope":"everywhere","observed":"Lisk"}`+"\r\n")
	s, err := Load(file)
	if err != nil {
		t.Fatal(err)
	}
	if !s.Stands("log.txt", foulcase.Mark{Observed: "Lisk"}) || s.Options("log.txt").House == nil {
		t.Error("what the files say is not heeded")
	}
}
