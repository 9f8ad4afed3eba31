package text_test

import (
	"testing"

	"example.org/foulcase/internal/text"
)

func TestLaTeXBlocks(t *testing.T) {
	checkReadings(t, text.LaTeX, []reading{
		{"empty", "", nil},
		{"paragraphs", "Fog at\n  the bar.\n\nIce.\\par Sea", []string{"Fog at\nthe bar.", "Ice.", "Sea"}},
		{"document", "\\documentclass[a4paper]{article}\nhidden words\n\\title{The \\emph{log}}\n\\author{A Pilot}\n\\begin{document}\n\\maketitle\nFog.\n\\end{document}\nno more", []string{"The log", "Fog."}},
		{"headings", "\\section{Fog}Ice\\subsection*{The bar}\nat \\chapter[Short tides]{Long tides}", []string{"Fog", "Ice", "The bar", "at", "Long tides"}},
		{"text commands", `\textbf{b}erth and b\emph{ir}th and {\itshape now} \href{http://x}{quay}s`, []string{"berth and birth and now quays"}},
		{"footnote", `Fog\footnote{The \emph{log}.} came\marginpar{Ice}.`, []string{"Fog came.", "The log.", "Ice"}},
		{"references", `See \ref{fig:a b} and~\cite[p.~3]{tide, bar}\label{x} of \url{http://x/%7E}.`, []string{"See \uFFFC and \uFFFC of \uFFFC."}},
		{"accents", `na\"{\i}ve caf\'e \c{c}a \v{S}i\v s {\'E}t\'{e} stra\ss e \ae on f{\o}r \oe uvre`, []string{"naïve café ça Šiš Été straße æon før œuvre"}},
		{"symbols", `10\,\% \& \$5 \#1 a\_b \{x\} \ldots{} \S 3`, []string{"10 % & $5 #1 a_b {x} … §3"}},
		{"ligatures", "``fog'' -- `ice'---don't~go well-known", []string{"“fog” – ‘ice'—don't go well-known"}},
		{"math", `Let $x_1 = \$2$ and \(y\) or $$z$$ and \[w\] be.`, []string{"Let \uFFFC and \uFFFC or \uFFFC and \uFFFC be."}},
		{"equations", "We have\n\\begin{equation}\nx = y\n\\end{equation}\nwhere fog\\begin{align*}a\\end{align*}", []string{"We have\n\uFFFC\nwhere fog\uFFFC"}},
		{"a lone dollar", "It costs $5 now.\n\nFog $x$", []string{"It costs 5 now.", "Fog \uFFFC"}},
		{"code", "Run \\verb|a b %|s or \\lstinline[x]{y z} now.\n\\begin{verbatim}\nno words % \\end{x}\n\\end{verbatim}\nFog\\begin{tikzpicture}[x]no\\end{tikzpicture}", []string{"Run \uFFFCs or \uFFFC now.", "Fog"}},
		{"comments", "fog % a note\nat 5\\% % b\n\nsea% c\n% d\n  shore", []string{"fog at 5%", "seashore"}},
		{"list", "\\begin{itemize}[noitemsep]\n\\item rope\n\\item[The hook] {big} chain\n\\end{itemize}", []string{"rope", "The hook", "big chain"}},
		{"table", "\\begin{tabular}{l|r}\n\\hline fog & ice\\\\[2pt] sea & \\multicolumn{2}{c}{bar} \\\\ \\end{tabular}\nend", []string{"fog", "ice", "sea", "bar", "end"}},
		{"figure", "\\begin{figure}[ht]\\includegraphics[width=2cm]{a.png}\\caption[Short]{The bar}\\label{f}\\end{figure}", []string{"\uFFFC", "The bar"}},
		{"line breaks", "Harbour Office\\\\Skarrow\\\\*[2mm]\nSound and\\newline the way", []string{"Harbour Office", "Skarrow", "Sound and\nthe way"}},
		{"settings", "\\setlength{\\parskip}{1em}\\newcommand{\\ssp}[1]{Sound Pilots #1}\\vspace*{2mm}Fog\\def\\x#1#2{two words #1} ice", []string{"Fog ice"}},
		{"own commands", `The \ssp{} at \berth{b-3} and \note{the fog comes}`, []string{"The \uFFFC at \uFFFC and the fog comes"}},
		{"own environments of code", "\\DefineVerbatimEnvironment{Skarrow}{Verbatim}{commandchars=\\\\\\{\\}}Fog\n\\begin{Skarrow}[]\nno \\x{words at all}\n\\end{Skarrow}\nIce", []string{"Fog", "Ice"}},
		{"a text and its bookmark", "\\section{On \\texorpdfstring{$x$ \\emph{and} ice}{x and ice} now}\\texorpdfstring a{b}", []string{"On \uFFFC and ice now", "ab"}},
		{"hyphenation", `har\-bour`, []string{"harbour"}},
		{"language", `He is \foreignlanguage{german}{ein Lotse} here`, []string{"He is \uFFFC here"}},
		{"CRLF", "Ice at\r\nthe bar.\r\n\r\nFog % x\r\nnow", []string{"Ice at\nthe bar.", "Fog now"}},
		{"not closed", "fog \\emph{ice \\footnote{sea \\item[bar", []string{"fog ice", "sea", "bar"}},
		{"closed too often", "fog} ice]] sea}", []string{"fog ice]] sea"}},
		{"a bracket not closed", "\\emph{\\item[fog} ice} sea", []string{"fog", "ice sea"}},
	})
}

func TestLaTeXEscape(t *testing.T) {
	checkEscapes(t, text.LaTeX, "a_b & 5% – “x”", map[string]string{"fog": "a\\_b \\& 5\\% -- ``x''"})
}

func TestLaTeXBounds(t *testing.T) {
	checkBounds(t, text.LaTeX, "\\", "{", "}", "[", "\\a{", "\\a[", "\\emph{", "\\footnote{", "\\label{", "\\item[", "$", "$$", "$ $$ ",
		"\\(", "\\[", "\\begin{equation}", "\\begin{verbatim}", "\\begin{x}", "\\end{x}", "\\verb|", "%", "%\n", "&", "\\\\", "\\'",
		"\\section{\n\n", "\\def{\n\n", "\\verb1\\verb2", "`", "-")
}

func FuzzLaTeX(f *testing.F) {
	fuzzFormat(f, text.LaTeX, `\begin{document}a\'e {\"o}\footnote{b $x$} \verb|y| % c`+"\n"+`\section[d]{e}\item[f] g\\h \begin{tabular}{l}i&j\\\end{tabular}\[k\]`)
}

// TestFootnoteIsNoCode: what stands inside another block is prose, and no name that
// the document has in its code.
func TestFootnoteIsNoCode(t *testing.T) {
	all := blocks(t, `The bar\footnote{The log.} is \verb|closed|.`, text.LaTeX)
	if len(all) != 2 || all[0].Names.Has([]byte("log")) || !all[0].Names.Has([]byte("closed")) {
		t.Errorf("%d blocks, with the names %v", len(all), all[0].Names)
	}
}
