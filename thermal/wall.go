package thermal

import (
	"fmt"
	"slices"

	"lagbook/network"
	"lagbook/network/casefile"
)

// Bounds on the lumps of a wall: beyond them nothing is gained but time.
const (
	maxLumps     = 200  // in a layer
	maxWallNodes = 1000 // in a wall
)

// wallTable is [thermal.wall.NAME]: flat layers, each cut into equal lumps.
func wallTable() casefile.Table {
	return casefile.Table{
		Name:  "wall",
		Stage: 1,
		Help:  "flat layers that store heat, from the first-named node to the second",
		Fields: []casefile.Field{
			casefile.Between(),
			{Name: "layers", Type: casefile.Groups, Structural: true, Required: true, OneOf: [][]string{{"material", "conductivity"}},
				Help: "in order from the first-named node",
				Fields: []casefile.Field{
					materialName("an own material or one of the handbook"),
					againstTemperature(casefile.Positive("conductivity", conductivity, "k, with density and specific_heat in place of a material")),
					casefile.Positive("density", density, "ρ"),
					againstTemperature(casefile.Positive("specific_heat", specificHeat, "c")),
					required(casefile.Positive("thickness", length, "t")),
					casefile.Positive("area", area, "A of this layer, where it differs"),
				}},
			casefile.Positive("area", area, "A of every layer that states none"),
			{Name: "lumps", Type: casefile.Count, Structural: true, Required: true, HasMin: true, Min: 1, HasMax: true, Max: maxLumps,
				Help: "number of lumps in each layer, each with its capacitance in its middle"},
			level("start", "temperature of the whole wall at t = 0"),
		},
		Build:  buildWall,
		Derive: deriveWall,
	}
}

// A wallLayer holds the inputs of one layer of a wall.
type wallLayer struct{ k, rho, c, t, a number }

// half is half the resistance of one lump of n, and store its capacitance.
func (w *wallLayer) half(v casefile.Values, n int) float64 {
	return w.t.at(v) / (2 * float64(n) * w.k.at(v) * w.a.at(v))
}

func (w *wallLayer) store(v casefile.Values, n int) float64 {
	return w.rho.at(v) * w.c.at(v) * w.t.at(v) * w.a.at(v) / float64(n)
}

func buildWall(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	from, to, faults := e.Ends()
	layers, more := wallLayers(e, c)
	if faults = append(faults, more...); faults != nil {
		return nil, faults
	}
	n := e.Count("lumps")
	total := n * len(layers)
	if total > maxWallNodes {
		return nil, []casefile.Diagnostic{e.Fault("lumps", fmt.Sprintf("%d lumps in all layers", total), fmt.Sprintf("at most %d", maxWallNodes), "")}
	}
	inner, faults := innerNodes(e, c, b, total)
	if faults != nil {
		return nil, faults
	}
	if slices.ContainsFunc(layers, wallLayer.varies) {
		w := &varyingWall{layers, n, append(append([]network.NodeID{from}, inner...), to)}
		return casefile.Together(append(w.build(e, b), startsOf(e, inner)...)...), nil
	}
	capacities := make([]network.CapacityID, total)
	for i, node := range inner {
		capacities[i] = b.Capacity(node, e.Ref)
	}
	nodes := append(append([]network.NodeID{from}, inner...), to)
	resistances := chain(e, b, nodes)
	setters := []casefile.Setter{func(v casefile.Values, p *network.Params) error {
		before := 0.0 // half of the lump before the resistance
		for i := range layers {
			half, store := layers[i].half(v, n), layers[i].store(v, n)
			for k := i * n; k < (i+1)*n; k++ {
				p.C[capacities[k]] = store
				p.G[resistances[k]] = 1 / (before + half)
				before = half
			}
		}
		p.G[resistances[total]] = 1 / before
		return nil
	}}
	return casefile.Together(append(setters, startsOf(e, inner)...)...), nil
}

// startsOf gives every lump of a wall the temperature at which it starts, where that is stated.
func startsOf(e *casefile.Element, inner []network.NodeID) (setters []casefile.Setter) {
	if !e.Has("start") {
		return nil
	}
	slot := e.Num("start")
	for _, node := range inner {
		setters = append(setters, casefile.SetStart(node, slot))
	}
	return setters
}

// wallLayers reads the layers.
func wallLayers(e *casefile.Element, c *casefile.Case) ([]wallLayer, []casefile.Diagnostic) {
	var layers []wallLayer
	var faults []casefile.Diagnostic
	for i := range e.Len("layers") {
		l, more := oneLayer(e, c, fmt.Sprintf("layers[%d].", i))
		layers, faults = append(layers, l), append(faults, more...)
	}
	return layers, faults
}

func oneLayer(e *casefile.Element, c *casefile.Case, prefix string) (l wallLayer, faults []casefile.Diagnostic) {
	if e.Has(prefix + "material") {
		l, faults = layerOfMaterial(e, c, prefix)
	} else {
		for _, p := range []struct {
			key string
			to  *number
		}{{"conductivity", &l.k}, {"density", &l.rho}, {"specific_heat", &l.c}} {
			if !e.Has(prefix + p.key) {
				faults = append(faults, e.Fault(prefix+"conductivity", "conductivity without "+p.key, "density and specific_heat beside it, or a material", ""))
				continue
			}
			*p.to = typed(e, prefix+p.key)
		}
	}
	l.t = typed(e, prefix+"thickness")
	switch {
	case e.Has(prefix + "area"):
		l.a = typed(e, prefix+"area")
	case e.Has("area"):
		l.a = typed(e, "area")
	default:
		faults = append(faults, e.Fault(prefix+"thickness", "a layer without area", "area in the layer, or for the whole wall", ""))
	}
	return l, faults
}

func layerOfMaterial(e *casefile.Element, c *casefile.Case, prefix string) (l wallLayer, faults []casefile.Diagnostic) {
	path := prefix + "material"
	for _, key := range []string{"density", "specific_heat"} {
		if e.Has(prefix + key) {
			faults = append(faults, e.Fault(prefix+key, key+" beside material", "one of the two", ""))
		}
	}
	s, unknown := substanceAt(e, c, path)
	if unknown != nil {
		return l, append(faults, unknown...)
	}
	var missing [3][]casefile.Diagnostic
	l.k, missing[0] = s.against(e, path, "conductivity", conductivity)
	l.rho, missing[1] = s.property(e, path, "density", density)
	l.c, missing[2] = s.against(e, path, "specific_heat", specificHeat)
	for _, m := range missing {
		faults = append(faults, m...)
	}
	return l, faults
}

func deriveWall(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	layers, faults := wallLayers(e, c)
	if faults != nil {
		return nil
	}
	var list []casefile.Derivation
	for i := range layers {
		l := &layers[i]
		where := fmt.Sprintf(" of layer %d of %s", i+1, e.Name)
		list = append(list,
			law{"t/(k·A)", l.t.text + "/(" + l.k.text + " · " + l.a.text + ")", sources(l.k, l.t, l.a),
				func(v casefile.Values) float64 { return 2 * l.half(v, 1) }}.derive("resistance"+where, resistance, v),
			law{"ρ·c·t·A", l.rho.text + " · " + l.c.text + " · " + l.t.text + " · " + l.a.text, sources(l.rho, l.c, l.t, l.a),
				func(v casefile.Values) float64 { return l.store(v, 1) }}.derive("capacitance"+where, capacitance, v))
	}
	return list
}
