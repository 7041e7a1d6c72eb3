package hydraulic

import "lagbook/network"

// A nodeWatch brings nothing to its node: it reads the level of the liquid there, and
// ends a run where vapour forms. Of a plain tank, which is a capacity of the network, it
// reads what is stored too and tells where it runs empty.
type nodeWatch struct {
	zero   float64 // the network's level of liquid without a level, Pa
	weight float64 // ρ·g, Pa/m; 0: no level to read
	vapour float64 // the network's level at which vapour forms, Pa
	area   float64 // of a plain tank, m²
	has    struct{ vapour, tank bool }
	vacuum bool // no vapour pressure is known: vacuum is
	floor  bool // a tank that runs empty stands here: its level ends at its floor
}

// Modes of a watch: empty is one of plain tanks. At vapour a run ends; an operating point
// found there is still one, about which the mode boils is silent.
const (
	watchWet = iota
	watchEmpty
	watchBoils
)

// Readings of a watch.
const (
	watchLevel = iota
	watchStored
)

// level returns the level at the node, m.
func (l *nodeWatch) level(x float64) float64 { return (x - l.zero) / l.weight }

// Eval implements network.Law.
func (l *nodeWatch) Eval(*network.Stamp) {}

// Read implements network.Readable.
func (l *nodeWatch) Read(s *network.Stamp, k int, grad []float64) float64 {
	factor := 1.0
	if k == watchStored {
		factor = l.area
	}
	h := l.level(s.X[0])
	if l.floor && h < 0 { // the dregs of an empty tank
		return 0
	}
	if grad != nil {
		grad[0] += factor / l.weight
	}
	return factor * h
}

// Begin implements network.Beginning.
func (l *nodeWatch) Begin(s *network.Stamp, _ bool) {
	if s.Mode = watchWet; l.has.tank && l.level(s.X[0]) < -dregs {
		s.Mode = watchEmpty
	}
}

// Guards implements network.Switching.
func (l *nodeWatch) Guards(s *network.Stamp, g []float64) int {
	n := 0
	if s.Mode == watchBoils {
		return 0
	}
	if l.has.vapour {
		g[0], n = s.X[0]-l.vapour, 1
	}
	if l.has.tank {
		if g[n] = l.level(s.X[0]) + dregs; s.Mode == watchEmpty {
			g[n] = edge - g[n]
		}
		n++
	}
	return n
}

// Next implements network.Switching.
func (l *nodeWatch) Next(s *network.Stamp, k int) (mode int, what string, last bool) {
	switch {
	case l.has.vapour && k == 0 && l.vacuum:
		return watchBoils, "the pressure falls to vacuum", true
	case l.has.vapour && k == 0:
		return watchBoils, "vapour forms", true
	case s.Mode == watchEmpty:
		return watchWet, "holds liquid again", false
	}
	return watchEmpty, "runs empty", false
}

// Shut implements network.Switching.
func (l *nodeWatch) Shut(int) bool { return false }

// Caution says where a plain tank is below its floor.
func (l *nodeWatch) Caution(s *network.Stamp) (code, text string) {
	if l.has.tank && l.level(s.X[0]) < -dregs {
		return "tank-empty", "it has run empty: a level below the floor is no level any more"
	}
	return "", ""
}
