package hydraulic

import (
	"fmt"

	"lagbook/network/casefile"
)

// vessel returns an empty one of the kind that the case states.
func (t *tankSlots) vessel() vessel {
	switch t.e.Word("tank.shape") {
	case "horizontal cylinder":
		return &blunt{of: &lying{}}
	case "sphere":
		return &blunt{of: &sphere{}}
	case "cone":
		return &blunt{of: &cone{}}
	}
	switch n := len(t.points); {
	case n > 0 && t.volumes:
		return &strapping{make([]float64, n), make([]float64, n)}
	case n > 0:
		return &survey{make([]float64, n), make([]float64, n), make([]float64, 0, n)}
	}
	return &prism{}
}

// measure writes the dimensions of the case into a vessel.
func (t *tankSlots) measure(to vessel, v casefile.Values) {
	switch x := to.(type) {
	case *prism:
		x.area = t.area(v)
	case *blunt:
		switch y := x.of.(type) {
		case *lying:
			y.diameter, y.length = t.across.of(v), t.long.of(v)
		case *sphere:
			y.diameter = t.across.of(v)
		case *cone:
			y.top, y.tall = t.across.of(v), t.own.of(v)
			if t.bottom.has {
				y.bottom = t.bottom.of(v)
			}
		}
		x.settle()
	case *survey:
		t.copy(x.height, x.area, v)
		x.sum()
	case *strapping:
		t.copy(x.height, x.volume, v)
	}
}

// copy writes the points of a tank into two lists.
func (t *tankSlots) copy(first, second []float64, v casefile.Values) {
	for i, p := range t.points {
		first[i], second[i] = v.Num[p[0]], v.Num[p[1]]
	}
}

// ceiling is the height at which a closed or a measured shape ends; false where none does.
func (t *tankSlots) ceiling(v casefile.Values) (h float64, ok bool) {
	switch n := len(t.points); {
	case t.own.has:
		return t.own.of(v), true
	case t.closed() && n == 0:
		return t.across.of(v), true
	case n > 0:
		return v.Num[t.points[n-1][0]], true
	}
	return 0, false
}

// height is that of a stated elevation above the floor.
func (t *tankSlots) height(n number, v casefile.Values) float64 {
	if !t.floor.has {
		return n.of(v)
	}
	return n.of(v) - t.floor.of(v)
}

// edges sets crest and top of a tank, and refuses those that no tank has.
func (t *tankSlots) edges(law *tankLaw, v casefile.Values) error {
	e := t.e
	if err := t.sound(v); err != nil {
		return err
	}
	law.has = tankEdges{crest: t.crest.has}
	law.top, law.has.top = t.ceiling(v)
	if t.top.has {
		h := t.height(t.top, v)
		if law.has.top && h > law.top*(1+1e-9) {
			return e.Fault("tank.top", fmt.Sprintf("the top lies %s above the floor, and its shape ends at %s", metres(h), metres(law.top)), "a top within the shape", "")
		}
		law.top, law.has.top = h, true
		if h <= 0 {
			return e.Fault("tank.top", fmt.Sprintf("the top lies at %s and the floor at %s", metres(t.top.of(v)), metres(t.top.of(v)-h)), "a floor below the top", "")
		}
	}
	if t.crest.has {
		h := t.height(t.crest, v)
		switch {
		case h <= 0:
			return e.Fault("tank.overflow", fmt.Sprintf("the crest lies at %s and the floor at %s", metres(t.crest.of(v)), metres(t.crest.of(v)-h)), "a crest above the floor", "")
		case law.has.top && h > law.top*(1+1e-9):
			return e.Fault("tank.overflow", fmt.Sprintf("the crest lies %s above the floor and the top at %s", metres(h), metres(law.top)), "a crest below the top: the tank would run over its walls first", "")
		}
		law.crest.height = h
		if t.width.has {
			law.crest.width = t.width.of(v)
		} else if h >= law.top*(1-1e-9) { // a plain crest at the top is that top
			law.has.top = false
		}
	}
	law.prepare()
	return nil
}

// sound refuses points that no tank has.
func (t *tankSlots) sound(v casefile.Values) error {
	for i, p := range t.points {
		x, what, want := v.Num[p[1]], "", ""
		switch {
		case i == 0 && v.Num[p[0]] != 0:
			return t.e.Fault("tank.points[0].first", "the first height is not 0 m", "the first at the floor, 0 m", "")
		case t.volumes && i == 0 && x != 0:
			what, want = "liquid below the floor", "a volume of 0 at the floor"
		case t.volumes && i > 0 && x <= v.Num[t.points[i-1][1]]:
			what, want = "a volume not above the one before it", "volumes that grow with the height"
		case !t.volumes && x == 0:
			what, want = "a surface without area", "areas above 0"
		default:
			continue
		}
		return t.e.Fault(fmt.Sprintf("tank.points[%d].second", i), what, want, "")
	}
	return nil
}

// fits refuses a level at t = 0 that the tank does not have.
func (t *tankSlots) fits(h float64, v casefile.Values) error {
	const rounding = 1e-9
	top, ok := t.ceiling(v)
	if t.top.has {
		top, ok = t.height(t.top, v), true
	}
	switch {
	case h < -rounding:
		return t.e.Fault("start", fmt.Sprintf("it starts %s below the floor of its tank", metres(-h)), "a level at or above the floor", "")
	case ok && h > top*(1+rounding):
		return t.e.Fault("start", fmt.Sprintf("it starts at a level of %s, and the top of its tank lies %s above the floor", metres(h), metres(top)), "a level below the top", "")
	}
	return nil
}

// deriveTank shows what a plain tank comes to, and the area of others at the floor.
func deriveTank(e *casefile.Element, s *liquidSlots, l *liquid, v casefile.Values) []casefile.Derivation {
	if !e.Has("tank.area") && e.Word("tank.shape") != "vertical cylinder" {
		return nil
	}
	t := newTankSlots(e, number{})
	numbers := e.Text("tank.area")
	if numbers == "" {
		numbers = "π/4·(" + e.Text("tank.diameter") + ")²"
	}
	return []casefile.Derivation{{Quantity: "compliance of the tank of " + e.Name, Formula: "A/(ρ·g)", Numbers: numbers + fmt.Sprintf("/(%.6g kg/m³ · %g m/s²)", l.density, gravity),
		Source: s.source(ofDensity), SI: t.area(v) / l.weight(), Dim: compliance}}
}
