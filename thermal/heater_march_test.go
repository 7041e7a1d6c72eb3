package thermal

import (
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// A controller on a body behind a sensor, with a target that jumps and a load that comes and goes, against its
// equations in short steps of Euler's method. There the integral takes each step as far as it does not push the
// sum beyond a limit: I is to be no more than the limit leaves, or than it was. Both limits, held, kept and left,
// are met in most draws.
func TestControllerAgainstShortSteps(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		draw := func(name string, lo, hi float64) float64 {
			return math.Round(rapid.Float64Range(lo, hi).Draw(rt, name)*1000) / 1000
		}
		gain, ti, lag := draw("gain", 2, 60), draw("integral time", 60, 1500), draw("lag", 0, 60)
		high, load, target := draw("high", 100, 500), draw("load", -80, 80), draw("second target", 25, 70)
		watch := "sensor"
		if lag < 5 {
			watch = "body" // what is heated is what is watched
		}
		m := read(t, "control", hotBody("20 °C", plainLoss+fmt.Sprintf(`
[thermal.node.sensor]
capacitance = "%g J/K"
[thermal.resistance.lead]
between     = ["sensor", "body"]
conductance = "0.1 W/K"
[thermal.source.load]
into  = "body"
drive = { step = { from = "0 W", to = "%g W", at = "50 min" } }
[thermal.heater.h]
into   = "body"
watch  = "%s"
target = { step = { from = "50 °C", to = "%g °C", at = "80 min" } }
pi     = { gain = "%g W/K", integral_time = "%g s" }
output = ["0 W", "%g W"]
`, 0.1*(lag+1), load, watch, target, gain, ti, high)))
		const until = 7200.0
		r := m.March(until, "body", "heat of h", "sensor")
		if n := len(r.Events()); n > 200 {
			rt.Fatalf("%d changes: %v", n, r.Events()[:10])
		}
		for _, at := range []float64{r.Max(1, 0, until).Y - high, -r.Min(1, 0, until).Y} {
			if at > 1e-6*high {
				rt.Fatalf("the heat passes a limit by %g W", at)
			}
		}

		const dt = 0.1
		body, sensor, integral := 20.0, 20.0, 0.0
		for k := 0; k < until/dt; k++ {
			at := (float64(k) + 0.5) * dt
			goal, push := 50.0, 0.0
			if at > 80*60 {
				goal = target
			}
			if at > 50*60 {
				push = load
			}
			seen := sensor
			if watch == "body" {
				seen = body
			}
			e := goal - seen
			u := math.Min(math.Max(gain*e+integral, 0), high)
			body += dt * (u + push - 2*(body-20) + 0.1*(sensor-body)) / 1000
			sensor += dt * (body - sensor) / (lag + 1)
			after := sensor
			if watch == "body" {
				after = body
			}
			e2 := goal - after
			if next := integral + dt*gain*e/ti; e > 0 {
				integral = math.Min(next, math.Max(integral, high-gain*e2))
			} else {
				integral = math.Max(next, math.Min(integral, -gain*e2))
			}
			if k%6000 == 5999 {
				at := float64(k+1) * dt
				if got := r.At(0, at) - 273.15; math.Abs(got-body) > 0.05 { // first order: dt times a slope of up to 1 K/s², and more where it turns
					rt.Fatalf("after %g s: %.6g °C, in short steps %.6g (%v)", at, got, body, r.Events())
				}
			}
		}
	})
}
