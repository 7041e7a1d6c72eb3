// Package material is the handbook: properties of engineering solids, liquids
// and air, typical resistances of joints and emissivities of surfaces, each with
// its source and with how well it is known.
//
// A Material has a short key to type in a case ("copper", "stainless steel 304",
// "water") and the full name its source gives it ("copper, pure"). Keys hold
// letters, digits, spaces and _-. only and are unique; so are the full names. A
// key is the everyday word, followed by whatever tells two of that word apart.
//
// All numbers are SI: K, kg/m³, J/(kg·K), W/(m·K), Pa·s. Solids are given at
// one temperature, usually 300 K, and taken as constant; liquids and air have
// several points, straight lines between them.
//
// Not here: properties against pressure, mixtures, and anything that melts.
package material

import "sync"

// Phase says whether a material can flow.
type Phase uint8

const (
	Solid Phase = iota
	Liquid
	Gas
)

// String returns "solid", "liquid" or "gas".
func (p Phase) String() string { return [...]string{"solid", "liquid", "gas"}[p] }

// Status says how well a value is known.
type Status uint8

const (
	LookedUp   Status = iota // read in the source named
	FromMemory               // recalled from the source named: to be checked before use
)

// String returns the words to print beside a value.
func (s Status) String() string {
	return [...]string{"looked up", "from memory, check before use"}[s]
}

// A Range is a pair of bounds; equal where the source gives one number, both 0
// where it gives none.
type Range struct{ Low, High float64 }

// A Point holds the properties at one temperature; 0 stands for not known.
type Point struct {
	Temperature  float64 // K
	Density      float64 // kg/m³
	SpecificHeat float64 // J/(kg·K)
	Conductivity float64 // W/(m·K)
	Viscosity    float64 // Pa·s, of liquids and gases
	Status       Status
	Source       string
}

// A Material is one substance of the handbook.
type Material struct {
	Key              string // to type in a case
	Name             string // as its source has it
	Phase            Phase
	Category         string  // "metal", "alloy", "ceramic", "glass", "plastic", "insulation", "building", "liquid", …
	Points           []Point // ascending temperature, at least one
	Emissivity       Range
	EmissivitySource string // always from memory
	Note             string
}

// A Joint is the typical resistance of two faces pressed together.
type Joint struct {
	Interface  string
	Pressure   Range // Pa
	Resistance Range // m²·K/W
	Status     Status
	Source     string
}

// A Surface is the total hemispherical emissivity of a finish.
type Surface struct {
	Name       string
	Emissivity Range
	Status     Status
	Source     string
}

// handbook is everything, read from the embedded tables when first asked for.
var handbook = sync.OnceValue(readHandbook)

// All returns every material in the order of the handbook. The slice is shared:
// it must not be changed.
func All() []Material { return handbook().materials }

// Joints returns the typical contact resistances. The slice is shared.
func Joints() []Joint { return handbook().joints }

// Surfaces returns the emissivities of finishes. The slice is shared.
func Surfaces() []Surface { return handbook().surfaces }

// Find returns the material of that key or full name, letter for letter.
func Find(name string) (Material, bool) {
	b := handbook()
	i, ok := b.byName[name]
	if !ok {
		return Material{}, false
	}
	return b.materials[i], true
}

// At returns the properties at temperature T in K: straight between the two
// points beside it, the nearest point's beyond the first and the last. inside
// is false where a material with several points is asked beyond them. Status
// and Source are those of the less certain of the points used.
func (m Material) At(T float64) (p Point, inside bool) {
	n := len(m.Points)
	if n == 1 {
		return m.Points[0], true
	}
	if T <= m.Points[0].Temperature {
		return m.Points[0], T == m.Points[0].Temperature
	}
	if T >= m.Points[n-1].Temperature {
		return m.Points[n-1], T == m.Points[n-1].Temperature
	}
	i := 1
	for m.Points[i].Temperature < T {
		i++
	}
	return between(m.Points[i-1], m.Points[i], T), true
}

// between interpolates; a property unknown at either end stays unknown.
func between(a, b Point, T float64) Point {
	f := (T - a.Temperature) / (b.Temperature - a.Temperature)
	mix := func(x, y float64) float64 {
		if x == 0 || y == 0 {
			return 0
		}
		return x + f*(y-x)
	}
	p := a
	if f == 1 || b.Status > a.Status {
		p.Status, p.Source = b.Status, b.Source
	}
	p.Temperature = T
	p.Density = mix(a.Density, b.Density)
	p.SpecificHeat = mix(a.SpecificHeat, b.SpecificHeat)
	p.Conductivity = mix(a.Conductivity, b.Conductivity)
	p.Viscosity = mix(a.Viscosity, b.Viscosity)
	return p
}
