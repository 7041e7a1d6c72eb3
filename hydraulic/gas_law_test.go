package hydraulic

import (
	"math"
	"math/cmplx"
	"testing"

	"lagbook/network"
)

func gasStamp(l *gasLaw, p float64) *network.Stamp {
	s := &network.Stamp{X: []float64{p}, F: make([]float64, 1), DF: make([]float64, 1), Mem: make([]float64, 1)}
	if l.constant > 0 {
		*s = network.Stamp{X: []float64{p, 0}, F: make([]float64, 2), DF: make([]float64, 4), Mem: make([]float64, 1), DStoredBy: make([]float64, 1)}
	}
	return s
}

// 10 L charged to 90 bar(a): compliances and volumes at the precharge and at 150 bar(a)
// (ideal gas, EL-07 of a collection of reference cases, by the law).
func TestGasCompliance(t *testing.T) {
	for _, c := range []struct{ n, p, compliance, volume float64 }{
		{1, 9e6, 1.111111111111111e-9, 0.01}, {1.4, 9e6, 7.936507936507936e-10, 0.01},
		{1, 15e6, 4e-10, 0.006}, {1.4, 15e6, 3.3061101026050023e-10, 0.006942831215470504},
	} {
		l := &gasLaw{volume: 0.01, charge: 9e4, exponent: c.n}
		s := gasStamp(l, 9e6)
		l.Begin(s, true) // starts full of gas
		s.X[0] = c.p
		l.Eval(s)
		if math.Abs(s.DStored/c.compliance-1) > 1e-12 || math.Abs((l.volume-s.Stored)/c.volume-1) > 1e-12 {
			t.Errorf("n = %v at %v Pa: C = %v, V = %v", c.n, c.p, s.DStored, l.volume-s.Stored)
		}
	}
}

// A bottle of 10 L charged to 90 bar(a) and slowly filled to 100 bar(a) holds 9 L of gas.
// Pressed on to 300 bar(a) in no time it holds 9·(100/300)^(1/1.4) = 4.106 L; the exponent
// run through the precharge point would give 10·(90/300)^(1/1.4) = 4.232 L (by the law).
func TestGasIsIsothermalToItsStart(t *testing.T) {
	l := &gasLaw{volume: 0.01, charge: 9e4, exponent: 1.4}
	s := gasStamp(l, 1e7)
	if l.Eval(s); math.Abs(l.volume-s.Stored-0.009) > 1e-12 {
		t.Errorf("before the start %v m³ of gas", l.volume-s.Stored)
	}
	l.Begin(s, false)
	if l.Eval(s); math.Abs(l.volume-s.Stored-0.009) > 1e-12 {
		t.Errorf("at the start %v m³ of gas", l.volume-s.Stored)
	}
	s.X[0] = 3e7
	l.Eval(s)
	if got, want := l.volume-s.Stored, 0.009*math.Pow(1.0/3, 1/1.4); math.Abs(got-want) > 1e-12 {
		t.Errorf("after it %v m³ of gas, want %v", got, want)
	}
}

// Pressure tank, 85 gal, precharge 28 psig, between 30 and 50 psig with 14.7 psi of air:
// drawdown 25.1 gal (The Driller, "How to calculate and control pressure tank drawdown",
// example 1; its formula takes the cut-in pressure for the charge: (P1/P2 − P1/P3)·V with the precharge as P1).
func TestDrawdown(t *testing.T) {
	const psi, gallon, air = 6894.757293168361, 3.785411784e-3, 14.7 * 6894.757293168361
	l := &gasLaw{volume: 85 * gallon, charge: 85 * gallon * (28*psi + air), exponent: 1, absolute: air}
	stored := func(gauge float64) float64 {
		s := gasStamp(l, gauge)
		l.Eval(s)
		return s.Stored
	}
	if got := (stored(50*psi) - stored(30*psi)) / gallon; math.Abs(got-25.099495520540508) > 1e-9 {
		t.Errorf("drawdown %v gal, printed 25.1", got)
	}
}

// With a thermal time constant the small-signal compliance is C_ad + (C_iso − C_ad)/(1 + τs).
func TestGasThatExchangesHeat(t *testing.T) {
	const tau, p = 7.0, 15e6
	l := &gasLaw{volume: 0.01, charge: 9e4, exponent: 1.4, constant: tau}
	s := gasStamp(l, p)
	l.Begin(s, false)
	l.Eval(s)
	if v := l.volume - s.Stored; math.Abs(v/0.006-1) > 1e-12 || math.Abs(s.F[1]) > 1e-15 {
		t.Fatalf("at rest %v m³ of gas, w' = %v", v, s.F[1])
	}
	iso, ad := 0.006/p, 0.006/(1.4*p)
	for _, w := range []float64{1e-3, 0.05, 0.14, 1, 40} {
		at := complex(0, w)
		heat := complex(s.DF[2], 0) / (at - complex(s.DF[3], 0)) // δw/δp
		got := complex(s.DStored, 0) + complex(s.DStoredBy[0], 0)*heat
		want := complex(ad, 0) + complex(iso-ad, 0)/(1+at*tau)
		if cmplx.Abs(got-want) > 1e-12*iso {
			t.Errorf("at %v rad/s C = %v, want %v", w, got, want)
		}
	}
}

func TestGases(t *testing.T) {
	for _, p := range []float64{-1e6, 1e5, 2e6, 9e6, 15e6, 60e6} {
		l := &gasLaw{volume: 0.01, charge: 9e4, exponent: 1.4, absolute: 1e5}
		(&trial{law: l, ports: 1, x: []float64{p}, step: []float64{1e3}, mem: []float64{0}}).jacobian(t, "before the start", false)
		(&trial{law: l, ports: 1, x: []float64{p}, step: []float64{1e3}, mem: []float64{1e7 * math.Pow(0.009, 1.4)}}).jacobian(t, "exponent", false)
		l.constant = 20
		for _, w := range []float64{-40, -0.3, 0, 0.2, 35} {
			(&trial{law: l, ports: 1, unknowns: 1, x: []float64{p, w}, step: []float64{1e3, 1e-4}, mem: []float64{0}}).jacobian(t, "heat", false)
		}
	}
}

// Gas blown out ends the run; too little liquid is said.
func TestGasTells(t *testing.T) {
	l := &gasLaw{volume: 0.01, charge: 9e4, exponent: 1, least: 0.001}
	s := gasStamp(l, 15e6)
	l.Begin(s, true)
	g := make([]float64, 3)
	s.X[0] = 9.5e6
	if n := l.Guards(s, g); n != 3 || g[0] < 0 || g[1] < 0 || g[2] > 0 {
		t.Fatalf("guards %v", g[:n])
	}
	mode, what, last := l.Next(s, 2)
	if s.Mode = mode; last || what != "holds less than its least liquid" {
		t.Errorf("%q, last %v", what, last)
	}
	if code, _ := l.Caution(s); code != "least-liquid" {
		t.Errorf("caution %q", code)
	}
	if l.Guards(s, g); g[2] < 0 {
		t.Error("it changes back at once")
	}
	s.X[0] = 8.9e6
	if l.Guards(s, g); g[0] > 0 {
		t.Errorf("no guard sees that no liquid is left: %v", g)
	}
	if _, _, last := l.Next(s, 0); !last {
		t.Error("the run goes on without liquid")
	}
	s.X[0] = 2e9
	if l.Guards(s, g); g[1] > 0 {
		t.Errorf("no guard sees that no gas is left: %v", g)
	}
}
