package material

import (
	_ "embed"
	"strconv"
	"strings"
)

// The tables: one record a line, fields separated by tabs, "#" before the line
// of headings. Lines of one material follow each other by temperature.
var (
	//go:embed substances.tsv
	substancesTSV string
	//go:embed joints.tsv
	jointsTSV string
	//go:embed surfaces.tsv
	surfacesTSV string
)

type book struct {
	materials []Material
	joints    []Joint
	surfaces  []Surface
	byName    map[string]int // by key and by full name
}

func readHandbook() *book {
	b := &book{byName: make(map[string]int, 200)}
	eachLine(substancesTSV, b.substance)
	eachLine(jointsTSV, func(f []string) {
		b.joints = append(b.joints, Joint{
			Interface:  f[0],
			Pressure:   Range{1000 * number(f[1]), 1000 * number(f[2])},
			Resistance: Range{number(f[3]), number(f[4])},
			Status:     status(f[5]),
			Source:     f[6],
		})
	})
	eachLine(surfacesTSV, func(f []string) {
		b.surfaces = append(b.surfaces, Surface{
			Name: f[0], Emissivity: Range{number(f[1]), number(f[2])}, Status: status(f[3]), Source: f[4],
		})
	})
	return b
}

// substance adds a line: a new material, or a further temperature of the last.
func (b *book) substance(f []string) {
	p := Point{
		Temperature: number(f[4]), Density: number(f[5]), SpecificHeat: number(f[6]),
		Conductivity: number(f[7]), Viscosity: number(f[8]), Status: status(f[9]), Source: f[10],
	}
	if n := len(b.materials); n > 0 && b.materials[n-1].Key == f[0] {
		m := &b.materials[n-1]
		m.Points = append(m.Points, p)
		return
	}
	b.byName[f[0]] = len(b.materials)
	b.byName[f[1]] = len(b.materials)
	b.materials = append(b.materials, Material{
		Key: f[0], Name: f[1], Phase: phase(f[2]), Category: f[3], Points: []Point{p},
		Emissivity: Range{number(f[11]), number(f[12])}, EmissivitySource: f[13], Note: f[14],
	})
}

func eachLine(tsv string, record func(fields []string)) {
	for line := range strings.Lines(tsv) {
		if line[0] != '#' {
			record(strings.Split(strings.TrimSuffix(line, "\n"), "\t"))
		}
	}
}

// number reads a cell; an empty cell is 0, not known.
func number(s string) float64 {
	if s == "" {
		return 0
	}
	v, err := strconv.ParseFloat(s, 64)
	if err != nil {
		panic("material: a cell of the embedded tables is not a number")
	}
	return v
}

func phase(s string) Phase {
	switch s {
	case "solid":
		return Solid
	case "liquid":
		return Liquid
	case "gas":
		return Gas
	}
	panic("material: unknown phase in the embedded tables")
}

func status(s string) Status {
	switch s {
	case "seen":
		return LookedUp
	case "memory":
		return FromMemory
	}
	panic("material: unknown status in the embedded tables")
}
