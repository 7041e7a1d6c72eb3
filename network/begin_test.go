package network_test

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
	"lagbook/network"
)

// On linear networks, Begin finds what Start finds by elimination: levels, flows, how,
// and whether there is a start at all.
func TestBeginAgreesWithStart(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s, fromRest := anyTubes(t), rapid.Bool().Draw(t, "from rest")
		for k := range s.tubes {
			if !fromRest { // what is steady without a resistance is a choice
				s.tubes[k].R = max(s.tubes[k].R, 0.25)
			}
		}
		m := s.build(t)
		m.p.HasAllStart = fromRest
		for k := range m.p.Wave {
			m.p.Wave[k] = laplace.Constant(float64(rapid.IntRange(-3, 3).Draw(t, "u")))
		}
		for i, k := range m.kinds {
			if k == store && rapid.Bool().Draw(t, "stated") {
				m.p.Start[i], m.p.HasStart[i] = float64(rapid.IntRange(-8, 8).Draw(t, "x")), true
			}
		}
		want, werr := m.net.Start(m.p)
		got, gerr := m.net.Begin(m.p)
		if (werr == nil) != (gerr == nil) {
			t.Fatalf("Start: %v; Begin: %v", werr, gerr)
		}
		if werr != nil {
			if errors.As(werr, new(*network.NoSteady)) != errors.As(gerr, new(*network.NoSteady)) {
				t.Fatalf("Start: %v; Begin: %v", werr, gerr)
			}
			return
		}
		if got.How != want.How {
			t.Fatalf("found %v, want %v", got.How, want.How)
		}
		size := 10.0
		for _, v := range want.Levels {
			size = max(size, math.Abs(v))
		}
		for b, v := range want.Flows {
			near(t, "flow", got.Flows[b], v, 1e-8, size)
		}
		for i, v := range want.Levels {
			near(t, "level", got.Levels[i], v, 1e-8, size)
		}
	})
}
