package casefile

import (
	"fmt"
	"slices"
	"strings"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// evalWith computes every value of the case with some profiles swapped: {"load",
// "overload"} lets overload stand in for load. All swaps hold at once. A stand-in is made
// of the profiles as stated, so that overload = "= 1.5*load" may stand in for load;
// everything else sees the stand-in. given is as for Eval; of those that are fixed, by
// index, the value holds though they are expressions.
func (c *Case) evalWith(given []quantity.Value, swap [][2]string, fixed ...bool) (Values, []Diagnostic) {
	v, known, diags := c.evalNumbers(given, fixed...)
	if diags != nil {
		return v, inFileOrder(c.gathered(diags))
	}
	s := &scene{known: known, until: c.horizon}
	if given != nil {
		s.num = v.Num
	}
	if q := &c.Questions; q.HasTo {
		s.until = max(s.until, v.Num[q.To])
	}
	diags = c.evalWaves(&v, s, swap)
	if diags == nil && c.net != nil {
		for i := range c.voc {
			if check := c.voc[i].Check; check != nil {
				diags = append(diags, c.news(check(c, v))...)
			}
		}
	}
	return v, inFileOrder(c.gathered(diags))
}

// evalWaves makes all waveforms: profiles stand before what follows them.
func (c *Case) evalWaves(v *Values, s *scene, swap [][2]string) (diags []Diagnostic) {
	stated := make([]*curve, len(c.profiles))
	s.curves = stated
	remake := func(i int) {
		made, d := c.makeWave(&c.waves[i], s)
		diags = append(diags, d...)
		v.Wave[i] = made.wave
		if p := c.waves[i].self; p > 0 {
			s.curves[p-1] = made.curve
		}
	}
	asWritten := func(i int) bool { return s.num == nil || c.waves[i].fixed }
	for i := range c.waves {
		switch w := &c.waves[i]; {
		case asWritten(i):
			v.Wave[i] = w.made
			if w.self > 0 {
				stated[w.self-1] = c.curves[w.self-1]
			}
		case w.self > 0:
			remake(i)
		}
	}
	moved := c.swapped(stated, swap, s)
	for i := range c.waves {
		w := &c.waves[i]
		touched := slices.ContainsFunc(w.profiles, func(p int) bool { return moved[p] })
		switch {
		case len(diags) > 0:
			return diags
		case w.self > 0 && moved[w.self-1]:
			v.Wave[i] = s.curves[w.self-1].wave // a stand-in
		case w.self > 0 && touched:
			moved[w.self-1] = true
			remake(i)
		case w.self == 0 && (touched || !asWritten(i)):
			remake(i)
		}
		if why, must := c.inSteps[WaveSlot(i)]; must && touched && laplace.NotStairs(v.Wave[i:i+1]) >= 0 {
			diags = append(diags, c.src.place(Diagnostic{Code: "element", Thing: w.owner.thing(),
				Text: fmt.Sprintf("%sit does not change in steps with %s; expected a number, step, stairs or pulse: %s", label(w.field), standIns(swap), why)}, w.n.span))
		}
	}
	return diags
}

// swapped puts the stand-ins in force and tells which profiles they replace.
func (c *Case) swapped(stated []*curve, swap [][2]string, s *scene) []bool {
	moved := make([]bool, len(c.profiles))
	if len(swap) == 0 {
		return moved
	}
	s.curves = slices.Clone(stated)
	for _, x := range swap {
		i, ok := c.profileNamed(x[0])
		j, found := c.profileNamed(x[1])
		if !ok || !found {
			panic("casefile: a profile is swapped that the case does not have")
		}
		s.curves[i], moved[i] = stated[j], i != j
	}
	return moved
}

// standIns puts swaps in words.
func standIns(swap [][2]string) string {
	var words []string
	for _, x := range swap {
		words = append(words, quoted(x[1])+" in the place of "+quoted(x[0]))
	}
	return strings.Join(words, ", ")
}

// mustStep notes a waveform that must change in steps only.
func (c *Case) mustStep(s WaveSlot, why string) {
	if s == noSlot || len(c.waves[s].profiles) == 0 {
		return
	}
	if c.inSteps == nil {
		c.inSteps = map[WaveSlot]string{}
	}
	c.inSteps[s] = why
}

// statedAs says how a waveform that does not change in steps is stated.
func (c *Case) statedAs(s WaveSlot) string {
	w := &c.waves[s]
	if w.form != "profile" {
		return "is stated as " + w.form
	}
	for _, p := range w.profiles {
		if slot := c.profiles[p].wave; !c.waves[slot].steps {
			if form := c.waves[slot].form; form != "profile" {
				return "follows profile " + quoted(c.profiles[p].name) + ", which is stated as " + form
			}
			return "follows profile " + quoted(c.profiles[p].name) + ", which does not change in steps"
		}
	}
	return "does not change in steps"
}
