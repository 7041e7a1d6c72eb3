package fluid

import (
	_ "embed"
	"errors"
	"math"
	"regexp"
	"strconv"
	"strings"
	"testing"
)

// valuesTSV holds values computed or looked up elsewhere, each with its source.
//
//go:embed testdata/values.tsv
var valuesTSV string

// within is how far a property may lie from the value of another formulation, relative.
var within = map[string]float64{
	"water density":              6e-5, // handbook tables are of saturated water, 4.6e-5 lighter than under an atmosphere; formulations differ by 1e-5
	"water viscosity":            4e-3, // formulation 0.1 %; handbook tables 0.3 %
	"water kinematic viscosity":  1.5e-3,
	"water bulk modulus":         1e-4, // the same speed of sound, the density of another formulation
	"water vapour pressure":      6e-4, // IAPWS-IF97 and Wagner-Pruß; handbook tables to 4 digits
	"oil VG 32 bulk modulus":     1e-9,
	"oil VG 46 bulk modulus":     1e-9,
	"diesel bulk modulus":        1e-3, // printed to four digits here
	"diesel density":             1e-9,
	"diesel kinematic viscosity": 1e-9,
}

func TestValuesOfOtherSources(t *testing.T) {
	n := 0
	for line := range strings.Lines(valuesTSV) {
		if line[0] == '#' {
			continue
		}
		f := strings.Split(strings.TrimSuffix(line, "\n"), "\t")
		T, want := parse(t, f[1]), parse(t, f[3])
		liquid, ok := Find(f[0])
		if !ok {
			t.Fatalf("no fluid %q", f[0])
		}
		p, err := liquid.At(T)
		if err != nil {
			continue // beyond 100 °C
		}
		got := map[string]float64{"density": p.Density, "viscosity": p.Viscosity, "kinematic viscosity": p.Viscosity / p.Density,
			"bulk modulus": p.BulkModulus, "vapour pressure": p.VapourPressure}[f[2]]
		tol, ok := within[f[0]+" "+f[2]]
		if !ok {
			tol = 1e-8 // the same law through the same points
		}
		if !(math.Abs(got-want) <= tol*want) {
			t.Errorf("%s at %s K, %s: %.9g, want %.9g of %s (off by %.2g)", f[0], f[1], f[2], got, want, f[4], got/want-1)
		}
		n++
	}
	if n < 100 {
		t.Errorf("%d values compared", n)
	}
}

func parse(t *testing.T, s string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(s, 64)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

// Every record is complete, its range is sensible, and each property moves one way.
func TestHandbookIsSound(t *testing.T) {
	plain := regexp.MustCompile(`^[A-Za-z0-9 _.-]+$`)
	seen := map[string]bool{}
	for _, f := range All() {
		if !plain.MatchString(f.Key) || seen[f.Key] || f.Name == "" || f.Category == "" {
			t.Errorf("%q: key, name or category", f.Key)
		}
		seen[f.Key] = true
		s := f.Sources
		if s.Density.Text == "" || s.Viscosity.Text == "" || s.BulkModulus.Text == "" {
			t.Errorf("%s: a property without a source", f.Key)
		}
		last := Properties{Density: 2000, Viscosity: 1e9}
		for k := range 101 {
			p, err := f.At(f.Low + (f.High-f.Low)*float64(k)/100)
			if err != nil {
				t.Fatal(err)
			}
			anomaly := f.Key == "water" && k <= 4 // water is densest at 4 °C
			if !(p.Density > 700 && (p.Density < last.Density || anomaly)) || !(p.Viscosity > 1e-4 && p.Viscosity < last.Viscosity) || !(p.BulkModulus > 8e8 && p.BulkModulus < 4e9) {
				t.Errorf("%s, point %d: %+v after %+v", f.Key, k, p, last)
			}
			if (p.VapourPressure > 0) != (s.VapourPressure.Text != "") || p.VapourPressure < last.VapourPressure {
				t.Errorf("%s, point %d: vapour pressure %g, source %q", f.Key, k, p.VapourPressure, s.VapourPressure.Text)
			}
			last = p
		}
	}
	if len(All()) != 15 || len(Keys()) != 15 {
		t.Errorf("%d fluids", len(All()))
	}
}

func TestBeyondTheRange(t *testing.T) {
	f, _ := Find("water")
	for _, T := range []float64{272, 374, math.NaN(), math.Inf(1)} {
		_, err := f.At(T)
		var out *RangeError
		if !errors.As(err, &out) || out.High != freezing+100 {
			t.Errorf("water at %g K: %v", T, err)
		}
	}
	_, err := f.At(freezing + 120)
	if err == nil || err.Error() != "water at 120 °C: its data reach from 0 to 100 °C" {
		t.Errorf("says %v", err)
	}
}

func TestSearch(t *testing.T) {
	for words, want := range map[string]int{"": 15, "OIL vg": 8, "vg 46": 2, "water": 3, "fuel": 4, "mercury": 0} {
		if got := len(Search(words)); got != want {
			t.Errorf("Search(%q): %d, want %d", words, got, want)
		}
	}
	if _, ok := Find("Water"); ok {
		t.Error("keys are found letter for letter")
	}
}

// Oil with one per cent of air by volume, 1.4 GPa without it: at 1 bar the air alone
// gives way, K = n·p/Gas nearly (isothermal 10.06 MPa, worked out by hand from
// 1/K = 1/1.4e9 + 0.01/101325), and at 200 bar it hardly counts.
func TestMixture(t *testing.T) {
	m := Mixture{Bulk: 1.4e9, Gas: 0.01, Atmosphere: 101325, Exponent: 1}
	if _, dv := m.Taken(101325); math.Abs(1/dv-10.0596985e6) > 1e2 {
		t.Errorf("K = %g at the atmosphere", 1/dv)
	}
	if _, dv := m.Taken(200e5); 1/dv < 1.35e9 || 1/dv > 1.4e9 {
		t.Errorf("K = %g at 200 bar", 1/dv)
	}
	for _, n := range []float64{1, 1.4} {
		m.Exponent = n
		for _, p := range []float64{-1e6, 0, 500, 1013, 1.1e3, 5e4, 101325, 1e6, 3e7} {
			h := 1e-4 * (math.Abs(p) + 1e3)
			if p == 1013 {
				continue // beside the kink of the slope
			}
			up, _ := m.Taken(p + h)
			down, _ := m.Taken(p - h)
			if _, dv := m.Taken(p); math.Abs((up-down)/(2*h)-dv) > 1e-4*dv {
				t.Errorf("n = %g, p = %g: slope %g, by differences %g", n, p, dv, (up-down)/(2*h))
			}
		}
	}
	if v, _ := m.Taken(101325); v != 0 {
		t.Errorf("%g taken up at the atmosphere", v)
	}
}
