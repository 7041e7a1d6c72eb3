package material

import (
	"math"
	"regexp"
	"testing"
)

// Every record is complete and within what exists in nature, and every name finds its own material.
func TestHandbookIsSound(t *testing.T) {
	plain := regexp.MustCompile(`^[A-Za-z0-9 _.-]+$`)
	seen := map[string]string{}
	for _, m := range All() {
		if !plain.MatchString(m.Key) {
			t.Errorf("%q: a key holds letters, digits, spaces and _-. only", m.Key)
		}
		for _, name := range []string{m.Key, m.Name} {
			if other, ok := seen[name]; ok && other != m.Key {
				t.Errorf("%q names both %q and %q", name, other, m.Key)
			}
			seen[name] = m.Key
			if got, ok := Find(name); !ok || got.Key != m.Key {
				t.Errorf("Find(%q) = %q, %v", name, got.Key, ok)
			}
		}
		last := 0.0
		for _, p := range m.Points {
			if p.Temperature <= last || p.Density <= 0 || p.Density > 23000 || p.Conductivity <= 0 || p.Conductivity > 500 || p.Source == "" {
				t.Errorf("%s: %+v", m.Key, p)
			}
			last = p.Temperature
			if p.SpecificHeat != 0 && (p.SpecificHeat < 100 || p.SpecificHeat > 4300) || p.SpecificHeat == 0 && m.Key != "glass fibre" {
				t.Errorf("%s: specific heat %g", m.Key, p.SpecificHeat)
			}
			if (p.Viscosity > 0) != (m.Phase != Solid) {
				t.Errorf("%s: %v with viscosity %g", m.Key, m.Phase, p.Viscosity)
			}
		}
		if m.Emissivity.Low > m.Emissivity.High || m.Emissivity.High >= 1 || (m.Emissivity.High > 0) != (m.EmissivitySource != "") {
			t.Errorf("%s: emissivity %v from %q", m.Key, m.Emissivity, m.EmissivitySource)
		}
	}
	if n := len(All()); n != 75 {
		t.Errorf("%d materials, want 75: 68 solids, 5 liquids, water, air", n)
	}
}

func TestJointsAndSurfacesAreSound(t *testing.T) {
	if n := len(Joints()); n != 22 {
		t.Errorf("%d joints, want 22", n)
	}
	for _, j := range Joints() {
		if j.Resistance.Low <= 0 || j.Resistance.Low > j.Resistance.High || j.Resistance.High > 0.01 || j.Source == "" {
			t.Errorf("%+v", j)
		}
	}
	if n := len(Surfaces()); n != 16 {
		t.Errorf("%d surfaces, want 16", n)
	}
	for _, s := range Surfaces() {
		if s.Emissivity.Low <= 0 || s.Emissivity.Low > s.Emissivity.High || s.Emissivity.High >= 1 || s.Source == "" {
			t.Errorf("%+v", s)
		}
	}
}

// Handbook values a reader can look up again.
func TestValuesOfTheSources(t *testing.T) {
	for _, c := range []struct {
		name, source string
		want         [3]float64 // density, specific heat, conductivity
		status       Status
	}{
		{"copper", "Incropera, Fundamentals of Heat and Mass Transfer, Table A.1, 300 K", [3]float64{8933, 385, 401}, LookedUp},
		{"copper, pure", "the same by its full name", [3]float64{8933, 385, 401}, LookedUp},
		{"stainless steel 304", "Incropera, Table A.1, 300 K", [3]float64{7900, 477, 14.9}, LookedUp},
		{"aluminium 6061-T6", "data sheet, recalled", [3]float64{2700, 896, 167}, FromMemory},
		{"brick", "Kutz, Mechanical Engineers' Handbook, vol. 4, Table 3", [3]float64{1920, 835, 0.72}, LookedUp},
	} {
		m, ok := Find(c.name)
		p := m.Points[0]
		if got := [3]float64{p.Density, p.SpecificHeat, p.Conductivity}; !ok || got != c.want || p.Status != c.status {
			t.Errorf("%s (%s): %v %v, want %v %v", c.name, c.source, got, p.Status, c.want, c.status)
		}
	}
}

// Straight lines between the points, the nearest point beyond them.
func TestAt(t *testing.T) {
	w, _ := Find("water")
	p, inside := w.At(293.15)
	if p.Density != 998.2065 || p.SpecificHeat != 4184.19 || !inside {
		t.Errorf("water at 20 °C: %+v %v", p, inside)
	}
	p, inside = w.At(338.15)
	if want := (983.1953 + 977.764) / 2; math.Abs(p.Density-want) > 1e-9 || !inside {
		t.Errorf("water at 65 °C: %g, want %g", p.Density, want)
	}
	for _, T := range []float64{250, 400} {
		if _, inside := w.At(T); inside {
			t.Errorf("water at %g K counted as inside its points", T)
		}
	}
	oil, _ := Find("engine oil")
	if p, _ := oil.At(305); p.Status != FromMemory {
		t.Error("a value between a recalled point and one looked up counts as looked up")
	}
	cu, _ := Find("copper")
	if p, inside := cu.At(500); p.Conductivity != 401 || !inside {
		t.Error("a material with one point is constant")
	}
}

func TestSearch(t *testing.T) {
	for _, c := range []struct {
		words string
		first string
		n     int
	}{
		{"", "aluminium", 75},
		{"stainless", "stainless steel 316", 3},
		{"STEEL", "stainless steel 316", 6},
		{"plastic nylon", "nylon 6-6", 1},
		{"liquid", "engine oil", 6},
		{"oak", "hardwood", 1},
		{"water", "water", 1},
		{"unobtainium", "", 0},
	} {
		got := Search(c.words)
		if len(got) != c.n || c.n > 0 && got[0].Key != c.first {
			t.Errorf("Search(%q): %d materials %v, want %d, first %q", c.words, len(got), got, c.n, c.first)
		}
	}
	if n := len(SearchJoints("grease")); n != 2 {
		t.Errorf("%d joints with grease, want 2", n)
	}
	if n := len(SearchSurfaces("paint white")); n != 1 {
		t.Errorf("%d white paints, want 1", n)
	}
	if len(Categories()) < 8 || len(Keys()) != 75 {
		t.Error("categories or keys are missing")
	}
}

// Reading the tables is the only cost, paid once and only by who asks.
func BenchmarkReadHandbook(b *testing.B) {
	for b.Loop() {
		readHandbook()
	}
}
