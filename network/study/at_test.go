package study_test

import (
	"math"
	"strings"
	"testing"

	"lagbook/network/study"
)

// Turns and angles are told apart, a time is a period, and a range keeps its direction.
func TestParseBand(t *testing.T) {
	const turn = 2 * math.Pi
	for _, c := range []struct {
		text     string
		from, to float64
		as       study.FrequencyWord
	}{
		{"2 Hz", 2 * turn, 2 * turn, study.AsHertz},
		{"5 rad/s", 5, 5, study.AsRadians},
		{"24 h", turn / 86400, turn / 86400, study.AsPeriod},
		{"8760 h", turn / 8760 / 3600, turn / 8760 / 3600, study.AsPeriod},
		{"50 rpm", 50 * turn / 60, 50 * turn / 60, study.AsHertz},
		{"3 rev/min", turn / 20, turn / 20, study.AsHertz},
		{"10 mrad/s", 0.01, 0.01, study.AsRadians},
		{"360 °/s", turn, turn, study.AsRadians},
		{"0.1 Hz..10 kHz", 0.1 * turn, 1e4 * turn, study.AsHertz},
		{" 1..24 h", turn / 3600, turn / 86400, study.AsPeriod},
		{"1e-3 .. 2 rad/s", 1e-3, 2, study.AsRadians},
		{"1 min..10 Hz", turn / 60, 10 * turn, study.AsHertz},
		{"12.5 ms", turn / 0.0125, turn / 0.0125, study.AsPeriod},
	} {
		b, err := study.ParseBand(c.text)
		if err != nil {
			t.Errorf("%q: %v", c.text, err)
			continue
		}
		if math.Abs(b.From-c.from) > 4e-16*c.from || math.Abs(b.To-c.to) > 4e-16*c.to || b.As != c.as {
			t.Errorf("%q is %+v, want %v to %v", c.text, b, c.from, c.to)
		}
	}
}

// What is no frequency is refused, with what to write instead.
func TestParseBandRefuses(t *testing.T) {
	for text, want := range map[string]string{
		"1 1/s":      "turns or an angle",
		"3 s^-1":     "turns or an angle",
		"1/d":        "turns or an angle",
		"2":          "expected Hz, rad/s or a period",
		"5 m":        "expected Hz, rad/s or a period",
		"0 Hz":       "must be positive",
		"-3 rad/s":   "must be positive",
		"0 s":        "must be positive",
		"":           "frequency",
		"..":         "frequency",
		"1 Hz..":     "frequency",
		"1..2..3 Hz": "more than two ends",
		"1 m..2 Hz":  "expected Hz, rad/s or a period",
		"2 hz":       "frequency",
		"nan Hz":     "frequency",
		"1e999 Hz":   "frequency",
	} {
		if b, err := study.ParseBand(text); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q: %+v, %v; want %q", text, b, err, want)
		}
	}
}

// Whatever is typed, there is an error or a band of positive numbers, whose points lie in it.
func FuzzParseBand(f *testing.F) {
	for _, s := range []string{"2 Hz", "5 rad/s", "24 h", "0.1 Hz..10 kHz", "1..24 h", "..", "1e308 s", "1 °/s", "−3 Hz", "1 Hz..1 Hz"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		b, err := study.ParseBand(text)
		if err != nil {
			return
		}
		if !(b.From > 0) || !(b.To > 0) || math.IsInf(b.From, 0) || math.IsInf(b.To, 0) {
			t.Fatalf("%q is %+v", text, b)
		}
		if math.Abs(math.Log10(b.To/b.From)) > 100 {
			return
		}
		for _, w := range b.Omegas(3) {
			if !(w >= min(b.From, b.To)*(1-1e-12) && w <= max(b.From, b.To)*(1+1e-12)) {
				t.Fatalf("%q: %v lies outside %+v", text, w, b)
			}
		}
	})
}
