// Package hydraulic turns hydraulic parts into branches and elements of a network: it
// hands casefile the tables of [hydraulic.*] and builds what stands in them.
//
// # Equations
//
// Each node has a pressure p (Pa, a level) at its elevation z; a flow q (m³/s) into a node
// counts as positive, and that of a part from its first-named end to its second. The
// network's own level is the piezometric pressure x = p + ρ·g·z, g = 9.80665 m/s², so that
// parts between different heights see its difference; what is shown is p.
//
//	C dx/dt = Σ q                              node with compliance C, m³/Pa
//	  dV/dt = Σ q                              node with a tank or gas, V by its law
//	      0 = Σ q                              node without: a junction
//	      p = p(t)                             held node
//	x_a − x_b = R q + L dq/dt                  line of resistance R, Pa·s/m³, and inertance L, Pa·s²/m³
//	x_a − x_b = (R/s) q + L dq/dt              the same with a scale s > 0, which changes in steps
//	        q = 0                              with a scale of 0: the line is shut
//	x_a − x_b = h(q) + ρ·l/A dq/dt             pipe, or each of its n sections of l/n
//	        q = Q(x_a, x_b)                    restriction, check, relief
//	x_b − x_a = ρ·g·H(q, speed)                pump by its head curve
//	        q = V·n − slip                     pump of a displacement V a turn
//	        q = drive(t)                       source
//
// A pipe of n sections has half of a section's compliance A·l/(n·ρ·a²) at either end of each,
// a the speed of waves in it. Its drop h is Darcy's with a factor for all regimes
// (friction.go).
//
// # Shutting
//
// A line is shut at once: the flow of a column is 0 from that instant on, and begins
// again from 0. The pressure that stops it acts on the shut end alone, for no time,
// and is in no answer; the same goes for a column whose only way on is a resistance
// that is shut. Where columns meet at a junction without compliance, those left keep
// the momentum that they have together, Σ L·q around what is left of the network. A valve
// that is shut is gone.
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
// The liquid has one temperature and one density everywhere. Waves in a pipe are those of
// its sections, which overstate a sudden stop, and a rigid column knows none; friction is
// that of steady flow; where it can be known, checkPipes says which way that errs. A run
// ends where vapour forms. Air does not dissolve or come out of solution. A head curve tells
// nothing of a pump that liquid flows back through.
//
// # Where to start
//
// Vocabulary lists the tables; each table has a file of its own, named for it. head.go
// says what liquid flows, pipe.go and pump.go what moves it.
package hydraulic

import "lagbook/network/casefile"

// Vocabulary returns the tables of [hydraulic.*], for casefile.Read.
func Vocabulary() []casefile.Vocabulary {
	return []casefile.Vocabulary{{
		Domain: "hydraulic",
		Measures: casefile.Measures{Level: pressure, Flow: flow, LevelWord: "pressure", FlowWord: "flow",
			StoreWord: "vessel", Lump: "vessel", StoreKey: "compliance", StoreAlso: []string{"tank", "gas", "trapped", "piston"}, Sample: "2 bar"},
		Head: append([]casefile.Field{
			{Name: "pressures", Type: casefile.Word, Words: []string{"gauge", "absolute"}, Structural: true,
				Help: "what a plain level of pressure is; gauge unless stated"},
			atmosphere(),
		}, liquidFields()...),
		Check:  check,
		Tables: []casefile.Table{nodeTable(), lineTable(), restrictionTable(), checkTable(), outfallTable(), reliefTable(), pumpTable(), sourceTable()},
		NotBuilt: []string{
			"cylinder", "capsule", "line.pipe.exact",
		},
	}}
}

// check says what only all values together show.
func check(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	return append(checkLiquid(c, v), checkPipes(c, v)...)
}
