package present

import (
	"bytes"
	"fmt"
	"strings"
	"unicode"
)

// linesOnAPage is how many lines of a table fit a page with its heads and a
// caption.
const linesOnAPage = 40

// em is the unit of the metric of LaTeX: thousandths of the size of the type.
const em = 1000

// latexSizes are the sizes of type a table may be set in, largest first, with
// the room of a line and of the gap between columns at that size: 170 mm are
// 483.7 pt, the gap is two times 6 pt.
var latexSizes = []struct {
	command   string
	room, gap int
}{
	{"", 44 * em, 11 * em / 10},
	{"\\small", 48 * em, 12 * em / 10},
	{"\\footnotesize", 53 * em, 134 * em / 100},
}

// latexTable sets a table: as it is where it fits, else smaller, else with its
// words broken, else in pieces below one another.
func latexTable(b *bytes.Buffer, t Table) {
	if t.Caption != "" {
		b.WriteString("\\medskip\n\\textbf{" + inLaTeX(t.Caption) + "}\n\n\\nopagebreak\n")
	}
	if len(t.Columns) == 0 {
		return
	}
	g := newGrid(t, remark)
	g.pointColumns(func(cell, lacks string) string { return cell + lackMark + lacks })
	command, pieces := g.latexFit()
	b.WriteString("{" + command)
	for i, p := range pieces {
		if i > 0 {
			b.WriteString("\n\\medskip\n")
		}
		latexColumns(b, p)
	}
	b.WriteString("}\n")
}

// latexFit returns a size of type and what of the table stands side by side in it.
func (g *grid) latexFit() (command string, pieces []grid) {
	for _, size := range latexSizes[:2] {
		if pieces = g.fit(ems, size.gap, size.room); pieces[0].broken() == 0 && len(pieces) == 1 {
			return size.command, pieces
		}
	}
	if len(pieces) == 1 && pieces[0].broken() < 2*em {
		return latexSizes[1].command, pieces
	}
	last := latexSizes[2]
	return last.command, g.fit(ems, last.gap, last.room)
}

// broken is how many times wider than its room the most broken column of words
// is, in thousandths; 0 where nothing is broken.
func (g *grid) broken() int {
	most := 0
	for k, m := range g.measures(ems, 0) {
		if g.widths[k] >= m.most {
			continue
		}
		most = max(most, 1)
		if g.aligns[k] == Left {
			most = max(most, em*m.most/max(1, g.widths[k]))
		}
	}
	return most
}

// lackMark stands, until the cell is set, between a number and what it lacks
// behind its point; no cleaned string holds it.
const lackMark = "\x00"

// latexColumns sets the columns of a piece, a page's worth of lines at a time.
func latexColumns(b *bytes.Buffer, g grid) {
	wanted := g.measures(ems, 0)
	var columns strings.Builder
	heads := make([]string, len(g.heads))
	for k, lines := range g.foldHeads(ems) {
		heads[k] = latexHead(lines, g.aligns[k])
		switch {
		case g.aligns[k] != Left:
			columns.WriteByte('r')
		case g.widths[k] < wanted[k].most:
			fmt.Fprintf(&columns, "p{%d.%02dem}", g.widths[k]/em, g.widths[k]%em/10)
		default:
			columns.WriteByte('l')
		}
	}
	for first := 0; first == 0 || first < len(g.rows); {
		lines, end := 0, first
		for end < len(g.rows) && (end == first || lines+g.lines(end) <= linesOnAPage) {
			lines += g.lines(end)
			end++
		}
		b.WriteString("\n\\begin{tabular}{@{}" + columns.String() + "@{}}\n\\hline\n" + latexRow(heads) + "\\hline\n")
		for _, r := range g.rows[first:end] {
			b.WriteString(latexRow(g.latexCells(r, wanted)))
		}
		b.WriteString("\\hline\n\\end{tabular}\n")
		first = max(end, 1)
	}
}

// lines is the number of lines a row takes.
func (g *grid) lines(row int) int {
	most := 1
	for k, s := range g.rows[row] {
		if ems(s) > g.widths[k] {
			most = max(most, len(fold(s, g.widths[k], ems)))
		}
	}
	return most
}

// latexHead sets the lines of a head above one another, the last on the line of
// the other heads.
func latexHead(lines []string, a Align) string {
	for len(lines) > 1 && lines[0] == "" {
		lines = lines[1:]
	}
	for i, s := range lines {
		lines[i] = escapeLaTeX(s)
	}
	if len(lines) == 1 {
		return lines[0]
	}
	return "\\begin{tabular}[b]{@{}" + string("lrr"[a]) + "@{}}{}" + strings.Join(lines, "\\\\{}") + "\\end{tabular}"
}

// latexCells sets the cells of a row. A number that lacks digits behind its
// point is given their room.
func (g *grid) latexCells(row []string, wanted []measure) []string {
	cells := make([]string, len(row))
	for k, s := range row {
		number, lacks, _ := strings.Cut(s, lackMark)
		cells[k] = escapeLaTeX(number)
		if lacks != "" {
			cells[k] += "\\phantom{" + escapeLaTeX(lacks) + "}"
		}
		if g.aligns[k] == Left && g.widths[k] < wanted[k].most {
			cells[k] = "\\raggedright " + cells[k]
		}
	}
	return cells
}

// latexRow protects a leading bracket, which would be read as an argument of
// the end of the row before it.
func latexRow(cells []string) string {
	return "{}" + strings.Join(cells, " & ") + " \\tabularnewline\n"
}

// ems estimates, rather too large, how wide LaTeX's own type sets a string, in
// thousandths of the size of the type.
func ems(s string) int {
	sum := 0
	for _, r := range s {
		sum += emsOf(r)
	}
	return sum
}

// emsOf goes by the widths of the usual letters of the type, of which that of 9
// points is a thirtieth wider than the others.
func emsOf(r rune) int {
	w := 5000 // by its number: [U+65E5]
	switch {
	case 'a' <= r && r <= 'z':
		w = lowerEms[r-'a']
	case 'A' <= r && r <= 'Z':
		w = upperEms[r-'A']
	case '0' <= r && r <= '9':
		w = 500
	case strings.ContainsRune(".,:;!|'()[]·- \u00a0", r):
		w = 390
	case strings.ContainsRune("⁰¹²³⁴⁵⁶⁷⁸⁹°", r):
		w = 450
	case strings.ContainsRune("/–*", r):
		w = 510
	case strings.ContainsRune("→←%—", r):
		w = 1000
	case r < 0x80, europeanLetter(r), unicode.Is(unicode.Greek, r), strings.ContainsRune("µ±×÷−≤≥≈≠⁻", r):
		w = 800
	case latexLetters[r] != "":
		w = 1000
	}
	return w * 31 / 30
}

var (
	lowerEms = [26]int{500, 560, 450, 560, 450, 310, 500, 560, 280, 310, 530, 280, 840, 560, 500, 560, 530, 400, 400, 390, 560, 530, 730, 530, 530, 450}
	upperEms = [26]int{750, 710, 730, 770, 690, 660, 790, 750, 370, 520, 780, 630, 920, 750, 780, 690, 780, 740, 560, 730, 750, 750, 1030, 750, 750, 620}
)
