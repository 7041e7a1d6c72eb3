package hydraulic

import (
	"io/fs"
	"math"
	"math/cmplx"
	"testing"

	"lagbook/testdata/demo"
)

// What the hand check in the demo case promises.
func TestDemoCaseIsWhatItsHandCheckSays(t *testing.T) {
	text, err := fs.ReadFile(demo.Cases, "wash-line.toml")
	if err != nil {
		t.Fatal(err)
	}
	m := read(t, "wash-line.toml", string(text))
	r := m.respond(15, "vessel", "flow of rinse")
	final, ok := r.Final(0)
	if !ok {
		t.Fatal("no final value")
	}
	_, swings := m.lags()
	p := swings[0]
	for _, c := range []struct {
		what              string
		got, want, within float64
	}{
		{"natural frequency, rad/s", cmplx.Abs(p), 2.164, 0.02},
		{"damping", -real(p) / cmplx.Abs(p), 0.192, 0.002},
		{"vessel while washing, bar", r.Left(0, 0) / 1e5, 3.35, 0.005},
		{"rinse while washing, L/min", r.Left(1, 0) * 6e4, 3.35, 0.005},
		{"vessel in the end, bar", final / 1e5, 3.94, 0.005},
		{"peak, bar", r.Max(0, 0, 15).Y / 1e5, 5.2, 0.05},
	} {
		if !(math.Abs(c.got-c.want) <= c.within) {
			t.Errorf("%s: %.4g, the hand check says %.4g", c.what, c.got, c.want)
		}
	}
}
