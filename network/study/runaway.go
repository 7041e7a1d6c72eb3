package study

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"lagbook/laplace"
	"lagbook/network"
)

const (
	widestShift  = 1000.0 // K by which surroundings are made hotter in search of the end
	fineShift    = 1e-3   // K to which that end is found
	widestFactor = 100.0  // by which losses are multiplied in search of it
	fineFactor   = 1e-5
	nearFold     = 0.1   // share of the slowest pole at which the end counts as a fold
	jumped       = 100.0 // K by which a level may move at once; more is another branch
)

// runaway says, of a case that is not linear and in which losses rise with temperature,
// how much hotter its surroundings may be, and how much larger its losses, before there
// is no steady state left: "" where nothing of the kind is in the case. Every thermal held
// node is shifted alike, or every thermal source multiplied, with the loads as at the
// instant at which they are largest together.
//
// Method: continuation from one steady state to the next, to where none follows; that is
// a fold of the balance where the slowest pole goes to 0 on the way.
func (m *Model) runaway() string {
	if m.findEnd() != nil {
		return ""
	}
	at := m.heaviest()
	loads := "with every load for ever as at " + m.Show.Time(at)
	point, err := m.Net.Operate(m.par, at, m.lastState())
	if err != nil {
		if _, feeds := m.slowestAt(m.par, m.march.begun); feeds && errors.As(err, new(*network.NoSteady)) {
			return "runaway: " + loads + " no steady state is found"
		}
		return ""
	}
	slow, feeds := m.slowestAt(m.par, point)
	if !feeds {
		return ""
	}
	if slow >= 0 {
		return "runaway: " + loads + " the steady state found from the start" + m.standing(" (", m.march.begun, ")") + m.standing(" has ", point, " and") +
			" does not hold itself: the least excess grows; another start may lead to one that does"
	}
	shift, last, ok := m.continued(at, point, 0, 1, fineShift, widestShift, m.shifted)
	switch {
	case !ok:
		return fmt.Sprintf("losses rise with temperature, and still hold themselves in surroundings %s hotter, %s", m.Show.Value(widestShift, "K", kindDifference), loads)
	case math.Abs(last) > nearFold*math.Abs(slow):
		return "" // it ends otherwise than by running away
	}
	losses := ""
	if k, last, ok := m.continued(at, point, 1, 0.25, fineFactor, widestFactor, m.heated); ok && !m.turns() && math.Abs(last) <= nearFold*math.Abs(slow) {
		losses = " and, where they are as stated, all losses less than " + m.known(k, fineFactor, "1", "") + " times those stated"
	}
	return fmt.Sprintf("runaway: %s a steady state exists only while the surroundings are less than %s hotter (%s)%s; beyond, the losses outrun what is carried off",
		loads, m.known(shift, fineShift, "K", kindDifference), join(firstNames(m.surroundings(at, shift))), losses)
}

// heaviest is the instant in the run at which the sources of the thermal domain give most
// together.
func (m *Model) heaviest() float64 {
	times := []float64{0}
	for _, w := range m.par.Wave {
		for _, s := range w.Segments {
			if s.At <= m.until {
				times = append(times, s.At)
			}
		}
	}
	best, most := 0.0, math.Inf(-1)
	for _, t := range times {
		sum := 0.0
		for _, in := range m.Net.Inputs() {
			if !in.Held && m.thermal(in.Node) {
				sum += in.Sign * m.par.Wave[in.ID].At(t)
			}
		}
		if sum > most {
			best, most = t, sum
		}
	}
	return best
}

// thermal reports whether the levels of a node are temperatures.
func (m *Model) thermal(id network.NodeID) bool { return m.at(id).level == "K" }

// slowestAt is the largest real part of the poles about a state, and whether a source
// there gives more as its node gets hotter.
func (m *Model) slowestAt(p *network.Params, s *network.State) (re float64, feeds bool) {
	lin, err := m.Net.Linearise(p, s)
	if err != nil {
		return 0, false
	}
	if len(m.feeding(lin)) == 0 {
		return 0, false
	}
	red, err := lin.Net.Reduce(lin.Params, nil)
	if err != nil {
		return 0, false
	}
	re = math.Inf(-1)
	for _, p := range red.System.Poles() {
		if p.P != 0 { // a sum that counts without an end
			re = math.Max(re, real(p.P))
		}
	}
	return re, !math.IsInf(re, -1)
}

// feeding are the nodes at which a source gives more as they get hotter.
func (m *Model) feeding(lin *network.Linear) (list []network.NodeID) {
	for _, b := range lin.Net.Branches() {
		if e := m.parts[b.Ref]; b.Kind == network.FeedbackBranch && e != nil && e.Table.Name == "source" && b.From == b.To && lin.Params.K[b.Index] > 0 {
			list = append(list, b.To)
		}
	}
	return list
}

// standing says between two pieces of text at what the nodes that losses heat stand in a
// state: "j at 61.7 °C".
func (m *Model) standing(before string, s *network.State, behind string) string {
	lin, err := m.Net.Linearise(m.par, s)
	if err != nil {
		return ""
	}
	var words []string
	for _, id := range m.feeding(lin) {
		if w := m.Net.Name(id) + " at " + m.levelAt(id, s.Levels[id]); !slices.Contains(words, w) {
			words = append(words, w)
		}
	}
	if words == nil {
		return ""
	}
	return before + join(firstNames(words)) + behind
}

// known prints v, which is found to within fine, with no digit that is not known.
func (m *Model) known(v, fine float64, unit, kind string) string {
	p := m.Show
	size, least := v, fine
	if unit != "1" {
		size, least = p.In(v, unit, kind), p.In(fine, unit, kindDifference)
	}
	if size != 0 {
		p.digits = max(1, min(p.digits, int(math.Floor(math.Log10(math.Abs(size)/least)))))
	}
	return p.Value(v, unit, kind)
}

// continued follows the steady state from the one at v as v grows, in steps, and finds
// within fine where the last stable one is, and the slowest pole there; false where there
// is one up to most.
func (m *Model) continued(at float64, from *network.State, v, step, fine, most float64, with func(float64) *network.Params) (last, slow float64, ok bool) {
	for unit := step; step > fine/2; {
		p := with(v + step)
		next, err := m.Net.Operate(p, at, from)
		stable := err == nil && !m.leaps(from, next, step/unit)
		if stable {
			re, _ := m.slowestAt(p, next)
			stable = re < 0
		}
		if !stable {
			step /= 4
			ok = true
			continue
		}
		if v += step; v > most {
			return v, 0, false
		}
		if from = next; !ok {
			step *= 2
		}
	}
	slow, _ = m.slowestAt(with(v), from)
	return v, slow, ok
}

// leaps reports whether a level moved farther than it does along one branch in a step of
// so many of the first.
func (m *Model) leaps(a, b *network.State, step float64) bool {
	for i := range a.Levels {
		if m.thermal(network.NodeID(i)) && math.Abs(b.Levels[i]-a.Levels[i]) > jumped+10*step {
			return true
		}
	}
	return false
}

// shifted returns the parameters with every thermal held node so much hotter.
func (m *Model) shifted(by float64) *network.Params {
	p := *m.par
	p.Wave = append([]laplace.Waveform(nil), m.par.Wave...)
	for _, in := range m.Net.Inputs() {
		if in.Held && m.thermal(in.Node) {
			p.Wave[in.ID] = p.Wave[in.ID].Plus(by)
		}
	}
	return &p
}

// heated returns the parameters with every thermal source multiplied, what it adds with
// its temperature included.
func (m *Model) heated(by float64) *network.Params {
	p := *m.par
	p.Wave, p.K = append([]laplace.Waveform(nil), m.par.Wave...), append([]float64(nil), m.par.K...)
	p.Drive = append([][]laplace.Waveform(nil), m.par.Drive...)
	for _, in := range m.Net.Inputs() {
		if !in.Held && m.thermal(in.Node) {
			p.Wave[in.ID] = p.Wave[in.ID].Scaled(by)
		}
	}
	for _, b := range m.Net.Branches() {
		if e := m.parts[b.Ref]; b.Kind == network.FeedbackBranch && e != nil && e.Table.Name == "source" {
			p.K[b.Index] *= by
		}
	}
	for _, e := range m.elements() {
		part := m.parts[e.Ref]
		if part == nil || part.Table.Name != "source" {
			continue
		}
		p.Drive[e.ID] = nil
		for _, w := range m.par.Drive[e.ID] {
			p.Drive[e.ID] = append(p.Drive[e.ID], w.Scaled(by))
		}
	}
	return &p
}

// surroundings says at what the held nodes then stand: "air at 41.7 °C".
func (m *Model) surroundings(at, shift float64) []string {
	var words []string
	for _, in := range m.Net.Inputs() {
		if in.Held && m.thermal(in.Node) {
			words = append(words, in.Name+" at "+m.known(m.par.Wave[in.ID].At(at)+shift-m.par.Datum[in.Node], fineShift, "K", kindLevel))
		}
	}
	return words
}
