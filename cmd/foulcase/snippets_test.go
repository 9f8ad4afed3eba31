package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// editorHeading is the heading of README.md under which editors are set up.
const editorHeading = "\n## In the editor\n"

// TestReadmeSnippets: what README.md tells users to put into the settings of their
// editors is what the sessions with these editors ran.
func TestReadmeSnippets(t *testing.T) {
	readme, err := os.ReadFile(filepath.Join(projectRoot(t), "README.md"))
	if err != nil {
		t.Fatal(err)
	}
	_, section, ok := strings.Cut(string(readme), editorHeading)
	if !ok {
		t.Skip("README.md has no such section")
	}
	section, _, _ = strings.Cut(section, "\n## ")
	for name, language := range map[string]string{"neovim.lua": "lua", "emacs.el": "elisp"} {
		snippet, err := os.ReadFile(clientFile(t, name))
		if err != nil {
			t.Fatal(err)
		}
		if block := "```" + language + "\n" + string(snippet) + "```\n"; !strings.Contains(section, block) {
			t.Errorf("README.md lacks this block of %s:\n%s", name, block)
		}
	}
}
