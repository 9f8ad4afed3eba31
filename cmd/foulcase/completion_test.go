package main

import (
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"github.com/spf13/pflag"
)

// overstruck is how a printed page makes letters bold: twice in one place.
var overstruck = regexp.MustCompile(".\b")

func completedFlagsOf(v verb) (names []string) {
	fs, _ := v.flagSet()
	fs.VisitAll(func(f *pflag.Flag) { names = append(names, f.Name) })
	return names
}

// completions are command lines, the last word of which is completed, with some of
// the words that must be offered and some that must not. The folder has a file
// "two words.txt".
var completions = []struct {
	line      string
	want, not []string
}{
	{"foulcase pr", []string{"proof"}, []string{"rank", "two words.txt"}},
	{"foulcase ", []string{"proof", "lm", "model", "eval", "help"}, []string{"train", "--model", "two words.txt"}},
	{"foulcase lm ", []string{"train", "measure"}, []string{"show", "proof"}},
	{"foulcase help pr", []string{"proof"}, []string{"rank"}},
	{"foulcase proof --em", []string{"--emit"}, []string{"--known", "proof"}},
	{"foulcase proof --emit ", []string{"lines", "jsonl", "sarif"}, []string{"two words.txt", "--emit"}},
	{"foulcase proof --emit j", []string{"jsonl"}, []string{"lines"}},
	{"foulcase proof --variety=en-U", nil, []string{"two words.txt", "en-GB"}},
	{"foulcase proof two", []string{"two words.txt"}, []string{"--emit"}},
	{"foulcase proof --known two", []string{"two words.txt"}, nil},
	{"foulcase proof --emit lines --variety en-", []string{"en-US", "en-GB"}, []string{"any", "lines"}},
	{"foulcase eval compare --ga", []string{"--gate"}, []string{"--emit"}},
	{"foulcase completion ", []string{"bash", "zsh", "fish"}, []string{"two words.txt"}},
	{"foulcase proof $(touch${IFS}made)", nil, []string{"proof"}},
	{"foulcase proof `touch made` --em", []string{"--emit"}, nil},
}

// completer runs a shell, with the script at a path, in a folder and returns the
// words that it offers for each line.
type completer func(t *testing.T, dir, script string, lines []string) [][]string

func testCompletions(t *testing.T, shell string, complete completer) {
	if _, err := exec.LookPath(shell); err != nil {
		t.Skipf("%s is not installed", shell)
	}
	dir := t.TempDir()
	script := filepath.Join(t.TempDir(), "completion")
	for path, text := range map[string]string{script: mustRun(t, "completion", shell), filepath.Join(dir, "two words.txt"): "text"} {
		if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	var lines []string
	for _, test := range completions {
		lines = append(lines, test.line)
	}
	answers := complete(t, dir, script, lines)
	if len(answers) != len(lines) {
		t.Fatalf("%d answers to %d lines", len(answers), len(lines))
	}
	for i, test := range completions {
		got := answers[i]
		for _, want := range test.want {
			if !slices.Contains(got, want) {
				t.Errorf("%q: offers %.300q, not %s", test.line, got, want)
			}
		}
		for _, not := range test.not {
			if slices.Contains(got, not) {
				t.Errorf("%q: offers %.300q, %s among them", test.line, got, not)
			}
		}
	}
	if _, err := os.Stat(filepath.Join(dir, "made")); err == nil {
		t.Error("a command that stood in the line was run")
	}
}

// offered runs a shell in a folder and returns the lines that it prints.
func offered(t *testing.T, dir string, command ...string) []string {
	t.Helper()
	cmd := exec.Command(command[0], command[1:]...)
	cmd.Dir = dir
	cmd.Env = append(os.Environ(), "HOME="+dir, "XDG_CONFIG_HOME="+dir, "TERM=dumb")
	out, err := cmd.CombinedOutput()
	if err != nil {
		t.Fatalf("%s: %v\n%s", command[0], err, out)
	}
	return strings.Split(strings.TrimRight(string(out), "\n"), "\n")
}

// askBash calls the function as bash does, with the words of the line.
const askBash = `source "$1"; shift; COMP_WORDS=("$@"); COMP_CWORD=$(($# - 1)); _foulcase; printf '%s\n' "${COMPREPLY[@]}"`

func TestBashCompletion(t *testing.T) {
	testCompletions(t, "bash", func(t *testing.T, dir, script string, lines []string) (all [][]string) {
		for _, line := range lines {
			// Bash parts words at "=", and takes it for a word.
			words := strings.Split(strings.ReplaceAll(line, "=", " = "), " ")
			all = append(all, offered(t, dir, append([]string{"bash", "--norc", "-c", askBash, "bash", script}, words...)...))
		}
		return all
	})
}

// askFish has fish complete each line, and ends each answer.
const askFish = `source $argv[1]; for line in $argv[2..-1]; complete -C $line; echo "<end>"; end`

func TestFishCompletion(t *testing.T) {
	testCompletions(t, "fish", func(t *testing.T, dir, script string, lines []string) (all [][]string) {
		var words []string
		for _, line := range offered(t, dir, append([]string{"fish", "--no-config", "-c", askFish, script}, lines...)...) {
			word, _, _ := strings.Cut(line, "\t")
			if word == "<end>" {
				all, words = append(all, words), nil
			} else {
				words = append(words, strings.ReplaceAll(word, `\ `, " "))
			}
		}
		return all
	})
}

// askZsh types each line into an interactive zsh, has it complete the last word, and
// prints what the completion adds to the list, and at last what ends it.
const askZsh = `
zmodload zsh/zpty
zpty inner zsh -f -i
inner() { zpty -w inner "$1" }
inner "PS1=; PS2=; unsetopt zle_bracketed_paste prompt_sp; cd ${(q)2}"
inner "autoload -Uz compinit; compinit -D -u; source ${(q)1}"
inner 'compadd() { local -a hits; builtin compadd -A hits "$@" 2>/dev/null; (( $#hits )) && print -rl -- "<${(@)^hits}>"; builtin compadd "$@" }'
inner 'finish() { print -r -- "<the""end>"; comppostfuncs=(finish) }; comppostfuncs=(finish); bindkey "^I" complete-word'
inner 'print -r -- "<rea""dy>"'
while zpty -r inner line; do [[ $line == *"<ready>"* ]] && break; done
for typed in "${@[3,-1]}"; do
	zpty -w -n inner $'\C-u'"$typed"$'\t'
	while zpty -r inner line; do
		print -r -- "$line"
		[[ $line == *"<theend>"* ]] && break
	done
done
zpty -d inner
`

func TestZshCompletion(t *testing.T) {
	match := regexp.MustCompile(`<([^<>]*)>`)
	testCompletions(t, "zsh", func(t *testing.T, dir, script string, lines []string) (all [][]string) {
		var words []string
		for _, line := range offered(t, dir, append([]string{"zsh", "-f", "-c", askZsh, "zsh", script, dir}, lines...)...) {
			for _, found := range match.FindAllStringSubmatch(line, -1) {
				if found[1] == "theend" {
					all, words = append(all, words), nil
				} else {
					words = append(words, strings.ReplaceAll(found[1], `\ `, " "))
				}
			}
		}
		return all
	})
}

func TestCompletionNeedsAShell(t *testing.T) {
	for _, args := range [][]string{{"completion"}, {"completion", "csh"}, {"completion", "bash", "zsh"}} {
		var out, messages strings.Builder
		if code := run(args, strings.NewReader(""), &out, &messages); code != int(trouble) || !strings.Contains(messages.String(), "name one shell") {
			t.Errorf("%q: exit code %d, %s", args, code, messages.String())
		}
	}
}
