package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network"
)

// A gasLaw is a vessel of gas over liquid, or behind a bladder or piston, at a node of the
// absolute pressure p. It is charged slowly, at its surroundings' temperature, so that at
// t = 0 it holds the volume V₀ = charge/p; from then on
//
//	p·V^n = what it was at t = 0                                 with an exponent n
//	d ln(p·V^γ)/dt = (γ/τ)·(charge/(p·V) − 1)                    with a time constant τ
//
// The second is the energy of an ideal gas, of constant specific heats, that takes heat
// from a wall at its own temperature in proportion to the difference: τ is the time
// constant at constant pressure (Pourmovahed and Otis, J. Dyn. Syst. Meas. Control 112,
// 116-121, 1990, state it at constant volume, τ/γ). About a state of rest it has the
// compliance C(s) = C_ad + (C_iso − C_ad)/(1 + τ·s).
type gasLaw struct {
	volume   float64 // of the vessel, all of it gas at the precharge, m³
	charge   float64 // pressure times volume at rest, Pa·m³, absolute
	exponent float64 // n, or γ where the gas exchanges heat
	constant float64 // τ, s; 0: an exponent
	absolute float64 // the network's level and this is the absolute pressure
	least    float64 // liquid that must be left, m³; 0: none
}

// heatExponent is γ of nitrogen and of air as ideal gases.
const heatExponent = 1.4

// thinGas is the share of the precharge below which the gas law goes on straight, so
// that an iteration may pass through pressures without meaning: the vessel is full of
// gas long before.
const thinGas = 0.05

// speckOfGas is the share of the vessel by which rounding may put the gas beyond it at a
// start at the precharge; leastGas that below which no gas law holds.
const (
	speckOfGas = 1e-9
	leastGas   = 0.01
)

// Modes of a gas. Where no liquid is left, or next to no gas, a run ends; an operating
// point found there is still one, about which the mode beyond is silent.
const (
	gasWet = iota
	gasLow // less liquid than must be left
	gasBeyond
)

// Readings of a gas.
const (
	gasVolume = iota
	gasStored
)

// state is V and its derivatives by the level and by the unknown.
func (l *gasLaw) state(s *network.Stamp) (v, dp, dw float64) {
	switch {
	case l.constant > 0:
		return l.warmed(s.X[0]+l.absolute, s.X[1])
	case s.Mem[0] == 0:
		v, dp = l.curve(s.X[0]+l.absolute, l.charge, 1)
	default:
		v, dp = l.curve(s.X[0]+l.absolute, s.Mem[0], l.exponent)
	}
	return v, dp, 0
}

// curve is V = (k/p)^(1/n) for p·V^n = k, and dV/dp.
func (l *gasLaw) curve(p, k, n float64) (v, dp float64) {
	at := max(p, thinGas*l.charge/l.volume)
	v = math.Pow(k/at, 1/n)
	dp = -v / (n * at)
	return v + dp*(p-at), dp
}

// warmed is V = volume·e^w·(p₀/p)^(1/γ), with p₀ = charge/volume, which makes
// w = ln(p·V^γ/(p₀·volume^γ))/γ a measure of the heat taken in; w is 0 at p₀.
func (l *gasLaw) warmed(p, w float64) (v, dp, dw float64) {
	const most = 30 // e^w goes on straight beyond
	at := min(max(w, -most), most)
	grown := math.Exp(at)
	v, dp = l.curve(p, l.charge*math.Pow(l.volume, l.exponent-1), l.exponent)
	factor := grown * (1 + w - at)
	return v * factor, dp * factor, v * grown
}

// Eval implements network.Law.
func (l *gasLaw) Eval(s *network.Stamp) {
	v, dp, dw := l.state(s)
	s.Stored, s.DStored = l.volume-v, -dp
	if l.constant == 0 {
		return
	}
	s.DStoredBy[0] = -dw
	p := s.X[0] + l.absolute
	at := max(p, thinGas*l.charge/l.volume)
	room := max(v, 1e-6*l.volume)
	ratio := l.charge / (at * room)
	s.F[1] = (ratio - 1) / l.constant
	if at == p {
		s.DF[2] = -ratio / (at * l.constant)
	}
	if room == v {
		s.DF[2] -= ratio / (room * l.constant) * dp
		s.DF[3] = -ratio / (room * l.constant) * dw
	}
}

// Begin implements network.Beginning: up to t = 0 the gas had the time to keep its
// temperature.
func (l *gasLaw) Begin(s *network.Stamp, _ bool) {
	p := max(s.X[0]+l.absolute, thinGas*l.charge/l.volume)
	v := l.charge / p
	if l.constant > 0 {
		// V = charge/p in V = volume·e^w·(p₀/p)^(1/γ)
		s.X[1] = (1 - 1/l.exponent) * math.Log(l.charge/(l.volume*p))
	} else {
		s.Mem[0] = p * math.Pow(v, l.exponent)
	}
	if s.Mode = gasWet; l.least > 0 && l.volume-v < l.least {
		s.Mode = gasLow
	}
}

// Guards implements network.Switching.
func (l *gasLaw) Guards(s *network.Stamp, g []float64) int {
	if s.Mode == gasBeyond {
		return 0
	}
	v, _, _ := l.state(s)
	left := l.volume - v
	g[0], g[1] = left+speckOfGas*l.volume, v-leastGas*l.volume
	switch {
	case l.least == 0:
		return 2
	case s.Mode == gasLow:
		g[2] = l.least*(1+1e-6) - left
	default:
		g[2] = left - l.least
	}
	return 3
}

// Next implements network.Switching.
func (l *gasLaw) Next(s *network.Stamp, k int) (mode int, what string, last bool) {
	switch {
	case k == 1:
		return gasBeyond, "has its gas pressed to a hundredth of the vessel", true
	case k == 0:
		return gasBeyond, "has no liquid left: the gas is blown out, or the bladder shuts the port", true
	case s.Mode == gasLow:
		return gasWet, "holds its least liquid again", false
	}
	return gasLow, "holds less than its least liquid", false
}

// Shut implements network.Switching.
func (l *gasLaw) Shut(int) bool { return false }

// Read implements network.Readable.
func (l *gasLaw) Read(s *network.Stamp, k int, grad []float64) float64 {
	v, dp, dw := l.state(s)
	sign, y := 1.0, v
	if k == gasStored {
		sign, y = -1, l.volume-v
	}
	if grad != nil {
		grad[0] += sign * dp
		if l.constant > 0 {
			grad[1] += sign * dw
		}
	}
	return y
}

// Caution says where little liquid is left.
func (l *gasLaw) Caution(s *network.Stamp) (code, text string) {
	v, _, _ := l.state(s)
	if l.least > 0 && l.volume-v < l.least {
		return "least-liquid", fmt.Sprintf("less than its least liquid, %.4g L, is left", l.least*1e3)
	}
	return "", ""
}
