package hydraulic

import "lagbook/network"

// A displacementPump is the law of a pump that moves a volume with each turn, whatever
// the pressure, less what slips back: q = V·n·(1 − slip) − leak·(p_to − p_from), n in
// turns a second. Local variables: levels of from, to and of a third node watched, and
// the drive speed.
type displacementPump struct {
	pumpModes
	ports  int
	volume float64 // m³ a turn, less slip
	leak   float64 // m³/s for each pascal
	rise   float64 // Pa; level of to less that of from and this is the pressure difference
	inlet  float64 // Pa; level at the inlet and this is the absolute pressure
	vapour float64 // Pa, absolute; 0: not known
	weight float64 // ρ·g, Pa/m
}

// flow is q in a mode, and its derivatives by the level of from and by the speed.
func (l *displacementPump) flow(s *network.Stamp, mode int) (q, dfrom, dspeed float64) {
	n := max(s.X[l.ports], 0)
	dspeed = l.volume
	if mode&pumpOff != 0 {
		n, dspeed = 0, 0
	}
	return l.volume*n - l.leak*(s.X[1]-s.X[0]+l.rise), l.leak, dspeed
}

// Eval implements network.Law.
func (l *displacementPump) Eval(s *network.Stamp) {
	if l.Shut(s.Mode) {
		return
	}
	n := len(s.X)
	q, dfrom, dspeed := l.flow(s, s.Mode)
	s.F[0], s.F[1] = -q, q
	s.DF[0], s.DF[1], s.DF[l.ports] = -dfrom, dfrom, -dspeed
	s.DF[n], s.DF[n+1], s.DF[n+l.ports] = dfrom, -dfrom, dspeed
}

// Guards implements network.Switching.
func (l *displacementPump) Guards(s *network.Stamp, g []float64) int {
	q, _, _ := l.flow(s, s.Mode)
	return l.guards(s, q, 1, g)
}

// pushes tells whether liquid would go forward in a mode.
func (l *displacementPump) pushes(s *network.Stamp) func(mode int) bool {
	return func(mode int) bool {
		q, _, _ := l.flow(s, mode)
		return q > 0
	}
}

// Next implements network.Switching.
func (l *displacementPump) Next(s *network.Stamp, k int) (int, string, bool) {
	mode, what := l.next(s.Mode, k, l.pushes(s))
	return mode, what, false
}

// Shut implements network.Switching: a pump at rest from which nothing slips back is shut.
func (l *displacementPump) Shut(mode int) bool {
	return mode&pumpShut != 0 || mode&pumpOff != 0 && l.leak == 0
}

// Begin implements network.Beginning.
func (l *displacementPump) Begin(s *network.Stamp, _ bool) { s.Mode = l.start(s, l.pushes(s)) }

// Read implements network.Readable.
func (l *displacementPump) Read(s *network.Stamp, k int, grad []float64) float64 {
	add := func(place int, v float64) {
		if grad != nil {
			grad[place] += v
		}
	}
	q, dfrom, dspeed := l.flow(s, s.Mode)
	if l.Shut(s.Mode) {
		q, dfrom, dspeed = 0, 0, 0
	}
	rise := s.X[1] - s.X[0] + l.rise
	switch k {
	case readHead:
		add(1, 1/l.weight)
		add(0, -1/l.weight)
		return (s.X[1] - s.X[0]) / l.weight
	case readPower:
		add(0, dfrom*rise-q)
		add(1, q-dfrom*rise)
		add(l.ports, dspeed*rise)
		return q * rise
	case readSpeed:
		if s.Mode&pumpOff != 0 {
			return 0
		}
		add(l.ports, 1)
		return max(s.X[l.ports], 0)
	}
	add(0, 1/l.weight)
	return (s.X[0] + l.inlet - l.vapour) / l.weight
}

// Caution implements network.Cautious.
func (l *displacementPump) Caution(s *network.Stamp) (code, text string) {
	if l.vapour > 0 && !l.Shut(s.Mode) && s.X[0]+l.inlet <= l.vapour {
		return "cavitation", "the pressure at its inlet is at or below the vapour pressure: it cavitates and no longer delivers its displacement"
	}
	return "", ""
}
