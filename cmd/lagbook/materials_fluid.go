package main

import (
	"lagbook/hydraulic/fluid"
)

// fluidAnswer is a liquid of the handbook as JSON.
type fluidAnswer struct {
	Key      string           `json:"key"`
	Name     string           `json:"name"`
	Category string           `json:"category"`
	Range    []float64        `json:"range"` // K, from, to
	Points   []fluidPoint     `json:"points"`
	Sources  []propertySource `json:"sources"`
	Note     string           `json:"note,omitempty"`
}

type fluidPoint struct {
	Temperature    float64  `json:"temperature"`               // K
	Density        float64  `json:"density"`                   // kg/m³
	Viscosity      float64  `json:"viscosity"`                 // Pa·s, dynamic
	Kinematic      float64  `json:"kinematic"`                 // m²/s
	BulkModulus    float64  `json:"bulk_modulus"`              // Pa, isentropic
	VapourPressure *float64 `json:"vapour_pressure,omitempty"` // Pa, absolute
}

// A propertySource says where a property comes from and how well it is known.
type propertySource struct {
	Property string `json:"property"`
	Status   string `json:"status"`
	Source   string `json:"source"`
}

// fluidStep is how far apart the temperatures lie at which fluids are listed, K.
const fluidStep = 20

// fluids gathers the liquids that match the words.
func fluids(words string) []fluidAnswer {
	list := []fluidAnswer{}
	for _, f := range fluid.Search(words) {
		x := fluidAnswer{Key: f.Key, Name: f.Name, Category: f.Category, Range: []float64{f.Low, f.High}, Note: f.Note}
		for _, T := range listed(f.Low, f.High) {
			p, err := f.At(T)
			if err != nil {
				continue // rounding at the end of the range
			}
			x.Points = append(x.Points, fluidPoint{T, p.Density, p.Viscosity, p.Viscosity / p.Density, p.BulkModulus, known(p.VapourPressure)})
		}
		for _, s := range []struct {
			property string
			fluid.Source
		}{{"density", f.Sources.Density}, {"viscosity", f.Sources.Viscosity}, {"bulk_modulus", f.Sources.BulkModulus}, {"vapour_pressure", f.Sources.VapourPressure}} {
			if s.Text != "" {
				x.Sources = append(x.Sources, propertySource{s.property, s.Status.String(), s.Text})
			}
		}
		list = append(list, x)
	}
	return list
}

// listed are the temperatures at which a fluid is listed: the ends of its range and, from
// 0 °C, every twentieth degree between them.
func listed(low, high float64) []float64 {
	const zero = 273.15
	list := []float64{low}
	for k := -10; k <= 10; k++ {
		if T := zero + fluidStep*float64(k); T > low+1 && T < high-1 {
			list = append(list, T)
		}
	}
	return append(list, high)
}
