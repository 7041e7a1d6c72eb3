package laplace

import "fmt"

// MaxPulses is the largest Count of a PulseTrain.
const MaxPulses = 1_000_000

// A PulseTrain is High for Width (s) from At (s) on, once every Period (s), Count
// times or, where Count is 0, for ever. Between the pulses, before At and before
// t = 0 it is Low. A single pulse needs no Period.
type PulseTrain struct {
	Low, High, Width, Period, At float64
	Count                        int
}

// Pulse returns the train as a wave.
func Pulse(p PulseTrain) (Waveform, error) {
	if err := p.check(); err != nil {
		return Waveform{}, err
	}
	w := Waveform{Before: p.Low, Segments: []Segment{{A: p.Low}}}
	if p.Count > 0 {
		for k := range p.Count {
			on := p.At + float64(k)*p.Period
			w.level(on, p.High)
			w.level(on+p.Width, p.Low)
		}
		return w, nil
	}
	on := p.At
	for on < 0 { // the train already runs at t = 0: let it begin with the first whole pulse
		w.level(on, p.High)
		w.level(on+p.Width, p.Low)
		on += p.Period
	}
	w.level(on, p.High)
	if w.Segments[len(w.Segments)-1].At != on { // the pulse before it ends just here
		w.Segments = append(w.Segments, Segment{At: on, A: p.High})
	}
	if w.Repeat = len(w.Segments) - 1; p.Width < p.Period {
		w.level(on+p.Width, p.Low)
		w.Period = p.Period
	}
	return w, nil
}

// level lets the wave hold v from t on; what lies before 0 is past.
func (w *Waveform) level(t, v float64) {
	last := &w.Segments[len(w.Segments)-1]
	switch {
	case t <= last.At:
		last.A = v
	case v != last.A:
		w.Segments = append(w.Segments, Segment{At: t, A: v})
	}
}

func (p PulseTrain) check() error {
	if err := finite("a pulse train's number", p.Low, p.High, p.Width, p.Period, p.At); err != nil {
		return err
	}
	switch {
	case !(p.Width > 0):
		return fmt.Errorf("the width is %g s, must be positive", p.Width)
	case p.Count < 0:
		return fmt.Errorf("the count is %d, must be positive", p.Count)
	case p.Count > MaxPulses:
		return fmt.Errorf("the count is %d, above %d; without a count the pulses go on for ever", p.Count, MaxPulses)
	case p.Count != 1 && !(p.Period > 0):
		return fmt.Errorf("the period is %g s, must be positive", p.Period)
	case p.Count != 1 && p.Width > p.Period:
		return fmt.Errorf("the width %g s exceeds the period %g s", p.Width, p.Period)
	case p.Count == 0 && p.At < -float64(MaxPulses)*p.Period:
		return fmt.Errorf("the pulses begin more than %d periods before 0 s", MaxPulses)
	}
	return nil
}
