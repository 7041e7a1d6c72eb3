package thermal

import (
	"fmt"
	"slices"
	"strings"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
	"lagbook/thermal/material"
)

var (
	speedDim   = quantity.Dim{0, 1, -1, 0, 0}
	irradiance = quantity.Dim{1, 0, -3, 0, 0}
)

// filmField is film = {…}: a coefficient as it is stated, or by correlation.
func filmField() casefile.Field {
	return casefile.Field{Name: "film", Type: casefile.Group, Help: "convection at a surface: 1/(h·A·η), h stated or by correlation; the surface is the first-named node",
		OneOf: [][]string{{"coefficient", "natural", "forced"}},
		Fields: append([]casefile.Field{
			casefile.Positive("coefficient", coefficient, "h"),
			required(areaField()),
			efficiencyField(),
		}, shapeFields()...)}
}

// Between these sizes correlations are reckoned with: no surface is beyond, and no number of theirs
// leaves double precision.
const (
	leastSize, mostSize = 1e-6, 1e3 // m
	mostArea            = 1e7       // m²
	mostSpeed           = 1e3       // m/s
)

// sizeField is a length of a surface.
func sizeField(name, help string) casefile.Field {
	return casefile.Field{Name: name, Type: casefile.Number, Dim: length, HasMin: true, Min: leastSize, HasMax: true, Max: mostSize, Help: help}
}

func areaField() casefile.Field {
	f := casefile.Positive("area", area, "A")
	f.HasMax, f.Max = true, mostArea
	return f
}

func efficiencyField() casefile.Field {
	return casefile.Field{Name: "efficiency", Type: casefile.Number, Dim: dimless, HasMin: true, MinOpen: true, HasMax: true, Max: 1, Help: "η of a finned surface; 1 unless stated"}
}

// shapeFields are the keys of a correlation; shapeFaults tells which of them a surface
// needs.
func shapeFields() []casefile.Field {
	return []casefile.Field{
		{Name: "natural", Type: casefile.Word, Words: words("natural"), Structural: true, Help: "convection that the difference of temperature itself drives"},
		{Name: "forced", Type: casefile.Word, Words: words("forced"), Structural: true, Help: "convection of a fluid that is blown or pumped"},
		{Name: "face", Type: casefile.Word, Words: []string{"up", "down"}, Structural: true, Help: "which way the surface of the first-named node looks: of a horizontal plate, up unless stated, or of the lower (up) or upper side of a flat layer of air"},
		sizeField("height", "H of an upright surface"),
		sizeField("length", "of a forced plate or tube along the flow; of a horizontal plate one side, the other follows from the area"),
		sizeField("diameter", "D; of a duct 4·cross-section/perimeter; of a round horizontal plate"),
		sizeField("gap", "width of the layer of air in an enclosure"),
		speedField("of the fluid, undisturbed along a plate and across a cylinder, the mean in a tube; natural convection beside it, or when it stops, is a part of its own"),
		{Name: "fluid", Type: casefile.Name, Structural: true, Help: "air unless stated, or a liquid of the handbook"},
	}
}

func speedField(help string) casefile.Field {
	return casefile.Field{Name: "speed", Type: casefile.Wave, Dim: speedDim, HasMin: true, HasMax: true, Max: mostSpeed, Drives: "speed", Help: help}
}

// filmReadings is what can be read off a film.
func filmReadings() []casefile.Reading {
	return []casefile.Reading{{Word: "coefficient", Dim: coefficient, Help: "h at this moment"}}
}

// A filmPlan is a film as a case states it.
type filmPlan struct {
	of                          *correlation // nil: coefficient stated
	points                      []material.Point
	pressure                    func(v casefile.Values) float64
	height, side, diameter, gap number
	area, efficiency, stated    number
	up, blown                   bool
	speed                       casefile.WaveSlot
	fluid                       string
}

// planFilm reads the keys of a film; prefix leads to them ("film."), area to A.
func planFilm(e *casefile.Element, c *casefile.Case, prefix, area string) (*filmPlan, []casefile.Diagnostic) {
	p := &filmPlan{pressure: airPressure(c), fluid: "air", area: typed(e, area), efficiency: typedOr(e, prefix+"efficiency", 1, "1")}
	way := "natural"
	if e.Has(prefix + "forced") {
		way = "forced"
	}
	if p.of = correlationOf(e, prefix, way); p.of == nil {
		p.stated = typed(e, prefix+"coefficient")
		return p, nil
	}
	if faults := shapeFaults(e, prefix, p.of); faults != nil {
		return nil, faults
	}
	for _, x := range []struct {
		key string
		to  *number
	}{{"height", &p.height}, {"length", &p.side}, {"diameter", &p.diameter}, {"gap", &p.gap}} {
		*x.to = typedOr(e, prefix+x.key, 0, "")
	}
	p.up = e.Word(prefix+"face") != "down"
	if p.blown = e.Has(prefix + "speed"); p.blown {
		p.speed = e.Wave(prefix + "speed")
	}
	return p, p.takeFluid(e, c, prefix+"fluid")
}

// correlationOf finds the one stated: of an enclosure there are two, upright and flat.
func correlationOf(e *casefile.Element, prefix, way string) *correlation {
	word := e.Word(prefix + way)
	for i := range correlations {
		x := &correlations[i]
		if x.way != way || x.word != word {
			continue
		}
		if flat := slices.Contains(x.may, "face"); word == "enclosure" && flat != (e.Has(prefix+"face") && !e.Has(prefix+"height")) {
			continue
		}
		return x
	}
	return nil
}

// shapeKeys are the keys that some correlations take and others do not.
var shapeKeys = []string{"face", "height", "length", "diameter", "gap", "speed", "fluid"}

// shapeFaults finds keys that a surface needs and those that say nothing of it.
func shapeFaults(e *casefile.Element, prefix string, x *correlation) (faults []casefile.Diagnostic) {
	at := prefix + x.way
	missing := func(key string, hint string) {
		d := e.Fault(at, fmt.Sprintf("%s = %q without %s", x.way, x.word, key), "", "")
		d.Code, d.Hint = "missing-key", hint
		faults = append(faults, d)
	}
	for _, key := range x.needs {
		if !e.Has(prefix + key) {
			missing(key, "add "+key+" = "+shapeSamples[key])
		}
	}
	switch {
	case x.word == "horizontal plate" && e.Has(prefix+"length") == e.Has(prefix+"diameter"):
		missing("one of length, diameter", `add length = "0.2 m", one side of the plate, or diameter of a round one`)
	case x.word == "enclosure" && !e.Has(prefix+"height") && !e.Has(prefix+"face"):
		missing("height or face", `add height = "1 m" of an upright layer; face = "up" or "down" of a flat one, the way the first-named side looks`)
	}
	for _, key := range shapeKeys {
		if !e.Has(prefix+key) || slices.Contains(x.needs, key) || slices.Contains(x.may, key) {
			continue
		}
		d := e.Fault(prefix+key, fmt.Sprintf("%s says nothing of %s = %q", key, x.way, x.word), "", "")
		d.Hint = "take it out: this film goes by " + strings.Join(append(append([]string{"area"}, x.needs...), x.may...), ", ")
		faults = append(faults, d)
	}
	return faults
}

var shapeSamples = map[string]string{"face": `"up"`, "height": `"0.3 m"`, "length": `"0.2 m"`, "diameter": `"0.1 m"`, "gap": `"2 cm"`, "speed": `"2 m/s"`}

// takeFluid finds the properties of the fluid named.
func (p *filmPlan) takeFluid(e *casefile.Element, c *casefile.Case, path string) []casefile.Diagnostic {
	if !e.Has(path) || e.NameOf(path) == "air" {
		return nil
	}
	s, faults := substanceAt(e, c, path)
	if faults != nil {
		return faults
	}
	if s.own != nil {
		return []casefile.Diagnostic{e.Fault(path, fmt.Sprintf("material %q of the case states no viscosity", s.own.Name), "air or a liquid of the handbook", `"air"`)}
	}
	for _, x := range s.book.Points {
		if s.book.Phase == material.Solid || x.Density == 0 || x.SpecificHeat == 0 || x.Conductivity == 0 || x.Viscosity == 0 {
			return []casefile.Diagnostic{e.Fault(path, fmt.Sprintf("%s is a %s", s.book.Key, s.book.Phase), "air or a liquid of the handbook", `"air"`)}
		}
	}
	if len(s.book.Points) == 1 && p.of.way == "natural" {
		return []casefile.Diagnostic{e.Fault(path, fmt.Sprintf("the handbook has the density of %s at one temperature only: how it expands is not known", s.book.Key), "air, water or engine oil", `"water"`)}
	}
	p.points, p.fluid = s.book.Points, s.book.Key
	return nil
}

// fresh makes the film whose numbers set writes.
func (p *filmPlan) fresh() convection {
	return &film{correlation: p.of, up: p.up, medium: medium{points: p.points}}
}

func (p *filmPlan) set(v casefile.Values, to convection) {
	f := to.(*film)
	f.medium.pressure = p.pressure(v)
	f.height, f.side, f.diameter, f.gap = p.height.at(v), p.side.at(v), p.diameter.at(v), p.gap.at(v)
	f.area, f.efficiency = p.area.at(v), p.efficiency.at(v)
	if p.of == nil {
		f.coefficient = p.stated.at(v)
	}
}

func (p *filmPlan) blower() (speed casefile.WaveSlot, blown, still bool) {
	return p.speed, p.blown, p.blown && p.of.word == "plate"
}

// A convectionPlan is a convection as a case states it.
type convectionPlan interface {
	fresh() convection
	set(v casefile.Values, to convection)
	// blower tells the speed, whether there is one, and whether nothing is carried where it is 0.
	blower() (speed casefile.WaveSlot, blown, shuts bool)
	// derive shows it at levels a of the surface, the node of that name, and b of the fluid.
	derive(e *casefile.Element, v casefile.Values, surface string, a, b float64) []casefile.Derivation
}

// convects reports whether a resistance is a convection by correlation.
func convects(e *casefile.Element) bool {
	return e.Has("film.natural") || e.Has("film.forced") || e.Has("fins")
}

func planConvection(e *casefile.Element, c *casefile.Case) (convectionPlan, []casefile.Diagnostic) {
	if e.Has("fins") {
		p, faults := planFins(e, c)
		return p, faults
	}
	p, faults := planFilm(e, c, "film.", "film.area")
	return p, faults
}

// buildConvection builds a resistance that is a convection by correlation.
func buildConvection(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.Ends()
	plan, more := planConvection(e, c)
	if faults = append(faults, more...); faults != nil {
		return nil, faults
	}
	shape := network.Shape{Name: e.FullName(), Ports: []network.NodeID{from, to}, Joins: true, Readings: []string{"coefficient"}}
	scaled := e.Has("scale")
	if scaled {
		shape.Drives, shape.Gate = append(shape.Drives, "scale of "+e.FullName()), 1
	}
	speed, blown, shuts := plan.blower()
	if blown {
		shape.Drives = append(shape.Drives, "speed of "+e.FullName())
		if shuts && !scaled {
			shape.Gate = len(shape.Drives)
		}
	}
	id := b.Element(shape, e.Ref)
	e.Shows("coefficient", network.Output{Reading: &network.ReadingTerm{Element: id, Sign: 1}})
	if blown {
		e.Driven("speed", id, len(shape.Drives)-1)
	}
	return func(v casefile.Values, p *network.Params) error {
		if p.Law[id] == nil {
			p.Law[id] = &convecting{of: plan.fresh(), scaled: scaled, blown: blown}
		}
		plan.set(v, p.Law[id].(*convecting).of)
		if scaled {
			p.Drive[id][0] = v.Wave[e.Wave("scale")]
		}
		if blown {
			p.Drive[id][len(p.Drive[id])-1] = v.Wave[speed]
		}
		return nil
	}, nil
}
