package main

import (
	"fmt"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
	"lagbook/thermal/material"

	"github.com/spf13/cobra"
)

// materials lists or searches the handbook.
func (a *app) materials() *cobra.Command {
	return &cobra.Command{
		Use:     "materials [WORD...]",
		Short:   "the handbook data, with sources",
		Long:    "materials lists the materials of the handbook, the liquids of hydraulic networks,\ntypical resistances of joints and emissivities of surfaces, each with its source;\nwith words, those that match. The key in the first column is what a case file\nnames.",
		Example: "  lagbook materials copper",
		RunE: func(_ *cobra.Command, args []string) error {
			words := strings.Join(args, " ")
			ans := handbook(words)
			if len(ans.Materials)+len(ans.Fluids)+len(ans.Joints)+len(ans.Surfaces) == 0 {
				return &fault{exitCase, fmt.Sprintf("nothing in the handbook matches %q", words)}
			}
			return a.answer(ans, func() present.Doc { return materialsDoc(ans) })
		},
	}
}

// handbookAnswer is what the verb materials prints as JSON. A property that is
// not known is absent.
type handbookAnswer struct {
	Title     string           `json:"title"`
	Materials []materialAnswer `json:"materials"`
	Fluids    []fluidAnswer    `json:"fluids"`
	Joints    []rangeAnswer    `json:"joints"`   // m²·K/W
	Surfaces  []rangeAnswer    `json:"surfaces"` // total hemispherical emissivity
	Warnings  []study.Warning  `json:"warnings"`
	Caution   string           `json:"caution"`
}

type materialAnswer struct {
	Key              string        `json:"key"`
	Name             string        `json:"name"`
	Phase            string        `json:"phase"`
	Category         string        `json:"category"`
	Points           []pointAnswer `json:"points"`
	Emissivity       []float64     `json:"emissivity,omitempty"` // from, to
	EmissivitySource string        `json:"emissivity_source,omitempty"`
	Note             string        `json:"note,omitempty"`
}

type pointAnswer struct {
	Temperature  float64  `json:"temperature"`
	Density      *float64 `json:"density,omitempty"`
	SpecificHeat *float64 `json:"specific_heat,omitempty"`
	Conductivity *float64 `json:"conductivity,omitempty"`
	Viscosity    *float64 `json:"viscosity,omitempty"`
	Status       string   `json:"status"`
	Source       string   `json:"source"`
}

type rangeAnswer struct {
	Name     string    `json:"name"`
	Range    []float64 `json:"range"`              // from, to
	Pressure []float64 `json:"pressure,omitempty"` // Pa, from, to
	Status   string    `json:"status"`
	Source   string    `json:"source"`
}

// handbook gathers what matches the words; all of it for none.
func handbook(words string) *handbookAnswer {
	a := &handbookAnswer{Title: "Handbook data", Materials: []materialAnswer{}, Fluids: fluids(words), Joints: []rangeAnswer{}, Surfaces: []rangeAnswer{}, Warnings: []study.Warning{}, Caution: study.Caution}
	for _, m := range material.Search(words) {
		x := materialAnswer{Key: m.Key, Name: m.Name, Phase: m.Phase.String(), Category: m.Category, Note: m.Note}
		if m.Emissivity.High > 0 {
			x.Emissivity, x.EmissivitySource = bounds(m.Emissivity), m.EmissivitySource
		}
		for _, q := range m.Points {
			x.Points = append(x.Points, pointAnswer{
				Temperature: q.Temperature, Density: known(q.Density), SpecificHeat: known(q.SpecificHeat),
				Conductivity: known(q.Conductivity), Viscosity: known(q.Viscosity), Status: q.Status.String(), Source: q.Source,
			})
		}
		a.Materials = append(a.Materials, x)
	}
	for _, j := range material.SearchJoints(words) {
		a.Joints = append(a.Joints, rangeAnswer{j.Interface, bounds(j.Resistance), bounds(j.Pressure), j.Status.String(), j.Source})
	}
	for _, s := range material.SearchSurfaces(words) {
		a.Surfaces = append(a.Surfaces, rangeAnswer{Name: s.Name, Range: bounds(s.Emissivity), Status: s.Status.String(), Source: s.Source})
	}
	return a
}

func bounds(r material.Range) []float64 {
	if r == (material.Range{}) {
		return nil
	}
	return []float64{r.Low, r.High}
}

// known drops a property that the handbook does not give.
func known(v float64) *float64 {
	if v == 0 {
		return nil
	}
	return &v
}
