// Package hydraulic turns hydraulic parts into branches of a network: it hands
// casefile the tables of [hydraulic.*] and builds what stands in them.
//
// # Equations
//
// Each node has a pressure p (Pa, a level); a flow q (m³/s) into a node counts as
// positive, and that of a line from its first-named end to its second:
//
//	C dp/dt = Σ q                              node with compliance C, m³/Pa
//	      0 = Σ q                              node without: a junction
//	      p = p(t)                             held node
//	p_a − p_b = R q                            line of resistance R, Pa·s/m³
//	p_a − p_b = R q + L dq/dt                  line with inertance L, Pa·s²/m³, in series
//	p_a − p_b = (R/s) q + L dq/dt              the same with a scale s > 0, which changes in steps
//	        q = 0                              with a scale of 0: the line is shut
//	      q = drive(t)                         source, m³/s
//
// A compliance is that of an open tank A/(ρg), of a trapped volume of liquid V/K,
// of a gas V/(n·p); an inertance that of a column of liquid ρ·l/A; a resistance
// the slope of the drop over the flow. The case states them as numbers or as
// expressions of its own; they do not change.
//
// # Shutting
//
// A line is shut at once: the flow of a column is 0 from that instant on, and begins
// again from 0. The pressure that stops it acts on the shut end alone, for no time,
// and is in no answer; the same goes for a column whose only way on is a resistance
// that is shut. Where columns meet at a junction without compliance, those left keep
// the momentum that they have together, Σ L·q around what is left of the network.
//
// # Gauge and absolute
//
// [hydraulic] pressures says whether the levels of a case are gauge or absolute
// pressures. A plain "2 bar" is meant so; "2 bar(g)" and "30 psia" are converted
// with the atmosphere. Answers are in Pa, as the case states pressures. Unless it
// says, pressures are gauge, and the atmosphere is 101325 Pa.
//
// # Not modelled
//
// Everything here is linear and lumped. Fluids with their properties, elevations,
// tanks, gas vessels, pipes, valves, pumps and all that depends on the flow or
// the level are words of the vocabulary that casefile refuses by name. Waves in a
// line are those of its lumps: a column of liquid moves as one, so that a stop
// faster than several travel times of a wave reads too low. Vapour is not
// formed: package study says where a pressure falls below vacuum.
//
// # Where to start
//
// Vocabulary lists the tables; each table has a file of its own, named for it.
package hydraulic

import "lagbook/network/casefile"

// Vocabulary returns the tables of [hydraulic.*], for casefile.Read.
func Vocabulary() []casefile.Vocabulary {
	return []casefile.Vocabulary{{
		Domain: "hydraulic",
		Measures: casefile.Measures{Level: pressure, Flow: flow, LevelWord: "pressure", FlowWord: "flow",
			StoreWord: "vessel", Lump: "vessel", StoreKey: "compliance", Sample: "2 bar"},
		Head: []casefile.Field{
			{Name: "pressures", Type: casefile.Word, Words: []string{"gauge", "absolute"}, Structural: true,
				Help: "what a plain level of pressure is; gauge unless stated"},
			atmosphere(),
		},
		Tables: []casefile.Table{nodeTable(), lineTable(), sourceTable()},
		NotBuilt: []string{
			"fluid", "at", "density", "viscosity", "bulk_modulus", "vapour_pressure", "free_gas",
			"restriction", "check", "outfall", "relief", "pump", "cylinder", "capsule", "pipe", "valve", "tank",
			"node.elevation", "node.tank", "node.gas", "node.trapped", "node.piston", "node.held.level",
			"line.pipe", "line.valve", "line.restriction",
		},
	}}
}
