// Package quantity reads, reckons with and prints numbers that carry units.
//
// Inside lagbook everything is SI and float64. Parse turns "0.35 K/W" into a
// Value, Want hands out its double where dimension and kind are right, Print
// writes a double for people, Scale for files. The decimal the user wrote is
// kept as a fraction beside the double, so that it is decided exactly whether
// two numbers of a case are equal.
//
// # Units
//
// SI with all its prefixes, the units used beside it, and the US customary
// units of the trade; the factors are exact (see unit). Symbols are
// case-sensitive: Mm is a megametre. Factors are joined by ·, * or a space, a
// division is / with one factor or a bracket below it; powers are ², ^2, ^-1 or
// a digit (m2). W/m·K and W/m/K are refused, since some mean W/(m·K) by them.
//
//	µ μ u   micro                      °C ℃ degC     the same
//	US gal  or galUS; gal is refused   Btu, BTU      the IT one
//	hp      550 ft·lbf/s               TR            ton of refrigeration
//	a       365.25 d                   rpm           1/60 s⁻¹, in turns
//
// Angles and turns are plain numbers: rad and rev are 1, so 1 rpm is 1/60 s⁻¹
// and 1 rad/s is 1 s⁻¹.
//
// # Levels and differences
//
// "40 °C" alone is a level, in K from absolute zero; "40 K" is a level or a
// difference, as the place it stands in asks; inside a compound unit a degree
// is a difference. Δ°C and Δ°F are differences that say so. Level − level is a
// difference, level ± difference a level, min and max of levels a level;
// everything else with a level is refused, a percentage of it too. Pressures do
// the same with bar(g), barg, psig and bar(a), bara, psia; a plain pressure
// serves as either and as a difference.
//
// # Expressions
//
// Compile reads + - * / ^, brackets, sqrt exp ln abs min max, pi, names and
// numbers with units. What follows a number as a unit belongs to it, before any
// operator: 1/2 m is 1/(2 m), 2 mm^2 is two square millimetres. The unit goes on
// over a space or a ·, and over a / or * that touches both its neighbours, as
// long as units follow; it ends at a name. So
//
//	20 W/(m·K) * t     a conductivity times t
//	20 W / area        the spaces end the unit: a power divided by area
//	20 W/area          area is no unit: the same
//	20 W/m             refused where m is a name of the case
//
// Curves computes an expression of which some names stand for quantities that
// change with time: it checks units and levels by the same rules, and leaves the
// operations on what changes to its caller.
//
// # Not here
//
// Amount of substance and luminous intensity, logarithmic units, and normal
// cubic metres have no dimension in Dim.
package quantity
