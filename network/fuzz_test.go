package network_test

import (
	"errors"
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// tape reads small numbers from fuzzed bytes, zeros at its end.
type tape []byte

func (t *tape) next() int {
	if len(*t) == 0 {
		return 0
	}
	v := (*t)[0]
	*t = (*t)[1:]
	return int(v)
}

// value reads a number: mostly ordinary, now and then one that physics forbids.
func (t *tape) value() float64 {
	v := t.next()
	if v >= 248 {
		return [...]float64{0, -1, math.NaN(), math.Inf(1), math.Inf(-1), 1e-300, 1e300, -1e-20}[v-248]
	}
	return math.Exp2(float64(v-124) / 4)
}

// Any graph and any numbers give a fault or finite answers, never a panic and
// never a value that is no number.
func FuzzNetwork(f *testing.F) {
	f.Add([]byte{3, 0, 1, 2, 6, 0, 0, 1, 0, 1, 2, 1, 0, 2, 2, 1, 1, 3, 1, 0})
	f.Add([]byte{2, 0, 2, 2, 0, 0, 1, 2, 1, 1, 100, 130, 140})
	f.Add([]byte{5, 1, 1, 1, 1, 1, 9, 0, 0, 1, 0, 1, 2, 0, 2, 3, 0, 3, 4, 3, 0, 0, 1, 4, 0, 250})
	f.Add([]byte{4, 2, 0, 1, 0, 5, 0, 0, 1, 0, 1, 2, 0, 2, 3, 2, 2, 2, 2, 1, 3, 120, 120, 120, 120, 248})
	f.Fuzz(func(t *testing.T, src []byte) {
		tp := tape(src)
		net, err := fuzzGraph(&tp)
		if err != nil {
			var faults *network.Faults
			if !errors.As(err, &faults) || len(faults.List) == 0 {
				t.Fatalf("Build: %v", err)
			}
			return
		}
		p := fuzzParams(&tp, net)
		outs := []network.Output{net.Level(0), net.Difference(0, network.NodeID(net.NodeCount()-1))}
		if len(p.G) > 0 {
			outs = append(outs, net.FlowOf(0))
		}
		r, err := net.Reduce(p, outs)
		if err != nil {
			if len(faultsOf(err)) == 0 {
				t.Fatalf("Reduce: %v", err)
			}
			return
		}
		fuzzAnswers(t, net, p, r, len(outs))
	})
}

func fuzzGraph(tp *tape) (*network.Network, error) {
	b := network.NewBuilder()
	n := 1 + tp.next()%7
	for i := range n {
		id := b.Node(string(rune('a'+i)), network.Ref(i))
		switch tp.next() % 3 {
		case 0:
			b.Capacity(id, network.NoRef)
		case 1:
			b.Hold(id, network.NoRef)
		}
	}
	at := func() network.NodeID { return network.NodeID(tp.next() % n) }
	for range tp.next() % 16 {
		switch tp.next() % 5 {
		case 0, 1:
			b.Resistance("r", at(), at(), network.NoRef)
		case 2:
			b.OneWay("w", at(), at(), network.NoRef)
		case 3:
			b.Feedback("k", at(), at(), network.NoRef)
		case 4:
			b.Source("q", at(), 1, network.NoRef)
		}
	}
	return b.Build()
}

func fuzzParams(tp *tape, net *network.Network) *network.Params {
	p := net.NewParams()
	for _, list := range [][]float64{p.C, p.G, p.W, p.K, p.About} {
		for i := range list {
			list[i] = tp.value()
		}
	}
	for i := range p.K {
		if tp.next()%2 == 0 {
			p.K[i] = -p.K[i]
		}
	}
	for i := range p.Wave {
		p.Wave[i] = laplace.Step(tp.value(), float64(tp.next()), float64(tp.next()%3))
	}
	p.AllStart, p.HasAllStart = float64(tp.next()), tp.next()%2 == 0
	for i := range p.Start {
		if tp.next()%4 == 0 {
			p.Start[i], p.HasStart[i] = tp.value(), true
		}
	}
	return p
}

func fuzzAnswers(t *testing.T, net *network.Network, p *network.Params, r *network.Reduction, outs int) {
	finite := func(what string, values ...float64) {
		for _, v := range values {
			if math.IsNaN(v) || math.IsInf(v, 0) {
				t.Fatalf("%s is %v", what, v)
			}
		}
	}
	b := r.Realisation.Balance
	finite("capacity", b.C...)
	finite("exchange", b.F...)
	finite("leak", b.Leak...)
	for _, rows := range [][][]float64{r.Realisation.B, r.Realisation.Output, r.Realisation.D} {
		for _, row := range rows {
			finite("port", row...)
		}
	}
	var none *network.NoSteady
	start, err := r.Start(p)
	if err != nil {
		if !errors.As(err, &none) {
			t.Fatalf("Start: %v", err)
		}
		return
	}
	finite("start level", start.Levels...)
	finite("imbalance", start.Imbalance...)
	resp, err := r.Respond(p, 10)
	if err != nil {
		return // a feedback may drive a level beyond the largest number
	}
	for o := range outs {
		if y := resp.At(o, 0); math.IsNaN(y) {
			t.Fatalf("output %d begins at %v", o, y)
		}
	}
}
