// Package fluid is the handbook of liquids in networks of pipes, tanks and machines:
// density, viscosity, bulk modulus and vapour pressure against temperature, each with
// its source and with how well it is known.
//
// A Fluid has a short key to type in a case ("water", "oil VG 46"). All numbers are SI:
// K, kg/m³, Pa·s (dynamic), Pa. They hold at atmospheric pressure; the bulk modulus is
// the isentropic one, K = ρ·w² with the speed of sound w, which is what a wave and a
// quick compression meet. A property that the handbook does not know is 0.
//
// Water follows published formulations. Oils and fuels are typical of their grade, as
// data sheets give them: what a supplier states is better, and a case may state it.
//
// Not here: properties against pressure, mixtures other than those listed, gases.
// Start reading at At.
package fluid

import (
	"fmt"
	"strings"
)

// Status says how well a property is known.
type Status uint8

const (
	Published  Status = iota // computed from a published formulation
	LookedUp                 // read in the source named
	FromMemory               // recalled from the source named: to be checked before use
	Common                   // typical, common practice without one source
)

// String returns the words to print beside a value.
func (s Status) String() string {
	return [...]string{"published formulation", "looked up", "from memory, check before use", "typical, common practice"}[s]
}

// A Source is where a property comes from.
type Source struct {
	Status Status
	Text   string
}

// Properties of a liquid at one temperature; 0 stands for not known.
type Properties struct {
	Density        float64 // kg/m³
	Viscosity      float64 // Pa·s, dynamic
	BulkModulus    float64 // Pa, isentropic, free of gas
	VapourPressure float64 // Pa, absolute
}

// Sources say where each property comes from; empty where it is not known.
type Sources struct {
	Density, Viscosity, BulkModulus, VapourPressure Source
}

// A Fluid is one liquid of the handbook.
type Fluid struct {
	Key       string  // to type in a case
	Name      string  // in full
	Category  string  // "water", "hydraulic oil", "water–glycol", "fuel"
	Low, High float64 // K; the range in which the properties hold
	Sources   Sources
	Note      string

	at func(T float64) Properties
}

// A RangeError says that a fluid was asked beyond its range.
type RangeError struct {
	Fluid     string
	T         float64 // K, asked
	Low, High float64 // K, allowed
}

func (e *RangeError) Error() string {
	return fmt.Sprintf("%s at %.4g °C: its data reach from %.4g to %.4g °C", e.Fluid, e.T-freezing, e.Low-freezing, e.High-freezing)
}

// freezing is 0 °C in K.
const freezing = 273.15

// At returns the properties at temperature T in K, a *RangeError beyond its range.
func (f *Fluid) At(T float64) (Properties, error) {
	if !(T >= f.Low && T <= f.High) {
		return Properties{}, &RangeError{f.Key, T, f.Low, f.High}
	}
	return f.at(T), nil
}

// All returns every fluid in the order of the handbook. The slice is shared: it must
// not be changed.
func All() []Fluid { return handbook }

var handbook = gather()

func gather() []Fluid {
	list := []Fluid{water}
	list = append(list, oils()...)
	list = append(list, glycols()...)
	return append(list, fuels()...)
}

// Keys returns every name a case may give, in the order of the handbook.
func Keys() []string {
	keys := make([]string, len(handbook))
	for i := range handbook {
		keys[i] = handbook[i].Key
	}
	return keys
}

// Find returns the fluid of that key, letter for letter.
func Find(key string) (*Fluid, bool) {
	for i := range handbook {
		if handbook[i].Key == key {
			return &handbook[i], true
		}
	}
	return nil, false
}

// Search returns the fluids in whose key, name or category every one of the words
// occurs, whatever the case of its letters; without words all of them.
func Search(words string) []*Fluid {
	var found []*Fluid
	want := strings.Fields(strings.ToLower(words))
	for i := range handbook {
		f := &handbook[i]
		if holds(strings.ToLower(f.Key+" "+f.Name+" "+f.Category+" fluid liquid"), want) {
			found = append(found, f)
		}
	}
	return found
}

func holds(text string, words []string) bool {
	for _, w := range words {
		if !strings.Contains(text, w) {
			return false
		}
	}
	return true
}
