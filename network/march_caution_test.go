package network_test

import (
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// wary is a linear flow that is sure of itself up to a difference of its own.
type wary struct{ g, upTo float64 }

func (w wary) Flow(a, b float64) (q, da, db float64) { return w.g * (a - b), w.g, -w.g }

func (w wary) Caution(a, b float64) (code, text string) {
	if a-b > w.upTo {
		return "far", "too far apart"
	}
	return "", ""
}

// What a law warns of from the start on is noted at 0, and what it warns of from a jump on
// at the jump, not at the end of the step that follows.
func TestCautionAtTheStart(t *testing.T) {
	for _, c := range []struct{ upTo, want float64 }{{3, 0}, {7, 2}} {
		b := network.NewBuilder()
		main, store := b.Node("main", network.NoRef), b.Node("store", network.NoRef)
		h := b.Hold(main, network.NoRef)
		b.Capacity(store, network.NoRef)
		k := b.Between("way", main, store, false, network.NoRef)
		net, p := finished(t, b)
		p.C[0], p.Start[store], p.HasStart[store] = 1e9, 0, true
		p.Law[k] = &network.Through{Flow: wary{0.1, c.upTo}}
		var err error
		if p.Wave[h], err = laplace.Stairs([][2]float64{{0, 5}, {2, 9}}); err != nil {
			t.Fatal(err)
		}
		p.Wave[h].Before = 5
		r := marched(t, net, p, []network.Output{net.Level(store)}, network.Run{Until: 4})
		if list := r.Cautions(); len(list) != 1 || list[0].At != c.want || list[0].Code != "far" {
			t.Errorf("up to %v: %+v, want one at %v", c.upTo, list, c.want)
		}
	}
}
