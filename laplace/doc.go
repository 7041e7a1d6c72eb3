// Package laplace answers linear systems in s and in t: poles and zeros, transfer
// functions, and the response to waveforms in closed form. It knows no network, no
// file and no physical quantity; packages that do reduce theirs to a Realisation.
//
// # Equations
//
// A System is C x' = Σ F (xj − xi) − Leak x + B u, y = Output x + D u, or plainly
// x' = A x + B u, y = C x + D u. Time t is in s, s and all poles p in rad/s, u and y
// in whatever units the caller has. H(s) is Output (sC + G)⁻¹ B + D for one input
// and one output; its residue r at a simple pole p is the weight of r·exp(pt) in the
// response to an impulse, and −r/p that of exp(pt) in the response to a step.
//
// # Conventions
//
// Poles and zeros are listed slowest first: ascending modulus, then real, then
// imaginary part, both members of a conjugate pair. Equal ones are one Pole with a
// multiplicity. Every pole carries a bound of its error; poles closer than their
// bounds are not told apart. A value at a jump is the one after it; Left gives the
// one before. Responses start from rest at t = 0: a caller with another start works
// in deviations from it and adds the base.
//
// # Accuracy
//
// Against answers of 30 digits (testdata/systems.json: 46 systems to order 64, 118
// transfers): poles of networks of resistances and capacitances 5e-15 relative, each
// of them, at spreads up to 1e19; other simple poles 3e-16, zeros 4e-15; gains 2e-15;
// responses 1.1e-13 of their largest value, repeated and nearly repeated poles
// included; rise, settling, peak and crossing times 4e-13. Where losses and feedback
// nearly cancel (T41 there) the doubles given fix the slow pole to 2e-13 only, and an
// output that is a difference of nearly equal levels has the absolute error of those
// levels: Rounding states it.
//
// # Method
//
// The system is taken apart into modes that do not act on each other: single real
// modes, single conjugate pairs, and blocks of modes too close to be told apart by
// their vectors (package matrix). Between two breaks of the inputs each of them
// answers to a + bτ + Σ exp by the functions φ₁(x) = (eˣ−1)/x and φ₂, so that slow
// poles, poles at 0, resonance and repeated poles are no cases of their own and
// nothing is subtracted that nearly cancels. Crossings and extremes are found by
// excluding every other part of the time with Taylor bounds: they are guaranteed,
// not picked from samples.
//
// # Not here
//
// Systems with delays, with coefficients that vary in time otherwise than in steps (a
// Schedule has those that do), and anything nonlinear.
//
// A Cycle is the periodic steady state, from (1 − e^{pP})z = w for each mode, and for a
// Schedule, whose systems take turns, from the map of the stores over a period. Steady
// periodic answers of 30 digits (testdata/periodic.json, 106 of 43 systems): 1e-14 of the
// largest value, 1.4e-13 where losses and feedback nearly cancel.
//
// # Where to start
//
// Build a Waveform for each input (Step, Points, Stairs, Pulse, Sine, Decay,
// Repeated), a System with New or FromMatrices, then ask Transfer, Step or Respond.
package laplace
