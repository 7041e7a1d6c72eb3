package hydraulic

import (
	"errors"
	"fmt"

	"lagbook/hydraulic/fluid"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// gravity is the standard acceleration of free fall, m/s².
const gravity = 9.80665

// A property of the liquid that a part may need.
type property uint8

const (
	ofDensity property = iota
	ofViscosity
	ofBulk
	ofVapour
	properties // how many there are
)

// propertyKeys are the keys of [hydraulic] that state one by itself, and samples of them.
var propertyKeys = [properties]struct{ key, word, sample string }{
	{"density", "density", "1000 kg/m³"},
	{"viscosity", "viscosity", "1 mPa·s"},
	{"bulk_modulus", "bulk modulus", "2 GPa"},
	{"vapour_pressure", "vapour pressure", "2.3 kPa"},
}

// liquidFields are the keys of [hydraulic] that say which liquid it is.
func liquidFields() []casefile.Field {
	vapour := casefile.Positive("vapour_pressure", pressure, "pressure below which vapour forms, absolute; of the fluid unless stated")
	vapour.Kind, vapour.MinOpen = quantity.Absolute, false
	thick := casefile.Positive("viscosity", viscosity, "µ, dynamic, or ν, kinematic; of the fluid unless stated")
	thick.Unit, thick.Also = "mPa·s", []quantity.Dim{kinematic}
	return []casefile.Field{
		{Name: "fluid", Type: casefile.Word, Words: fluid.Keys(), Structural: true, With: []string{"at"}, Help: "a liquid of the handbook; lagbook materials lists them"},
		{Name: "at", Type: casefile.Number, Dim: temperature, Kind: quantity.Level, With: []string{"fluid"}, Help: "temperature at which the properties of the fluid are taken"},
		casefile.Positive("density", density, "ρ; of the fluid unless stated"),
		thick,
		casefile.Positive("bulk_modulus", pressure, "K of the liquid free of gas; of the fluid unless stated"),
		vapour,
		{Name: "free_gas", Type: casefile.Number, HasMin: true, HasMax: true, Max: 0.2,
			Help: "volume of free gas in the liquid at atmospheric pressure, as a share of the liquid's; bubbles keep no heat (exponent 1.4)"},
	}
}

// A liquid is what the parts of a case need to know of what flows in them, in SI. A
// property that nobody states is 0; parts ask for those they need with needs.
type liquid struct {
	density   float64 // kg/m³
	viscosity float64 // Pa·s
	bulk      float64 // Pa, free of gas
	vapour    float64 // Pa, absolute
	gas       float64 // share of the volume at the atmosphere
	air       float64 // Pa, absolute: the atmosphere
	offset    float64 // Pa; a pressure as the case states it and this is an absolute one
}

// weight is ρ·g, in Pa/m.
func (l *liquid) weight() float64 { return l.density * gravity }

// absolute is the absolute pressure in Pa of one as the case states it.
func (l *liquid) absolute(p float64) float64 { return p + l.offset }

// bubbleExponent is that of bubbles in a quick compression, which exchange no heat.
const bubbleExponent = 1.4

// mixture is the liquid with its free gas, whose bulk modulus goes by the pressure.
func (l *liquid) mixture() fluid.Mixture {
	return fluid.Mixture{Bulk: l.bulk, Gas: l.gas, Atmosphere: l.air, Exponent: bubbleExponent}
}

// liquidSlots say where a case states what its liquid is.
type liquidSlots struct {
	head   *casefile.Element // nil: nothing is stated
	fluid  *fluid.Fluid
	at     number
	own    [properties]number // stated one by one
	gas    number
	air    float64
	offset float64

	kinematic bool // the viscosity is stated as ν
}

// A number is a slot that may not be there.
type number struct {
	slot casefile.Slot
	has  bool
}

func (n number) of(v casefile.Values) float64 { return v.Num[n.slot] }

// optional is the slot of a field, where it is stated.
func optional(e *casefile.Element, path string) number {
	if e == nil || !e.Has(path) {
		return number{}
	}
	return number{e.Num(path), true}
}

// liquidOf reads where [hydraulic] states the liquid.
func liquidOf(c *casefile.Case) liquidSlots {
	head := c.Head("hydraulic")
	s := liquidSlots{head: head, air: c.Pressures.Atmosphere}
	if !c.Pressures.Absolute {
		s.offset = s.air
	}
	if head == nil {
		return s
	}
	s.fluid, _ = fluid.Find(head.Word("fluid"))
	s.at, s.gas = optional(head, "at"), optional(head, "free_gas")
	for i, p := range propertyKeys {
		s.own[i] = optional(head, p.key)
	}
	s.kinematic = s.own[ofViscosity].has && head.DimOf("viscosity") == kinematic
	return s
}

// liquid computes the liquid from the values of the case. The error is a Diagnostic with
// its place.
func (s *liquidSlots) liquid(v casefile.Values) (liquid, error) {
	l := liquid{air: s.air, offset: s.offset}
	if s.fluid != nil && s.at.has {
		p, err := s.fluid.At(s.at.of(v))
		if err != nil {
			return l, s.beyond(err)
		}
		l.density, l.viscosity, l.bulk, l.vapour = p.Density, p.Viscosity, p.BulkModulus, p.VapourPressure
	}
	for i, to := range [...]*float64{&l.density, &l.viscosity, &l.bulk, &l.vapour} {
		if s.own[i].has {
			*to = s.own[i].of(v)
		}
	}
	if s.kinematic {
		l.viscosity *= l.density
	}
	if s.gas.has {
		l.gas = s.gas.of(v)
	}
	return l, nil
}

// beyond places a temperature outside the data of a fluid.
func (s *liquidSlots) beyond(err error) error {
	var out *fluid.RangeError
	if !errors.As(err, &out) {
		return err
	}
	degrees := quantity.Print{}
	return s.head.Fault("at", fmt.Sprintf("%s at %s", out.Fluid, degrees.Format(out.T, temperature, quantity.Level)),
		fmt.Sprintf("%s to %s, the range of its data", degrees.Format(out.Low, temperature, quantity.Level), degrees.Format(out.High, temperature, quantity.Level)), "")
}

// states reports whether a property is known from the case.
func (s *liquidSlots) states(p property) bool {
	if s.own[p].has {
		return p != ofViscosity || !s.kinematic || s.states(ofDensity)
	}
	if s.fluid == nil || !s.at.has {
		return false
	}
	f := s.fluid
	return [properties]fluid.Source{f.Sources.Density, f.Sources.Viscosity, f.Sources.BulkModulus, f.Sources.VapourPressure}[p].Text != ""
}

// needs reports each property that a part needs and that the case does not state, at
// the part's key.
func (s *liquidSlots) needs(e *casefile.Element, path string, list ...property) []casefile.Diagnostic {
	var faults []casefile.Diagnostic
	for _, p := range list {
		if s.states(p) {
			continue
		}
		k := propertyKeys[p]
		d := e.Fault(path, "it needs the "+k.word+" of the liquid, which [hydraulic] does not state", "", "")
		d.Code, d.Hint = "missing-key", fmt.Sprintf("add %s = %q, or fluid and at, to [hydraulic]", k.key, k.sample)
		if s.fluid != nil {
			d.Hint = fmt.Sprintf("the handbook does not know it of %q: add %s = %q to [hydraulic]", s.fluid.Key, k.key, k.sample)
		}
		faults = append(faults, d)
	}
	return faults
}

// source of a property, as a derivation shows it.
func (s *liquidSlots) source(p property) string {
	if s.own[p].has {
		return s.head.SourceOf(propertyKeys[p].key)
	}
	if s.fluid == nil {
		return ""
	}
	f := s.fluid
	from := [properties]fluid.Source{f.Sources.Density, f.Sources.Viscosity, f.Sources.BulkModulus, f.Sources.VapourPressure}[p]
	return fmt.Sprintf("%s at %s: %s (%s)", f.Key, s.head.Text("at"), from.Text, from.Status)
}

// checkLiquid refuses a temperature outside the data of the fluid, before a setter meets
// it, and warns of a liquid that boils in the open.
func checkLiquid(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	s := liquidOf(c)
	if s.head == nil {
		return nil
	}
	l, err := s.liquid(v)
	var d casefile.Diagnostic
	switch {
	case errors.As(err, &d):
		return []casefile.Diagnostic{d}
	case l.vapour >= l.air && s.states(ofVapour):
		d = s.head.Fault("vapour_pressure", fmt.Sprintf("a vapour pressure of %.4g Pa, at or above the atmosphere of %.4g Pa", l.vapour, l.air), "", "")
		d.Severity, d.Hint = casefile.Warning, "the liquid boils where it stands open"
	default:
		return nil
	}
	return []casefile.Diagnostic{d}
}
