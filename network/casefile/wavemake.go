package casefile

import (
	"fmt"
	"math"
	"strings"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// A madeWave is a waveform made from numbers.
type madeWave struct {
	wave  laplace.Waveform
	bound float64 // by how much it may be off
	curve *curve  // what it is in an expression
}

// makeWave makes the waveform in a scene and checks what only numbers show.
func (c *Case) makeWave(w *wave, s *scene) (madeWave, []Diagnostic) {
	m := maker{c: c, w: w, s: s}
	made := m.make()
	whole := m.curve != nil // the curve says all
	if m.diags == nil && w.repeat != noSlot {
		made, whole = m.repeated(made), false
	}
	if m.diags == nil && w.before != noSlot {
		made, whole = made.WithBefore(m.at(w.before)), false
	}
	if m.diags == nil && w.form == "profile" {
		m.inRange(&made)
	}
	if !whole {
		return madeWave{made, m.bound, &curve{wave: made, bound: m.bound}}, m.diags
	}
	kept := *m.curve
	kept.wave, kept.bound, kept.done = made, m.bound, true
	return madeWave{made, m.bound, &kept}, m.diags
}

// A maker makes one waveform.
type maker struct {
	c     *Case
	w     *wave
	s     *scene
	first float64 // the first time stated, where it lies before t = 0
	last  float64 // the last time stated
	curve *curve  // of an expression
	bound float64
	diags []Diagnostic
}

func (m *maker) at(s Slot) float64 {
	if m.s.num == nil {
		return m.c.slots[s].si
	}
	return m.s.num[s]
}

// key returns the value of a key, 0 where it is not stated.
func (m *maker) key(name string) float64 {
	if s, ok := m.w.group[name]; ok {
		return m.at(s)
	}
	return 0
}

func (m *maker) fault(n *node, text string) {
	if n == nil {
		n = m.w.n
	}
	m.diags = append(m.diags, m.c.src.place(Diagnostic{Code: "wave", Thing: m.w.owner.thing(), Text: text}, n.span))
}

func (m *maker) make() laplace.Waveform {
	var made laplace.Waveform
	var err error
	switch m.w.form {
	case "profile":
		return m.follow()
	case "constant":
		return laplace.Constant(m.at(m.w.value))
	case "step":
		m.last = m.key("at")
		return laplace.Step(m.key("from"), m.key("to"), m.key("at"))
	case "points", "stairs", "file":
		pts := m.points()
		if m.diags != nil {
			return made
		}
		if m.w.form == "stairs" {
			made, err = laplace.Stairs(pts)
		} else {
			made, err = laplace.Points(pts)
		}
	case "pulse":
		made, err = m.pulse()
	case "sine":
		made = m.sine()
	case "decay":
		terms := make([][2]float64, len(m.w.list))
		for i, x := range m.w.list {
			for _, k := range x.list {
				if k.name == "amplitude" {
					terms[i][0] = m.at(k.slot)
				} else {
					terms[i][1] = m.at(k.slot)
				}
			}
		}
		made, err = laplace.Decay(terms)
	}
	if err != nil && m.diags == nil {
		m.fault(nil, err.Error())
	}
	return made
}

// points returns the points of a list or file, checked for their order.
func (m *maker) points() [][2]float64 {
	pts := m.w.data
	if m.w.form != "file" {
		pts = make([][2]float64, len(m.w.list))
		for i, x := range m.w.list {
			pts[i] = [2]float64{m.at(x.list[0].slot), m.at(x.list[1].slot)}
			if i > 0 {
				pts[i][0] = laterDay(x.list[0].n, pts[i][0], pts[i-1][0])
			}
			if i > 0 && pts[i][0] < pts[i-1][0] {
				m.fault(x.list[0].n, fmt.Sprintf("%s: the time %s comes after %s; times do not go back", m.w.form,
					quantity.Duration(pts[i][0]), quantity.Duration(pts[i-1][0])))
				return nil
			}
			if i > 1 && pts[i][0] == pts[i-2][0] {
				m.fault(x.list[0].n, fmt.Sprintf("%s: the time %s stands three times; a jump takes two", m.w.form, quantity.Duration(pts[i][0])))
				return nil
			}
		}
	}
	m.last = pts[len(pts)-1][0]
	if m.w.repeat != noSlot && m.onClock() {
		return m.around(pts)
	}
	return pts
}

func (m *maker) pulse() (laplace.Waveform, error) {
	p := laplace.PulseTrain{Low: m.key("low"), High: m.key("high"), Width: m.key("width"), Period: m.key("period"), At: m.key("at"), Count: m.w.count}
	if m.w.share {
		p.Width *= p.Period
	}
	if p.Period > 0 && p.Width > p.Period {
		m.fault(m.w.places["width"], fmt.Sprintf("pulse: the width, %s, is longer than the period, %s", quantity.Duration(p.Width), quantity.Duration(p.Period)))
		return laplace.Waveform{}, nil
	}
	m.last = p.At + float64(max(0, p.Count-1))*p.Period + p.Width
	return laplace.Pulse(p)
}

func (m *maker) sine() laplace.Waveform {
	omega := 2 * math.Pi * m.key("frequency")
	if p := m.key("period"); p > 0 {
		omega = 2 * math.Pi / p
	}
	phase := m.key("phase")
	if _, ok := m.w.group["highest_at"]; ok {
		phase = math.Pi/2 - math.Mod(omega*(m.key("highest_at")-m.w.clock), 2*math.Pi)
	}
	if least, words := m.c.lowest(m.w.field); m.key("mean")-m.key("amplitude") < least {
		what, _, _ := strings.Cut(words, ",")
		m.fault(m.w.places["amplitude"], "sine: it goes below "+what)
	}
	return laplace.Sine(m.key("mean"), m.key("amplitude"), omega, phase)
}

// repeated makes the wave periodic.
func (m *maker) repeated(made laplace.Waveform) laplace.Waveform {
	period := m.at(m.w.repeat)
	n := m.c.slots[m.w.repeat].n
	switch {
	case m.w.form == "sine" || m.w.form == "pulse" && m.w.count == 0:
		m.fault(n, m.w.form+" repeats by itself; repeat has no place here")
		return made
	case m.last-m.first > period*(1+1e-12) && m.first < 0:
		m.fault(n, fmt.Sprintf("repeat is %s, but the %s go on for %s", quantity.Duration(period), m.w.form, quantity.Duration(m.last-m.first)))
		return made
	case m.last > period*(1+1e-12) && m.first == 0:
		m.fault(n, fmt.Sprintf("repeat is %s, but the last time of the %s is %s", quantity.Duration(period), m.w.form, quantity.Duration(m.last)))
		return made
	}
	periodic, err := made.Repeated(period)
	if err != nil {
		m.fault(n, err.Error())
	}
	return periodic
}
