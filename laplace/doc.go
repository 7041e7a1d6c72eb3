// Package laplace answers linear systems in s and in t: poles and zeros, transfer
// functions, responses to waveforms, periodic steady states and frequency responses in
// closed form, and transforms that are given as functions only by inversion. It knows no
// network, no file and no physical quantity; packages that do reduce theirs to a
// Realisation.
//
// # Equations
//
// A System is C x' = Σ F (xj − xi) − Leak x + K x + B u, y = Output x + D u + Rate u', or
// plainly x' = A x + B u, y = C x + D u. Time t is in s, s and all poles p in rad/s, u and
// y in whatever units the caller has. H(s) is Output (sC + G)⁻¹ B + D + s·Rate for one
// input and one output; its residue r at a simple pole p is the weight of r·exp(pt) in the
// response to an impulse, and −r/p that of exp(pt) in the response to a step.
//
// # Conventions
//
// Poles and zeros are listed slowest first: ascending modulus, then real, then imaginary
// part, so that of a conjugate pair, whose members are both listed and exact conjugates,
// the one with Im < 0 comes first. Equal ones are one Pole with a multiplicity. Every pole
// carries a bound of its error; poles closer than their bounds are not told apart.
// Coefficients of polynomials are ascending in s.
//
// A value at a jump is the one after it; Left gives the one before. Responses start from
// rest at t = 0: a caller with another start works in deviations from it and adds the base.
//
// # Where to start
//
// Build a Waveform for each input (Step, Points, Stairs, Pulse, Sine, Decay, Repeated), out
// of others where need be (Sum, Product, Power, Quotient, or Apply for any function, sampled),
// and a System with New or FromMatrices. Then
//
//	System.Transfer      H(s) of one input and output: poles, zeros, residues, gain
//	System.Step          the measures of a step: rise, settling, overshoot, peak
//	System.Respond       y(t): tables, crossings, extremes, the final value
//	System.Cycle         the periodic steady state under inputs that repeat or settle,
//	                     and with Approach how soon a start has come to it
//	Schedule             the same for systems that take turns: numbers that switch at
//	                     stairs, the stores keeping what they hold
//	Transfer.Frequency   gain and phase, the largest gain, where it falls below a level
//	FromRatio, FromRoots, Series, Parallel, Feedback, WithoutPairs, TimeConstants,
//	PartialFractions, Region
//	                     transfer functions made, connected, thinned, rewritten and judged
//	Invert               f(t) of a transform known only as a function of complex s
//
// # Improper systems
//
// An output with a Rate follows the derivative of an input: the pressure of a held node
// that stores, say. Its transfer is "improper", RelativeDegree −1, with one zero more than
// poles. Where such an input jumps the output has an impulse, which no number of a
// Response or a Cycle shows: Impulses lists them.
//
// # Answers and refusals
//
// What is returned is finite, but for what is said to be infinite where it stands: the
// gain at a pole on the imaginary axis, the error of an Estimate without ground. What does
// not exist is absent: false, nil or an empty list, never NaN. An error means that there
// is no answer: a type for each reason that a caller may want to tell apart (*TooMany,
// *Overflow, *Unsettled, *NotCommensurate, *Resonant, *NotDecaying, *Drifting,
// *NotContracting, *SwitchError, *NotInverted, *NotClosed, *NoValue, *HiddenJump). What was decided within error bounds only,
// or where a search stopped at its cap, is said beside the answer: Transfer.Warnings,
// Touch, Capped, Estimate.Trusted. Waves or bases
// that are not as many as the inputs or outputs panic.
//
// Systems, transfers, responses and cycles are never changed once made and may be used
// from several goroutines. A FrequencyResponse is a workspace and a Schedule keeps the
// systems it has met: goroutines must not share either, nor cycles of one Schedule.
// The same arguments give the same bits.
//
// # Accuracy
//
// Against answers of 30 digits (testdata/systems.json: 46 systems to order 64, 118
// transfers): poles of networks of resistances and capacitances 5e-15 relative, each
// of them, however stiff; other poles 3e-16, zeros 4e-15; gains 2e-15; coefficients
// 1e-15; responses 1.1e-13 of their largest value, repeated and nearly repeated poles
// and inputs of the 12th degree in time included; rise, settling, peak and crossing times 4e-13; gain at a frequency 1.2e-14
// relative, phase 7e-13 degrees. Periodic steady states (testdata/periodic.json, 106 of 43
// systems): 1.1e-14 of the largest value. Inversions (testdata/distributed.json): trusted
// values 7e-11 of the range.
//
// Where losses and feedback nearly cancel (T41 there) the doubles given fix the slow pole
// to 2e-13 only, and an output that is a difference of nearly equal levels (T28) has the
// absolute error of those levels: Rounding states it.
//
// # Method
//
// The system is taken apart into modes that do not act on each other: single real
// modes, single conjugate pairs, and blocks of modes too close to be told apart by
// their vectors (package matrix). Between two breaks of the inputs each of them
// answers to a + bτ + cτ² + … + Σ exp by the functions φ₁(x) = (eˣ−1)/x, φ₂, φ₃, … so that slow
// poles, poles at 0, resonance and repeated poles are no cases of their own and
// nothing is subtracted that nearly cancels. Crossings and extremes are found by
// excluding every other part of the time with Taylor bounds: they are guaranteed,
// not picked from samples. A Cycle starts at the solution of (1 − e^{pP})z = w for each
// mode, and for a Schedule at that of the map of the stores over a period. Frequency
// responses are solved from the equations, not summed from residues.
//
// # Not here
//
// Systems with delays (Invert alone takes one out), with coefficients that vary in time
// otherwise than in steps, and anything nonlinear.
package laplace
