package main

import (
	"fmt"
	"slices"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/quantity"
)

// materialsDoc shows what the handbook holds. Temperatures are in °C.
func materialsDoc(a *handbookAnswer) present.Doc {
	d := present.Doc{Title: a.Title}
	if len(a.Materials) > 0 {
		d.Parts = append(d.Parts, substances(a.Materials))
	}
	if len(a.Joints) > 0 {
		d.Parts = append(d.Parts, ranges("Joints: resistance of an area", "joint", "R·A / (m²·K/W)", a.Joints))
	}
	if len(a.Surfaces) > 0 {
		d.Parts = append(d.Parts, ranges("Surfaces: total hemispherical emissivity", "surface", "emissivity", a.Surfaces))
	}
	d.Parts = append(d.Parts, present.Caution{Text: a.Caution})
	return d
}

// substances lists materials, a row for each temperature.
func substances(list []materialAnswer) present.Table {
	t := present.Table{Caption: "Materials"}
	for _, h := range []string{"key", "name", "T / °C", "ρ / (kg/m³)", "c / (J/(kg·K))", "k / (W/(m·K))", "µ / (Pa·s)", "emissivity", "known", "source"} {
		t.Columns = append(t.Columns, present.Column{Head: h})
	}
	for k := 2; k <= 6; k++ {
		t.Columns[k].Align = present.Point
	}
	t.FullHead = []string{"key", "name", "T / K", "ρ / (kg/m³)", "c / (J/(kg·K))", "k / (W/(m·K))", "µ / (Pa·s)", "emissivity", "known", "source"}
	for _, m := range list {
		for i, q := range m.Points {
			key, name, shine := m.Key, m.Name, span(m.Emissivity, 1)
			if i > 0 {
				key, name, shine = "", "", ""
			}
			celsius, err := quantity.Convert(q.Temperature, "°C", quantity.Level)
			if err != nil {
				celsius = q.Temperature
			}
			t.Rows = append(t.Rows, []string{key, name, quantity.Number(celsius, 4), digits(q.Density), digits(q.SpecificHeat), digits(q.Conductivity), digits(q.Viscosity), shine, q.Status, q.Source})
			t.Full = append(t.Full, []string{m.Key, m.Name, full(q.Temperature), fullOf(q.Density), fullOf(q.SpecificHeat), fullOf(q.Conductivity), fullOf(q.Viscosity), shine, q.Status, q.Source})
		}
	}
	return t
}

// ranges lists values known only from … to …, with the pressure they hold at
// where one is known.
func ranges(caption, what, unit string, list []rangeAnswer) present.Table {
	t := present.Table{Caption: caption, Columns: []present.Column{{Head: what}, {Head: unit}, {Head: "pressure / kPa"}, {Head: "known"}, {Head: "source"}}}
	pressed := slices.ContainsFunc(list, func(r rangeAnswer) bool { return r.Pressure != nil })
	if !pressed {
		t.Columns = slices.Delete(t.Columns, 2, 3)
	}
	for _, r := range list {
		row := []string{r.Name, span(r.Range, 1), span(r.Pressure, 1000), r.Status, r.Source}
		if !pressed {
			row = slices.Delete(row, 2, 3)
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// digits prints a property to four digits, nothing where it is not known.
func digits(v *float64) string {
	if v == nil {
		return ""
	}
	return quantity.Number(*v, 4)
}

// span prints from and to in a unit of so many SI units.
func span(r []float64, unit float64) string {
	switch {
	case len(r) < 2:
		return ""
	case r[0] == r[1]:
		return quantity.Number(r[0]/unit, 3)
	}
	return fmt.Sprintf("%s to %s", quantity.Number(r[0]/unit, 3), quantity.Number(r[1]/unit, 3))
}
