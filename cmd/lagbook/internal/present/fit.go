package present

import (
	"slices"
	"strings"
)

// A metric tells how much room a string takes on a line, in units of its own.
type metric func(string) int

// A grid is a table under way: polished heads and cells, and how the columns
// share the room.
type grid struct {
	heads  []string
	rows   [][]string
	aligns []Align
	widths []int
}

// newGrid returns the cells of t, polished, its marks as a last column.
func newGrid(t Table, markHead string) grid {
	g := grid{}
	g.heads, g.rows = t.cells(markHead, polish)
	for k, h := range g.heads {
		g.heads[k] = polishHead(h)
	}
	for _, c := range t.Columns {
		g.aligns = append(g.aligns, c.Align)
	}
	if t.hasMarks() {
		g.aligns = append(g.aligns, Left)
	}
	return g
}

// A measure is the room a column takes: unbroken, and at the least.
type measure struct{ least, most int }

// narrowWords is the room, in characters, below which words are not broken
// further while there is another way: a column of one word a line is hard to read.
const narrowWords = 14

// measures returns the room of each column. Heads may be broken, and cells of
// words, but to no less than so many characters; numbers may not.
func (g *grid) measures(of metric, least int) []measure {
	list := make([]measure, len(g.heads))
	floor := of(strings.Repeat("n", least))
	for k, h := range g.heads {
		m := measure{longestWord(h, of), of(h)}
		for _, r := range g.rows {
			n := of(r[k])
			m.most = max(m.most, n)
			if g.aligns[k] != Left {
				m.least = max(m.least, n)
			} else if n > m.least {
				m.least = max(m.least, min(n, floor), longestWord(r[k], of))
			}
		}
		list[k] = m
	}
	return list
}

// longestWord is the room of the longest part of s that has no place to break.
func longestWord(s string, of metric) int {
	longest := 0
	for w := range strings.SplitSeq(s, " ") {
		longest = max(longest, of(w))
	}
	return longest
}

// share gives each column its room: all it wants where that fits, else the
// widest are narrowed to one width, down to what each needs at the least. It
// returns nil where even that is too much.
func share(list []measure, gap, room int) []int {
	room -= gap * (len(list) - 1)
	total := func(limit int) int {
		sum := 0
		for _, m := range list {
			sum += min(m.most, max(m.least, limit))
		}
		return sum
	}
	if total(0) > room {
		return nil
	}
	widest := 0
	for _, m := range list {
		widest = max(widest, m.most)
	}
	low, high := 0, widest+1 // total(low) fits; total(high) does not, or need not be asked
	for high-low > 1 {
		if mid := (low + high) / 2; total(mid) <= room {
			low = mid
		} else {
			high = mid
		}
	}
	widths := make([]int, len(list))
	for k, m := range list {
		widths[k] = min(m.most, max(m.least, low))
	}
	return widths
}

// fit gives the columns their widths; where they do not fit side by side, the
// table comes back in pieces, each with the first column again.
func (g grid) fit(of metric, gap, room int) []grid {
	var list []measure
	for _, least := range []int{narrowWords, 0} {
		list = g.measures(of, least)
		if g.widths = share(list, gap, room); g.widths != nil {
			g.settle(list, of, room-gap*(len(list)-1))
			return []grid{g}
		}
	}
	var pieces []grid
	columns := []int{0}
	add := func() {
		p := g.pick(columns)
		list := p.measures(of, 0)
		if p.widths = share(list, gap, room); p.widths == nil { // two columns too wide for any page
			for _, m := range list {
				p.widths = append(p.widths, m.least)
			}
		} else {
			p.settle(list, of, room-gap*(len(list)-1))
		}
		pieces = append(pieces, p)
	}
	used := list[0].least
	for k := 1; k < len(list); k++ {
		if len(columns) > 1 && used+gap+list[k].least > room {
			add()
			columns, used = []int{0}, list[0].least
		}
		columns, used = append(columns, k), used+gap+list[k].least
	}
	add()
	return pieces
}

// settle takes from each column what breaking its words left unused, and gives
// it to the broken columns of words, what lacks least first; then to the broken
// heads of numbers, if it is enough for all: like heads stay alike.
func (g *grid) settle(list []measure, of metric, room int) {
	var words, heads []int
	lack := func(k int) int { return list[k].most - g.widths[k] }
	for k := range g.widths {
		switch {
		case lack(k) <= 0:
		case g.aligns[k] == Left:
			words = append(words, k)
		default:
			heads = append(heads, k)
		}
	}
	slices.SortStableFunc(words, func(i, j int) int { return lack(i) - lack(j) })
	for _, k := range words {
		spare := room - g.tighten(of)
		g.widths[k] += min(lack(k), spare)
	}
	spare := room - g.tighten(of)
	for _, k := range heads {
		spare -= lack(k)
	}
	if spare >= 0 {
		for _, k := range heads {
			g.widths[k] = list[k].most
		}
	}
}

// tighten makes each column as narrow as its longest line and returns the sum.
func (g *grid) tighten(of metric) int {
	sum := 0
	for k := range g.widths {
		g.widths[k] = min(g.widths[k], g.used(k, of))
		sum += g.widths[k]
	}
	return sum
}

// used is the longest line of a column broken to its width.
func (g *grid) used(k int, of metric) int {
	longest := 0
	measure := func(s string) {
		for _, line := range fold(s, g.widths[k], of) {
			longest = max(longest, of(line))
		}
	}
	measure(g.heads[k])
	for _, r := range g.rows {
		measure(r[k])
	}
	return longest
}

// pick returns some columns of a grid.
func (g grid) pick(columns []int) grid {
	p := grid{rows: make([][]string, len(g.rows))}
	for _, k := range columns {
		p.heads, p.aligns = append(p.heads, g.heads[k]), append(p.aligns, g.aligns[k])
		for i, r := range g.rows {
			p.rows[i] = append(p.rows[i], r[k])
		}
	}
	return p
}

// pointColumns calls pad for each cell of a column of numbers, with the part of
// the widest number behind the point that this one lacks: "", or ".00" as it
// would stand there.
func (g *grid) pointColumns(pad func(cell, lacks string) string) {
	for k, a := range g.aligns {
		if a != Point {
			continue
		}
		longest := ""
		for _, r := range g.rows {
			if t := tail(r[k]); width(t) > width(longest) {
				longest = t
			}
		}
		for _, r := range g.rows {
			if r[k] == "" {
				continue
			}
			if own := []rune(tail(r[k])); len(own) < len([]rune(longest)) {
				r[k] = pad(r[k], string([]rune(longest)[len(own):]))
			}
		}
	}
}

// tail is a polished number from its decimal point on, or from its power of
// ten; "" for a cell that holds no number.
func tail(s string) string {
	whole, power, scientific := strings.Cut(s, timesTen)
	digits := strings.TrimPrefix(strings.TrimPrefix(whole, "−"), "+")
	if !isNumber(digits) || scientific && strings.Trim(power, "⁻⁰¹²³⁴⁵⁶⁷⁸⁹") != "" {
		return ""
	}
	if i := strings.IndexByte(s, '.'); i >= 0 {
		return s[i:]
	}
	if scientific {
		return s[len(whole):]
	}
	return ""
}

// fold breaks s into lines of at most room where there is a space; a longer
// word stays whole. There is at least one line.
func fold(s string, room int, of metric) []string {
	if of(s) <= room {
		return []string{s}
	}
	var lines []string
	line, used, blank := "", 0, of(" ")
	for word := range strings.SplitSeq(s, " ") {
		n := of(word)
		if line != "" && used+blank+n > room {
			lines = append(lines, line)
			line, used = word, n
			continue
		}
		if line != "" {
			line, used = line+" ", used+blank
		}
		line, used = line+word, used+n
	}
	return append(lines, line)
}

// foldHeads breaks the heads to the widths of the columns and puts their last
// lines on one line.
func (g *grid) foldHeads(of metric) [][]string {
	list := make([][]string, len(g.heads))
	most := 1
	for k, h := range g.heads {
		list[k] = fold(h, g.widths[k], of)
		most = max(most, len(list[k]))
	}
	for k, lines := range list {
		list[k] = slices.Concat(make([]string, most-len(lines)), lines)
	}
	return list
}
