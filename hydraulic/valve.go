package hydraulic

import (
	"fmt"
	"math"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

var dimensionless = quantity.Dim{}

// What Kv and Cv are made of (IEC 60534-1): Kv is the flow of water in m³/h at 1 bar, Cv
// that in US gallons a minute at 1 psi; water of 1000 kg/m³.
const (
	waterDensity = 1000.0              // kg/m³
	gallonMinute = 3.785411784e-3 / 60 // m³/s
	cubicHour    = 1.0 / 3600          // m³/s
	oneBar       = 1e5                 // Pa
	onePsi       = 6894.757293168361   // Pa
)

// kvFields are the keys kv and cv.
func kvFields() (kv, cv casefile.Field) {
	kv = casefile.Positive("kv", flow, "Kv fully open: m³/h of water at 1 bar")
	kv.Also, kv.Unit = []quantity.Dim{{}}, "m³/h"
	cv = casefile.Positive("cv", dimensionless, "Cv fully open: US gallons of water a minute at 1 psi")
	cv.Also = []quantity.Dim{flow}
	return kv, cv
}

// valveGain returns what Kv or Cv at a path comes to as k of q = k·√(Δ/ρ), in m².
func valveGain(e *casefile.Element, path string) func(v casefile.Values) float64 {
	key, unit, drop := path+"kv", cubicHour, oneBar
	if !e.Has(key) {
		key, unit, drop = path+"cv", gallonMinute, onePsi
	}
	if e.DimOf(key) != dimensionless {
		unit = 1
	}
	slot := e.Num(key)
	return func(v casefile.Values) float64 { return v.Num[slot] * unit * math.Sqrt(waterDensity/drop) }
}

// valveField is the key valve of a restriction.
func valveField() casefile.Field {
	kv, cv := kvFields()
	share := casefile.Field{Name: "characteristic", HasMin: true}
	stroke := casefile.Field{Name: "stroke", HasMin: true, HasMax: true, Max: 1}
	close := casefile.Field{Name: "close", Type: casefile.Group, Help: "straight from open to shut",
		Fields: []casefile.Field{
			{Name: "at", Type: casefile.Number, Dim: duration, Required: true, HasMin: true, Help: "when it begins to shut"},
			needed(casefile.Positive("over", duration, "how long it takes")),
		}}
	return casefile.Field{Name: "valve", Type: casefile.Group, Help: "a valve by its Kv or Cv",
		OneOf: [][]string{{"kv", "cv"}, {"opening", "close", ""}},
		Fields: []casefile.Field{
			kv, cv,
			{Name: "characteristic", Type: casefile.Word, Words: trimWords, Against: &stroke, Second: &share,
				Help: "share of Kv at a stroke: a word, or points from [0, 0] on; linear unless stated"},
			{Name: "rangeability", Type: casefile.Number, HasMin: true, Min: 5, HasMax: true, Max: 1000, With: []string{"characteristic"}, Help: "of an equal-percentage characteristic; 50 unless stated"},
			{Name: "opening", Type: casefile.Wave, HasMin: true, HasMax: true, Max: 1, Drives: "opening", Help: "its stroke against time, 0 shut to 1 open; open unless stated"},
			close,
			{Name: "recovery", Type: casefile.Number, HasMin: true, MinOpen: true, HasMax: true, Max: 1, Help: "FL of liquids: with it, choking is checked"},
		}}
}

// buildValve adds a valve, gone while its stroke is 0.
func (r *passage) buildValve() (casefile.Setter, []casefile.Diagnostic) {
	e := r.e
	faults := r.liquid.needs(e, "valve", ofDensity)
	if e.Has("scale") {
		faults = append(faults, e.Fault("scale", "a scale on a valve", "its opening: the stroke goes by that", ""))
	}
	if e.Has("valve.rangeability") && e.Word("valve.characteristic") != trimWords[equalPercentage] {
		faults = append(faults, e.Fault("valve.rangeability", "a rangeability of another characteristic", `characteristic = "equal percentage" beside it`, ""))
	}
	if faults != nil {
		return nil, faults
	}
	id := r.b.Element(network.Shape{Name: e.FullName(), Ports: []network.NodeID{r.from, r.to}, Drives: []string{"opening of " + e.FullName()}, Joins: true, Gate: 1}, e.Ref)
	e.Driven("opening", id, 0)
	gain, liquid, trim := valveGain(e, "valve."), r.liquid, pointSlots(e, characteristicKey+".points")
	ends := e.Names("between")
	first, second := elevationOf(r.c, ends[0]), elevationOf(r.c, ends[1])
	return func(v casefile.Values, p *network.Params) error {
		l, err := liquid.liquid(v)
		if err != nil {
			return err
		}
		law, ok := p.Law[id].(*valveLaw)
		if !ok {
			law = &valveLaw{}
			p.Law[id] = law
		}
		a := gain(v)
		law.open = rooted(a/math.Sqrt(l.density), a, l.viscosity)
		law.choke = r.choke(v, &l, first(v), second(v))
		if p.Drive[id][0], err = r.opening(v); err != nil {
			return err
		}
		return setTrim(e, trim, v, &law.trim)
	}, nil
}

// choke sets the drop at which the valve chokes; without a recovery that of a valve which
// recovers much, for a caution.
func (r *passage) choke(v casefile.Values, l *liquid, first, second float64) choke {
	c := choke{recovery: lowRecovery, first: l.offset - l.weight()*first, second: l.offset - l.weight()*second}
	if r.e.Has("valve.recovery") {
		fl := v.Num[r.e.Num("valve.recovery")]
		c.checked, c.recovery = true, fl*fl
	}
	critical := 0.0
	if r.liquid.fluid != nil && r.liquid.fluid.Key == "water" {
		critical = criticalOfWater
	}
	c.least = criticalRatio(l.vapour, critical) * l.vapour
	return c
}

// criticalOfWater is the critical pressure of water (IAPWS, release on the values of
// critical temperature, pressure and density, 1992), Pa.
const criticalOfWater = 22.064e6

// opening is the stroke against time.
func (r *passage) opening(v casefile.Values) (laplace.Waveform, error) {
	e := r.e
	switch {
	case e.Has("valve.opening"):
		return v.Wave[e.Wave("valve.opening")], nil
	case e.Has("valve.close"):
		at := v.Num[e.Num("valve.close.at")]
		w, err := laplace.Points([][2]float64{{at, 1}, {at + v.Num[e.Num("valve.close.over")], 0}})
		if err != nil {
			return w, e.Fault("valve.close", err.Error(), "", "")
		}
		return w.WithBefore(1), nil
	}
	return laplace.Constant(1), nil
}

const characteristicKey = "valve.characteristic"

// setTrim writes the characteristic of a valve.
func setTrim(e *casefile.Element, points [][2]casefile.Slot, v casefile.Values, to *characteristic) error {
	for i, word := range trimWords {
		if e.Word(characteristicKey) == word {
			to.trim = trim(i)
		}
	}
	if to.spread = usualRangeability; e.Has("valve.rangeability") {
		to.spread = v.Num[e.Num("valve.rangeability")]
	}
	n := len(points)
	if n == 0 {
		return nil
	}
	if to.trim = pointsTrim; len(to.points) != n {
		to.points = make([][2]float64, n)
	}
	for i, p := range points {
		to.points[i] = [2]float64{v.Num[p[0]], v.Num[p[1]]}
		if i > 0 && to.points[i][1] < to.points[i-1][1] {
			return e.Fault(fmt.Sprintf("%s.points[%d].second", characteristicKey, i), "a share that falls as the valve opens", "shares that do not fall", "")
		}
	}
	if n < 2 || to.points[0] != [2]float64{} || to.points[n-1][0] != 1 {
		return e.Fault(characteristicKey, "points that do not run from shut to open", "the first [0, 0] and the last at a stroke of 1", "")
	}
	return nil
}

// deriveValve shows what Kv comes to and whether choking is checked.
func deriveValve(e *casefile.Element, s *liquidSlots, l *liquid, v casefile.Values) []casefile.Derivation {
	if l.density == 0 {
		return nil
	}
	a := valveGain(e, "valve.")(v)
	key := "kv"
	if !e.Has("valve.kv") {
		key = "cv"
	}
	list := []casefile.Derivation{flowAtOneBar(e, key+"·√(ρ₀/ρ)", fmt.Sprintf("%s · √(1000/%.6g)", e.Text("valve."+key), l.density), a/math.Sqrt(l.density))}
	if !e.Has("valve.recovery") {
		list[0].Numbers += ", choking not checked"
		return list
	}
	if s.fluid == nil || s.fluid.Key != "water" {
		return list // FF is 0.96 where the critical pressure is not known
	}
	return append(list, casefile.Derivation{Quantity: "critical pressure ratio FF of " + e.Name, Formula: "0.96 − 0.28·√(pv/pc)",
		Numbers: fmt.Sprintf("0.96 − 0.28·√(%.6g kPa/%.6g kPa)", l.vapour/1e3, criticalOfWater/1e3), Source: "IEC 60534-2-1", SI: criticalRatio(l.vapour, criticalOfWater)})
}
