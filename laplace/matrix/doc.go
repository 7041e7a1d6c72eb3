// Package matrix holds the linear algebra of stores that exchange: the modes,
// steady states, zeros and exact ratios of
//
//	C_i x_i' = Σ_j F_ij (x_j − x_i) − Leak_i x_i + f_i.          (1)
//
// x_i is the level of store i, C_i > 0 its capacity, F_ij what it takes in per
// unit of difference to store j, Leak_i what it loses per unit of its own
// level, and f_i a flow into it, positive into the store. In a thermal network
// these are K, J/K, W/K, W/K and W; in a network of tanks Pa, m³/Pa, m³/(s·Pa)
// and m³/s. The package knows no units: it wants one coherent set, and poles
// then come out in 1/s.
//
// A Balance keeps (1) as it is stated. The diagonal Σ F + Leak is never formed,
// and that is the point of the package: in a stiff network the time constant
// that matters, the warm-up, hangs on a leak that is far below the rounding of
// that sum, and no method that starts from the assembled matrix can find it.
//
// # What to call
//
// RCWork.Modes, for symmetric F ≥ 0 and Leak ≥ 0 (Balance.IsRC), a network of
// resistances and capacitances: every pole to 1e-13 relative, whatever the
// spread, and for each input and output vector its value in every mode, from
// which transfer functions are sums. Islands without a leak have a pole at
// exactly 0.
//
// Balance.Eliminate, for steady states: subtraction-free where nothing in the
// balance is negative, streams (F_ij without F_ji) included; a *Singular names
// the stores whose level nothing determines.
//
// Balance.BlockForm, for any Balance, and DenseBlockForm for x' = A x: strongly
// connected parts one by one, an RC part by its modes and any other by a real
// Schur form scaled by √C; poles that nearly coincide stay together in one
// block and all others are uncoupled, so that x = X z with z' = diag(T_k) z and
// no response ever divides by the distance of two poles. Every pole carries a
// radius. Phi gives the functions e^{tT}, φ₁, φ₂ of such a block; with them the
// response to steps and ramps needs no residue, no pole is too close to
// another or to 0, and a short time costs no digits.
//
// Zeros, of a single-input single-output system, deflated by the relative
// degree that StructuralDegree counts in the graph, not by a tolerance, and
// refined in twice the working precision. Ratio, numerator and denominator of a
// transfer function of small order from the doubles taken as rationals.
//
// # Conventions
//
// Matrices are row-major slices of float64. The diagonal of F is ignored. Poles
// are listed slowest first; of a complex pair the member with Im < 0 comes
// first. Vectors of inputs are flows into the stores,
// those of outputs weights of the levels. Results depend on the input alone:
// sums run in a fixed order and nothing is concurrent. Vector instructions,
// where a processor has them, give the same bits as the plain code.
//
// # Errors
//
// An error means that there is no answer: ErrShape, ErrValue, ErrNotRC,
// ErrRange, *Singular. Everything that is returned is finite. A workspace must
// not be shared by goroutines; a Balance may.
//
// # Not here
//
// Time, waveforms and measures (package laplace); what a store is (package
// network); sparse methods: a dense N×N is meant to have N up to a few hundred.
package matrix
