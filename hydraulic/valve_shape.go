package hydraulic

import "math"

// A trim says how much of what a valve passes fully open it passes at a stroke. Each runs
// from 0 at a stroke of 0, with a finite slope there, to 1 at 1.
type trim uint8

const (
	linearTrim trim = iota
	equalPercentage
	quickOpening
	pointsTrim
)

// trimWords are the words of the case for them, in that order.
var trimWords = []string{"linear", "equal percentage", "quick opening"}

// usualRangeability is that of a valve with an equal-percentage trim: common practice, no source.
const usualRangeability = 50

// quickFoot is the stroke up to which a quick-opening trim opens straight.
const quickFoot = 0.01

// A characteristic is the trim of one valve.
type characteristic struct {
	trim   trim
	spread float64      // rangeability of equal percentage, > e
	points [][2]float64 // stroke, share; from [0, 0], strokes going up
}

// at returns the share at a stroke, and its slope. Below 0 and above 1 it goes on straight.
func (c *characteristic) at(h float64) (share, slope float64) {
	switch c.trim {
	case equalPercentage:
		return c.percentage(h)
	case quickOpening:
		return quick(h)
	case pointsTrim:
		return c.between(h)
	}
	return h, 1
}

// percentage is R^(h−1) (IEC 60534-2-4), which at 0 is not 0: below the stroke 1/ln R it
// is the straight line through zero that touches it there.
func (c *characteristic) percentage(h float64) (share, slope float64) {
	log := math.Log(c.spread)
	if h > 1 {
		return 1 + log*(h-1), log
	}
	if h < 1/log {
		slope = log * math.Exp(1-log)
		return slope * h, slope
	}
	share = math.Exp(log * (h - 1))
	return share, log * share
}

// quick is √h (Seborg, Edgar and Mellichamp, Process Dynamics and Control, 1989, section
// 9.2, from memory), straight up to a hundredth of the stroke.
func quick(h float64) (share, slope float64) {
	switch {
	case h > 1:
		return 1 + (h-1)/2, 0.5
	case h < quickFoot:
		slope = 1 / math.Sqrt(quickFoot)
		return slope * h, slope
	}
	share = math.Sqrt(h)
	return share, 0.5 / share
}

// between runs straight from point to point.
func (c *characteristic) between(h float64) (share, slope float64) {
	i := 1
	for i < len(c.points)-1 && h >= c.points[i][0] {
		i++
	}
	a, b := c.points[i-1], c.points[i]
	slope = (b[1] - a[1]) / (b[0] - a[0])
	return a[1] + slope*(h-a[0]), slope
}
