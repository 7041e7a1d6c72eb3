package study

import (
	"fmt"
	"math"
	"strings"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// FrequencyWord says how frequencies were asked for, and so how they are shown.
type FrequencyWord uint8

const (
	AsPeriod  FrequencyWord = iota // 24 h
	AsHertz                        // 2 Hz: turns
	AsRadians                      // 5 rad/s: angle
)

// A Band is a frequency, or a range of them, to be asked at.
type Band struct {
	From, To float64 // rad/s; equal for a single frequency. To may lie below From: periods that grow
	As       FrequencyWord
}

// mostPoints is how many frequencies one question may have.
const mostPoints = 100_000

// ParseBand reads one frequency or a range of them: "2 Hz", "5 rad/s", "24 h",
// "0.1 Hz..10 kHz", "1..24 h". A time is a period. Hz, rpm and rev/s count turns,
// rad/s and °/s an angle: 1 Hz is 2π rad/s. A bare 1/s could be either and is
// refused, as is anything that is not positive.
func ParseBand(text string) (Band, error) {
	first, second, isRange := strings.Cut(text, "..")
	if !isRange {
		w, as, err := parseFrequency(text)
		return Band{w, w, as}, err
	}
	if strings.Contains(second, "..") {
		return Band{}, fmt.Errorf("%q names more than two ends of a range", text)
	}
	to, as, err := parseFrequency(second)
	if err != nil {
		return Band{}, err
	}
	if v, err := quantity.Parse(first); err == nil && v.Dim == (quantity.Dim{}) {
		first = strings.TrimSpace(first) + " " + unitOfText(second) // the unit of both stands behind the second
	}
	from, _, err := parseFrequency(first)
	if err != nil {
		return Band{}, err
	}
	return Band{from, to, as}, nil
}

// parseFrequency returns ω in rad/s.
func parseFrequency(text string) (omega float64, as FrequencyWord, err error) {
	text = strings.TrimSpace(text)
	v, err := quantity.Parse(text)
	if err != nil {
		return 0, 0, fmt.Errorf("%q is no frequency: %w", text, err)
	}
	unit := unitOfText(text)
	switch {
	case v.Dim == dims["s"]:
		omega, as = 2*math.Pi/v.SI, AsPeriod
	case v.Dim != dims["1/s"]:
		return 0, 0, fmt.Errorf("%q is no frequency; expected Hz, rad/s or a period such as 24 h", text)
	case isAngle(unit):
		omega, as = v.SI, AsRadians
	case isTurns(unit):
		omega, as = 2*math.Pi*v.SI, AsHertz
	default:
		return 0, 0, fmt.Errorf("%q may mean turns or an angle; write Hz, rad/s or the period", text)
	}
	if !(v.SI > 0) || !(omega > 0) || math.IsInf(omega, 0) {
		return 0, 0, fmt.Errorf("%q: a frequency must be positive", text)
	}
	return omega, as, nil
}

// unitOfText returns what stands behind the number.
func unitOfText(text string) string {
	return strings.TrimLeft(strings.TrimSpace(text), "0123456789.,_+-−eE \u00a0\u202f\u2009")
}

// isAngle reports whether a unit counts an angle: rad/s, krad/s, °/min.
func isAngle(unit string) bool {
	return strings.Contains(unit, "rad") || strings.Contains(unit, "°")
}

// isTurns reports whether a unit counts turns or swings.
func isTurns(unit string) bool {
	return strings.Contains(unit, "Hz") || strings.Contains(unit, "rpm") || strings.Contains(unit, "rev")
}

// Omegas lists the frequencies of a band, in its direction, so many a factor of ten.
func (b Band) Omegas(perDecade int) []float64 {
	return laplace.FrequencyGrid(b.From, b.To, perDecade)
}

// points counts what Omegas would list.
func (b Band) points(perDecade int) float64 {
	return math.Abs(math.Log10(b.To)-math.Log10(b.From))*float64(perDecade) + 1
}
