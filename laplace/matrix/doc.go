// Package matrix holds the linear algebra of stores that exchange: the modes,
// steady states, frequency responses, zeros and exact ratios of
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
// Stores adds flows that store too, pipes with their inertance: couplings K of any
// sign, and a mass matrix where inertances move together. Functions that begin with
// Dense take a plain matrix a, x' = a x.
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
// the stores whose level nothing determines. Stores.AtRest, for stores of every kind,
// in doubled precision.
//
// BlockForm of a Balance or of Stores, and DenseBlockForm: strongly connected parts
// one by one, an RC part by its modes and any other by a real Schur form of the
// matrix scaled by √C and balanced; poles that nearly coincide stay together in one
// block and all others are uncoupled, so that x = X z with z' = diag(T_k) z and
// no response ever divides by the distance of two poles. Every pole carries a
// radius. Phi gives the functions e^{tT}, φ₁, φ₂ of such a block; with them the
// response to steps and ramps needs no residue, no pole is too close to
// another or to 0, and a short time costs no digits. BlockWork does many, one after
// the other, in one place.
//
// Stores.Resolvent and DenseResolvent, for the transfer function at any s with
// Re s ≥ 0, from the equations and not from poles and residues.
//
// Zeros of a Balance or of Stores, and DenseZeros, of one input and one output, refined
// in twice the working precision; how many there are is counted in the graph
// (StructuralDegree) and by exact arithmetic, not by a tolerance. Exact decides without
// error what degrees there are, what lies at 0 and how many poles cancel. Ratio gives
// numerator and denominator of a transfer function of small order. Both take the doubles
// as the rational numbers they are.
//
// Path and Restrict cut out the stores that take part in a transfer.
//
// # Conventions
//
// Matrices are row-major slices of float64. The diagonal of F is ignored. Poles
// are listed slowest first; of a complex pair the member with Im < 0 comes
// first. Vectors of inputs are flows into the stores, those of outputs weights of the
// levels. Results depend on the input alone: sums run in a fixed order and nothing is
// concurrent. Vector instructions, where a processor has them, give the same bits as
// the plain code.
//
// # Errors
//
// An error means that there is no answer: ErrShape, ErrValue, ErrNotRC, ErrRange,
// ErrNoConvergence, ErrZeroTransfer, ErrOrder, *Singular. Modes, block
// forms, roots, ratios and φ functions are finite; a Resolvent is infinite at a pole. A workspace
// (RCWork, BlockWork, Resolvent) must not be shared by goroutines; a Balance, Stores and
// every result may.
//
// # Not here
//
// Time, waveforms and measures (package laplace); what a store is (package
// network); sparse methods: a dense N×N is meant to have N up to a few hundred.
package matrix
