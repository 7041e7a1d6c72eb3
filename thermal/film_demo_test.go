package thermal

import (
	"math"
	"testing"

	"lagbook/network/casefile/casetest"
)

// What the hand checks in the demo cases of films and fins promise.
func TestDemoCasesOfFilms(t *testing.T) {
	near := func(what string, got, want, within float64) {
		t.Helper()
		if math.Abs(got-want) > within {
			t.Errorf("%s: %.2f, the hand check says %g", what, got, want)
		}
	}
	m := casetest.Demo(t, "finned-sink.toml", Vocabulary()...)
	r := m.March(7200, "junction", "sink", "coefficient of fins")
	near("sink before the overload", r.At(1, 0)-kelvin, 76, 1)
	near("junction before it", r.Left(0, 0)-kelvin, 91, 1)
	near("coefficient of the fins", r.At(2, 0), 5.0, 0.1)
	near("sink after two minutes", r.At(1, 120)-kelvin, 92, 1)
	near("junction after two minutes", r.Max(0, 0, 600).Y-kelvin, 142, 3)
	near("junction in the repetition", r.Max(0, 6000, 7200).Y-kelvin, 150, 5)
	if b := r.Balance(); b > 1e-6 {
		t.Errorf("finned sink: balance within %g", b)
	}

	m = casetest.Demo(t, "sun-cabinet.toml", Vocabulary()...)
	const day = 86400.0
	r = m.March(3*day, "inside", "shell", "racks", "pack", "liquid fraction of pack")
	near("inside at its highest", r.Max(0, 2*day, 3*day).Y-kelvin, 41.5, 1)
	near("shell at 17 h", r.At(1, 2*day+17*3600)-kelvin, 43, 1.5)
	near("wax by morning", r.At(4, 2*day+6*3600), 0, 1e-9)
	near("wax in the evening", r.Max(4, 2*day, 3*day).Y, 1, 0.05)
	if b := r.Balance(); b > 1e-6 {
		t.Errorf("cabinet: balance within %g", b)
	}
}
