package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// checkPipes warns of what a lumped pipe does worse than a real one: sudden stops, and
// damping in laminar flow.
func checkPipes(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	var said []casefile.Diagnostic
	stops := stopsOf(c, v)
	for _, e := range c.Elements {
		if e.Domain() != "hydraulic" || e.Table.Name != "line" || !e.Has("pipe") {
			continue
		}
		p := pipeOf(e, c)
		s, err := p.at(e, v)
		if err != nil {
			continue // the setter says it
		}
		if stop, ok := quickestStop(e, stops); ok {
			said = append(said, p.checkStop(e, c, &stop, &s, v)...)
		}
		if !p.rigid && s.laminarAt(swift) {
			said = append(said, warning(e, "laminar-damping", "its liquid is so thick that it flows laminar up to 2 m/s and beyond: friction taken from the steady flow damps swings and waves less than the real one, whose velocity profile lags",
				"peaks and settling times are read on the high side"))
		}
	}
	return said
}

func warning(e *casefile.Element, code, text, hint string) casefile.Diagnostic {
	d := e.Fault("pipe", text, "", "")
	d.Severity, d.Code, d.Hint = casefile.Warning, code, hint
	return d
}

// swift is a velocity in m/s that lines rarely exceed by much: common practice.
const swift = 2.0

// laminarAt reports whether the liquid flows laminar at a velocity: below a Reynolds
// number of 2300.
func (s *pipeState) laminarAt(v float64) bool { return s.density*v*s.bore/s.viscosity < 2300 }

// fewTravels is how many travel times of a section a stop must take for lumps to follow it.
const fewTravels = 8

// usualWaves is the speed of waves in m/s by which a rigid column is judged that states
// none: common practice for water in steel.
const usualWaves = 1000.0

// slowStop is how many round trips a stop must take before waves are of no account.
const slowStop = 10

// checkStop says which way a pipe errs where the flow at its end is stopped quickly.
func (p *pipe) checkStop(e *casefile.Element, c *casefile.Case, t *stop, s *pipeState, v casefile.Values) []casefile.Diagnostic {
	speed := s.speed
	if speed == 0 {
		speed = usualWaves
	}
	trip := 2 * s.length / speed
	section := s.length / float64(p.count(e, v, s)) / speed
	if p.rigid && t.over >= slowStop*trip || !p.rigid && t.over >= fewTravels*section {
		return nil
	}
	if t.flow == 0 {
		t.flow = flowAtStart(e, c, t.node, v)
	}
	when := "at once"
	if t.over > 0 {
		when = "in " + inUnits(t.over, duration)
	}
	what := fmt.Sprintf("%s stops or throttles the flow at %q %s", t.part.Thing(), t.node, when)
	beside := surge(s, speed, t.flow/s.area)
	if p.rigid {
		return []casefile.Diagnostic{warning(e, "rigid-stop", what+": a rigid column reads half the true peak of a stop along a straight line, and of a sudden one nothing of the wave", beside)}
	}
	text := fmt.Sprintf("%s, in fewer than %d section travel times (%s each): a ladder overstates a sudden stop however many sections it has, its first peak 1.47 times ρ·a·ΔV with half a section's compliance at the valve, as here, 1.09 with a whole one, and later peaks worse",
		what, fewTravels, inUnits(section, duration))
	return []casefile.Diagnostic{warning(e, "sudden-stop", text, beside)}
}

// surge is what to hold a computed peak against: ρ·a·ΔV, of a change of velocity that is
// known, and 2·l/a.
func surge(s *pipeState, speed, change float64) string {
	bar := quantity.Print{Unit: "bar"} // in which a network's pressures are read unless asked
	text := fmt.Sprintf("ρ·a is %s for each m/s stopped", bar.Format(s.density*speed, pressure, quantity.Difference))
	if change > 0 {
		text = fmt.Sprintf("ρ·a·ΔV is %s for ΔV = %s", bar.Format(s.density*speed*change, pressure, quantity.Difference), inUnits(change, velocity))
	}
	text += "; 2·l/a is " + inUnits(2*s.length/speed, duration)
	if s.speed == 0 {
		text += fmt.Sprintf(", with a = %g m/s, usual for water in steel", usualWaves)
	}
	return text
}

// flowAtStart is how much flows at an end of a pipe just before t = 0, 0 where that cannot
// be said without running the case.
func flowAtStart(e *casefile.Element, c *casefile.Case, node string, v casefile.Values) float64 {
	out, ok := c.Showing(e.FullName(), "flow at "+node)
	net, set, faults := c.Build()
	if !ok || out.Flow == nil || net == nil || casefile.Failed(faults) {
		return 0
	}
	p := net.NewParams()
	for _, s := range set {
		if s(v, p) != nil {
			return 0 // said where the case is computed
		}
	}
	if net.Check(p) != nil {
		return 0
	}
	state, err := net.Begin(p)
	if err != nil {
		return 0
	}
	return math.Abs(state.Flows[out.Flow.Inertance])
}

// inUnits prints a plain quantity.
func inUnits(si float64, dim quantity.Dim) string {
	return quantity.Print{}.Format(si, dim, quantity.Plain)
}
