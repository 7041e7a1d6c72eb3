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
	var notes sourceNotes
	if len(a.Materials) > 0 {
		d.Parts = append(d.Parts, substances(&notes, a.Materials))
	}
	if len(a.Fluids) > 0 {
		d.Parts = append(d.Parts, liquids(&notes, a.Fluids))
	}
	if len(a.Joints) > 0 {
		d.Parts = append(d.Parts, ranges(&notes, "Joints: resistance of an area", "joint", "R·A / (m²·K/W)", a.Joints))
	}
	if len(a.Surfaces) > 0 {
		d.Parts = append(d.Parts, ranges(&notes, "Surfaces: total hemispherical emissivity", "surface", "emissivity", a.Surfaces))
	}
	d.Parts = append(d.Parts, notes.parts()...)
	d.Parts = append(d.Parts, present.Caution{Text: a.Caution})
	return d
}

// substances lists materials, a row for each temperature.
func substances(notes *sourceNotes, list []materialAnswer) present.Table {
	t := present.Table{Caption: "Materials (check: from memory, to be checked before use)"}
	for _, h := range []string{"key", "name", "T / °C", "ρ / (kg/m³)", "c / (J/(kg·K))", "k / (W/(m·K))", "µ / (Pa·s)", "emissivity", "source"} {
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
			t.Rows = append(t.Rows, []string{key, name, quantity.Number(celsius, 4), digits(q.Density), digits(q.SpecificHeat), digits(q.Conductivity), digits(q.Viscosity), shine, notes.known(q.Status, q.Source)})
			t.Full = append(t.Full, []string{m.Key, m.Name, full(q.Temperature), fullOf(q.Density), fullOf(q.SpecificHeat), fullOf(q.Conductivity), fullOf(q.Viscosity), shine, q.Status, q.Source})
		}
	}
	for k := 6; k >= 3; k-- {
		if !slices.ContainsFunc(t.Rows, func(r []string) bool { return r[k] != "" }) {
			dropColumn(&t, k)
		}
	}
	return t
}

// ranges lists values known only from … to …, with the pressure they hold at
// where one is known.
func ranges(notes *sourceNotes, caption, what, unit string, list []rangeAnswer) present.Table {
	t := present.Table{Caption: caption, Columns: []present.Column{{Head: what}, {Head: unit}, {Head: "pressure / kPa"}, {Head: "source"}},
		FullHead: []string{what, unit, "pressure / kPa", "known", "source"}}
	pressed := slices.ContainsFunc(list, func(r rangeAnswer) bool { return r.Pressure != nil })
	if !pressed {
		t.Columns, t.FullHead = slices.Delete(t.Columns, 2, 3), slices.Delete(t.FullHead, 2, 3)
	}
	for _, r := range list {
		row := []string{r.Name, span(r.Range, 1), span(r.Pressure, 1000)}
		if !pressed {
			row = row[:2]
		}
		t.Full = append(t.Full, append(slices.Clone(row), r.Status, r.Source))
		t.Rows = append(t.Rows, append(row, notes.known(r.Status, r.Source)))
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
