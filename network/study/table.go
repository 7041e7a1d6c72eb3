package study

import (
	"fmt"
	"math"
	"slices"
	"sort"
	"strconv"
	"strings"

	"lagbook/laplace"
	"lagbook/network/casefile"
)

const (
	defaultRows = 13        // of a table nobody asked for: thirteen instants
	mostRows    = 1_000_000 // of one table
	samePeak    = 1e-6      // peaks of a march closer than this share of the run share a row
	sameTime    = 1e-9      // instants closer than this share of the run are one row
	mostChanges = 3         // changes of a load that one mark spells out
	mostJumps   = 10_000    // rows added for jumps
)

// Tables answers for each [[table]] or, without any, shows every named node at
// thirteen instants.
func (m *Model) Tables() (*Tables, error) {
	asks := m.tables()
	cols := make([][]shown, len(asks))
	for i, t := range asks {
		for _, s := range t.Show {
			w, err := m.want(s, t.Above)
			if err != nil {
				return nil, err
			}
			cols[i] = append(cols[i], w)
		}
	}
	if err := m.wantMeasured(); err != nil {
		return nil, err
	}
	if err := m.wantNamed(); err != nil {
		return nil, err
	}
	resp, err := m.response()
	if err != nil {
		return nil, err
	}
	a := &Tables{Title: m.Case.Title, Tables: []Table{}}
	var warn []Warning
	for i, t := range asks {
		if t.Title == "" && len(asks) > 1 {
			t.Title = fmt.Sprintf("Table %d", i+1)
		}
		tab, w, err := m.table(resp, t, cols[i])
		if err != nil {
			return nil, err
		}
		a.Tables = append(a.Tables, tab)
		warn = append(warn, w...)
	}
	logged, more, err := m.measured(resp)
	if err != nil {
		return nil, err
	}
	a.Measured = logged
	said, err := m.named(&a.Results, &a.Finds)
	if err != nil {
		return nil, err
	}
	warn = append(slices.Concat(warn, more, said), m.grows()...)
	a.Evidence = m.evidence(warn)
	return a, nil
}

// tables are the tables asked for, or the one shown without asking.
func (m *Model) tables() []casefile.AskTable {
	if len(m.Case.Questions.Tables) > 0 {
		return m.tableAsks()
	}
	t := casefile.AskTable{Title: m.levelsTitle(), Peaks: true}
	for _, n := range m.freeNames() {
		t.Show = append(t.Show, casefile.Shown{Text: n, Node: n})
	}
	return []casefile.AskTable{t}
}

// levelsTitle is the title of a table of all levels.
func (m *Model) levelsTitle() string {
	if d := m.Case.Domains(); len(d) == 1 {
		w := m.physicsOf(d[0]).LevelWord
		return strings.ToUpper(w[:1]) + w[1:] + "s"
	}
	return "Levels"
}

// table fills one table.
func (m *Model) table(resp answers, ask casefile.AskTable, cols []shown) (Table, []Warning, error) {
	t := Table{Title: ask.Title, Columns: []Column{{Name: "t", Unit: "s"}}, Rows: [][]float64{}, Marks: []Mark{}}
	for _, c := range cols {
		t.Columns = append(t.Columns, Column{c.name, c.unit, c.kind})
	}
	times, err := m.times(ask)
	if err != nil {
		return t, nil, err
	}
	var warn []Warning
	if end := m.reach(); m.cut() && times[len(times)-1] > end {
		times, t.ValidUntil = endingAt(times, end), &end
	}
	marks := map[float64][]string{}
	kinds := map[float64]string{} // of the last mark at an instant
	lo, hi := times[0], times[len(times)-1]
	for _, c := range cols {
		warn = append(warn, m.impulseWarning(c, impulsesIn(resp, c.out, lo, hi))...)
	}
	if ask.Jumps {
		more, cut := m.jumps(lo, hi)
		times = merge(times, more, m.until)
		if cut {
			warn = append(warn, Warning{"jumps-left-out", fmt.Sprintf("table %q: rows for jumps stop at %d", ask.Title, mostJumps)})
		}
	}
	if ask.Peaks {
		for _, c := range cols {
			if len(impulsesIn(resp, c.out, lo, hi)) > 0 {
				continue // no row is its peak
			}
			e := m.extreme(resp, c.out, lo, hi)
			if e.Capped {
				warn = append(warn, Warning{"search-stopped", "the search for the extreme of " + c.name + " was given up: the loads change too often"})
			}
			at := nearest(times, e.T)
			if m.marches() && math.Abs(at-e.T) <= samePeak*m.until && len(marks[at]) > 0 {
				e.AtLeft = false // the peak of another column, as far as a march tells
			} else {
				times = merge(times, []float64{e.T}, m.until)
				at = nearest(times, e.T)
			}
			if n := len(marks[at]); n > 0 && kinds[at] == e.word && !e.AtLeft {
				marks[at][n-1] += ", " + c.name // "peak of case, plate"
				continue
			}
			marks[at], kinds[at] = append(marks[at], m.peakWords(e, c)), e.word
			if e.AtLeft {
				kinds[at] = ""
			}
		}
	}
	t.Rows = rows(resp, times, cols)
	t.Marks = m.marks(times, marks)
	return t, append(warn, still(ask.Title, t)...), nil
}

// times are the instants of a table, ascending and each once.
func (m *Model) times(ask casefile.AskTable) ([]float64, error) {
	num := m.val.Num
	if len(ask.Times) > 0 {
		var list []float64
		for _, s := range ask.Times {
			list = append(list, num[s])
		}
		sort.Float64s(list)
		return unique(list), nil
	}
	from, to := 0.0, m.until
	if ask.HasFrom {
		from = num[ask.From]
	}
	if ask.HasTo {
		to = num[ask.To]
	}
	every := (to - from) / (defaultRows - 1)
	if ask.HasEvery {
		every = num[ask.Every]
	}
	return spaced(ask.Title, from, to, every)
}

// spaced returns from, from + every, … and to; each is reckoned from the first,
// so that no rounding adds up.
func spaced(title string, from, to, every float64) ([]float64, error) {
	switch {
	case to < from:
		return nil, fmt.Errorf("table %q ends before it begins", title)
	case to == from:
		return []float64{from}, nil
	case !(every > 0):
		return nil, fmt.Errorf("table %q: the step between rows must be positive", title)
	case (to-from)/every > mostRows:
		return nil, fmt.Errorf("table %q has more than %d rows", title, mostRows)
	}
	n := int(math.Floor((to-from)/every*(1+1e-12) + 1e-9))
	list := make([]float64, 0, n+2)
	for i := 0; i <= n; i++ {
		list = append(list, from+float64(i)*every)
	}
	if last := list[n]; to-last <= 1e-9*every {
		list[n] = to
	} else {
		list = append(list, to)
	}
	return list, nil
}

// decimal returns the number of few digits that a sum or a product misses by rounding,
// 0.3 for 3·0.1; any other as it is.
func decimal(x float64) float64 {
	short, err := strconv.ParseFloat(strconv.FormatFloat(x, 'e', fewDigits-1, 64), 64)
	if err == nil && math.Abs(short-x) <= 4*0x1p-52*math.Abs(x) {
		return short
	}
	return x
}

// fewDigits are those of a number that somebody typed, or a whole multiple of one.
const fewDigits = 12

func unique(sorted []float64) []float64 {
	list := sorted[:0:0]
	for i, t := range sorted {
		if i == 0 || t != sorted[i-1] {
			list = append(list, t)
		}
	}
	return list
}

// merge adds instants to a sorted list unless one within rounding is there.
func merge(times, more []float64, span float64) []float64 {
	list := append([]float64(nil), times...)
	for _, t := range more {
		if math.Abs(nearest(list, t)-t) > sameTime*math.Max(math.Abs(t), 1e-6*span) {
			list = append(list, t)
			sort.Float64s(list)
		}
	}
	return list
}

// nearest returns the member of a sorted list that lies closest to t.
func nearest(sorted []float64, t float64) float64 {
	i := sort.SearchFloat64s(sorted, t)
	switch {
	case i == len(sorted):
		return sorted[i-1]
	case i > 0 && t-sorted[i-1] <= sorted[i]-t:
		return sorted[i-1]
	}
	return sorted[i]
}

// rows evaluates the columns at the instants.
func rows(resp answers, times []float64, cols []shown) [][]float64 {
	outs := 0
	for _, c := range cols {
		outs = max(outs, c.out+1)
	}
	y := make([][]float64, outs) // a nil row is not wanted
	for _, c := range cols {
		if y[c.out] == nil {
			y[c.out] = make([]float64, len(times))
		}
	}
	resp.Table(times, y)
	for out := range y {
		still := resp.Rounding(out)
		for i, v := range y[out] {
			if math.Abs(v) <= still {
				y[out][i] = 0 // what it is, as far as its parts are known
			}
		}
	}
	cells := make([]float64, len(times)*(len(cols)+1))
	table := make([][]float64, len(times))
	for i, t := range times {
		row := cells[i*(len(cols)+1) : (i+1)*(len(cols)+1)]
		row[0] = decimal(t) // the others are read at t itself: a rounding off a jump may be its other side
		for k, c := range cols {
			row[k+1] = y[c.out][i]
		}
		table[i] = row
	}
	return table
}

// A peak is the extreme of a column in the direction in which it goes furthest
// from where it begins.
type peak struct {
	laplace.Extreme
	word string
}

func (m *Model) extreme(resp answers, out int, t0, t1 float64) peak {
	hi, lo := resp.Max(out, t0, t1), resp.Min(out, t0, t1)
	begin := resp.At(out, t0)
	if begin-lo.Y > hi.Y-begin {
		return peak{lo, "lowest"}
	}
	return peak{hi, "peak"}
}

// peakWords marks the row of an extreme. The row holds the value after a jump,
// so an extreme just before one is put in words.
func (m *Model) peakWords(e peak, c shown) string {
	if e.AtLeft {
		return fmt.Sprintf("%s of %s %s, just before", e.word, c.name, m.Show.Value(e.Y, c.unit, c.kind))
	}
	return e.word + " of " + c.name
}

// still warns of a table in which nothing changes.
func still(title string, t Table) []Warning {
	if len(t.Rows) < 2 {
		return nil
	}
	for _, row := range t.Rows[1:] {
		for k := 1; k < len(row); k++ {
			if a := t.Rows[0][k]; math.Abs(row[k]-a) > math.Max(1e-9*math.Abs(a), 1e-6*speck(t.Columns[k].Unit)) {
				return nil
			}
		}
	}
	name := "the table"
	if title != "" {
		name = fmt.Sprintf("table %q", title)
	}
	return []Warning{{nothingChanges, name + ": nothing changes in it; does every load reach its value before the run begins?"}}
}
