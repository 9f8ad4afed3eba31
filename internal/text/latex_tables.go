package text

import "strings"

// latexText says what a command is to a reader of prose.
type latexText uint8

const (
	unknownText     latexText = iota
	silentText                // it prints nothing here
	placeholderText           // it prints something that is no prose: a number, a name, an image
	runningText               // its last argument is part of the sentence
	apartText                 // its last argument is a text of its own
	headingText               // the same, and a heading
)

// latexUse is the use of a command.
type latexUse struct {
	text      latexText
	arguments int  // that are left out, in braces; of texts, before the one that is read
	optional  bool // the argument in brackets is the text
	first     bool // not the last argument is the text but the one before it
	block     bool // it ends the paragraph before it
}

// latexCommand is the table of commands. Source: the LaTeX reference manual and
// the manuals of the packages hyperref, graphicx, biblatex, cleveref, babel, beamer
// and glossaries, from memory.
func latexCommand(name string) latexUse {
	switch name {
	case "part", "chapter", "section", "subsection", "subsubsection", "paragraph", "subparagraph", "title", "subtitle",
		"frametitle", "framesubtitle", "addchap", "addsec", "minisec", "dictum":
		return latexUse{text: headingText}
	case "caption", "captionof", "subcaption", "abstract", "publishers", "dedication", "subject":
		return latexUse{text: apartText, block: true}
	case "footnote", "footnotetext", "thanks", "marginpar", "sidenote", "marginnote", "endnote", "todo", "pdfcomment", "tooltip":
		return latexUse{text: apartText}
	case "item":
		return latexUse{text: apartText, optional: true, block: true}
	case "emph", "textbf", "textit", "textsl", "textsc", "textrm", "textsf", "textmd", "textup", "textnormal", "text", "underline",
		"uline", "sout", "mbox", "makebox", "fbox", "framebox", "hbox", "enquote", "textquote", "uppercase", "lowercase",
		"MakeUppercase", "MakeLowercase", "textsuperscript", "textsubscript", "alert", "structure", "hl", "ul", "st", "so", "caps":
		return latexUse{text: runningText}
	case "href", "textcolor", "colorbox", "parbox", "raisebox", "hyperref", "hyperlink", "hypertarget",
		"minipage", "multirow", "scalebox", "resizebox", "foreignquote", "onslide":
		return latexUse{text: runningText, arguments: 1}
	case "texorpdfstring":
		return latexUse{text: runningText, first: true}
	case "multicolumn", "fcolorbox":
		return latexUse{text: runningText, arguments: 2}
	case "ref", "eqref", "pageref", "autoref", "nameref", "cref", "Cref", "vref", "labelcref", "url", "path", "nolinkurl", "texttt",
		"code", "includegraphics", "input", "include", "num", "si", "unit", "ang", "gls", "Gls", "glspl", "acrshort", "acrlong", "ac",
		"footnotemark", "ensuremath", "symbol", "email", "the", "arabic", "roman", "Roman", "alph", "Alph", "ce", "tikz",
		"detokenize", "today":
		return latexUse{text: placeholderText, arguments: placeholderArguments(name)}
	case "SI", "qty", "foreignlanguage", "textlang", "numrange", "frac":
		return latexUse{text: placeholderText, arguments: 2}
	}
	if strings.Contains(strings.ToLower(name), "cite") {
		return latexUse{text: placeholderText, arguments: 1}
	}
	if n, ok := latexSilent(name); ok {
		return latexUse{text: silentText, arguments: n}
	}
	return latexUse{}
}

// placeholderArguments counts the arguments of those commands.
func placeholderArguments(name string) int {
	switch name {
	case "footnotemark", "today", "the":
		return 0
	}
	return 1
}

// latexSilent reports commands that print nothing where they stand, and how many
// arguments they have.
func latexSilent(name string) (arguments int, ok bool) {
	switch name {
	case "-", "/", "@", "!", "+", "<", ">", "*", "|", // discretionary hyphen, italic correction, tab stops
		"noindent", "indent", "centering", "raggedright", "raggedleft", "bfseries", "itshape", "scshape", "slshape", "upshape",
		"mdseries", "rmfamily", "sffamily", "ttfamily", "normalfont", "em", "bf", "it", "sc", "sl", "rm", "sf", "tt",
		"tiny", "scriptsize", "footnotesize", "small", "normalsize", "large", "Large", "LARGE", "huge", "Huge",
		"newpage", "clearpage", "cleardoublepage", "pagebreak", "nopagebreak", "smallskip", "medskip", "bigskip", "hfill", "vfill",
		"hline", "toprule", "midrule", "bottomrule", "endhead", "endfirsthead", "endfoot", "endlastfoot", "maketitle", "tableofcontents",
		"listoffigures", "listoftables", "appendix", "frontmatter", "mainmatter", "backmatter", "sloppy", "fussy", "protect", "relax",
		"leavevmode", "null", "makeatletter", "makeatother", "printbibliography", "printindex", "makeindex", "singlespacing",
		"onehalfspacing", "doublespacing", "pause", "and", "selectfont", "strut", "allowbreak", "nobreak", "ignorespaces", "unskip":
		return 0, true
	case "label", "index", "usepackage", "documentclass", "RequirePackage", "vspace", "hspace", "pagestyle", "thispagestyle",
		"bibliography", "bibliographystyle", "addbibresource", "nocite", "cline", "cmidrule", "phantom", "hphantom", "vphantom",
		"date", "author", "institute", "color", "linespread", "pagenumbering", "graphicspath", "hypersetup", "geometry", "lstset",
		"usetikzlibrary", "tikzset", "selectlanguage", "includeonly", "newcounter", "stepcounter", "refstepcounter", "captionsetup",
		"sisetup", "microtypesetup", "pdfbookmark", "usetheme", "vskip", "hskip", "baselineskip", "lstinputlisting", "rowcolor",
		"columncolor", "cellcolor", "newlength", "theoremstyle", "hyphenation", "special", "write", "setstretch", "glsadd", "phantomsection":
		if name == "phantomsection" || name == "baselineskip" {
			return 0, true
		}
		return 1, true
	case "setlength", "addtolength", "setcounter", "addtocounter", "newcommand", "renewcommand", "providecommand", "newtheorem",
		"DeclareMathOperator", "rule", "definecolor", "newglossaryentry", "let", "fontsize",
		"DeclareRobustCommand", "setmainfont", "NewDocumentCommand", "inputminted", "settowidth", "colorlet", "addcontentsline":
		return latexLong(name), true
	case "newenvironment", "renewenvironment", "newacronym", "DefineVerbatimEnvironment", "lstnewenvironment":
		return 3, true
	}
	return 0, false
}

// latexLong counts the arguments of those commands.
func latexLong(name string) int {
	switch name {
	case "definecolor", "addcontentsline", "NewDocumentCommand":
		return 3
	case "setmainfont":
		return 1
	}
	return 2
}

// environmentKind says what stands in an environment.
type environmentKind uint8

const (
	textEnvironment environmentKind = iota
	mathEnvironment
	codeEnvironment
)

// latexEnvironment is the table of environments that hold no text. Source: the
// LaTeX reference manual and the manuals of amsmath, listings, minted, fancyvrb,
// TikZ and algorithmicx, from memory.
func latexEnvironment(name string) environmentKind {
	switch strings.TrimSuffix(name, "*") {
	case "equation", "align", "gather", "multline", "flalign", "alignat", "eqnarray", "math", "displaymath", "array", "split",
		"cases", "matrix", "pmatrix", "bmatrix", "vmatrix", "dmath", "IEEEeqnarray":
		return mathEnvironment
	case "verbatim", "Verbatim", "BVerbatim", "LVerbatim", "lstlisting", "minted", "tikzpicture", "picture", "pgfpicture", "axis",
		"comment", "filecontents", "algorithm", "algorithmic", "alltt", "forest", "pspicture", "thebibliography", "otherlanguage",
		"asy", "dot", "code", "luacode":
		return codeEnvironment
	}
	return textEnvironment
}

// latexEnvironmentArguments counts the arguments of an environment that are no
// text.
func latexEnvironmentArguments(name string) int {
	switch strings.TrimSuffix(name, "*") {
	case "tabular", "longtable", "minipage", "wrapfigure", "multicols", "list", "adjustwidth", "supertabular", "spacing", "tabbing":
		if name == "tabular*" || strings.HasPrefix(name, "wrap") || name == "list" || strings.HasPrefix(name, "adjust") {
			return 2
		}
		if name == "tabbing" {
			return 0
		}
		return 1
	case "tabularx", "tabulary", "wraptable":
		return 2
	}
	return 0
}

// latexTable reports environments whose line breaks end a row.
func latexTable(name string) bool {
	switch strings.TrimSuffix(name, "*") {
	case "tabular", "tabularx", "tabulary", "longtable", "supertabular", "tabbing":
		return true
	}
	return false
}
