package thermal

import "lagbook/network"

// freezing is the temperature from which stored heat is counted: 0 °C.
const freezing = 273.15

// A storing is the law of a lump whose specific heat depends on temperature: it keeps the
// integral of m·c dT from 0 °C on, so that what went in comes out again exactly.
type storing struct {
	capacity float64 // J/K, where the specific heat is one number
	mass     float64 // kg, (1 + extra) of it, where it is a curve
	heat     curve   // K, J/(kg·K); none: capacity
}

// Eval implements network.Law.
func (l *storing) Eval(s *network.Stamp) { s.Stored, s.DStored = l.sensible(s.X[0]) }

// sensible is the heat stored at T in J, above 0 °C, and the capacitance there.
func (l *storing) sensible(T float64) (stored, slope float64) {
	if len(l.heat.x) == 0 {
		return l.capacity * (T - freezing), l.capacity
	}
	c, _ := l.heat.value(T)
	return l.mass * l.heat.between(T, freezing), l.mass * c
}

// Read implements network.Readable: the heat stored.
func (l *storing) Read(s *network.Stamp, _ int, grad []float64) float64 {
	stored, slope := l.sensible(s.X[0])
	if grad != nil {
		grad[0] += slope
	}
	return stored
}

// A melting is the law of a lump that melts, by its enthalpy: the sensible heat, and the
// latent heat smeared evenly over a range of temperature around the melting point. The march
// stops where a lump enters or leaves the range, so that within a mode the law has no kink:
// each goes on along its own line beyond its bounds.
type melting struct {
	storing
	latent   float64 // J
	at, over float64 // K; over > 0
}

// Modes of a melting.
const (
	solid = iota
	melts
	liquid
)

// Eval implements network.Law.
func (l *melting) Eval(s *network.Stamp) { s.Stored, s.DStored = l.stored(s.X[0], s.Mode) }

func (l *melting) stored(T float64, mode int) (stored, slope float64) {
	stored, slope = l.sensible(T)
	switch mode {
	case melts:
		return stored + l.latent*l.share(T), slope + l.latent/l.over
	case liquid:
		return stored + l.latent, slope
	}
	return stored, slope
}

// share is how much has melted, in 0…1 within the range.
func (l *melting) share(T float64) float64 { return 0.5 + (T-l.at)/l.over }

// overlap is how far beyond its bounds a mode lasts, as a share of the range, so that rounding
// does not throw a lump to and fro.
const overlap = 1e-8

// Guards implements network.Switching.
func (l *melting) Guards(s *network.Stamp, g []float64) int {
	f := l.share(s.X[0])
	switch s.Mode {
	case solid:
		g[0] = overlap - f
		return 1
	case liquid:
		g[0] = f - (1 - overlap)
		return 1
	}
	g[0], g[1] = f+overlap, 1+overlap-f
	return 2
}

// Next implements network.Switching.
func (l *melting) Next(s *network.Stamp, k int) (mode int, what string, last bool) {
	switch {
	case s.Mode == solid:
		return melts, "begins to melt", false
	case s.Mode == liquid:
		return melts, "begins to freeze", false
	case k == 0:
		return solid, "is frozen", false
	}
	return liquid, "is molten", false
}

// Shut implements network.Switching.
func (l *melting) Shut(int) bool { return false }

// Begin implements network.Beginning: a lump starts in the mode of its temperature.
func (l *melting) Begin(s *network.Stamp, _ bool) {
	switch f := l.share(s.X[0]); {
	case f <= 0:
		s.Mode = solid
	case f < 1:
		s.Mode = melts
	default:
		s.Mode = liquid
	}
}

// Readings of a melting.
const (
	readStored = iota
	readLiquid
)

// Read implements network.Readable: the heat stored, and the share that is liquid.
func (l *melting) Read(s *network.Stamp, k int, grad []float64) float64 {
	v, slope := l.stored(s.X[0], s.Mode)
	if k == readLiquid {
		v, slope = 0, 0
		switch s.Mode {
		case liquid:
			v = 1
		case melts:
			v, slope = min(max(l.share(s.X[0]), 0), 1), 1/l.over
		}
	}
	if grad != nil {
		grad[0] += slope
	}
	return v
}
