package hydraulic

import (
	"math"
	"testing"

	"lagbook/network/casefile/casetest"
	"lagbook/testdata/demo"
)

// What the hand check in the demo case promises.
func TestDemoCaseIsWhatItsHandCheckSays(t *testing.T) {
	m := casetest.Demo(t, demo.Swing, Vocabulary()...)
	r := m.Respond(15, "vessel", "flow of rinse")
	p := m.Swings()[0]
	for _, c := range []struct {
		what              string
		got, want, within float64
	}{
		{"natural frequency, rad/s", casetest.NaturalFrequency(p), 2.164, 0.02},
		{"damping", casetest.Damping(p), 0.192, 0.002},
		{"vessel while washing, bar", r.Left(0, 0) / 1e5, 3.35, 0.005},
		{"rinse while washing, L/min", r.Left(1, 0) * 6e4, 3.35, 0.005},
		{"vessel in the end, bar", casetest.Final(t, r, 0) / 1e5, 3.94, 0.005},
		{"peak, bar", r.Max(0, 0, 15).Y / 1e5, 5.2, 0.05},
	} {
		if !(math.Abs(c.got-c.want) <= c.within) {
			t.Errorf("%s: %.4g, the hand check says %.4g", c.what, c.got, c.want)
		}
	}
}
