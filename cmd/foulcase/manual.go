package main

import (
	"bufio"
	"fmt"
	"io"
	"os"
	"regexp"
	"runtime/debug"
	"strconv"
	"strings"
	"time"

	"example.org/foulcase/internal/house"
	"github.com/spf13/pflag"
)

func manualVerb() verb {
	return verb{
		name:     "manual",
		operands: "",
		summary:  "print the manual page",
		about: `
Prints foulcase(1) in the mdoc language, for the folder man1 of a manual path.
It is made of what each verb tells in its help. Its date is SOURCE_DATE_EPOCH
(seconds since 1970), or else that of the commit the program was built from.`,
		examples: `
			foulcase manual`,
		declare: declareManual,
	}
}

func declareManual(*pflag.FlagSet) action {
	return func(c *console, operands []string) (status, error) {
		if len(operands) > 0 {
			return trouble, misusef("the manual page is of all verbs; name none")
		}
		date, err := manualDate(os.Getenv("SOURCE_DATE_EPOCH"), time.Now())
		if err != nil {
			return trouble, err
		}
		return clean, printManual(c.out, date)
	}
}

// manualDate is the date of the page: that of the epoch, if it is not "", else of
// the commit, else now.
func manualDate(epoch string, now time.Time) (time.Time, error) {
	if epoch != "" {
		seconds, err := strconv.ParseInt(epoch, 10, 48)
		if err != nil {
			return now, fmt.Errorf("SOURCE_DATE_EPOCH %q: want seconds since 1970", epoch)
		}
		return time.Unix(seconds, 0).UTC(), nil
	}
	if info, ok := debug.ReadBuildInfo(); ok {
		if commit, ok := commitTime(info); ok {
			return commit.UTC(), nil
		}
	}
	return now, nil
}

// page writes mdoc(7). Its first error stays in the buffer, whose Flush returns it.
type page struct{ *bufio.Writer }

// macro writes a line that begins with a macro. Arguments are text, but those that
// begin with a point, which are macros.
func (p page) macro(name string, args ...string) {
	p.WriteString("." + name)
	for _, arg := range args {
		if callee, ok := strings.CutPrefix(arg, "."); ok {
			p.WriteString(" " + callee)
		} else {
			p.WriteString(` "\&` + strings.ReplaceAll(escapeRoff(arg), `"`, `\(dq`) + `"`)
		}
	}
	p.WriteString("\n")
}

// section begins one. Its title stands bare: by that, man tells a page's name and synopsis.
func (p page) section(title string) { p.WriteString(".Sh " + title + "\n") }

// line writes a line of text.
func (p page) line(s string) {
	s = escapeRoff(s)
	if strings.HasPrefix(s, ".") || strings.HasPrefix(s, "'") {
		s = `\&` + s
	}
	p.WriteString(s + "\n")
}

// escapeRoff writes text so that roff takes none of it for its own.
func escapeRoff(s string) string {
	return strings.NewReplacer(`\`, `\e`, "-", `\-`, "`", `\(ga`, "^", `\(ha`, "~", `\(ti`).Replace(s)
}

// sentenceEnd is the space after a sentence, where mdoc wants a new line.
var sentenceEnd = regexp.MustCompile(`([.?!][")]*) +`)

// prose writes text whose paragraphs are parted by blank lines; lines that begin
// with a space stay as they are.
func (p page) prose(text string) {
	literal, parted := false, false
	for line := range strings.Lines(strings.TrimSpace(text)) {
		line = strings.TrimRight(line, " \n")
		if line == "" {
			parted = true
			continue
		}
		indented := strings.HasPrefix(line, " ")
		switch {
		case literal && !indented:
			p.macro("Ed")
			fallthrough
		case parted && !indented:
			p.macro("Pp")
		case indented && !literal:
			p.macro("Bd", ".-literal")
		}
		literal, parted = indented, false
		if !indented {
			line = sentenceEnd.ReplaceAllString(line, "$1\n")
		}
		for part := range strings.SplitSeq(line, "\n") {
			p.line(part)
		}
	}
	if literal {
		p.macro("Ed")
	}
}

// printManual writes the manual page.
func printManual(w io.Writer, date time.Time) error {
	p := page{bufio.NewWriter(w)}
	fmt.Fprintf(p, ".Dd %s\n.Dt FOULCASE 1\n.Os\n", date.Format("January 2, 2006"))
	p.section("NAME")
	p.WriteString(".Nm foulcase\n.Nd find misspellings in documents, those that are words too\n")
	p.section("SYNOPSIS")
	p.WriteString(".Nm\n.Ar verb\n.Op Ar flags\n.Op Ar operands\n.Nm\n.Fl -version\n")
	p.section("DESCRIPTION")
	p.prose("foulcase proofreads documents, and builds and measures the models that it does so with. It reads\n" +
		"files and uses no network. The first word names what is to be done:")
	p.macro("Bl", ".-tag", ".-width", ".Ds")
	for _, v := range verbs() {
		p.macro("It", ".Cm", v.name)
		p.line(capitalised(v.summary) + ".")
	}
	p.macro("El")
	p.section("VERBS")
	for _, v := range verbs() {
		p.verb(v)
	}
	p.surroundings()
	p.section("EXIT STATUS")
	p.macro("Bl", ".-tag", ".-width", ".Ds")
	for code, meaning := range []string{"Nothing was marked.", "Something was marked, or a gate was not passed.", "There was trouble, which standard error tells."} {
		p.macro("It", strconv.Itoa(code))
		p.line(meaning)
	}
	p.macro("El")
	p.section("EXAMPLES")
	p.macro("Bd", ".-literal")
	for _, v := range verbs() {
		for _, line := range v.exampleLines() {
			p.line(line)
		}
	}
	p.macro("Ed")
	return p.Flush()
}

// verb describes one verb with its flags.
func (p page) verb(v verb) {
	p.macro("Ss", strings.TrimSpace("foulcase "+v.name+" "+v.operands))
	p.prose(v.about)
	fs, _ := v.flagSet()
	if !fs.HasFlags() {
		return
	}
	p.macro("Bl", ".-tag", ".-width", ".Ds")
	fs.VisitAll(func(f *pflag.Flag) {
		label, usage := pflag.UnquoteUsage(f)
		args := []string{".Fl", "-" + f.Name}
		if f.Shorthand != "" {
			args = []string{".Fl", f.Shorthand, ".,", ".Fl", "-" + f.Name}
		}
		if label != "" && f.NoOptDefVal == "" {
			args = append(args, ".Ar", label)
		}
		p.macro("It", args...)
		p.prose(capitalised(usage) + ".")
		if !isEmptyDefault(f.DefValue) && f.Name != "jobs" {
			p.line("The default is " + f.DefValue + ".")
		}
	})
	p.macro("El")
}

// isEmptyDefault tells a default that says nothing.
func isEmptyDefault(value string) bool {
	return value == "" || value == "false" || value == "[]" || value == "0"
}

// surroundings describes the variables and files that foulcase goes by.
func (p page) surroundings() {
	p.section("ENVIRONMENT")
	p.macro("Bl", ".-tag", ".-width", ".Ds")
	for _, k := range house.Keys() {
		if k.Variable != "" {
			p.macro("It", ".Ev", k.Variable)
			p.line(capitalised(k.About) + ".")
		}
	}
	p.macro("It", ".Ev", "FOULCASE_CONFIG")
	p.line("A file of settings in place of those found; none for none at all.")
	p.macro("It", ".Ev", "NO_COLOR")
	p.line("When it is not empty, nothing is coloured unless --color asks for it.")
	p.macro("It", ".Ev", "SOURCE_DATE_EPOCH")
	p.line("The date of the manual page, in seconds since 1970.")
	p.macro("El")
	p.section("FILES")
	p.prose("Settings stand in " + house.FileName + ", which is looked for from each document upwards, and in the\n" +
		"user's folder of settings. Its keys are:")
	p.macro("Bl", ".-tag", ".-width", ".Ds")
	for _, k := range house.Keys() {
		p.macro("It", ".Cm", k.Name)
		p.line(capitalised(k.About) + ".")
		p.line("Default: " + k.Default + ".")
		p.line("For example " + k.Example)
	}
	p.macro("El")
}

// capitalised begins a sentence with s.
func capitalised(s string) string {
	if s == "" || strings.HasPrefix(s, "-") {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}
