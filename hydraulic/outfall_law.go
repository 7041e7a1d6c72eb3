package hydraulic

import "lagbook/network"

// lipResistance is what a free fall over a lip takes, 0.3 Pa for each m³/s: some hundredths
// of a millimetre of water where a cubic metre a second runs. It stops where less than
// lastDrop would come back, in m³/s.
const (
	lipResistance = 0.3
	lastDrop      = 1e-7
)

// Modes of an outfall.
const (
	lipRuns = iota
	lipDry
)

// An outfallLaw is a free outlet: as long as it runs, the pressure at its lip is that of
// the air, whatever the pressure where it falls to.
type outfallLaw struct {
	lip    float64 // the network's level of liquid that just reaches the lip, Pa
	weight float64 // ρ·g
}

// Eval implements network.Law: two ports, and the flow.
func (l *outfallLaw) Eval(s *network.Stamp) {
	s.F[0], s.F[1] = -s.X[2], s.X[2]
	s.DF[2], s.DF[5] = -1, 1
	s.F[2], s.DF[8] = -s.X[2], -1
	if s.Mode == lipRuns {
		s.F[2] += drop(s.X[0], l.lip) / lipResistance
		s.DF[6] = 1 / lipResistance
	}
}

// Begin implements network.Beginning.
func (l *outfallLaw) Begin(s *network.Stamp, steady bool) {
	if steady {
		return
	}
	if s.Mode = lipDry; s.X[0] > l.lip {
		s.Mode = lipRuns
	}
}

// Guards implements network.Switching.
func (l *outfallLaw) Guards(s *network.Stamp, g []float64) int {
	if g[0] = l.lip - s.X[0]; s.Mode == lipRuns {
		g[0] = s.X[2] + lastDrop
	}
	return 1
}

// Next implements network.Switching.
func (l *outfallLaw) Next(s *network.Stamp, _ int) (mode int, what string, last bool) {
	if s.Mode == lipRuns {
		return lipDry, "runs dry", false
	}
	return lipRuns, "runs", false
}

// Shut implements network.Switching.
func (l *outfallLaw) Shut(int) bool { return false }

// Caution says where the lip is under water.
func (l *outfallLaw) Caution(s *network.Stamp) (code, text string) {
	if s.X[1] > l.lip+l.weight*1e-3 {
		return "outfall-drowned", "the liquid it falls into stands above its lip: it is no free outlet any more, and passes too much"
	}
	return "", ""
}
