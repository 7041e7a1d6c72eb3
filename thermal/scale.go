package thermal

import (
	"lagbook/network"
	"lagbook/network/casefile"
)

// scaleField is the key of a part whose conductance or capacity rate switches.
func scaleField() casefile.Field {
	return casefile.Field{Name: "scale", Type: casefile.Wave, Dim: dimless, HasMin: true,
		Help: "multiplies what it conducts or carries, in steps: a fan that stops, a door that opens; 0 opens the branch"}
}

// A scaling is the switch of a part with a scale; of a part without one its factor is 1.
type scaling struct {
	has  bool
	id   network.SwitchID
	wave casefile.WaveSlot
}

// scalingOf reads the scale of a part.
func scalingOf(e *casefile.Element, c *casefile.Case, b *network.Builder) (scaling, []casefile.Diagnostic) {
	if !e.Has("scale") {
		return scaling{}, nil
	}
	if d := notInSteps(e, c, "scale", "the network must be linear between its changes"); d != nil {
		return scaling{}, d
	}
	return scaling{true, b.Switch(e.FullName(), e.Ref), e.Wave("scale")}, nil
}

// factor hands the wave to the network and returns the value it is set for now.
func (s scaling) factor(v casefile.Values, p *network.Params) float64 {
	if !s.has {
		return 1
	}
	p.Switch[s.id] = v.Wave[s.wave]
	return p.Now[s.id]
}

// stepwise are the forms of a waveform that is constant between its changes.
var stepwise = map[string]bool{"constant": true, "step": true, "stairs": true, "pulse": true}

// notInSteps refuses a waveform that changes otherwise than in steps.
func notInSteps(e *casefile.Element, c *casefile.Case, key, why string) []casefile.Diagnostic {
	form := c.WaveInfo(e.Wave(key)).Form
	if stepwise[form] {
		return nil
	}
	return []casefile.Diagnostic{e.Fault(key, key+" is stated as "+form, "a number, step, stairs or pulse: "+why, "")}
}
