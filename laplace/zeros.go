package laplace

import (
	"errors"
	"math"
	"math/cmplx"

	"lagbook/laplace/matrix"
)

// MaxExactOrder is the largest order up to which the number of poles that cancel
// is decided exactly, for the doubles of a balance taken as the rationals they are;
// beyond it error bounds decide. The cost grows with the cube of the order.
const MaxExactOrder = 64

// facts are what is known exactly of a transfer.
type facts struct {
	ok       bool // common is known
	common   int  // how many poles cancel
	zerosAt0 int
	polesAt0 int
}

// facts works them out for a system with one input and one output and its zeros. A
// zero or a pole at 0 is exactly 0 in what package matrix returns.
func (s *System) facts(zeros []seated) facts {
	var f facts
	if w := s.plant.stores; w != nil && s.plant.n <= MaxExactOrder && !s.rounded {
		if e, err := w.Exact(s.b[0], s.c[0], s.d[0][0], s.rateOf(0, 0)); err == nil {
			return facts{ok: true, common: e.Common, zerosAt0: e.OriginZeros, polesAt0: e.OriginPoles}
		}
	}
	for _, z := range zeros {
		if z.p == 0 {
			f.zerosAt0++
		}
	}
	for _, p := range s.poles {
		if p.P == 0 {
			f.polesAt0 += p.Mult
		}
	}
	return f
}

// zeros returns the finite zeros, those that cancel included. Their number is
// counted, not judged by size. vanishes reports that the transfer is identically
// zero although a path leads through it.
func (s *System) zeros() (list []seated, vanishes bool, err error) {
	var found []matrix.Root
	if w := s.plant.stores; w != nil {
		found, err = w.Zeros(s.b[0], s.c[0], s.d[0][0], s.rateOf(0, 0))
	} else {
		found, err = matrix.DenseZeros(s.plant.n, s.plant.dense, s.b[0], s.c[0], s.d[0][0])
	}
	if errors.Is(err, matrix.ErrZeroTransfer) {
		return nil, true, nil
	}
	for _, z := range found {
		if s.rounded && s.beyond(&z) {
			continue
		}
		list = append(list, seated{p: complex(z.Re, z.Im), radius: z.Radius})
	}
	return list, false, err
}

// beyondAll is how many times the fastest pole a zero lies that rounding of a leading
// coefficient has brought in from infinity.
const beyondAll = 1e12

// beyond reports a zero that rounded numbers have brought in from infinity.
func (s *System) beyond(z *matrix.Root) bool {
	size := math.Hypot(z.Re, z.Im)
	fastest := s.fastest()
	return fastest > 0 && size > beyondAll*fastest
}

func (s *System) fastest() (most float64) {
	for _, p := range s.poles {
		most = max(most, cmplx.Abs(p.P))
	}
	return most
}

// settleOrigin makes zeros of rounded numbers that cannot be told from 0 exactly 0.
func (s *System) settleOrigin(zeros []Pole) {
	for i, z := range zeros {
		if m := cmplx.Abs(z.P); s.rounded && m <= z.Radius && m <= s.fastest()/beyondAll {
			zeros[i].P = 0
		}
	}
}
