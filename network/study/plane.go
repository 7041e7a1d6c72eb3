package study

import (
	"fmt"
	"math"
	"math/cmplx"
	"slices"

	"lagbook/laplace"
)

// FrequencyCurves are gain and phase of transfer functions of one unit, to be drawn.
type FrequencyCurves struct {
	Title string          `json:"title"`
	Lines []FrequencyLine `json:"lines"`
	Evidence
}

// A FrequencyLine is one transfer function along the imaginary axis; Phase is
// followed from ω = 0 without a jump, in degrees.
type FrequencyLine struct {
	Input  string    `json:"input"`
	Output string    `json:"output"`
	Unit   string    `json:"unit"`
	Omega  []float64 `json:"omega"`
	Gain   []float64 `json:"gain"`
	Phase  []float64 `json:"phase_deg"`
}

// A Plane is one transfer function with its poles and zeros.
type Plane struct {
	Title    string   `json:"title"`
	Transfer Transfer `json:"transfer"`
	Evidence

	h *laplace.Transfer
}

// pick returns the transfer functions and checks the number of the one asked for,
// counted from 1.
func (m *Model) pick(number int) ([]pair, []*laplace.Transfer, []Warning, error) {
	pairs, list, warn, err := m.transfers()
	if err != nil {
		return nil, nil, nil, err
	}
	if number < 1 || number > len(pairs) {
		return nil, nil, nil, fmt.Errorf("there is no transfer function %d: the case has %d", number, len(pairs))
	}
	_, sys, _, err := m.modal(pairs)
	if err != nil {
		return nil, nil, nil, err
	}
	return pairs, list, append(append(warn, m.aboutWarnings(pairs)...), m.growing(sys)...), nil
}

// mostBode is how many transfer functions share a picture.
const mostBode = 5

// FrequencyCurves samples transfer function number pick and the next ones of the same
// unit.
func (m *Model) FrequencyCurves(number int) (*FrequencyCurves, error) {
	pairs, list, warn, err := m.pick(number)
	if err != nil {
		return nil, err
	}
	a := &FrequencyCurves{Title: m.Case.Title, Lines: []FrequencyLine{}}
	unit := gainUnit(pairs[number-1])
	lo, hi := math.Inf(1), 0.0
	var chosen []int
	var each []*laplace.FrequencyResponse
	for i := number - 1; i < len(pairs) && len(chosen) < mostBode; i++ {
		if gainUnit(pairs[i]) != unit || list[i].Zero {
			continue
		}
		r, err := list[i].Frequency()
		if err != nil {
			return nil, err
		}
		l, h := span(list[i], r)
		lo, hi = min(lo, l), max(hi, h)
		chosen, each = append(chosen, i), append(each, r)
	}
	for k, i := range chosen {
		line := FrequencyLine{Input: pairs[i].in.Name, Output: pairs[i].show.name, Unit: unit}
		for _, omega := range fine(list[i], lo, hi) {
			w := each[k].At(omega)
			if w.Gain > 0 && !math.IsInf(w.Gain, 0) {
				line.Omega, line.Gain, line.Phase = append(line.Omega, omega), append(line.Gain, w.Gain), append(line.Phase, w.Unwound)
			}
		}
		a.Lines = append(a.Lines, line)
	}
	if len(a.Lines) == 0 {
		return nil, fmt.Errorf("transfer function %d is zero at every frequency", number)
	}
	a.Evidence = m.evidence(warn)
	return a, nil
}

// fine is a grid that is closer about lightly damped poles and zeros.
func fine(h *laplace.Transfer, lo, hi float64) []float64 {
	grid := laplace.FrequencyGrid(lo, hi, 60)
	for _, p := range append(slices.Clone(h.Poles), h.Zeros...) {
		w, width := imag(p.P), math.Abs(real(p.P))
		if w <= 0 || width > w/10 {
			continue
		}
		for d := max(width/8, 1e-6*w); d < w/4; d *= 1.3 {
			grid = append(grid, w-d, w+d)
		}
		grid = append(grid, cmplx.Abs(p.P))
	}
	slices.Sort(grid)
	return slices.DeleteFunc(slices.Compact(grid), func(w float64) bool { return w < lo || w > hi })
}

// Plane returns transfer function number pick with its poles and zeros; 0 is the first
// that has a pole.
func (m *Model) Plane(number int) (*Plane, error) {
	pairs, list, warn, err := m.pick(max(number, 1))
	if err != nil {
		return nil, err
	}
	if number == 0 {
		number = 1 + max(0, slices.IndexFunc(list, func(h *laplace.Transfer) bool { return len(h.Poles) > 0 }))
	}
	p, h := pairs[number-1], list[number-1]
	if len(h.Poles) == 0 {
		return nil, fmt.Errorf("%s to %s has no pole: the output follows at once", p.in.Name, p.show.name)
	}
	a := &Plane{Title: m.Case.Title, Transfer: m.transfer(p, h), h: h}
	a.Evidence = m.evidence(warn)
	return a, nil
}

// Magnitude returns |H(s)| at re + i·im: a row for each im.
func (p *Plane) Magnitude(re, im []float64) [][]float64 {
	rows := make([][]float64, len(im))
	for j, y := range im {
		rows[j] = make([]float64, len(re))
		for i, x := range re {
			rows[j][i] = cmplx.Abs(p.h.Eval(complex(x, y)))
		}
	}
	return rows
}
