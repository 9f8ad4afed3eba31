package text_test

import (
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"example.org/foulcase/internal/text"
)

const poSample = `# The desk of the pilots
msgid ""
msgstr ""
"Content-Type: text/plain; charset=UTF-8\n"
"Content-Transfer-Encoding: 8bit\n"
"Language: en_GB\n"
"Plural-Forms: nplurals=2; plural=(n != 1);\n"

#. translators see this
#: desk.c:17
#, c-format
msgctxt "a context here"
msgid "Le pilote %s est parti."
msgstr ""
"The \"duty\" pilot %s has le"
"ft the <b>fog</b> behind.\n\n"
"Caf\303\251 &amp; pier.<br>At 50% of tide."

msgid "&Quai"
msgstr "Ou&ay side"

msgid "un navire"
msgid_plural "%d navires"
msgstr[0] "the ship"
msgstr[1] "%2$-5d ships, %(name)s and {count} more %%"

#~ msgid "vieux"
#~ msgstr "an old one"

msgid "pas traduit"
msgstr ""
`

func TestPO(t *testing.T) {
	other := strings.Replace(poSample, "en_GB", "fr", 1)
	unnamed := strings.Replace(poSample, "\"Language: en_GB\\n\"\n", "", 1)
	translations := []string{"The \"duty\" pilot \uFFFC has left the fog behind.", "Café & pier.", "At 50% of tide.", "Ouay side", "the ship", "\uFFFC ships, \uFFFC and \uFFFC more %"}
	checkReadings(t, text.PO, []reading{
		{"empty", "", nil},
		{"own language", poSample, translations},
		{"another language", other, []string{"Le pilote \uFFFC est parti.", "Quai", "un navire", "\uFFFC navires", "pas traduit"}},
		{"no language", unnamed, append(append([]string{}, translations...), "pas traduit")},
		{"CRLF", strings.ReplaceAll(poSample, "\n", "\r\n"), translations},
		{"template", "msgid \"\"\nmsgstr \"Language: \\n\"\n\nmsgid \"R&D of the pier\"\nmsgstr \"\"\n", []string{"R&D of the pier"}},
		{"no end of a string", "msgid \"a\"\nmsgstr \"the fog\nmsgstr \"\n\"ice\"", []string{"ice"}},
		{"escapes", `msgid "a"` + "\n" + `msgstr "a\x41\101\q \777"`, []string{"aAAq ?7"}},
	})
	checkOptions(t, text.PO, text.Options{Language: "fr"}, []reading{{"as French", other, translations}})
}

// TestPOSpelling: translations have a spelling for other words, originals none.
func TestPOSpelling(t *testing.T) {
	if s, ok, _ := spelled(t, poSample, text.PO, "behind", "a\"b\\\n"); !ok || s != `a\"b\\\n` {
		t.Errorf("spelled %q, %v", s, ok)
	}
	if s, ok, _ := spelled(t, strings.Replace(poSample, "en_GB", "fr", 1), text.PO, "pilote", "pilot"); ok {
		t.Errorf("an original is spelled %q", s)
	}
	for word, want := range map[string]bool{"left": true, "Ouay": true, "fog": false, "pilot": false, "the fog": true, "Café": false} {
		if _, _, interrupted := spelled(t, poSample, text.PO, word, "x"); interrupted != want {
			t.Errorf("%q: interrupted %v", word, interrupted)
		}
	}
}

// TestPOCompiles: what is edited is still a catalogue for gettext.
func TestPOCompiles(t *testing.T) {
	msgfmt, err := exec.LookPath("msgfmt")
	if err != nil {
		t.Skip("no msgfmt (gettext) to check the catalogue with")
	}
	var edits []text.Edit
	for _, p := range places(t, text.PO, []byte(poSample)) {
		if s, ok := p.block.Escape("a \"b\" \\ c"); ok && p.kind == text.Word && !p.block.Interrupted(p.from, p.from+len(p.word)) {
			edits = append(edits, p.edit(s))
		}
	}
	out, err := text.Splice([]byte(poSample), text.PO, edits)
	if err != nil || len(edits) < 10 {
		t.Fatalf("%d edits, %v", len(edits), err)
	}
	path := filepath.Join(t.TempDir(), "desk.po")
	if err := os.WriteFile(path, out, 0o600); err != nil {
		t.Fatal(err)
	}
	if said, err := exec.Command(msgfmt, "-c", "-o", os.DevNull, path).CombinedOutput(); err != nil && !strings.Contains(string(said), "header field") {
		t.Errorf("%v: %s\n%s", err, said, out)
	}
}

func FuzzPO(f *testing.F) { fuzzFormat(f, text.PO, poSample, "msgid \"\\x\"\nmsgstr[\"\\7%5$s<b\"") }
