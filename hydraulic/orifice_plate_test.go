package hydraulic

import (
	"math"
	"testing"
)

// Coefficients of discharge worked out from ISO 5167-2:2003 equation (4) in arithmetic of
// 40 digits (equation from memory: these check the arithmetic, not a printed table), D = 100 mm.
func TestReaderHarrisGallagher(t *testing.T) {
	reynolds := []float64{5e3, 1e4, 1e5, 1e6, 1e7}
	for _, c := range []struct {
		taps tapping
		beta float64
		want [5]float64
	}{
		{cornerTaps, 0.5, [5]float64{0.6275734975951922, 0.6185802697835102, 0.6068731632649673, 0.6037770890602403, 0.6026791303613187}},
		{cornerTaps, 0.7, [5]float64{0.6588245141236364, 0.6371528427868772, 0.6099541984068919, 0.6022950877143188, 0.599226511432943}},
		{bothBores, 0.5, [5]float64{0.6264073608421881, 0.6176378653472976, 0.6061848039616716, 0.6031289931971184, 0.6020374158234204}},
		{bothBores, 0.7, [5]float64{0.6628104776083099, 0.642526706102951, 0.616904003912273, 0.6094946632244544, 0.6064656728211003}},
		{flangeTaps, 0.5, [5]float64{0.6265835996782448, 0.6177391667177786, 0.6062010148156118, 0.6031317181130178, 0.6020380033621804}},
		{flangeTaps, 0.7, [5]float64{0.6604940809343415, 0.6397454427645254, 0.6135948905285155, 0.6061018912463483, 0.6030596418493267}},
	} {
		r := newReader5167(c.beta, 0.1, c.taps)
		for i, re := range reynolds {
			got, slope := r.at(re)
			if math.Abs(got-c.want[i]) > 1e-12 {
				t.Errorf("%s, β = %v, Re = %v: C = %.15g, want %.15g", tapWords[c.taps], c.beta, re, got, c.want[i])
			}
			a, _ := r.at(re * (1 + 1e-5))
			b, _ := r.at(re * (1 - 1e-5))
			if q := (a - b) / (2e-5 * re); math.Abs(q-slope) > 1e-6*math.Abs(slope) {
				t.Errorf("%s, β = %v, Re = %v: dC/dRe = %v, by differences %v", tapWords[c.taps], c.beta, re, slope, q)
			}
		}
	}
}

// A plate loses what its drop at the taps less the recovery is: q from the equation of
// the standard with the C and the drop that belong to q.
func TestPlateLosesForGood(t *testing.T) {
	for _, d := range []float64{2e3, 2e4, 5e5} {
		p := &plate{bore: 0.06, pipe: 0.1, density: 998, viscosity: 1e-3, taps: cornerTaps}
		p.prepare()
		q, _, _ := p.Flow(d, 0)
		c, _ := p.c.at(4 * 998 * q / (math.Pi * 0.1 * 1e-3))
		const beta = 0.6
		b4 := math.Pow(beta, 4)
		taps := math.Pow(q*math.Sqrt(1-b4)/(c*math.Pi/4*0.06*0.06), 2) * 998 / 2
		s, u := math.Sqrt(1-b4*(1-c*c)), c*beta*beta
		if lost := taps * (s - u) / (s + u); math.Abs(lost/d-1) > 1e-6 {
			t.Errorf("%v Pa lost pass %v m³/s, which loses %v Pa", d, q, lost)
		}
	}
}

func TestPlates(t *testing.T) {
	for _, p := range []*plate{
		{bore: 0.06, pipe: 0.1, density: 998, viscosity: 1e-3, taps: cornerTaps},
		{bore: 0.03, pipe: 0.05, density: 870, viscosity: 0.04, taps: flangeTaps},
		{bore: 0.2, pipe: 0.3, density: 998, viscosity: 1e-3, taps: bothBores},
	} {
		p.prepare()
		flowLaw(t, tapWords[p.taps], p)
	}
}

func TestPlateOutOfRange(t *testing.T) {
	for _, c := range []struct {
		bore, pipe, drop float64
		warns            bool
	}{{0.06, 0.1, 1e4, false}, {0.01, 0.05, 1e4, true}, {0.03, 0.04, 1e4, true}, {0.08, 0.1, 1e4, true}, {0.06, 0.1, 5, true}} {
		p := &plate{bore: c.bore, pipe: c.pipe, density: 998, viscosity: 1e-3}
		p.prepare()
		if code, _ := p.Caution(c.drop, 0); (code != "") != c.warns {
			t.Errorf("%v: %q", c, code)
		}
	}
}
