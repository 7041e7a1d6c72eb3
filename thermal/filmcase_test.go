package thermal

import (
	"math"
	"strings"
	"testing"

	"lagbook/network"
	"lagbook/network/casefile/casetest"
)

// heldAndBody is a case of two held nodes and what stands between them.
func heldAndBody(rest string) string {
	return `
[thermal.node.hot]
held = "50 °C"
[thermal.node.cold]
held = "26 °C"
[thermal.node.sky]
held = "-10 °C"
[thermal.node.body]
capacitance = "1 kJ/K"
start = "40 °C"
[thermal.resistance.tie]
between = ["body", "cold"]
value = "1 K/W"
[thermal.resistance.other]
between = ["body", "sky"]
value = "1 K/W"
[thermal.resistance.third]
between = ["body", "hot"]
value = "1 K/W"
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
` + rest
}

// element returns the law of the element of that name, and its stamp.
func element(t *testing.T, m *casetest.Model, name string) (network.Law, *network.Stamp, network.ElementView) {
	t.Helper()
	for _, e := range m.Net.Elements() {
		if e.Name == name {
			return m.Params.Law[e.ID], stamp(len(e.Ports), len(e.Unknowns), len(e.Drives)), e
		}
	}
	t.Fatalf("%s: no element %q", m.Case.File, name)
	return nil, nil, network.ElementView{}
}

const kelvin = 273.15

// What a case states reaches the law: a plate of 0.28 m at 50 °C in air of 26 °C, by hand Ra = 9.81/311 · 24 · 0.28³
// · 0.706/(1.67e-5)² = 4.2e7, Nu = (0.825 + 0.324 · 18.6)² = 47, h = 47 · 0.0271/0.28 = 4.55 W/(m²·K), and 0.34 m² carry 37 W.
func TestNaturalFilmOfACase(t *testing.T) {
	m := read(t, "plate.toml", heldAndBody(`
[thermal.resistance.still_air]
between = ["hot", "cold"]
film = { natural = "vertical plate", height = "0.28 m", area = "0.34 m²" }
scale = { points = [["0 s", 1], ["10 s", 0]] }
`))
	law, s, e := element(t, m, "still_air")
	at(law, s, 50+kelvin, 26+kelvin, 1)
	if q := s.F[1]; math.Abs(q-37) > 0.5 || e.Drives[0] != "scale of still_air" || e.Gate != 1 {
		t.Errorf("%.2f W, drives %v, gate %d", q, e.Drives, e.Gate)
	}
	if h := law.(network.Readable).Read(s, 0, make([]float64, 3)); math.Abs(h-4.55) > 0.05 {
		t.Errorf("h %.3f", h)
	}
	d := m.Derived("coefficient of still_air at 50 °C against 26 °C")
	if math.Abs(d.SI-4.55) > 0.05 || !strings.Contains(d.Numbers, "Ra = 4.18e7") || !strings.Contains(d.Numbers, "air at 38 °C and 101 kPa") || !strings.Contains(d.Source, "Churchill") {
		t.Errorf("%+v", d)
	}
	out, ok := m.Case.Showing("still_air", "coefficient")
	if flow, known := m.Case.Showing("still_air", "flow"); !ok || out.Reading == nil || !known || flow.Flow == nil {
		t.Errorf("showing: %v, %v", out, flow)
	}
}

// Thinner air carries less: at 3000 m, p = 70.1 kPa, a film by Ra^(1/3) to Ra^(1/4) loses 17 to 22 %.
func TestAltitude(t *testing.T) {
	film := `
[thermal.resistance.still_air]
between = ["hot", "cold"]
film = { natural = "horizontal cylinder", diameter = "80 mm", area = "1 m²" }
`
	heat := func(air string) float64 {
		m := read(t, "air.toml", heldAndBody(film+air))
		law, s, _ := element(t, m, "still_air")
		return at(law, s, 70+kelvin, 20+kelvin).F[1]
	}
	low, high, stated := heat(""), heat("[air]\naltitude = \"3000 m\""), heat("[air]\npressure = \"70.121 kPa\"")
	if r := high / low; r < 0.78 || r > 0.84 || math.Abs(stated/high-1) > 1e-4 {
		t.Errorf("%g W at sea level, %g at 3000 m, %g at its pressure", low, high, stated)
	}
	// Cengel, Example 9-1: 5.869 W/(m²·K) at sea level; its table has 3 % less conductivity
	if math.Abs(low/50/5.869-1) > 0.02 {
		t.Errorf("h %g", low/50)
	}
	if got := faults(heldAndBody("[air]\naltitude = \"3 km\"\npressure = \"70 kPa\"")); !strings.Contains(got, "stated-twice: ") {
		t.Error(got)
	}
	if got := faults(heldAndBody("[air]\naltitude = \"30 km\"")); !strings.Contains(got, "range: ") {
		t.Error(got)
	}
}

// A blown film has its speed for a drive; a stopped fan shuts a plate; liquids of the handbook serve.
func TestForcedFilmOfACase(t *testing.T) {
	m := read(t, "fan.toml", heldAndBody(`
[thermal.resistance.fan]
between = ["hot", "cold"]
film = { forced = "plate", length = "0.2 m", area = "0.1 m²", speed = { stairs = [["0 s", "4 m/s"], ["10 s", "0 m/s"]] } }
[thermal.resistance.coil]
between = ["hot", "cold"]
film = { forced = "tube", diameter = "30 mm", length = "5 m", area = "0.4 m²", speed = "0.2358 m/s", fluid = "water" }
`))
	law, s, e := element(t, m, "fan")
	at(law, s, 50+kelvin, 26+kelvin, 0)
	if s.F[0] != 0 || s.DF[0] != 0 || e.Gate != 1 || e.Drives[0] != "speed of fan" {
		t.Errorf("stopped: %v %v, gate %d", s.F, s.DF, e.Gate)
	}
	id, k, ok := m.Case.Drive("speed of fan")
	if !ok || id != e.ID || k != 0 || m.Params.Drive[id][k].Before != 4 {
		t.Errorf("drive %v %d %v", id, k, ok)
	}
	if d := m.Derived("coefficient of fan at 50 °C against 26 °C"); math.Abs(d.SI-0.664*math.Sqrt(4*0.2/1.69e-5)*math.Cbrt(0.71)*0.0272/0.2) > 0.2 {
		t.Errorf("%+v", d)
	}
	law, s, _ = element(t, m, "coil")
	at(law, s, 60+kelvin, 40+kelvin, 0.2358)
	// Cengel, Example 8-5, at 40 °C: 1462 W/(m²·K) by Dittus-Boelter; the entrance adds 3 %
	if h := s.F[1] / 20 / 0.4; math.Abs(h/1462-1) > 0.08 {
		t.Errorf("water in a tube: %.0f", h)
	}
}

// The faults that a user makes with films.
func TestFilmFaults(t *testing.T) {
	film := func(f string) string {
		return "[thermal.resistance.x]\nbetween = [\"hot\", \"cold\"]\nfilm = { " + f + ", area = \"1 m²\" }"
	}
	for _, c := range []struct{ text, want string }{
		{film(`natural = "vertical plate"`), `natural = "vertical plate" without height`},
		{film(`natural = "vertical plate", height = "1 m", gap = "1 cm"`), `gap says nothing of natural = "vertical plate"`},
		{film(`natural = "vertical plate", height = "1 m", speed = "1 m/s"`), `speed says nothing of natural = "vertical plate"`},
		{film(`natural = "horizontal plate", face = "up"`), `without one of length, diameter`},
		{film(`natural = "horizontal plate", length = "1 m", face = "left"`), `face`},
		{film(`natural = "enclosure", gap = "1 cm"`), `without height or face`},
		{film(`natural = "upright plate", height = "1 m"`), `upright plate`},
		{film(`forced = "plate", length = "1 m"`), `without speed`},
		{film(`forced = "cylinder", diameter = "1 m", speed = "-1 m/s"`), "range: "},
		{film(`forced = "plate", length = "1 m", speed = "1 m/s", fluid = "copper"`), "copper is a solid; expected air or a liquid of the handbook"},
		{film(`forced = "plate", length = "1 m", speed = "1 m/s", fluid = "watr"`), `did you mean "water"?`},
		{film(`natural = "vertical plate", coefficient = "5 W/(m²·K)", height = "1 m"`), "stated-twice: "},
		{"[thermal.resistance.x]\nbetween = [\"hot\", \"cold\"]\nfins = { count = 20, thickness = \"3 mm\", height = \"3 cm\", length = \"10 cm\", width = \"5 cm\", material = \"copper\" }",
			"20 plates of 3 mm fill a base 5 cm wide"},
		{"[thermal.resistance.x]\nbetween = [\"hot\", \"cold\"]\nfins = { count = 200, diameter = \"6 mm\", height = \"3 cm\", length = \"5 cm\", width = \"5 cm\", material = \"copper\" }",
			"200 pins of 6 mm fill a base of 5 cm by 5 cm"},
		{"[thermal.resistance.x]\nbetween = [\"hot\", \"cold\"]\nspreading = { source_area = \"2 cm²\", plate_area = \"1 cm²\", thickness = \"2 mm\", material = \"copper\", coefficient = \"50 W/(m²·K)\" }",
			"source_area is 2 cm²; expected at most the plate_area, 1 cm²"},
		{"[thermal.resistance.x]\nbetween = [\"hot\", \"cold\"]\ncontact = { joint = \"vacuum copper\", area = \"1 cm²\" }", `"vacuum copper" fits 2 joints`},
		{"[thermal.resistance.x]\nbetween = [\"hot\", \"cold\"]\ncontact = { joint = \"chewing gum\", area = \"1 cm²\" }", `the handbook has no joint "chewing gum"`},
		{"[material.m]\nconductivity = [[\"0 °C\", \"1 W/(m·K)\"], [\"90 °C\", \"2 W/(m·K)\"]]\n[thermal.resistance.x]\nbetween = [\"hot\", \"cold\"]\n" +
			"fins = { count = 2, thickness = \"3 mm\", height = \"3 cm\", length = \"10 cm\", width = \"5 cm\", material = \"m\" }", `conductivity of material "m" is stated against temperature`},
		{"[thermal.surface.x]\nnode = \"body\"\narea = \"1 m²\"", "does nothing"},
		{"[thermal.surface.x]\nnode = \"body\"\narea = \"1 m²\"\nfilm = \"5 W/(m²·K)\"", "film needs air beside it"},
		{"[thermal.surface.x]\nnode = \"body\"\narea = \"1 m²\"\nemissivity = 0.9", "emissivity without a node to radiate to"},
		{"[thermal.surface.x]\nnode = \"body\"\narea = \"1 m²\"\nemissivity = 0.9\nsky = \"body\"", "is the node of the surface itself"},
		{"[thermal.surface.x]\nnode = \"body\"\narea = \"1 m²\"\nabsorbs = \"500 W/m²\"", "absorbs needs absorptance beside it"},
	} {
		if got := faults(heldAndBody(c.text)); !strings.Contains(got, c.want) {
			t.Errorf("%q is not among\n%s", c.want, got)
		}
	}
}

// Out of range is said with the range.
func TestFilmsSayWhereTheyEnd(t *testing.T) {
	for _, c := range []struct {
		f       *film
		a, b, u float64
		want    string
	}{
		{&film{correlation: correlationNamed("natural", "vertical plate"), height: 30}, 400, 300, 0, "above 1e12"},
		{&film{correlation: correlationNamed("natural", "vertical plate"), height: 0.3}, 2400, 300, 0, "outside -73.15 °C to 726.9 °C"},
		{&film{correlation: correlationNamed("natural", "enclosure"), height: 0.03, gap: 0.02}, 310, 300, 0, "height/gap is 1.5, outside 5 to 110"},
		{&film{correlation: correlationNamed("forced", "duct"), diameter: 0.01}, 310, 300, 0.5, "laminar flow"},
		{&film{correlation: correlationNamed("forced", "plate"), side: 0.5}, 310, 300, 5, ""},
		{&film{correlation: correlationNamed("natural", "horizontal plate"), diameter: 0.02}, 300.5, 300, 0, ""},
		{&film{correlation: correlationNamed("natural", "horizontal plate"), diameter: 0.02}, 320, 300, 0, "below 10000"},
	} {
		c.f.medium.pressure = 101325
		_, text := c.f.doubt(c.a, c.b, c.u)
		if (c.want == "") != (text == "") || !strings.Contains(text, c.want) {
			t.Errorf("%s: %q, want %q", c.f.word, text, c.want)
		}
	}
}

func TestArraysSayWhereTheyEnd(t *testing.T) {
	list := arrays()
	plates, blown, pins := list[0], list[1], list[2]
	crowded := *pins
	crowded.count = 400
	wide := *plates
	wide.count, wide.width = 2, 1
	for _, c := range []struct {
		f       *finArray
		a, b, u float64
		want    string
	}{
		{plates, 340, 300, 0, ""},
		{plates, 2400, 300, 0, "where they are known"},
		{&wide, 340, 300, 0, "outside 0.1 to 1e5 that Elenbaas (1942) measured"},
		{blown, 340, 300, 2, ""},
		{blown, 340, 300, 0, ""},
		{blown, 340, 300, 60, "outside 0.1 to 100"},
		{pins, 340, 300, 0, ""},
		{&crowded, 340, 300, 0, "within each other's boundary layers"},
	} {
		s := stamp(2, 0, 1)
		s.X[0], s.X[1], s.X[2] = c.a, c.b, c.u
		_, text := (&convecting{of: c.f, blown: true}).Caution(s)
		if (c.want == "") != (text == "") || !strings.Contains(text, c.want) {
			t.Errorf("%+v: %q, want %q", *c.f, text, c.want)
		}
	}
}

// Arrays as a case states them: blown plates and pins, with what the derivations show.
func TestArraysOfACase(t *testing.T) {
	m := read(t, "arrays.toml", heldAndBody(`
[thermal.resistance.channels]
between = ["hot", "cold"]
fins = { count = 20, thickness = "1 mm", height = "30 mm", length = "100 mm", width = "80 mm", material = "aluminium", speed = "3 m/s" }
[thermal.resistance.pins]
between = ["hot", "cold"]
fins = { count = 64, diameter = "4 mm", height = "30 mm", length = "100 mm", width = "100 mm", material = "aluminium", speed = "3 m/s" }
[thermal.resistance.spikes]
between = ["hot", "cold"]
fins = { count = 64, diameter = "4 mm", height = "30 mm", length = "100 mm", width = "100 mm", material = "aluminium" }
`))
	// channels: s = 3.158 mm, Re* = 3·0.003158/1.67e-5·0.03158 = 17.9; (6.32^−3 + 3.41^−3)^(−1/3) = 3.25, h = 27.9
	d := m.Derived("coefficient of channels at 50 °C against 26 °C")
	if math.Abs(d.SI-27.9) > 0.3 || !strings.Contains(d.Numbers, "Re* = 17.9") || !strings.Contains(d.Source, "Teertstra") {
		t.Errorf("%+v", d)
	}
	// a pin: Re = 3·0.004/1.69e-5 = 710, Nu = 0.3 + 0.62·26.6·0.89/1.14 = 13.2, h = 90
	if d = m.Derived("coefficient of pins at 50 °C against 26 °C"); math.Abs(d.SI-90) > 3 || !strings.Contains(d.Source, "Bernstein") {
		t.Errorf("%+v", d)
	}
	// still: Ra = 9.81/311·24·6.4e-8·0.706/(1.69e-5)² = 120, Nu = (0.6 + 0.32·2.22)² = 1.73, h = 11.7
	if d = m.Derived("coefficient of spikes at 50 °C against 26 °C"); math.Abs(d.SI-11.7) > 0.4 || !strings.Contains(d.Source, "by itself, Churchill and Chu") {
		t.Errorf("%+v", d)
	}
	_, s, e := element(t, m, "channels")
	if e.Gate != 1 || len(s.X) != 3 {
		t.Errorf("gate %d, %d variables: a stopped fan shuts the channels", e.Gate, len(s.X))
	}
	if _, _, e = element(t, m, "pins"); e.Gate != 0 {
		t.Error("a stopped fan shuts the pins")
	}
}
