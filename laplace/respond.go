package laplace

import (
	"fmt"
	"math"
	"slices"
	"sort"
	"sync/atomic"
)

// A Response is the closed-form answer of a system to waveforms from rest at
// t = 0: between two breaks it is a sum of exponentials with known weights, and
// the state at every break is carried over exactly. It is never changed after
// Respond and may be used from several goroutines.
type Response struct {
	s      *System // in force at t = 0
	base   []float64
	phases phases // which system is in force when
	until  float64
	input  []int       // the active ones: not zero for ever
	wave   []*Waveform // of each active input
	times  []float64   // the start of every piece; times[0] = 0
	stride int         // the state is kept for every stride-th piece
	kept   []vector
	first  *vector   // the state at t = 0; nil at rest
	before []float64 // the outputs before t = 0
	peak   []vector  // of each kind of phases: a bound of the modulus of each mode's state
	last   atomic.Pointer[run]
	recent atomic.Pointer[recent] // the piece asked for last

	rates   *System    // where outputs are improper: whose they are
	jumping []Waveform // and the waves it was given
}

type recent struct {
	index int
	piece *piece
}

// A run is the states of one stride of pieces, worked out again when asked for.
type run struct {
	index  int
	states []vector
}

// keptNumbers bounds the memory for states kept: 64 MB.
const keptNumbers = 8 << 20

// An Overflow error says that an unstable response outgrows the numbers.
type Overflow struct {
	At float64 // s; about when
}

func (e *Overflow) Error() string {
	return fmt.Sprintf("the response grows beyond the largest number at about %.3g s", e.At)
}

// Respond returns y(t) = base[m] + the response from rest to the deviations u[i]
// for t in [0, until], until in s and finite. What u held before t = 0 is not felt:
// the deviations begin at 0. A nil base is 0. The error is *TooMany where the
// waves have more than MaxBreaks breaks, *Overflow where a growing mode leaves the
// range of numbers before until.
//
// Method: between breaks the inputs are a + bτ + exponentials and the state follows
// by the φ-functions of each mode or block; the cost is breaks × modes × inputs.
func (s *System) Respond(u []Waveform, base []float64, until float64) (*Response, error) {
	if len(u) == len(s.b) && len(s.improper()) > 0 {
		x, waves := s.withRates(u)
		r, err := x.respondFrom(nil, waves, base, until)
		if err == nil {
			r.rates, r.jumping = s, append([]Waveform(nil), u...)
		}
		return r, err
	}
	return s.respondFrom(nil, u, base, until)
}

// respondFrom is Respond from the state first.
func (s *System) respondFrom(first *vector, u []Waveform, base []float64, until float64) (*Response, error) {
	if len(u) != len(s.b) {
		panic("laplace: a response takes one wave for each input")
	}
	if base == nil {
		base = make([]float64, len(s.c))
	}
	if len(base) != len(s.c) {
		panic("laplace: a response takes one base for each output")
	}
	if !(until >= 0) || math.IsInf(until, 0) {
		panic("laplace: a response ends at a finite time after 0")
	}
	return respondIn(always(Kind{s, append([]float64(nil), base...)}), first, u, until)
}

// respondIn is the response of the systems that are in force one after the other.
func respondIn(p phases, first *vector, u []Waveform, until float64) (*Response, error) {
	s := p.kinds[p.kind[0]].System
	r := &Response{s: s, base: p.kinds[p.kind[0]].Base, phases: p, until: until, first: first}
	r.before = r.base
	for i := range u {
		u[i].check()
		if u[i].Constant() && u[i].Before == 0 {
			continue
		}
		w := u[i]
		r.input, r.wave = append(r.input, i), append(r.wave, &w)
	}
	if err := r.fits(); err != nil {
		return nil, err
	}
	if err := r.findTimes(); err != nil {
		return nil, err
	}
	m := s.modal
	r.carry(1 + len(r.times)*(len(m.real)+2*len(m.pair)+m.width+1)/keptNumbers)
	return r, nil
}

// fits refuses a growth beyond what a number holds.
func (r *Response) fits() error {
	const most = 600 // exp(600) = 4e260: room for the weights
	grown, rate := r.phases.growth(r), 0.0
	for _, w := range r.wave {
		for i := range w.Segments {
			for _, e := range w.Segments[i].Exp {
				rate = max(rate, real(e.Rate))
			}
		}
	}
	if grown = max(grown, rate*r.until); grown > most {
		return &Overflow{At: most / grown * r.until}
	}
	return nil
}

// growth returns the fastest rate at which a mode grows that something drives.
func (s *System) growth(r *Response) float64 {
	rate := 0.0
	for i, p := range s.poles {
		if real(p.P) <= 0 {
			continue
		}
		for _, at := range s.seats[i] {
			// over a switch anything may be handed to any mode
			if len(r.phases.kinds) > 1 || s.driven(r, at) || r.first != nil && r.first.holds(s.modal, at) {
				rate = max(rate, real(p.P))
			}
		}
	}
	return rate
}

// driven reports whether any active input drives a mode.
func (s *System) driven(r *Response, at seat) bool {
	for _, i := range r.input {
		in := &s.modal.in[i]
		switch at.kind {
		case realSeat:
			if in.real[at.index] != 0 {
				return true
			}
		case pairSeat:
			if in.pair[at.index] != 0 {
				return true
			}
		case blockSeat:
			q := &s.modal.block[at.index]
			if !allZero(in.block[q.first : q.first+q.n]) {
				return true
			}
		}
	}
	return false
}

// holds reports whether a state holds anything of a mode.
func (z *vector) holds(m *modal, at seat) bool {
	switch at.kind {
	case realSeat:
		return z.real[at.index] != 0
	case pairSeat:
		return z.pair[at.index] != 0
	}
	q := &m.block[at.index]
	return !allZero(z.block[q.first : q.first+q.n])
}

// findTimes joins the breaks of the active waves.
func (r *Response) findTimes() error {
	r.times = r.phases.starts(r.until)
	for _, w := range r.wave {
		list, err := w.starts(r.until, MaxBreaks)
		if err != nil {
			return err
		}
		r.times = append(r.times, list...)
	}
	r.times = slices.Clip(distinct(r.times, 0))
	if n := len(r.times); n > MaxBreaks {
		return &TooMany{Found: n, Limit: MaxBreaks}
	}
	return nil
}

// carry works out the state at every break and keeps every stride-th.
func (r *Response) carry(stride int) {
	r.stride, r.kept, r.peak = stride, nil, make([]vector, len(r.phases.kinds))
	for k := range r.peak {
		r.peak[k] = r.phases.kinds[k].System.modal.vector()
	}
	z := r.s.modal.vector()
	if r.first != nil {
		z.add(1, r.first)
	}
	for j := range r.times {
		if j%r.stride == 0 {
			r.kept = append(r.kept, z)
		}
		p := r.pieceFrom(j, z)
		peak := &r.peak[r.phases.kindAt(r.times[j])]
		next := p.m.vector()
		p.state(p.length, &next)
		peak.widen(&next)
		p.reach(peak)
		z = r.enter(j+1, next)
	}
}

// enter takes the state at the end of piece j − 1 into the coordinates of piece j:
// the stores keep what they hold while another system comes into force.
func (r *Response) enter(j int, z vector) vector {
	if len(r.phases.kinds) == 1 || j >= len(r.times) {
		return z
	}
	return r.phases.cross(r.times[j-1], r.times[j], z)
}

// widen raises z to the modulus of v wherever that is larger.
func (z *vector) widen(v *vector) {
	for k, x := range v.real {
		z.real[k] = max(z.real[k], math.Abs(x))
	}
	for k, x := range v.pair {
		z.pair[k] = complex(max(real(z.pair[k]), math.Abs(real(x))), max(imag(z.pair[k]), math.Abs(imag(x))))
	}
	for k, x := range v.block {
		z.block[k] = max(z.block[k], math.Abs(x))
	}
}

// pieceFrom prepares piece j, which starts with the state z.
func (r *Response) pieceFrom(j int, z vector) *piece {
	t0, t1 := r.times[j], r.until
	if j+1 < len(r.times) {
		t1 = r.times[j+1]
	}
	u := make([]segmentNow, len(r.wave))
	for i, w := range r.wave {
		u[i].input = r.input[i]
		if len(w.Segments) == 0 {
			u[i].A = w.Before
			continue
		}
		n, k := w.locate(t0, false)
		if tau := t0 - w.start(n, k); tau != 0 {
			u[i].Segment = w.Segments[k].from(tau)
		} else {
			u[i].Segment = w.Segments[k]
		}
	}
	of := &r.phases.kinds[r.phases.kindAt(t0)]
	p := newPiece(of.System.modal, t0, t1-t0, z, u)
	p.of = of
	return p
}

// piece returns piece j.
func (r *Response) piece(j int) *piece {
	if known := r.recent.Load(); known != nil && known.index == j {
		return known.piece
	}
	p := r.pieceFrom(j, r.state(j))
	r.recent.Store(&recent{j, p})
	return p
}

// state returns the state at the start of piece j.
func (r *Response) state(j int) vector {
	if r.stride == 1 {
		return r.kept[j]
	}
	index := j / r.stride
	now := r.last.Load()
	if now == nil || now.index != index {
		now = r.runAt(index)
		r.last.Store(now)
	}
	return now.states[j-index*r.stride]
}

// runAt works out the states of a stride again.
func (r *Response) runAt(index int) *run {
	now := &run{index: index}
	z := r.kept[index]
	for j := index * r.stride; j < min((index+1)*r.stride, len(r.times)); j++ {
		now.states = append(now.states, z)
		p := r.pieceFrom(j, z)
		next := p.m.vector()
		p.state(p.length, &next)
		z = r.enter(j+1, next)
	}
	return now
}

// pieceAt returns the index of the piece in force at t ≥ 0: the last that starts
// at or before t, strictly before t where left is asked for.
func (r *Response) pieceAt(t float64, left bool) int {
	j := sort.Search(len(r.times), func(i int) bool {
		return r.times[i] > t || left && r.times[i] == t
	}) - 1
	return max(j, 0)
}

// At returns output out at t (s), after a jump where there is one. Before 0 it is
// the base, of a response that starts in a cycle what the cycle ends with; a t beyond
// until counts as until.
func (r *Response) At(out int, t float64) float64 {
	if t < 0 {
		return r.before[out]
	}
	t = min(t, r.until)
	p := r.piece(r.pieceAt(t, false))
	return r.curve(p, out).value(t - p.t0)
}

// Left returns output out just before t (s).
func (r *Response) Left(out int, t float64) float64 {
	if t <= 0 {
		return r.before[out]
	}
	t = min(t, r.until)
	p := r.piece(r.pieceAt(t, true))
	return r.curve(p, out).value(t - p.t0)
}

// Breaks returns every instant in [0, until] at which an input jumps, bends or
// begins another law, ascending; the first is 0.
func (r *Response) Breaks() []float64 { return append([]float64(nil), r.times...) }

// Final returns the limit of output out for t → ∞, every wave going on as it
// does, and false where there is none: a wave that never settles, or a pole with
// Re p ≥ 0 between an active input and the output.
func (r *Response) Final(out int) (float64, bool) {
	k := r.phases.last
	if k < 0 {
		return 0, false
	}
	sys := r.phases.kinds[k].System
	y := r.phases.kinds[k].Base[out]
	for i, in := range r.input {
		v, ok := r.wave[i].Final()
		if !ok || sys.takesPart(in, out, func(p Pole) bool { return real(p.P) >= -p.Radius }) {
			return 0, false
		}
		g, ok := sys.Gain(in, out)
		if !ok {
			return 0, false
		}
		y += g * v
	}
	return y, true
}
