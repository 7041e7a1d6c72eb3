package thermal

import (
	"math"
	"testing"

	"lagbook/network"
)

// A face in one block is a film, a radiation and a source: a flat box in the sun.
func TestSurface(t *testing.T) {
	m := read(t, "face.toml", heldAndBody(`
[thermal.surface.roof]
node = "body"
area = "2 m²"
film = { natural = "horizontal plate", face = "up", length = "1 m" }
air = "cold"
emissivity = 0.9
sky = "sky"
absorbs = { stairs = [["0 s", "800 W/m²"], ["10 s", "0 W/m²"]] }
absorptance = 0.4
[thermal.surface.windy]
node = "body"
area = "2 m²"
film = { forced = "plate", length = "2 m", speed = "3 m/s" }
air = "cold"
emissivity = 0.5
[thermal.surface.plain]
node = "body"
area = "2 m²"
film = "8 W/(m²·K)"
air = "cold"
`))
	law, s, e := element(t, m, "roof")
	x := []float64{330, 299.15, 263.15}
	at(law, s, x...)
	radiated := 5.670374419e-8 * 0.9 * 2 * (math.Pow(330, 4) - math.Pow(263.15, 4))
	_, h := (&film{correlation: correlationNamed("natural", "horizontal plate"), up: true, side: 1, area: 2, efficiency: 1, medium: medium{pressure: 101325}}).convect(330, 299.15, 0)
	if math.Abs(s.F[2]-radiated) > 1e-9*radiated || math.Abs(s.F[1]-2*h.v*30.85) > 1e-9*s.F[1] || math.Abs(s.F[0]+s.F[1]+s.F[2]) > 1e-12*radiated {
		t.Errorf("%v, radiated %g, by the film %g", s.F, radiated, 2*h.v*30.85)
	}
	jacobian(t, "roof", law, s, []float64{1e-4, 1e-4, 1e-4}, 1e-6, x...)
	if r := law.(network.Readable).Read(s, 0, make([]float64, 3)); math.Abs(r-h.v) > 1e-12 || len(e.Ports) != 3 {
		t.Errorf("coefficient %g, want %g", r, h.v)
	}
	sun := 0.0
	for _, in := range m.Net.Inputs() {
		if in.Name == "roof" {
			sun = m.Params.Wave[in.ID].At(1)
		}
	}
	if math.Abs(sun-800*0.4*2) > 1e-9 {
		t.Errorf("sun %g W", sun)
	}
	for _, word := range []string{"flow", "flow at cold", "flow at sky", "coefficient"} {
		if _, ok := m.Case.Showing("roof", word); !ok {
			t.Errorf("roof does not show %q", word)
		}
	}
	if d := m.Derived("sun absorbed by roof, for each W/m²"); d.SI != 0.8 {
		t.Errorf("%+v", d)
	}
	// of one air for both, with a drive
	law, s, e = element(t, m, "windy")
	jacobian(t, "windy", law, s, []float64{1e-4, 1e-4, 1e-5}, 1e-6, 330, 299.15, 3)
	if len(e.Ports) != 2 || e.Drives[0] != "speed of windy" || s.F[0] != -s.F[1] {
		t.Errorf("windy: %v %v", e.Ports, s.F)
	}
	// a coefficient alone stays linear
	for _, b := range m.Net.Branches() {
		if b.Name == "plain" && (b.Kind != network.ResistanceBranch || m.Params.G[b.Index] != 16) {
			t.Errorf("plain: %+v", b)
		}
	}
}

// Parts that stay linear: spreading and joints of the handbook.
func TestSpreadingAndJointsOfACase(t *testing.T) {
	m := read(t, "parts.toml", heldAndBody(`
[thermal.resistance.chip]
between = ["body", "cold"]
spreading = { source_area = "1 cm²", plate_area = "25 cm²", thickness = "5 mm", conductivity = "180 W/(m·K)", coefficient = "400 W/(m²·K)" }
[thermal.resistance.grease]
between = ["body", "cold"]
contact = { joint = "aluminium, silicone grease", area = "4 cm²" }
[thermal.resistance.sink]
between = ["body", "cold"]
fins = { count = 14, thickness = "1 mm", height = "24 mm", length = "180 mm", width = "120 mm", material = "aluminium" }
`))
	if d := m.Derived("resistance of chip"); math.Abs(d.SI-spread(1e-4, 25e-4, 5e-3, 180, 400, true)) > 1e-12 {
		t.Errorf("%+v", d)
	}
	// Incropera, Table 3.2: 0.07e-4 m²·K/W
	if d := m.Derived("resistance of grease"); math.Abs(d.SI-7e-6/4e-4) > 1e-12 {
		t.Errorf("%+v", d)
	}
	if d := m.Derived("efficiency of the fins of sink"); !(d.SI > 0.98 && d.SI < 1) {
		t.Errorf("%+v", d)
	}
	// 2.714 · 0.18 m/(9.81/306 · 14 · 0.18³ · 0.707/(1.63e-5)²)^(1/4) = 9.5 mm
	if d := m.Derived("spacing that carries most of sink at 40 °C against 26 °C"); math.Abs(d.SI-0.0095) > 0.0001 {
		t.Errorf("%+v", d)
	}
}
