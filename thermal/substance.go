package thermal

import (
	"fmt"
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
	"lagbook/thermal/material"
)

// usual is the temperature at which a handbook material with several points is
// taken where the case does not say: 20 °C, in K.
const usual = 293.15

// A substance is the material a part is made of: an own one of the case, which
// hides one of the handbook by the same name, or one of the handbook.
type substance struct {
	own   *casefile.Element
	book  material.Material
	point material.Point
}

// substanceAt finds the material named at a path.
func substanceAt(e *casefile.Element, c *casefile.Case, path string) (substance, []casefile.Diagnostic) {
	name := e.NameOf(path)
	if own, ok := c.Element("material", name); ok {
		return substance{own: own}, nil
	}
	if m, ok := material.Find(name); ok {
		p, _ := m.At(usual)
		return substance{book: m, point: p}, nil
	}
	return substance{}, []casefile.Diagnostic{unknownMaterial(e, c, path, name)}
}

// unknownMaterial suggests the nearest name of the case or the handbook; failing
// that it tells those in whose name the word occurs: "steel".
func unknownMaterial(e *casefile.Element, c *casefile.Case, path, name string) casefile.Diagnostic {
	var names []string
	for _, other := range c.Elements {
		if other.Table.Name == "material" {
			names = append(names, other.Name)
		}
	}
	fix, hint := "", "define it under [material."+tomlKey(name)+"], or choose one that `lagbook materials` lists"
	hits := material.Search(name)
	if near, ok := quantity.Nearest(name, append(names, material.Keys()...)); ok {
		fix, hint = fmt.Sprintf("%q", near), ""
	} else if len(hits) == 1 {
		fix, hint = fmt.Sprintf("%q", hits[0].Key), ""
	} else if len(hits) > 1 {
		hint = "the handbook has " + keysOf(hits)
	}
	d := e.Fault(path, fmt.Sprintf("material %q is not known", name), "", fix)
	d.Hint = hint
	return d
}

// keysOf lists the keys of some materials, the first few by name.
func keysOf(list []material.Material) string {
	const most = 8
	var keys []string
	for i, m := range list {
		if i == most {
			return strings.Join(keys, ", ") + fmt.Sprintf(" and %d more", len(list)-i)
		}
		keys = append(keys, m.Key)
	}
	return strings.Join(keys, ", ")
}

// solid reports whether the substance is known to be one that cannot flow. An
// own material does not say what it is.
func (s substance) solid() bool { return s.own == nil && s.book.Phase == material.Solid }

// property returns one property that must be one number. The name is that of the key in
// [material.NAME].
func (s substance) property(e *casefile.Element, path, name string, dim quantity.Dim) (number, []casefile.Diagnostic) {
	n, faults := s.against(e, path, name, dim)
	if n.points != nil {
		d := e.Fault(path, fmt.Sprintf("%s of material %q is stated against temperature", name, s.own.Name), "one value", "")
		d.Hint = "layers, shells, walls and lumps take it against temperature; what else there is takes one value: define a second material for it"
		return number{}, []casefile.Diagnostic{d}
	}
	return n, faults
}

// against returns one property, which may be points against temperature.
func (s substance) against(e *casefile.Element, path, name string, dim quantity.Dim) (number, []casefile.Diagnostic) {
	if s.own != nil {
		if s.own.Has(name) {
			return typed(s.own, name), nil
		}
		d := e.Fault(path, fmt.Sprintf("material %q states no %s", s.own.Name, name), "", "")
		d.Hint = fmt.Sprintf("add %s = %q to [material.%s]", name, "… "+quantity.UnitOf(dim), tomlKey(s.own.Name))
		return number{}, []casefile.Diagnostic{d}
	}
	v := map[string]float64{
		"density": s.point.Density, "specific_heat": s.point.SpecificHeat, "conductivity": s.point.Conductivity,
	}[name]
	if v == 0 {
		return number{}, []casefile.Diagnostic{e.Fault(path, fmt.Sprintf("the handbook has no %s of %s", name, s.book.Key), "a material of your own that states it", "")}
	}
	return known(v, dim, s.source()), nil
}

// source names the handbook's source, the temperature and how well it is known.
func (s substance) source() string {
	t := s.book.Name
	if len(s.book.Points) > 1 {
		t += " at " + quantity.Print{Digits: 4}.Format(s.point.Temperature, temperature, quantity.Level)
	}
	t += ": " + s.point.Source
	if s.point.Status == material.FromMemory {
		t += " (" + s.point.Status.String() + ")"
	}
	return t
}

// tomlKey writes a name as a part of a TOML key.
func tomlKey(name string) string {
	for _, r := range name {
		if (r < 'a' || r > 'z') && (r < 'A' || r > 'Z') && (r < '0' || r > '9') && r != '_' && r != '-' {
			return fmt.Sprintf("%q", name)
		}
	}
	return name
}

// materialTable is [material.NAME]: it builds nothing by itself.
func materialTable() casefile.Table {
	return casefile.Table{
		Name: "material",
		Help: "a material of the case's own; it hides one of the handbook by the same name",
		Fields: []casefile.Field{
			casefile.Positive("density", density, "ρ"),
			againstTemperature(casefile.Positive("specific_heat", specificHeat, "c")),
			againstTemperature(casefile.Positive("conductivity", conductivity, "k")),
			{Name: "emissivity", Type: casefile.Number, Dim: dimless, HasMin: true, MinOpen: true, HasMax: true, Max: 1, Help: "ε of its surface"},
		},
	}
}

// emissivityOf is ε as stated, or that of the material named.
func emissivityOf(e *casefile.Element, c *casefile.Case, prefix string) (number, []casefile.Diagnostic) {
	if e.Has(prefix + "emissivity") {
		return typed(e, prefix+"emissivity"), nil
	}
	path := prefix + "material"
	s, faults := substanceAt(e, c, path)
	if faults != nil {
		return number{}, faults
	}
	if s.own != nil {
		return s.property(e, path, "emissivity", dimless)
	}
	r := s.book.Emissivity
	if r.Low > 0 && r.Low == r.High {
		return known(r.Low, dimless, s.book.Name+": "+s.book.EmissivitySource+" (from memory)"), nil
	}
	d := e.Fault(path, fmt.Sprintf("the handbook has no emissivity of %s", s.book.Key), "", "")
	if r.Low > 0 {
		d = e.Fault(path, fmt.Sprintf("the emissivity of %s lies between %g and %g", s.book.Key, r.Low, r.High), "", "")
	}
	d.Hint = "state emissivity in place of material: it depends on the finish"
	return number{}, []casefile.Diagnostic{d}
}
