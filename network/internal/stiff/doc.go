// Package stiff integrates
//
//	M x′ = F(t, x),   M diagonal and constant, zeros allowed,
//
// where rows with M = 0 are algebraic equations 0 = F(t, x) that can be solved for their
// own unknowns (index 1). It knows no network and no matrix: a System evaluates F and
// its derivatives and solves with shift·M − ∂F/∂x.
//
// The method is a Rosenbrock method of eight stages, order 5 with an embedded order 4,
// stiffly accurate and L-stable, whose order does not fall on linear stiff parts driven
// by time, nor for index 1: Rodas5P (G. Steinebach, Construction of Rosenbrock–Wanner
// method Rodas5P and numerical benchmarks within the Julia differential equations
// package, BIT Numerical Mathematics 63:27, 2023). One factorisation serves a step, no iteration can
// fail to converge, and linear invariants of F are kept to rounding. The step is written
// as in E. Hairer, G. Wanner, Solving Ordinary Differential Equations II, 2nd ed. 1996,
// IV.7 (7.25) and VI.3: with u_i the unknowns of stage i,
//
//	(M/(hγ) − J) u_i = F(t + c_i h, x + Σ a_ij u_j) + M Σ (C_ij/h) u_j + d_i h ∂F/∂t.
//
// Between the ends of a step the state is a polynomial of degree 4 with an error of the
// order of the embedded method's. Where a part that reacts at once follows something that
// moves with time, the ends of a step are right however long it is and the polynomial is
// not: there the middle is checked by one more evaluation and solve.
//
// Compared with the six stages of RODAS (order 4(3), same book) on the problems of the
// tests at a tolerance of 1e-7: half the steps, a third fewer solves, errors at the ends
// of about the tolerance with both, and between the ends of algebraic parts driven by time
// a tenth of the error.
package stiff
