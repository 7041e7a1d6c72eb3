package hydraulic

import (
	"fmt"
	"math"
	"math/cmplx"
	"sort"
	"strings"
	"testing"

	"lagbook/network/casefile/casetest"
)

// shutLine is a line of 100 m held at one end and shut at the other: a = 1000 m/s, ρ =
// 1000 kg/m³, bore of 1 cm². Its liquid has next to no viscosity, and at 1 cm/s next to no friction:
// 3e-4 of ρ·a·v.
func shutLine(lumps int, more string) string {
	return fmt.Sprintf(`
[hydraulic]
density = "1000 kg/m³"
viscosity = "1e-9 Pa·s"
[hydraulic.node.tank]
held = "0 bar"
[hydraulic.node.end]
[hydraulic.line.pipe]
between = ["tank", "end"]
pipe = { length = "100 m", bore = "0.011283791670955126 m", wave_speed = "1000 m/s", lumps = %d }
%s`, lumps, more)
}

// The swings of a line of n sections, held at one end and shut at the other, are those of
// a discrete chain, ω = 2·a·n/l·sin((2k−1)·π/(4n)), and come to the exact (2k−1)·π·a/(2·l).
func TestSwingsOfALine(t *testing.T) {
	for _, n := range []int{1, 2, 3, 5, 10, 20} {
		m := casetest.Read(t, "line.toml", shutLine(n, ""), Vocabulary()...)
		lin, err := m.Net.Linearise(m.Params, m.Begin())
		if err != nil {
			t.Fatal(err)
		}
		r, err := lin.Net.Reduce(lin.Params, nil)
		if err != nil {
			t.Fatal(err)
		}
		var swings []float64
		for _, p := range r.System.Poles() {
			if imag(p.P) > 0 {
				swings = append(swings, cmplx.Abs(p.P))
			}
		}
		sort.Float64s(swings)
		if len(swings) != n {
			t.Fatalf("%d swings of %d sections", len(swings), n)
		}
		for k := range swings {
			nearly(t, fmt.Sprintf("swing %d of %d sections", k+1, n), swings[k], 2*1000*float64(n)/100*math.Sin(float64(2*k+1)*math.Pi/float64(4*n)), 1e-9)
		}
		// first swing against the exact one, as published for the ladder of inertances and halved compliances
		if want, ok := map[int]float64{1: 0.9003163161571061, 2: 0.9744953584044327, 5: 0.9958927352435614, 10: 0.9989722332485385}[n]; ok {
			nearly(t, "ratio to the exact swing", swings[0]/(math.Pi/2*1000/100), want, 1e-9)
		}
	}
}

// A stop at once overshoots ρ·a·ΔV in a ladder with half a section's compliance at the
// valve by the same 47 % however many sections it has, as the warning says.
func TestSuddenStopOfALadder(t *testing.T) {
	for _, n := range []int{5, 20} {
		m := casetest.Read(t, "stop.toml", shutLine(n, `
[hydraulic.source.draw]
out_of = "end"
drive = { step = { from = "1e-6 m³/s", to = "0 m³/s", at = "0 s" } }
`), Vocabulary()...)
		until := 2 * 100 / 1000.0 // the wave is back
		rise := m.Run(until, "end").Max(0, 0, until).Y
		if over := rise / (1000 * 1000 * 0.01); math.Abs(over-1.47) > 0.02 {
			t.Errorf("%d sections: %.4g times ρ·a·ΔV", n, over)
		}
	}
}

// A stop along a straight line in four round trips: ρ·l·ΔV/τ in a rigid column, twice
// that in the line with its waves (Michaud), as the warning says; sections round the corners
// off by 2 %.
func TestSlowStop(t *testing.T) {
	stop := `
[hydraulic.source.draw]
out_of = "end"
drive = { points = [["0 s", "1e-6 m³/s"], ["0.8 s", "0 m³/s"]] }
`
	const rigid = 1000 * 100 * 0.01 / 0.8
	m := casetest.Read(t, "stop.toml", shutLine(20, stop), Vocabulary()...)
	if rise := m.Run(0.8, "end").Max(0, 0, 0.8).Y; math.Abs(rise/(2*rigid)-1) > 0.03 {
		t.Errorf("%.5g Pa with waves, want %.5g", rise, 2*rigid)
	}
	m = casetest.Read(t, "stop.toml", strings.Replace(shutLine(1, stop), "wave_speed = \"1000 m/s\", lumps = 1", "rigid = true", 1), Vocabulary()...)
	nearly(t, "rise of a rigid column", m.Run(0.8, "end").At(0, 0.4), rigid, 1e-3)
}

// headrace is a tunnel of 10 km by 5 m from a lake to a surge tank, whose turbine is
// shut off.
func headrace(flow, roughness string) string {
	return `
[hydraulic]
density = "1000 kg/m³"
viscosity = "1e-9 Pa·s"
[hydraulic.node.lake]
held = { level = "15 m" }
[hydraulic.node.surge]
tank = { area = "300 m²", floor = "0 m" }
[hydraulic.line.tunnel]
between = ["lake", "surge"]
pipe = { length = "10 km", bore = "5 m", rigid = true, roughness = "` + roughness + `" }
[hydraulic.source.turbine]
out_of = "surge"
drive = { step = { from = "` + flow + `", to = "0 m³/s", at = "0 s" } }
`
}

// Surge in a tank at the end of a headrace tunnel after 30 m³/s are shut off (exercise
// sheet, with g = 9.81 m/s²): without friction Z = V·√(L·A/(g·As)), printed 12.48 m, in
// swings of T = 2π·√(L·As/(g·A)); with f = 0.016, which a roughness of 2.0616 mm gives,
// 10.0815 m by the first integral of the exact equation.
func TestSurgeTank(t *testing.T) {
	area := math.Pi / 4 * 25
	surge := math.Sqrt(1e4 * area / (9.80665 * 300)) // for 1 m/s
	period := 2 * math.Pi * math.Sqrt(1e4*300/(9.80665*area))

	m := casetest.Read(t, "surge.toml", headrace("0.03 m³/s", "0 mm"), Vocabulary()...)
	top := m.Run(period/2, "level of surge").Max(0, 0, period/2)
	before := m.At(m.Begin(), "level of surge")[0]
	nearly(t, "surge", top.Y-15, surge*0.03/area, 1e-3) // a trace of friction is left at a thousandth of the flow
	nearly(t, "time of the surge", top.T, period/4, 1e-3)
	nearly(t, "level before", before, 15, 1e-5)
	if printed := (top.Y - 15) * 1000 * math.Sqrt(9.80665/9.81); math.Abs(printed-12.48) > 0.015 {
		t.Errorf("%.5g m, printed 12.48 m", printed)
	}

	rough := 3.7 * math.Pow(10, -1/(2*math.Sqrt(0.016))) * 5
	m = casetest.Read(t, "surge.toml", headrace("30 m³/s", fmt.Sprintf("%.9g m", rough)), Vocabulary()...)
	top = m.Run(period/2, "level of surge").Max(0, 0, period/2)
	nearly(t, "surge with friction", top.Y-15, 10.081491976746634, 3e-4) // that much by g
}
