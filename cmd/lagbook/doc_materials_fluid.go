package main

import (
	"slices"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/quantity"
)

// propertySigns are the letters of the properties of a fluid, in the order of its sources.
var propertySigns = map[string]string{"density": "ρ", "viscosity": "µ", "bulk_modulus": "K", "vapour_pressure": "p"}

// liquids lists fluids, a row for each temperature.
func liquids(notes *sourceNotes, list []fluidAnswer) present.Table {
	t := present.Table{Caption: "Fluids of hydraulic networks, at atmospheric pressure"}
	for _, h := range []string{"key", "name", "T / °C", "ρ / (kg/m³)", "µ / (mPa·s)", "ν / (mm²/s)", "K / GPa", "vapour / kPa", "source"} {
		t.Columns = append(t.Columns, present.Column{Head: h})
	}
	for k := 2; k <= 7; k++ {
		t.Columns[k].Align = present.Point
	}
	t.FullHead = []string{"key", "name", "T / K", "ρ / (kg/m³)", "µ / (Pa·s)", "ν / (m²/s)", "K / Pa", "vapour / Pa", "source"}
	for _, f := range list {
		for i, p := range f.Points {
			key, name, source := "", "", ""
			if i == 0 {
				key, name, source = f.Key, f.Name, fluidSources(f, notes.cell)
			}
			vapour := ""
			if p.VapourPressure != nil {
				vapour = quantity.Number(*p.VapourPressure/1e3, 4)
			}
			celsius, err := quantity.Convert(p.Temperature, "°C", quantity.Level)
			if err != nil {
				celsius = p.Temperature
			}
			t.Rows = append(t.Rows, []string{key, name, quantity.Number(celsius, 4), quantity.Number(p.Density, 4), quantity.Number(p.Viscosity*1e3, 4),
				quantity.Number(p.Kinematic*1e6, 4), quantity.Number(p.BulkModulus/1e9, 4), vapour, source})
			t.Full = append(t.Full, []string{f.Key, f.Name, full(p.Temperature), full(p.Density), full(p.Viscosity), full(p.Kinematic), full(p.BulkModulus),
				fullOf(p.VapourPressure), fluidSources(f, func(s string) string { return s })})
		}
	}
	if !slices.ContainsFunc(t.Rows, func(r []string) bool { return r[7] != "" }) {
		dropColumn(&t, 7)
	}
	return t
}

// fluidSources puts the sources of a fluid in one cell.
func fluidSources(f fluidAnswer, cell func(string) string) string {
	var words []string
	for _, s := range f.Sources {
		words = append(words, propertySigns[s.Property]+" "+cell(s.Status+": "+s.Source))
	}
	return strings.Join(words, ", ")
}
