package casefile

import (
	"lagbook/network"
	"lagbook/network/quantity"
)

// ScaleField is the key scale of a part that switches: what it conducts or carries is
// multiplied by it.
func ScaleField(help string) Field {
	return Field{Name: "scale", Type: Wave, Dim: quantity.Dim{}, HasMin: true, Help: help}
}

// A Scaling is the switch of a part with a scale; of a part without one its factor is 1.
type Scaling struct {
	has  bool
	id   network.SwitchID
	wave WaveSlot
}

// ScalingOf reads the scale of a part and adds its switch.
func ScalingOf(e *Element, c *Case, b *network.Builder) (Scaling, []Diagnostic) {
	if !e.Has("scale") {
		return Scaling{}, nil
	}
	if d := NotInSteps(e, c, "scale", "the network must be linear between its changes"); d != nil {
		return Scaling{}, d
	}
	return Scaling{true, b.Switch(e.FullName(), e.Ref), e.Wave("scale")}, nil
}

// Factor hands the wave to the network and returns the value it is set for now.
func (s Scaling) Factor(v Values, p *network.Params) float64 {
	if !s.has {
		return 1
	}
	p.Switch[s.id] = v.Wave[s.wave]
	return p.Now[s.id]
}

// Values returns every value that the scale takes, before t = 0 first.
func (s Scaling) Values(v Values) []float64 {
	if !s.has {
		return nil
	}
	w := v.Wave[s.wave]
	list := []float64{w.Before}
	for _, g := range w.Segments {
		list = append(list, g.A)
	}
	return list
}

// stepwise are the forms of a waveform that is constant between its changes.
var stepwise = map[string]bool{"constant": true, "step": true, "stairs": true, "pulse": true}

// NotInSteps refuses a waveform that changes otherwise than in steps.
func NotInSteps(e *Element, c *Case, key, why string) []Diagnostic {
	slot := e.Wave(key)
	if slot == noSlot || c.waves[slot].steps {
		c.mustStep(slot, why)
		return nil
	}
	return []Diagnostic{e.Fault(key, key+" "+c.statedAs(slot), "a number, step, stairs or pulse: "+why, "")}
}
