// Package thermal turns thermal parts into branches of a network: it hands
// casefile the tables of [thermal.*] and [material.*] and builds what stands in them.
//
// # Equations
//
// Each node has a temperature T (K, a level); heat flow q (W) into a node counts
// as positive, and that of a branch from its first-named end to its second:
//
//	C dT/dt = Σ q                                  node with capacitance C, J/K
//	      0 = Σ q                                  massless node
//	      T = T(t)                                 held node
//	      q = (T_a − T_b)/R                        resistance R, K/W
//	      q = w (T_up − T_down)                    stream of capacity rate w, W/K, into the node downstream
//	      q = drive(t) + slope·(T_on − about)      source, W
//	      q = drive(t)·(1 + α·(T_on − at))         source whose drive changes with temperature, α in 1/K
//
// with R of a layer t/(kA), of a shell ln(r_o/r_i)/(2πkL), of a contact 1/(hA), of
// a film 1/(hAη); C of a lump ρVc(1 + extra); a passage, in which a stream warms
// along a surface, by the exact 1 − exp(−UA/w); a transient thermal impedance by
// the ladder equal to its Foster terms; a wall by lumps with half a resistance on
// either side. Symbols: k W/(m·K), h W/(m²·K), ρ kg/m³, c J/(kg·K), A m², t m.
//
// # Not modelled
//
// Everything here is linear, with numbers that stay or change in steps (scale): films,
// conductivities and capacities that depend on temperature, radiation, melting and
// controlled heaters are words of the vocabulary that casefile refuses by name. The heat a lump conducts inside itself,
// heat stored in a stream between its nodes, and the travel time of a stream are
// left out.
//
// # Where to start
//
// Vocabulary lists the tables; each table has a file of its own, named for it.
// Package material is the handbook.
package thermal

import "lagbook/network/casefile"

// Vocabulary returns the tables of [thermal.*] and [material.*], for casefile.Read.
func Vocabulary() []casefile.Vocabulary {
	return []casefile.Vocabulary{
		{
			Domain: "thermal",
			Measures: casefile.Measures{Level: temperature, Flow: power, LevelWord: "temperature", FlowWord: "heat",
				StoreWord: "heat store", Lump: "mass", StoreKey: "capacitance", Sample: "20 °C"},
			Tables: []casefile.Table{
				nodeTable(), resistanceTable(), impedanceTable(), wallTable(), streamTable(), passageTable(), sourceTable(),
			},
			NotBuilt: []string{
				"exchanger", "heater", "surface",
				"node.lump.melts",
				"resistance.radiation", "resistance.fins", "resistance.spreading", "resistance.at_rise", "resistance.exponent",
				"resistance.points",
				"resistance.film.natural", "resistance.film.forced", "resistance.film.height", "resistance.film.length",
				"resistance.film.diameter", "resistance.film.gap", "resistance.film.speed", "resistance.film.fluid",
				"wall.exact",
				"source.doubles_every", "source.points",
			},
			Check: check,
		},
		{
			Tables: []casefile.Table{materialTable()},
			NotBuilt: []string{"air", "material.emissivity",
				"material.density.points", "material.specific_heat.points", "material.conductivity.points"},
		},
	}
}

// check looks at what only values can show: radii that do not enclose each
// other, and streams that leave a node without having entered it.
func check(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	return append(checkShells(c, v), checkStreams(c, v)...)
}
