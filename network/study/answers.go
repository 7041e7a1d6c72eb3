package study

import (
	"math"

	"lagbook/laplace"
	"lagbook/network"
)

// answers is what tables and limits ask of the outputs against time, whether they are
// the closed form of a linear network, a march, or a linear answer added to a state.
type answers interface {
	At(out int, t float64) float64
	Left(out int, t float64) float64 // just before a jump at t
	Table(at []float64, y [][]float64)
	Max(out int, t0, t1 float64) laplace.Extreme
	Min(out int, t0, t1 float64) laplace.Extreme
	First(out int, level, t0, t1 float64) (laplace.Root, bool)
	FirstOutside(out int, lo, hi, t0, t1 float64) (laplace.Root, bool)
	LastOutside(out int, mid, band, t0, t1 float64) (laplace.Root, bool)
	MaxRate(out int, t0, t1 float64) laplace.Extreme
	MinRate(out int, t0, t1 float64) laplace.Extreme
	Integral(out int, t0, t1 float64) float64
	Final(out int) (float64, bool)
	Rounding(out int) float64
	Breaks() []float64
}

var (
	_ answers = (*laplace.Response)(nil)
	_ answers = (*network.Trajectory)(nil)
	_ answers = (*added)(nil)
	_ answers = (*resulting)(nil)
)

// added is a response of deviations with the values that they deviate from.
type added struct {
	*laplace.Response
	base []float64 // by output
}

func (a *added) At(out int, t float64) float64   { return a.base[out] + a.Response.At(out, t) }
func (a *added) Left(out int, t float64) float64 { return a.base[out] + a.Response.Left(out, t) }

func (a *added) Table(at []float64, y [][]float64) {
	a.Response.Table(at, y)
	for out, row := range y {
		for i := range row {
			row[i] += a.base[out]
		}
	}
}

func (a *added) Max(out int, t0, t1 float64) laplace.Extreme {
	e := a.Response.Max(out, t0, t1)
	e.Y += a.base[out]
	return e
}

func (a *added) Min(out int, t0, t1 float64) laplace.Extreme {
	e := a.Response.Min(out, t0, t1)
	e.Y += a.base[out]
	return e
}

func (a *added) First(out int, level, t0, t1 float64) (laplace.Root, bool) {
	return a.Response.First(out, level-a.base[out], t0, t1)
}

func (a *added) FirstOutside(out int, lo, hi, t0, t1 float64) (laplace.Root, bool) {
	return a.Response.FirstOutside(out, lo-a.base[out], hi-a.base[out], t0, t1)
}

func (a *added) LastOutside(out int, mid, band, t0, t1 float64) (laplace.Root, bool) {
	return a.Response.LastOutside(out, mid-a.base[out], band, t0, t1)
}

func (a *added) Integral(out int, t0, t1 float64) float64 {
	return a.base[out]*(t1-t0) + a.Response.Integral(out, t0, t1)
}

func (a *added) Final(out int) (float64, bool) {
	y, ok := a.Response.Final(out)
	return a.base[out] + y, ok
}

func (a *added) Rounding(out int) float64 {
	return a.Response.Rounding(out) + math.Abs(a.base[out])*0x1p-52
}
