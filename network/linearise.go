package network

// Linearise returns the linear network about a state, in deviations from it.
func (n *Network) Linearise(p *Params, at *State) (*Linear, error) { panic("network: not built") }

// A Linear is a network linearised about a state. Levels, flows and waveforms of Net and
// Params are deviations from it: 0 where the state stays as it is.
type Linear struct {
	Net    *Network
	Params *Params
}

// Outputs are outputs of the nonlinear network as outputs of Net, and their values
// at the state.
func (l *Linear) Outputs(outs []Output) (deviations []Output, at []float64) {
	panic("network: not built")
}

// Input is the input of Net that stands for a drive. Inputs of the nonlinear network keep
// their identifiers.
func (l *Linear) Input(e ElementID, drive int) InputID { panic("network: not built") }
