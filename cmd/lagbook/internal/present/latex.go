package present

import (
	"bytes"
	"io"
	"strconv"
	"strings"
)

// LaTeX writes d as a document plain pdflatex compiles, with no package beyond
// those every distribution has. A long table is cut into pieces that fit a
// page, each under the heads; one too wide has its words broken.
func LaTeX(w io.Writer, d Doc) error {
	var b bytes.Buffer
	b.WriteString(preamble)
	if d.Title != "" {
		b.WriteString("\\section*{" + inLaTeX(d.Title) + "}\n")
	}
	if line := byline(d, `\textbf{`, "}", escapeLaTeX); line != "" {
		b.WriteString(line + "\n")
	}
	for _, p := range d.Parts {
		latexPart(&b, p)
	}
	b.WriteString("\n\\end{document}\n")
	_, err := w.Write(b.Bytes())
	return err
}

// preamble: T1 for < > | and quotation marks as they are typed; margins of 20 mm.
// \letter shows by its number what the font does not have.
const preamble = `\documentclass[a4paper,11pt]{article}
\usepackage[T1]{fontenc}
\usepackage[utf8]{inputenc}
\usepackage{textcomp}
\setlength{\textwidth}{170mm}
\setlength{\oddsidemargin}{-5.4mm}
\setlength{\textheight}{247mm}
\setlength{\topmargin}{-15.4mm}
\setlength{\headheight}{0pt}
\setlength{\headsep}{0pt}
\setlength{\emergencystretch}{4em}
\setlength{\parindent}{0pt}
\setlength{\parskip}{6pt}
\newcommand{\tight}{\setlength{\itemsep}{0pt}\setlength{\parsep}{0pt}\setlength{\parskip}{0pt}}
\newcommand{\letter}[1]{{\small[U+#1]}}
\begin{document}
`

func latexPart(b *bytes.Buffer, p Part) {
	b.WriteString("\n")
	switch p := p.(type) {
	case Heading:
		b.WriteString("\\" + strings.Repeat("sub", min(max(1, p.Level), 2)) + "section*{" + inLaTeX(p.Text) + "}\n")
	case Paragraph:
		b.WriteString(inLaTeX(p.Text) + "\n")
	case List:
		latexItems(b, "itemize", len(p.Items), func(i int) string { return "{} " + inLaTeX(p.Items[i]) })
	case Facts:
		latexItems(b, "description", len(p.List), func(i int) string {
			return "[{" + inLaTeX(p.List[i].Name) + "}] " + inLaTeX(p.List[i].Value)
		})
	case Table:
		latexTable(b, p)
	case Warning:
		b.WriteString("\\textbf{Warning:} " + inLaTeX(p.Text) + "\n")
	case Formula:
		b.WriteString("\\begin{quote}\\raggedright\n" + inLaTeX(p.Text) + "\n\\end{quote}\n")
	case Caution:
		b.WriteString("\\bigskip\\hrule\\medskip\n\\textbf{Caution:} " + inLaTeX(p.Text) + "\n")
	}
}

// latexItems writes a list; an empty one would stop the compiler.
func latexItems(b *bytes.Buffer, kind string, n int, item func(int) string) {
	if n == 0 {
		return
	}
	b.WriteString("\\begin{" + kind + "}\\tight\n")
	for i := range n {
		b.WriteString("\\item" + item(i) + "\n")
	}
	b.WriteString("\\end{" + kind + "}\n")
}

// latexLetters are the characters that mean something to LaTeX, and those of
// the trade that the fonts of plain LaTeX keep in mathematics. No entry is the
// beginning of another.
var latexLetters = map[rune]string{
	'\\': `\textbackslash{}`, '{': `\{`, '}': `\}`, '$': `\$`, '&': `\&`, '#': `\#`, '_': `\_`, '%': `\%`,
	'~': `\textasciitilde{}`, '^': `\textasciicircum{}`, '`': `\textasciigrave{}`, '\'': `\textquotesingle{}`, '"': `\textquotedbl{}`,
	'<': `\textless{}`, '>': `\textgreater{}`, '|': `\textbar{}`,
	'\u00a0': `~`, '\u2009': `\,`, '\u202f': `\,{}`,
	'°': `\ensuremath{^{\circ}}`, 'µ': `\textmu{}`, 'μ': `\ensuremath{\mu}`, 'Ω': `\ensuremath{\Omega}`, '\u2126': `\textohm{}`, 'Δ': `\ensuremath{\Delta}`, 'Σ': `\ensuremath{\Sigma}`, 'Φ': `\ensuremath{\Phi}`,
	'α': `\ensuremath{\alpha}`, 'β': `\ensuremath{\beta}`, 'γ': `\ensuremath{\gamma}`, 'δ': `\ensuremath{\delta}`, 'ε': `\ensuremath{\varepsilon}`, 'ζ': `\ensuremath{\zeta}`, 'η': `\ensuremath{\eta}`, 'θ': `\ensuremath{\theta}`, 'λ': `\ensuremath{\lambda}`,
	'ν': `\ensuremath{\nu}`, 'π': `\ensuremath{\pi}`, 'ρ': `\ensuremath{\rho}`, 'σ': `\ensuremath{\sigma}`, 'τ': `\ensuremath{\tau}`, 'φ': `\ensuremath{\varphi}`, 'ω': `\ensuremath{\omega}`,
	'·': `\ensuremath{\cdot}`, '⋅': `\ensuremath{\cdot{}}`, '×': `\ensuremath{\times}`, '÷': `\ensuremath{\div}`, '−': `\ensuremath{-}`, '±': `\ensuremath{\pm}`, '√': `\ensuremath{\surd}`, '∞': `\ensuremath{\infty}`,
	'≤': `\ensuremath{\leq}`, '≥': `\ensuremath{\geq}`, '≈': `\ensuremath{\approx}`, '≠': `\ensuremath{\neq}`, '→': `\ensuremath{\rightarrow}`, '←': `\ensuremath{\leftarrow}`, '◂': `\ensuremath{\triangleleft}`, '∑': `\ensuremath{\sum}`,
	'⁰': `\ensuremath{^{0}}`, '¹': `\ensuremath{^{1}}`, '²': `\ensuremath{^{2}}`, '³': `\ensuremath{^{3}}`, '⁴': `\ensuremath{^{4}}`, '⁵': `\ensuremath{^{5}}`, '⁶': `\ensuremath{^{6}}`, '⁷': `\ensuremath{^{7}}`, '⁸': `\ensuremath{^{8}}`, '⁹': `\ensuremath{^{9}}`, '⁻': `\ensuremath{^{-}}`, '⁺': `\ensuremath{^{+}}`,
	'–': `\textendash{}`, '—': `\textemdash{}`, '…': `\dots{}`, '‰': `\textperthousand{}`, '“': `\textquotedblleft{}`, '”': `\textquotedblright{}`, '‘': `\textquoteleft{}`, '’': `\textquoteright{}`,
}

// escapeLaTeX makes s stand for itself in text. Letters of European languages
// stay; what neither they nor latexLetters have is shown by its number. An
// empty group keeps -- and ,, from becoming one sign.
func escapeLaTeX(s string) string {
	var b strings.Builder
	last := rune(0)
	for _, r := range clean(s) {
		switch m, ok := latexLetters[r]; {
		case ok:
			b.WriteString(m)
		case r == last && (r == '-' || r == ','):
			b.WriteString("{}" + string(r))
		case r < 0x80, europeanLetter(r):
			b.WriteRune(r)
		default:
			b.WriteString(`\letter{` + strings.ToUpper(strconv.FormatInt(int64(r), 16)) + `}`)
		}
		last = r
	}
	return b.String()
}

// inLaTeX makes s stand for itself, its numbers as a page sets them.
func inLaTeX(s string) string { return escapeLaTeX(polish(s)) }

// europeanLetter: the letters T1 has of Latin-1 and Latin Extended-A that the
// inputenc of every distribution knows.
func europeanLetter(r rune) bool {
	return (0xc0 <= r && r <= 0xff && r != '×' && r != '÷') || strings.ContainsRune("ĂăĄąĆćČčĎďĐđĘęĚěĞğİıŁłŃńŇňŐőŒœŔŕŘřŚśŞşŠšŢţŤťŮůŰűŸŹźŻżŽž", r)
}
