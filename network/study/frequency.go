package study

import (
	"fmt"
	"math"

	"lagbook/laplace"
)

// FrequencyQuestion says what of a frequency response is wanted.
type FrequencyQuestion struct {
	At        []Band // empty: round periods about the corners
	PerDecade int    // points in each factor of ten of a range; 0: 10

	// Ripple is the amplitude of a swing at the input and Below what it may come to at
	// the output, both in SI; 0: not asked. The units tell which transfers are meant.
	Ripple, Below         float64
	RippleUnit, BelowUnit string
}

// perDecade is how many points a factor of ten has where nothing is said.
const perDecade = 10

// Frequency answers the verb frequency.
type Frequency struct {
	Title     string              `json:"title"`
	Transfers []FrequencyTransfer `json:"transfers"`
	Evidence
}

// A FrequencyTransfer is one transfer function along the imaginary axis. Frequencies
// are in rad/s, times in s.
type FrequencyTransfer struct {
	Input    string           `json:"input"`
	Output   string           `json:"output"`
	Scenario string           `json:"scenario,omitempty"` // where scenarios change the network
	About    string           `json:"about,omitempty"`    // of a network that switches or is not linear: start, or a time
	Unit     string           `json:"unit"`
	AtRest   *float64         `json:"gain_at_rest,omitempty"` // H(0), signed
	Points   []FrequencyPoint `json:"points"`
	Corners  []Corner         `json:"corners"`
	Cutoff   *FrequencyMark   `json:"cutoff,omitempty"`    // above it the gain is less than 1/√2 of that at rest, for good
	Peak     *FrequencyMark   `json:"peak,omitempty"`      // a resonance: the largest gain, above that at rest
	Below    *RippleMark      `json:"below,omitempty"`     // the answer to a ripple
	Undamped *FrequencyMark   `json:"resonance,omitempty"` // a pole on the imaginary axis: the gain has no bound there
}

// A FrequencyPoint is the answer at one frequency. Phase is in (−180, 180], lag
// negative; Lag is the phase as a time, followed from ω = 0, so that it may be longer
// than a period; Decrement is the gain as a share of that at rest.
type FrequencyPoint struct {
	Omega     float64  `json:"omega"`
	Period    float64  `json:"period"`
	Gain      *float64 `json:"gain,omitempty"`
	Phase     *float64 `json:"phase_deg,omitempty"`
	Lag       *float64 `json:"lag,omitempty"`
	Decrement *float64 `json:"decrement,omitempty"`
	Slack     *float64 `json:"error_bound,omitempty"` // of the gain
}

// A Corner is a frequency at which the gain, drawn in logarithms, bends.
type Corner struct {
	Omega  float64 `json:"omega"`
	Period float64 `json:"period"`
	Of     string  `json:"of"` // pole or zero
	Count  int     `json:"count"`
}

// A FrequencyMark is a frequency and the gain there.
type FrequencyMark struct {
	Omega  float64  `json:"omega"`
	Period float64  `json:"period"`
	Gain   *float64 `json:"gain,omitempty"`
}

// A RippleMark says for which swings at the input the output stays below a level:
// for every period shorter than Period; for all of them where Always, for none
// where Never.
type RippleMark struct {
	Ripple     float64  `json:"ripple"`
	RippleUnit string   `json:"ripple_unit"`
	Level      float64  `json:"level"`
	LevelUnit  string   `json:"level_unit"`
	Omega      *float64 `json:"omega,omitempty"`
	Period     *float64 `json:"period,omitempty"`
	Always     bool     `json:"always,omitempty"`
	Never      bool     `json:"never,omitempty"`
	Touch      bool     `json:"touch,omitempty"` // a hump of the gain meets the level within rounding
}

// Frequency answers for each transfer function that Poles shows.
func (m *Model) Frequency(q FrequencyQuestion) (*Frequency, error) {
	if q.PerDecade == 0 {
		q.PerDecade = perDecade
	}
	if err := q.check(); err != nil {
		return nil, err
	}
	pairs, found, warn, err := m.transfers()
	if err != nil {
		return nil, err
	}
	_, sys, _, err := m.modal(pairs)
	if err != nil {
		return nil, err
	}
	a := &Frequency{Title: m.Case.Title, Transfers: []FrequencyTransfer{}}
	for i, p := range pairs {
		t, more, err := q.answer(p, found[i])
		if err != nil {
			return nil, fmt.Errorf("transfer from %s to %s: %w", p.in.Name, p.show.name, err)
		}
		t.About = m.aboutWords(p)
		a.Transfers, warn = append(a.Transfers, t), append(warn, more...)
	}
	if q.Ripple > 0 && !a.ripples() {
		return nil, fmt.Errorf("no transfer function leads from something in %s to something in %s: a ripple is an amplitude at a source or held node, the level one at what is shown", q.RippleUnit, q.BelowUnit)
	}
	warn = append(append(warn, m.switching(pairs)...), m.aboutWarnings(pairs)...)
	a.Evidence = m.evidence(append(warn, m.growing(sys)...))
	return a, nil
}

func (q *FrequencyQuestion) check() error {
	total := 0.0
	for _, b := range q.At {
		total += b.points(q.PerDecade)
	}
	switch {
	case q.PerDecade < 1:
		return fmt.Errorf("a range needs at least one point a decade, not %d", q.PerDecade)
	case total > mostPoints:
		return fmt.Errorf("%.0f frequencies are too many: at most %d", total, mostPoints)
	}
	return nil
}

func (a *Frequency) ripples() bool {
	for i := range a.Transfers {
		if a.Transfers[i].Below != nil {
			return true
		}
	}
	return false
}

// answer works out one transfer function.
func (q *FrequencyQuestion) answer(p pair, h *laplace.Transfer) (FrequencyTransfer, []Warning, error) {
	t := FrequencyTransfer{
		Input: p.in.Name, Output: p.show.name, Unit: gainUnit(p),
		Points: []FrequencyPoint{}, Corners: corners(h),
	}
	if h.HasGain {
		t.AtRest = &h.Gain
	}
	r, err := h.Frequency()
	if err != nil {
		return t, nil, err
	}
	name := p.in.Name + " to " + p.show.name
	doubt := 0.0
	for _, omega := range q.omegas(h, r) {
		w := r.At(omega)
		t.Points = append(t.Points, point(w, h))
		if w.Gain > 0 && !math.IsInf(w.Gain, 0) {
			doubt = max(doubt, w.Slack/w.Gain)
		}
	}
	var warn []Warning
	if doubt > doubtShare {
		warn = append(warn, Warning{"rounding", fmt.Sprintf("%s: the gain is a small difference of large parts; the numbers given fix it to %.1g of itself only", name, doubt)})
	}
	warn = append(warn, t.mark(name, h, r)...)
	q.ripple(&t, p, r)
	return t, warn, nil
}

// omegas are the frequencies of one transfer function.
func (q *FrequencyQuestion) omegas(h *laplace.Transfer, r *laplace.FrequencyResponse) []float64 {
	if len(q.At) == 0 {
		return roundPeriods(h, r)
	}
	var list []float64
	for _, b := range q.At {
		list = append(list, b.Omegas(q.PerDecade)...)
	}
	return list
}

// point copies one answer; what does not exist is left out.
func point(w laplace.FrequencyPoint, h *laplace.Transfer) FrequencyPoint {
	p := FrequencyPoint{Omega: w.Omega, Period: w.Period(), Gain: finite(w.Gain)}
	if p.Gain == nil || w.Gain == 0 {
		return p
	}
	phase, lag := w.Phase, w.Lag()
	p.Phase, p.Lag, p.Slack = &phase, &lag, finite(w.Slack)
	if h.HasGain && h.Gain != 0 {
		p.Decrement = finite(w.Gain / math.Abs(h.Gain))
	}
	return p
}

func corners(h *laplace.Transfer) []Corner {
	list := []Corner{}
	for _, c := range h.Corners() {
		of := "pole"
		if c.Zero {
			of = "zero"
		}
		list = append(list, Corner{c.Omega, 2 * math.Pi / c.Omega, of, c.Mult})
	}
	return list
}

func markAt(omega, gain float64) *FrequencyMark {
	return &FrequencyMark{omega, 2 * math.Pi / omega, finite(gain)}
}
