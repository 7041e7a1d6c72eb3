package casetest

import (
	"math"
	"math/cmplx"
)

// Poles returns the poles, each as often as it occurs, slowest first.
func (m *Model) Poles() []complex128 {
	m.t.Helper()
	var list []complex128
	for _, p := range m.Reduce().System.Poles() {
		for range p.Mult {
			list = append(list, p.P)
		}
	}
	return list
}

// RealParts of the poles, each as often as it occurs, slowest first.
func (m *Model) RealParts() []float64 {
	m.t.Helper()
	var list []float64
	for _, p := range m.Poles() {
		list = append(list, real(p))
	}
	return list
}

// TimeConstants are those of the real poles that are not zero, slowest first.
func (m *Model) TimeConstants() []float64 {
	m.t.Helper()
	var list []float64
	for _, p := range m.Reduce().System.Poles() {
		for range p.Mult {
			if imag(p.P) == 0 && cmplx.Abs(p.P) > p.Radius {
				list = append(list, -1/real(p.P))
			}
		}
	}
	return list
}

// Swings are the poles with positive imaginary part, one for each pair, slowest first.
func (m *Model) Swings() []complex128 {
	m.t.Helper()
	var list []complex128
	for _, p := range m.Poles() {
		if imag(p) > 0 {
			list = append(list, p)
		}
	}
	return list
}

// NaturalFrequency of a pole, in rad/s.
func NaturalFrequency(p complex128) float64 { return cmplx.Abs(p) }

// Damping of a pole, as a ratio.
func Damping(p complex128) float64 { return -real(p) / cmplx.Abs(p) }

// period of a swing, damped as it is, in s.
func period(p complex128) float64 { return 2 * math.Pi / imag(p) }
