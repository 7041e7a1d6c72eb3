package hydraulic

import "testing"

// A tank of 2 m² that 10 L/s fill: over its crest of 1 m after 150 s from 0.25 m, and the
// surface stands there while 10 L/s run over, until they are 2 L/s drawn.
func TestTankRunsOver(t *testing.T) {
	m := read(t, "over", water+`
[hydraulic.node.t]
tank  = { area = "2 m²", floor = "3 m", top = "4.2 m", overflow = "4 m" }
start = { level = "0.25 m" }
[hydraulic.source.in]
into  = "t"
drive = { stairs = [["0 s", "10 L/s"], ["250 s", "-2 L/s"], ["350 s", "0 L/s"]] }
`)
	tr := m.March(400, "level of t", "spill of t", "stored of t", "t")
	if got := told(tr); got != "150 runs over; 250 runs over no more" {
		t.Error(got)
	}
	isNear(t, "level at the crest", tr.At(0, 200), 1, 1e-5)
	isNear(t, "what runs over", tr.At(1, 200), 0.01, 1e-8)
	isNear(t, "run over altogether", tr.Integral(1, 0, 400), 1, 1e-5)
	isNear(t, "level after 100 s of draining", tr.At(0, 350), 0.9, 1e-5)
	isNear(t, "stored", tr.At(2, 350), 1.8, 1e-5)
	isNear(t, "pressure at the floor", tr.At(3, 0), 1000*gravity*0.25, 1e-9)
	if tr.Balance() > 1e-7 {
		t.Errorf("the balance closes to %v", tr.Balance())
	}
}

// A tank without an overflow runs over its top, which is said.
func TestTankRunsOverItsTop(t *testing.T) {
	m := read(t, "brim", water+`
[hydraulic.node.t]
tank  = { area = "2 m²", top = "1 m" }
start = { level = "0.5 m" }
[hydraulic.source.in]
into  = "t"
drive = "10 L/s"
`)
	tr := m.March(200, "level of t", "spill of t")
	if got := told(tr) + "; " + cautioned(tr); got != "100 runs over its top; over-top" {
		t.Error(got)
	}
	isNear(t, "spill", tr.At(1, 150), 0.01, 1e-9)
}

// Drawn on, a tank runs empty; what is drawn then is air, and it fills again when liquid comes.
func TestTankRunsEmpty(t *testing.T) {
	m := read(t, "empty", water+`
[hydraulic.node.t]
tank  = { area = "2 m²", top = "3 m" }
start = { level = "0.5 m" }
[hydraulic.source.in]
into  = "t"
drive = { stairs = [["0 s", "-10 L/s"], ["120 s", "10 L/s"]] }
`)
	tr := m.March(220, "level of t")
	if got := told(tr) + "; " + cautioned(tr); got != "100 runs empty; 120 holds liquid again; tank-empty" {
		t.Error(got)
	}
	isNear(t, "level while empty", tr.At(0, 110), 0, 2e-5)
	isNear(t, "level filled again", tr.At(0, 220), 0.5, 3e-5)
}

// What is shown of an empty tank is 0, not the dregs that hold its level a little below its floor,
// though what hangs below it goes on drawing.
func TestEmptyTankShowsNothing(t *testing.T) {
	m := read(t, "empty", water+`
[hydraulic.node.t]
tank  = { shape = "cone", diameter = "2 m", bottom = "0.2 m", height = "3 m" }
start = { level = "0.3 m" }
[hydraulic.node.drain]
elevation = "-2 m"
held      = "0 bar"
[hydraulic.restriction.hole]
between = ["t", "drain"]
orifice = { bore = "30 mm", coefficient = 0.62 }
`)
	tr := m.March(400, "level of t", "stored of t")
	if got := told(tr) + "; " + cautioned(tr); got != "7.141 runs empty; tank-empty" {
		t.Error(got)
	}
	for k, what := range []string{"level", "stored"} {
		if got := tr.At(k, 300); got != 0 {
			t.Errorf("%s of the empty tank is %v", what, got)
		}
	}
}

// A plain crest at the height where the tank ends is where it runs over: nothing is lost over the
// walls then, and nothing is said of them.
func TestCrestAtTheTop(t *testing.T) {
	m := read(t, "crest", water+`
[hydraulic.node.t]
tank  = { points = [["0 m", "1 m²"], ["1 m", "3 m²"], ["2 m", "3 m²"]], overflow = "2 m" }
start = { level = "0.5 m" }
[hydraulic.source.in]
into  = "t"
drive = "2 L/s"
`)
	tr := m.March(3900, "level of t", "spill of t")
	if got := told(tr) + "; " + cautioned(tr); got != "2125 runs over; " {
		t.Error(got)
	}
	isNear(t, "level", tr.At(0, 3800), 2, 1e-5)
	isNear(t, "what runs over", tr.At(1, 3800), 2e-3, 1e-8)
}
