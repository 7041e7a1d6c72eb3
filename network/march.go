package network

import "lagbook/laplace"

// A State is all that a run must know to go on from.
type State struct {
	T        float64
	Levels   []float64   // by NodeID, held nodes included; the network's own, not less the datum
	Flows    []float64   // by InertanceID
	Unknowns [][]float64 // by ElementID
	Mem      [][]float64 // by ElementID
	Modes    []int       // by ElementID
	How      StartHow
}

// A Run says how far and how well to march.
type Run struct {
	Until   float64     // s
	RelTol  float64     // of a step; 0: DefaultTolerance
	Stopped func() bool // asked at each step; nil: never
}

// DefaultTolerance is the error allowed in one step, as a share of each value.
const DefaultTolerance = 1e-7

// An Event is a change of mode.
type Event struct {
	Element ElementID
	What    string
	At      float64
	Last    bool // the run ends here
}

// A Warned is a caution of a law, with the first instant at which it was given.
type Warned struct {
	Element    ElementID
	Code, Text string
	At         float64
}

// Begin returns the state at t = 0⁻.
func (n *Network) Begin(p *Params) (*State, error) { panic("network: not built") }

// Operate returns the steady state with every wave at its value at t.
func (n *Network) Operate(p *Params, t float64, from *State) (*State, error) {
	panic("network: not built")
}

// March integrates from a state on.
func (n *Network) March(p *Params, from *State, outs []Output, run Run) (*Trajectory, error) {
	panic("network: not built")
}

// A Trajectory is what a march came to: the outputs as piecewise polynomials.
type Trajectory struct{}

func (t *Trajectory) Until() float64                           { panic("network: not built") }
func (t *Trajectory) At(out int, at float64) float64           { panic("network: not built") }
func (t *Trajectory) Left(out int, at float64) float64         { panic("network: not built") }
func (t *Trajectory) Table(at []float64, y [][]float64)        { panic("network: not built") }
func (t *Trajectory) Breaks() []float64                        { panic("network: not built") }
func (t *Trajectory) Rounding(out int) float64                 { panic("network: not built") }
func (t *Trajectory) Final(out int) (float64, bool)            { panic("network: not built") }
func (t *Trajectory) Integral(out int, t0, t1 float64) float64 { panic("network: not built") }
func (t *Trajectory) Max(out int, t0, t1 float64) laplace.Extreme {
	panic("network: not built")
}
func (t *Trajectory) Min(out int, t0, t1 float64) laplace.Extreme {
	panic("network: not built")
}
func (t *Trajectory) First(out int, level, t0, t1 float64) (laplace.Root, bool) {
	panic("network: not built")
}
func (t *Trajectory) FirstOutside(out int, lo, hi, t0, t1 float64) (laplace.Root, bool) {
	panic("network: not built")
}
func (t *Trajectory) LastOutside(out int, mid, band, t0, t1 float64) (laplace.Root, bool) {
	panic("network: not built")
}
func (t *Trajectory) Events() []Event              { panic("network: not built") }
func (t *Trajectory) Cautions() []Warned           { panic("network: not built") }
func (t *Trajectory) Balance() float64             { panic("network: not built") }
func (t *Trajectory) End() *State                  { panic("network: not built") }
func (t *Trajectory) Steps() (taken, rejected int) { panic("network: not built") }
