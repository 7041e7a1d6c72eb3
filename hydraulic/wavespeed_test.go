package hydraulic

import (
	"math"
	"testing"
)

// Wave speeds worked out elsewhere from the formulas named.
func TestWaveSpeed(t *testing.T) {
	for _, c := range []struct {
		name, restraint              string
		bore, wall, modulus, poisson float64
		density, bulk                float64
		want                         float64
	}{
		{"steel main DN 600 of an exercise sheet, printed 1238.35 m/s", "", 0.6, 0.018, 200e9, 0, 1000, 2.06e9, 1238.3451696943025},
		{"Wylie and Streeter, thin wall, anchored upstream", anchoredUpstream, 0.5, 0.008, 207e9, 0.27, 998.2, 2.19e9, 1181.38583278602},
		{"anchored throughout", anchoredThroughout, 0.5, 0.008, 207e9, 0.27, 998.2, 2.19e9, 1166.2517564023196},
		{"expansion joints", expansionJoints, 0.5, 0.008, 207e9, 0.27, 998.2, 2.19e9, 1149.2066904031171},
		{"water of 20 °C in steel", "", 40, 1, 207e9, 0, 998.206092, 2193462398.8170347, 1242.286398054551},
		{"in ductile iron", "", 35, 1, 170e9, 0, 998.206092, 2193462398.8170347, 1230.3600673198873},
		{"in polyvinyl chloride", "", 21, 1, 3e9, 0, 998.206092, 2193462398.8170347, 366.55559098449277},
		{"in polyethylene", "", 11, 1, 1.1e9, 0, 998.206092, 2193462398.8170347, 309.53458211429967},
	} {
		stretch := giving(c.restraint, c.bore, c.wall, c.poisson) * c.bore / (c.modulus * c.wall)
		if got := waveSpeed(c.density, 1/c.bulk, stretch); math.Abs(got/c.want-1) > 1e-9 {
			t.Errorf("%s: %.12g, want %.12g m/s", c.name, got, c.want)
		}
	}
}

// The factors of a thick wall come to those of a thin one as the wall grows thinner, and
// a bore in a block of the same material gives way by 2·(1 + ν)/E (Lamé).
func TestGivingOfThickWalls(t *testing.T) {
	const nu, bore, wall = 0.3, 1, 1000.0
	for _, restraint := range []string{anchoredUpstream, anchoredThroughout, expansionJoints} {
		if got := giving(restraint, bore, wall, nu) * bore / wall; math.Abs(got-2*(1+nu)) > 1e-2 {
			t.Errorf("%s: %g, want %g", restraint, got, 2*(1+nu))
		}
	}
	if thick, thin := giving(anchoredThroughout, 24.99, 1, nu), giving(anchoredThroughout, 25, 1, nu); math.Abs(thick-thin) > 0.08 {
		t.Errorf("from %g to %g", thick, thin)
	}
}

// As many sections as the dispersion of a chain asks for: a line shut at one end and
// held at the other swings at 4n/π·sin(π/(4n)) times its true frequency a/(4l), so that
// with the accuracy of n sections at that frequency n come out.
func TestSections(t *testing.T) {
	s := pipeState{length: 100, speed: 1000}
	for _, n := range []float64{1, 2, 3, 5, 10, 20} {
		y := math.Pi / (4 * n)
		accuracy := y/math.Sin(y) - 1
		swing := 4 * n / math.Pi * math.Sin(y) * s.speed / (4 * s.length)
		if got := s.sections(accuracy*(1+1e-6), swing); got != n {
			t.Errorf("accuracy %.3g: %g sections, want %g", accuracy, got, n)
		}
	}
	if got := s.sections(0.01, 50); got != 65 { // π·50·100/(1000·0.2423) = 64.8
		t.Errorf("%g sections for 1 %% up to 50 Hz", got)
	}
}
