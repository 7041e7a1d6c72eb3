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
// along a surface, by the exact 1 − exp(−UA/w); an exchanger of two streams by its
// effectiveness; a transient thermal impedance by the ladder equal to its Foster
// terms; a wall by lumps with half a resistance on either side. All these are linear,
// with numbers that stay or change in steps (scale). These are not:
//
//	   q = k·(T_a⁴ − T_b⁴)                      radiation, k = σεFA, or between grey surfaces
//	   q = h(T_a, T_b)·A·(T_a − T_b)            film and fins by correlation
//	   q = (T_a − T_b)/R(|T_a − T_b|)           catalogue resistance
//	   q = g·∫k dT from T_b to T_a              layer or shell with k against temperature
//	   q = drive(t)·2^((T_on − at)/every)       source that doubles; or points against temperature
//	S' = Σ q, S = m·∫c dT + m·L·share(T)        lump with c against temperature, or that melts
//	   q = low … high                           heater: on or off, or gain·(e + ∫e dt/t_i)
//
// Symbols: k W/(m·K), h W/(m²·K), ρ kg/m³, c J/(kg·K), A m², t m, L J/kg, σ W/(m²·K⁴).
//
// # Not modelled
//
// The heat a lump conducts inside itself, heat stored in a stream or an exchanger between
// its nodes, and the travel time of a stream are left out. Walls, streams and lumps by volume
// take a density that does not change; what melts does so over a range that must be stated.
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
				nodeTable(), resistanceTable(), impedanceTable(), wallTable(), streamTable(), passageTable(), exchangerTable(),
				plugTable(), sourceTable(),
				heaterTable(), surfaceTable(),
			},
			NotBuilt: []string{"wall.exact"},
			Check:    check,
		},
		{
			Tables:   []casefile.Table{materialTable()},
			NotBuilt: []string{"material.density.points"},
		},
		airVocabulary(),
	}
}

// check looks at what only values can show: radii that do not enclose each
// other, and streams that leave a node without having entered it.
func check(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	var faults []casefile.Diagnostic
	for _, look := range []func(*casefile.Case, casefile.Values) []casefile.Diagnostic{checkShells, checkRadiation, checkConvection, checkCatalogue, checkHeaters, checkStreams} {
		faults = append(faults, look(c, v)...)
	}
	return faults
}
