package text

import "io"

// language is how a programming language, or one of settings or commands, writes
// comments and strings.
type language struct {
	name       Format
	title      string
	extensions []string // as in format
	names      []string // as in format
	ids        []string // identifiers of the Language Server Protocol; none: the name
	line       []string // what begins a comment that ends with the line
	enclosures []enclosure
	fresh      bool      // line comments begin where nothing but white space stands before them
	spaced     bool      // line comments begin at a line's start or after white space or one of ;(){}
	backslash  bool      // outside of strings a backslash takes away the meaning of the next byte
	regex      bool      // where an operand may stand, a slash begins a regular expression
	hereMark   string    // begins a here-document, whose lines are left out
	quotes     []string  // begin literals whose delimiters the writer chose, longer words first; left out
	raw        bool      // an r before a string says that backslashes stand for themselves
	question   bool      // a question mark before a sign makes a character of it
	island     [2]string // code stands between these alone
}

// role says what an enclosure holds.
type role uint8

const (
	quoted    role = iota // a string
	remark                // a block comment
	docstring             // a string that is a comment when it is a statement by itself
	character             // one character, or no literal at all: never read
	passed                // anything else in which no comment begins: never read
)

// enclosure is a pair of delimiters. Both may hold a tag, the same in both, that
// the writer chose: open, tag, openEnd ... close, tag, closeEnd.
type enclosure struct {
	role     role
	open     string
	openEnd  string
	close    string
	closeEnd string
	tag      byte   // 0: none; 'w': letters and digits; else any number of this byte
	escape   byte   // takes away the meaning of the byte after it; 0: none does
	doubled  bool   // the closing delimiter twice stands for itself once
	lines    bool   // may hold line ends
	nested   bool   // may hold its own kind
	fresh    bool   // both delimiters stand at the start of a line
	apart    bool   // does not open behind a letter or digit
	inner    string // begins code inside, up to the bracket that closes its last byte
}

// What many languages have in common.
var (
	cBlock  = enclosure{role: remark, open: "/*", close: "*/", lines: true}
	nestedC = enclosure{role: remark, open: "/*", close: "*/", lines: true, nested: true}
	mlBlock = enclosure{role: remark, open: "(*", close: "*)", lines: true, nested: true}

	double     = enclosure{open: `"`, close: `"`, escape: '\\'}
	single     = enclosure{open: "'", close: "'", escape: '\\'}
	apartOne   = enclosure{open: "'", close: "'", doubled: true, apart: true}
	apartTwo   = enclosure{open: `"`, close: `"`, escape: '\\', apart: true}
	singleJS   = enclosure{open: "'", close: "'", escape: '\\', apart: true} // "don't" stands in elements between code
	char       = enclosure{role: character, open: "'"}
	doubleLong = enclosure{open: `"`, close: `"`, escape: '\\', lines: true}
	singleLong = enclosure{open: "'", close: "'", escape: '\\', lines: true}
	singleRaw  = enclosure{open: "'", close: "'", lines: true}
	singleTwin = enclosure{open: "'", close: "'", doubled: true}
	doubleTwin = enclosure{open: `"`, close: `"`, doubled: true}
	triple     = enclosure{open: `"""`, close: `"""`, escape: '\\', lines: true}
	tripleDoc  = enclosure{role: docstring, open: `"""`, close: `"""`, escape: '\\', lines: true}
	tripleDoc1 = enclosure{role: docstring, open: "'''", close: "'''", escape: '\\', lines: true}
	tripleRaw1 = enclosure{open: "'''", close: "'''", lines: true}
	template   = enclosure{open: "`", close: "`", escape: '\\', lines: true, inner: "${"}
	dollarIn   = enclosure{open: `"`, close: `"`, escape: '\\', inner: "${"}
	hashIn     = enclosure{open: `"`, close: `"`, escape: '\\', lines: true, inner: "#{"}
	quotedName = enclosure{role: passed, open: `"`, close: `"`, doubled: true}
)

// languages is the table. Identifiers are those of the Language Server Protocol
// 3.17, TextDocumentItem, from memory; where it has none, those that editors use.
// Strings that stand without delimiters (YAML) and the text around islands of code
// (PHP) are not read.
func languages() []language {
	return []language{
		{name: "c", title: "C", extensions: []string{".c", ".h"}, ids: []string{"c", "objective-c"}, line: []string{"//"}, enclosures: []enclosure{cBlock, double, char}},
		{name: "cpp", title: "C++", extensions: []string{".cc", ".cpp", ".cxx", ".hh", ".hpp", ".hxx", ".mm"}, ids: []string{"cpp", "objective-cpp"}, line: []string{"//"}, enclosures: []enclosure{
			cBlock, double, char, {open: `R"`, openEnd: "(", close: ")", closeEnd: `"`, tag: 'w', lines: true},
		}},
		{name: "csharp", title: "C#", extensions: []string{".cs"}, line: []string{"//"}, enclosures: []enclosure{
			cBlock, double, char,
			{open: `"""`, close: `"""`, lines: true},
			{open: `@"`, close: `"`, doubled: true, lines: true},
			{open: `@$"`, close: `"`, doubled: true, lines: true},
		}},
		{name: "clojure", title: "Clojure", extensions: []string{".clj", ".cljs", ".cljc"}, line: []string{";"}, backslash: true, enclosures: []enclosure{doubleLong}},
		{name: "css", title: "CSS", extensions: []string{".css"}, enclosures: []enclosure{cBlock, double, single}},
		{name: "dart", title: "Dart", extensions: []string{".dart"}, line: []string{"//"}, enclosures: []enclosure{nestedC, triple, tripleRaw1, dollarIn, single}},
		{name: "dockerfile", title: "Dockerfile", extensions: []string{".dockerfile"}, names: []string{"dockerfile", "containerfile"}, line: []string{"#"}, fresh: true},
		{name: "elixir", title: "Elixir", extensions: []string{".ex", ".exs"}, line: []string{"#"}, enclosures: []enclosure{
			{role: docstring, open: `"""`, close: `"""`, escape: '\\', lines: true, inner: "#{"}, hashIn, {role: passed, open: "'", close: "'", escape: '\\', apart: true},
		}},
		{name: "erlang", title: "Erlang", extensions: []string{".erl", ".hrl"}, line: []string{"%"}, enclosures: []enclosure{doubleLong, {role: passed, open: "'", close: "'", escape: '\\'}}},
		{name: "fortran", title: "Fortran", extensions: []string{".f90", ".f95", ".f03", ".f08"}, line: []string{"!"}, enclosures: []enclosure{singleTwin, doubleTwin}},
		{name: "fsharp", title: "F#", extensions: []string{".fs", ".fsi", ".fsx"}, line: []string{"//"}, enclosures: []enclosure{mlBlock, triple, doubleLong, char}},
		{name: "graphql", title: "GraphQL", extensions: []string{".graphql", ".gql"}, line: []string{"#"}, enclosures: []enclosure{tripleDoc, double}},
		{name: "groovy", title: "Groovy", extensions: []string{".groovy", ".gradle"}, names: []string{"jenkinsfile"}, line: []string{"//"}, enclosures: []enclosure{cBlock, triple, tripleRaw1, dollarIn, single}},
		{name: "haskell", title: "Haskell", extensions: []string{".hs"}, line: []string{"--"}, enclosures: []enclosure{{role: remark, open: "{-", close: "-}", lines: true, nested: true}, double, char}},
		{name: "ini", title: "INI", extensions: []string{".ini", ".cfg", ".conf", ".properties"}, names: []string{".editorconfig"}, ids: []string{"ini", "properties"}, line: []string{"#", ";"}, fresh: true},
		{name: "java", title: "Java", extensions: []string{".java"}, line: []string{"//"}, enclosures: []enclosure{cBlock, triple, double, char}},
		{name: "javascript", title: "JavaScript", extensions: []string{".js", ".mjs", ".cjs", ".jsx"}, ids: []string{"javascript", "javascriptreact"}, line: []string{"//"}, regex: true, enclosures: []enclosure{cBlock, double, singleJS, template}},
		{name: "julia", title: "Julia", extensions: []string{".jl"}, line: []string{"#"}, enclosures: []enclosure{{role: remark, open: "#=", close: "=#", lines: true, nested: true}, tripleDoc, doubleLong, char}},
		{name: "kotlin", title: "Kotlin", extensions: []string{".kt", ".kts"}, line: []string{"//"}, enclosures: []enclosure{nestedC, {open: `"""`, close: `"""`, lines: true, inner: "${"}, dollarIn, char}},
		{name: "lisp", title: "Lisp", extensions: []string{".el", ".lisp", ".scm"}, line: []string{";"}, backslash: true, question: true, enclosures: []enclosure{{role: remark, open: "#|", close: "|#", lines: true, nested: true}, doubleLong}},
		{name: "lua", title: "Lua", extensions: []string{".lua"}, line: []string{"--"}, enclosures: []enclosure{
			{role: remark, open: "--[", openEnd: "[", close: "]", closeEnd: "]", tag: '=', lines: true},
			double, single,
			{open: "[", openEnd: "[", close: "]", closeEnd: "]", tag: '=', lines: true},
		}},
		{name: "make", title: "Make", extensions: []string{".mk", ".mak"}, names: []string{"makefile", "gnumakefile"}, ids: []string{"makefile"}, line: []string{"#"}, spaced: true, backslash: true},
		{name: "ocaml", title: "OCaml", extensions: []string{".ml", ".mli"}, enclosures: []enclosure{mlBlock, doubleLong, char, {open: "{", openEnd: "|", close: "|", closeEnd: "}", tag: 'w', lines: true}}},
		{name: "pascal", title: "Pascal", extensions: []string{".pas", ".dpr", ".lpr"}, line: []string{"//"}, enclosures: []enclosure{{role: remark, open: "{", close: "}", lines: true}, {role: remark, open: "(*", close: "*)", lines: true}, singleTwin}},
		{name: "perl", title: "Perl", extensions: []string{".pl", ".pm"}, line: []string{"#"}, spaced: true, regex: true, backslash: true, hereMark: "<<", quotes: []string{"qq", "qw", "qr", "q", "m", "s", "tr", "y"}, enclosures: []enclosure{
			{role: remark, open: "=pod", close: "=cut", fresh: true, lines: true},
			{role: remark, open: "=head", close: "=cut", fresh: true, lines: true},
			doubleLong,
			{open: "'", close: "'", escape: '\\', lines: true, apart: true},
		}},
		{name: "php", title: "PHP", extensions: []string{".php"}, line: []string{"//", "#"}, hereMark: "<<<", island: [2]string{"<?", "?>"}, enclosures: []enclosure{{role: passed, open: "#[", close: "]"}, cBlock, doubleLong, singleLong}},
		{name: "powershell", title: "PowerShell", extensions: []string{".ps1", ".psm1", ".psd1"}, line: []string{"#"}, spaced: true, enclosures: []enclosure{
			{role: remark, open: "<#", close: "#>", lines: true},
			{open: `@"`, close: "\n\"@", lines: true},
			{open: "@'", close: "\n'@", lines: true},
			{open: `"`, close: `"`, escape: '`', doubled: true, lines: true, inner: "$("},
			{open: "'", close: "'", doubled: true, lines: true},
		}},
		{name: "proto", title: "Protocol Buffers", extensions: []string{".proto"}, ids: []string{"proto", "proto3"}, line: []string{"//"}, enclosures: []enclosure{cBlock, double, single}},
		{name: "python", title: "Python", extensions: []string{".py", ".pyi", ".pyw"}, line: []string{"#"}, raw: true, enclosures: []enclosure{tripleDoc, tripleDoc1, double, single}},
		{name: "r", title: "R", extensions: []string{".r"}, line: []string{"#"}, enclosures: []enclosure{doubleLong, singleLong, {role: passed, open: "`", close: "`"}}},
		{name: "ruby", title: "Ruby", extensions: []string{".rb", ".rake", ".gemspec"}, names: []string{"rakefile", "gemfile"}, line: []string{"#"}, spaced: true, regex: true, hereMark: "<<", quotes: []string{"%q", "%Q", "%w", "%W", "%i", "%I", "%r", "%"}, question: true, enclosures: []enclosure{
			{role: remark, open: "=begin", close: "=end", fresh: true, lines: true}, hashIn, singleLong,
		}},
		{name: "rust", title: "Rust", extensions: []string{".rs"}, line: []string{"//"}, enclosures: []enclosure{
			nestedC, doubleLong, char,
			{open: "r", openEnd: `"`, close: `"`, tag: '#', lines: true, apart: true},
			{open: "br", openEnd: `"`, close: `"`, tag: '#', lines: true, apart: true},
		}},
		{name: "scala", title: "Scala", extensions: []string{".scala", ".sbt"}, line: []string{"//"}, enclosures: []enclosure{nestedC, {open: `"""`, close: `"""`, lines: true, inner: "${"}, double, char}},
		{name: "scss", title: "SCSS and Less", extensions: []string{".scss", ".less"}, ids: []string{"scss", "less"}, line: []string{"//"}, enclosures: []enclosure{cBlock, double, single}},
		{name: "shell", title: "shell scripts", extensions: []string{".sh", ".bash", ".zsh", ".ksh"}, ids: []string{"shellscript"}, line: []string{"#"}, spaced: true, backslash: true, hereMark: "<<", enclosures: []enclosure{
			{open: `"`, close: `"`, escape: '\\', lines: true, inner: "$("}, singleRaw,
		}},
		{name: "sql", title: "SQL", extensions: []string{".sql"}, line: []string{"--"}, enclosures: []enclosure{
			cBlock,
			{open: "'", close: "'", doubled: true, lines: true},
			quotedName,
			{role: passed, open: "$", openEnd: "$", close: "$", closeEnd: "$", tag: 'w', lines: true, apart: true},
		}},
		{name: "swift", title: "Swift", extensions: []string{".swift"}, line: []string{"//"}, enclosures: []enclosure{
			nestedC,
			{open: `"""`, close: `"""`, escape: '\\', lines: true, inner: `\(`},
			{open: `"`, close: `"`, escape: '\\', inner: `\(`},
			{open: "#", openEnd: `"`, close: `"#`, tag: '#'},
		}},
		{name: "terraform", title: "Terraform and HCL", extensions: []string{".tf", ".tfvars", ".hcl"}, ids: []string{"terraform", "terraform-vars", "hcl"}, line: []string{"#", "//"}, hereMark: "<<", enclosures: []enclosure{cBlock, dollarIn}},
		{name: "toml", title: "TOML", extensions: []string{".toml"}, line: []string{"#"}, enclosures: []enclosure{triple, tripleRaw1, double, {open: "'", close: "'"}}},
		{name: "typescript", title: "TypeScript", extensions: []string{".ts", ".tsx", ".mts", ".cts"}, ids: []string{"typescript", "typescriptreact"}, line: []string{"//"}, regex: true, enclosures: []enclosure{cBlock, double, singleJS, template}},
		{name: "yaml", title: "YAML (strings in quotation marks)", extensions: []string{".yaml", ".yml"}, line: []string{"#"}, spaced: true, enclosures: []enclosure{apartTwo, apartOne}},
		{name: "zig", title: "Zig", extensions: []string{".zig"}, line: []string{"//"}, enclosures: []enclosure{{role: passed, open: `\\`, close: "\n"}, double, char}},
	}
}

// sourceFormats are the entries of the registry for source code.
func sourceFormats() []format {
	formats := []format{{
		name: "go", about: "comments and strings of Go", extensions: []string{".go"}, languages: []string{"go"},
		read: sourceReader(goPieces),
	}}
	for _, l := range languages() {
		ids := l.ids
		if ids == nil {
			ids = []string{string(l.name)}
		}
		formats = append(formats, format{
			name: l.name, about: "comments and strings of " + l.title, extensions: l.extensions, names: l.names, languages: ids,
			read: sourceReader(l.pieces),
		})
	}
	return formats
}

// sourceReader makes the reader of source code that find cuts into its pieces.
func sourceReader(find func(source []byte, take func(codePiece))) func(io.Reader, Options, func(*Block, error) bool) {
	return func(r io.Reader, o Options, yield func(*Block, error) bool) {
		readWhole(r, o, yield, func(source []byte) ([]*Block, error) {
			reader := codeReader{source: source}
			find(source, reader.take)
			reader.finishComment()
			return reader.order(), nil
		})
	}
}
