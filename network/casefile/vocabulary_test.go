package casefile_test

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A small vocabulary, invented for these tests: nodes, links between them, feeds
// into them, ladders inside a link, streams and what passes along them.
var (
	dimTime        = quantity.Dim{0, 0, 1, 0, 0}
	dimLength      = quantity.Dim{0, 1, 0, 0, 0}
	dimArea        = quantity.Dim{0, 2, 0, 0, 0}
	dimTemperature = quantity.Dim{0, 0, 0, 1, 0}
	dimPower       = quantity.Dim{1, 2, -3, 0, 0}
	dimResistance  = quantity.Dim{-1, -2, 3, 1, 0}
	dimConductance = quantity.Dim{1, 2, -3, -1, 0}
	dimCapacitance = quantity.Dim{1, 2, -2, -1, 0}
	dimConduct     = quantity.Dim{1, 1, -3, -1, 0}
	dimDensity     = quantity.Dim{1, -3, 0, 0, 0}
)

func positive(name string, dim quantity.Dim) casefile.Field {
	return casefile.Field{Name: name, Type: casefile.Number, Dim: dim, HasMin: true, MinOpen: true}
}

func required(f casefile.Field) casefile.Field { f.Required = true; return f }

func between() casefile.Field {
	return casefile.Field{Name: "between", Type: casefile.Names, Refers: "node", Required: true, HasMin: true, Min: 2, HasMax: true, Max: 2}
}

func testVocabulary() []casefile.Vocabulary {
	duration := positive("", dimTime)
	return []casefile.Vocabulary{{
		Domain: "thermal",
		Measures: casefile.Measures{Level: dimTemperature, Flow: dimPower, LevelWord: "temperature", FlowWord: "heat",
			StoreWord: "heat store", Lump: "mass", StoreKey: "capacitance", Sample: "20 °C"},
		Tables: []casefile.Table{
			{Name: "node", Build: buildNode, OneOf: [][]string{{"capacitance", "held", ""}}, Fields: []casefile.Field{
				positive("capacitance", dimCapacitance),
				{Name: "held", Type: casefile.Wave, Dim: dimTemperature, Kind: quantity.Level},
				{Name: "start", Type: casefile.Number, Dim: dimTemperature, Kind: quantity.Level},
			}},
			{Name: "resistance", Stage: 1, Build: buildResistance, OneOf: [][]string{{"value", "conductance", "layer", "film"}}, Fields: []casefile.Field{
				between(), positive("value", dimResistance), positive("conductance", dimConductance),
				{Name: "layer", Type: casefile.Group, OneOf: [][]string{{"conductivity", "material"}}, Fields: []casefile.Field{
					positive("conductivity", dimConduct), {Name: "material", Type: casefile.Name, Look: lookMaterial},
					required(positive("thickness", dimLength)), required(positive("area", dimArea))}},
				{Name: "film", Type: casefile.Group, Fields: []casefile.Field{
					required(positive("coefficient", quantity.Dim{1, 0, -3, -1, 0})), required(positive("area", dimArea)),
					{Name: "efficiency", Type: casefile.Number, HasMin: true, MinOpen: true, HasMax: true, Max: 1}}},
			}},
			{Name: "impedance", Stage: 1, Build: buildImpedance, Fields: []casefile.Field{
				between(), {Name: "foster", Type: casefile.Pairs, Dim: dimResistance, HasMin: true, MinOpen: true, Second: &duration, Required: true}}},
			{Name: "source", Stage: 1, Build: buildSource, OneOf: [][]string{{"into", "out_of"}}, Fields: []casefile.Field{
				{Name: "into", Type: casefile.Name, Refers: "node"}, {Name: "out_of", Type: casefile.Name, Refers: "node"},
				{Name: "drive", Type: casefile.Wave, Dim: dimPower, Required: true},
				{Name: "slope", Type: casefile.Number, Dim: dimConductance, With: []string{"about"}},
				{Name: "about", Type: casefile.Number, Dim: dimTemperature, Kind: quantity.Level, With: []string{"slope"}},
				{Name: "mode", Type: casefile.Word, Words: []string{"gentle", "brisk"}},
				{Name: "cells", Type: casefile.Count, HasMin: true, Min: 1, HasMax: true, Max: 100},
			}},
			{Name: "stream", Stage: 1, Fields: []casefile.Field{
				{Name: "path", Type: casefile.Names, Refers: "node", Required: true, HasMin: true, Min: 2}, required(positive("capacity_rate", dimConductance))}},
			{Name: "passage", Stage: 2, Fields: []casefile.Field{
				required(casefile.Field{Name: "stream", Type: casefile.Name, Refers: "stream"}),
				required(casefile.Field{Name: "along", Type: casefile.Name, Refers: "node"})}},
			{Name: "wall", Stage: 1, Fields: []casefile.Field{between(), {Name: "layers", Type: casefile.Groups, Required: true, Fields: []casefile.Field{
				required(positive("thickness", dimLength)), {Name: "material", Type: casefile.Name, Required: true, Look: lookMaterial}}}}},
		},
		NotBuilt: []string{"heater", "resistance.radiation", "resistance.film.natural", "resistance.scale"},
	}, {
		Tables: []casefile.Table{{Name: "material", Fields: []casefile.Field{positive("density", dimDensity), positive("conductivity", dimConduct)}}},
	}}
}

func buildNode(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	id := b.Node(e.Name, e.Ref)
	c.BindNode(e.Name, id)
	capacity, input := network.CapacityID(-1), network.InputID(-1)
	var slot, start casefile.Slot
	var wave casefile.WaveSlot
	if e.Has("capacitance") {
		capacity, slot = b.Capacity(id, e.Ref), e.Num("capacitance")
	}
	if e.Has("held") {
		input, wave = b.Hold(id, e.Ref), e.Wave("held")
	}
	if e.Has("start") {
		start = e.Num("start")
	}
	return func(v casefile.Values, p *network.Params) error {
		if capacity >= 0 {
			p.C[capacity] = v.Num[slot]
		}
		if input >= 0 {
			p.Wave[input] = v.Wave[wave]
		}
		if e.Has("start") {
			p.Start[id], p.HasStart[id] = v.Num[start], true
		}
		return nil
	}, nil
}

func lookMaterial(e *casefile.Element, c *casefile.Case, path string) []casefile.Diagnostic {
	name := e.NameOf(path)
	if _, ok := c.Element("material", name); ok {
		return nil
	}
	return []casefile.Diagnostic{e.Fault(path, fmt.Sprintf("material %q is not known", name), "a material of the case", "")}
}

func buildResistance(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	ends := e.Names("between")
	from, _ := c.Node(ends[0])
	to, _ := c.Node(ends[1])
	id := b.Resistance(e.Name, from, to, e.Ref)
	slot := e.NumOr("value", 1)
	return func(v casefile.Values, p *network.Params) error {
		p.G[id] = 1 / v.Num[slot]
		return nil
	}, nil
}

func buildImpedance(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	ends := e.Names("between")
	at, _ := c.Node(ends[0])
	far, _ := c.Node(ends[1])
	n := e.Len("foster")
	var setters []casefile.Setter
	for i := range n {
		next := far
		if i < n-1 {
			name := fmt.Sprintf("%s.%d", e.Name, i+1)
			next = b.Node(name, e.Ref)
			c.BindNode(name, next)
		}
		name := e.Name
		if i > 0 {
			name = fmt.Sprintf("%s/%d", e.Name, i)
		}
		store, link := b.Capacity(at, e.Ref), b.Resistance(name, at, next, e.Ref)
		r, tau := e.Num(fmt.Sprintf("foster[%d].first", i)), e.Num(fmt.Sprintf("foster[%d].second", i))
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.G[link], p.C[store] = 1/v.Num[r], v.Num[tau]/v.Num[r]
			return nil
		})
		at = next
	}
	return func(v casefile.Values, p *network.Params) error {
		for _, set := range setters {
			if err := set(v, p); err != nil {
				return err
			}
		}
		return nil
	}, nil
}

func buildSource(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	key, sign := "into", 1.0
	if e.Has("out_of") {
		key, sign = "out_of", -1
	}
	at, _ := c.Node(e.NameOf(key))
	id, wave := b.Source(e.Name, at, sign, e.Ref), e.Wave("drive")
	return func(v casefile.Values, p *network.Params) error {
		p.Wave[id] = v.Wave[wave]
		return nil
	}, nil
}
