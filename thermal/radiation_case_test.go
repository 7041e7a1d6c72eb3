package thermal

import (
	"testing"
)

// Radiation as a case states it: the derivations, and the coefficient by hand.
func TestRadiationInACase(t *testing.T) {
	m := read(t, "glow", `
[material.paint]
emissivity = 0.92
[thermal.node.room]
held = "20 °C"
[thermal.node.wall]
held = "10 °C"
[thermal.node.body]
capacitance = "1 kJ/K"
start       = "100 °C"
[thermal.resistance.painted]
between   = ["body", "room"]
radiation = { material = "paint", area = "0.5 m²", view_factor = 0.7 }
[thermal.resistance.facing]
between   = ["body", "wall"]
radiation = { emissivities = [0.8, 0.6], areas = ["0.4 m²", "1.5 m²"], view_factor = 0.9 }
scale     = 0.5
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
`)
	grey := 1 / (0.2/(0.8*0.4) + 1/(0.4*0.9) + 0.4/(0.6*1.5))
	near(t, "radiating area of painted", m.Derived("radiating area of painted").SI, 0.92*0.7*0.5)
	near(t, "radiating area of facing", m.Derived("radiating area of facing").SI, grey, 1e-14)
	a, b, c := 373.15, 293.15, 283.15
	h := stefanBoltzmann * 0.92 * 0.7 * (a + b) * (a*a + b*b)
	near(t, "coefficient", m.Derived("coefficient of painted at 100 °C and 20 °C").SI, h, 1e-13)
	s := m.At(m.Begin(), "coefficient of painted", "flow of painted", "flow of facing", "coefficient of facing")
	near(t, "coefficient read", s[0], h, 1e-13)
	near(t, "flow", s[1], h*0.5*80, 1e-12)
	near(t, "flow between grey surfaces", s[2], 0.5*stefanBoltzmann*grey*(a*a*a*a-c*c*c*c), 1e-12)
	near(t, "coefficient of the first surface", s[3], stefanBoltzmann*grey/0.4*(a+c)*(a*a+c*c), 1e-12)
}

// About its steady state a radiating body is a linear one of slope 4kT³.
func TestLinearisedRadiation(t *testing.T) {
	m := read(t, "glow", hotBody("", `
[thermal.resistance.glow]
between   = ["body", "air"]
radiation = { emissivity = 1, area = "0.5 m²" }
[thermal.source.heat]
into  = "body"
drive = "200 W"
`))
	s := m.Operate(0)
	lin, err := m.Net.Linearise(m.Params, s)
	if err != nil {
		t.Fatal(err)
	}
	r, err := lin.Net.Reduce(lin.Params, nil)
	if err != nil {
		t.Fatal(err)
	}
	T := m.At(s, "body")[0]
	near(t, "pole", real(r.System.Poles()[0].P), -4*stefanBoltzmann*0.5*T*T*T/1000, 1e-9)
}
