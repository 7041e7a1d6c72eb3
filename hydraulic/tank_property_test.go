package hydraulic

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// A row of tanks of any shape, each joined to the next by a throttle of any kind, named
// in either order, that drains into the open; the last also through an outfall.
type row struct {
	shape, throttle []string
	level           []float64
	turned          []bool
}

func drawRow(t *rapid.T) row {
	shapes := []string{`area = "1.5 m²"`, `area = "0.7 m²", overflow = "2.2 m", top = "2.5 m"`, `shape = "cone", diameter = "2 m", bottom = "0.5 m", height = "3 m"`,
		`shape = "horizontal cylinder", diameter = "2.5 m", length = "1 m"`, `shape = "sphere", diameter = "2.5 m"`, `points = [["0 m", "0.5 m²"], ["1 m", "1 m²"], ["3 m", "1 m²"]]`,
		`points = [["0 m", "0 L"], ["1 m", "800 L"], ["3 m", "3 m³"]]`}
	throttles := []string{`orifice = { bore = "40 mm", coefficient = 0.62 }`, `fitting = { bore = "50 mm", loss = 3 }`, `rated = { flow = "5 L/s", drop = "0.1 bar", power = 1.8 }`,
		`valve = { kv = 20, recovery = 0.9 }`, `resistance = "2 MPa·s/m³"`, `orifice = { bore = "40 mm", pipe_bore = "60 mm", taps = "corner" }`}
	var r row
	for i := range rapid.IntRange(2, 4).Draw(t, "tanks") {
		r.shape = append(r.shape, rapid.SampledFrom(shapes).Draw(t, fmt.Sprint("shape", i)))
		r.throttle = append(r.throttle, rapid.SampledFrom(throttles).Draw(t, fmt.Sprint("throttle", i)))
		r.level = append(r.level, rapid.Float64Range(0.3, 2.1).Draw(t, fmt.Sprint("level", i)))
		r.turned = append(r.turned, rapid.Bool().Draw(t, fmt.Sprint("turned", i)))
	}
	return r
}

func (r row) text(turn bool) string {
	var b strings.Builder
	b.WriteString(water)
	for i := range r.shape {
		fmt.Fprintf(&b, "[hydraulic.node.t%d]\ntank = { %s }\nstart = { level = \"%.17g m\" }\n", i, r.shape[i], r.level[i])
		ends := []string{fmt.Sprintf("t%d", i), fmt.Sprintf("t%d", i+1)}
		if turn && r.turned[i] {
			ends[0], ends[1] = ends[1], ends[0]
		}
		fmt.Fprintf(&b, "[hydraulic.restriction.r%d]\nbetween = [\"%s\", \"%s\"]\n%s\n", i, ends[0], ends[1], r.throttle[i])
	}
	fmt.Fprintf(&b, "[hydraulic.node.t%d]\nelevation = \"-0.5 m\"\nheld = \"0 bar\"\n", len(r.shape))
	return b.String()
}

// highest is the highest of some levels.
func (r row) highest(level []float64) float64 {
	most := 0.0
	for _, h := range level {
		most = math.Max(most, h)
	}
	return most
}

// Which end of a throttle is named first changes nothing but the sign of its flow;
// volumes balance; no level rises above the highest there was.
func TestRowsOfTanks(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		r := drawRow(rt)
		n := len(r.shape)
		names := []string{"flow of r0"}
		for i := range n {
			names = append(names, fmt.Sprintf("level of t%d", i), fmt.Sprintf("stored of t%d", i))
		}
		const until = 400
		a, b := read(t, "row", r.text(false)).March(until, names...), read(t, "row", r.text(true)).March(until, names...)
		if a.Balance() > 1e-6 || b.Balance() > 1e-6 {
			rt.Fatalf("balances %v and %v", a.Balance(), b.Balance())
		}
		sign := 1.0
		if r.turned[0] {
			sign = -1
		}
		for _, at := range []float64{0, 1, 10, 60, until} {
			if p, q := a.At(0, at), sign*b.At(0, at); math.Abs(p-q) > 1e-5*math.Abs(p)+1e-7 {
				rt.Fatalf("flow at %v s: %v, turned %v", at, p, q)
			}
			for i := range n {
				if p, q := a.At(1+2*i, at), b.At(1+2*i, at); math.Abs(p-q) > 1e-5 {
					rt.Fatalf("level of t%d at %v s: %v, turned %v", i, at, p, q)
				}
				if h := a.At(1+2*i, at); h > r.highest(r.level)+1e-6 {
					rt.Fatalf("level of t%d at %v s is %v, above all of %v", i, at, h, r.level)
				}
			}
		}
	})
}
