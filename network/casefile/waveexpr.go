package casefile

import (
	"errors"
	"fmt"
	"strings"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// A waveform may be an expression of profiles, "= v0*current + r*current^2", or one of
// them by name, "load". Names of given values and profiles stand in it side by side:
// given values as numbers, profiles as curves (wavecurve.go).

// profileBase is the slot of the first profile in such an expression; below are given values.
const profileBase = 1 << 24

// waveName finds what a name in the expression of a waveform stands for.
func (r *reader) waveName(name string) (int, bool) {
	if i, ok := r.givenSlot(name); ok {
		return i, true
	}
	i, ok := r.c.profileNamed(name)
	return profileBase + i, ok
}

// parted tells the given values that an expression uses from its profiles.
func parted(expr *quantity.Expr) (givens, profiles []int) {
	for _, i := range expr.Uses() {
		if i >= profileBase {
			profiles = append(profiles, i-profileBase)
		} else {
			givens = append(givens, i)
		}
	}
	return givens, profiles
}

// waveText reports whether a text may be an expression of profiles.
func (r *reader) waveText(n *node) bool {
	if n.kind != kindString || len(r.c.profiles) == 0 {
		return false
	}
	text := strings.TrimSpace(n.text)
	_, bare := r.c.profileNamed(text)
	return bare || strings.HasPrefix(text, "=")
}

// compileWave compiles the expression of a waveform. ok is false after a fault, or where
// something that it uses is at fault; profiles is empty where it is a number.
func (f fielder) compileWave(n *node, field *Field) (expr *quantity.Expr, profiles []int, ok bool) {
	r := f.r
	expr, err := quantity.Compile(n.text, r.waveName)
	if err != nil {
		r.syntax(f.o, n, field, err)
		return nil, nil, false
	}
	givens, profiles := parted(expr)
	ok = true
	for _, g := range givens {
		r.use(g)
		ok = ok && !r.c.givens[g].bad
	}
	for _, p := range profiles {
		ok = ok && !r.c.profiles[p].bad
	}
	return expr, profiles, ok
}

// follow reads an expression of profiles into a wave. is tells that it is one.
func (f fielder) follow(n *node, w *wave) (is, ok bool) {
	r := f.r
	if !r.waveText(n) {
		return r.notProfile(f.o, n) || r.noEquals(f.o, n, w.field), false
	}
	expr, profiles, ok := f.compileWave(n, w.field)
	if !ok {
		for _, p := range profiles {
			r.useProfile(p)
		}
		return true, false
	}
	if len(profiles) == 0 {
		return false, true
	}
	w.form, w.expr, w.text, w.profiles = "profile", expr, n, profiles
	w.steps, w.still, w.earlier = true, true, true
	for _, p := range profiles {
		of := &r.c.waves[r.c.profiles[p].wave]
		w.steps = w.steps && of.steps
		w.loose = w.loose || !of.fixed
		still := of.form == "constant" || of.still
		w.still = w.still && still
		w.earlier = w.earlier && (still || of.before != noSlot || of.earlier)
		if w.self == 0 {
			r.useProfile(p)
		}
	}
	givens, _ := parted(expr)
	w.loose = w.loose || len(givens) > 0
	return true, true
}

// notProfile reports a name where no profile is called so, and whether it has.
func (r *reader) notProfile(o owner, n *node) bool {
	text := strings.TrimSpace(n.text)
	if n.kind != kindString || len(r.c.profiles) == 0 || !quantity.IsName(text) {
		return false
	}
	if _, given := r.givenSlot(text); given {
		return false
	}
	r.profileCalled(o, n.span, text, basic)
	return true
}

// noEquals reports an expression of profiles without its sign, and whether it is one.
func (r *reader) noEquals(o owner, n *node, f *Field) bool {
	if n.kind != kindString || len(r.c.profiles) == 0 {
		return false
	}
	if _, err := r.parse(n.text); err == nil {
		return false
	}
	expr, err := quantity.Compile(n.text, r.waveName)
	if err != nil {
		return false
	}
	if _, profiles := parted(expr); len(profiles) == 0 {
		return false
	}
	r.at(n.span, Diagnostic{Code: "no-equals", Thing: o.thing(), Text: label(f) + "an expression begins with =", Fix: basic("= " + n.text)})
	return true
}

// changes reports a profile where a number stands, and whether that is so.
func (r *reader) changes(o owner, n *node, f *Field, err error) bool {
	if f != nil && f.Type == Wave || len(r.c.profiles) == 0 {
		return false
	}
	at, name := n.span, strings.TrimSpace(n.text)
	if _, ok := r.c.profileNamed(name); !ok {
		var e *quantity.SyntaxError
		if !errors.As(err, &e) || e.Name == "" {
			return false
		}
		if _, ok := r.c.profileNamed(e.Name); !ok {
			return false
		}
		at, name = n.part(e.Off, e.Len), e.Name
	}
	r.at(at, Diagnostic{Code: "profile-in-number", Thing: o.thing(), Found: name, Want: "a number that does not change",
		Text: fmt.Sprintf("%s%s is a profile: it changes with time, and a number that does not change stands here", label(f), quoted(name)),
		Hint: "profiles go into waveforms: drive, held, scale, opening, speed, target; a number goes into [given]"})
	return true
}

// namesFor lists the names that a value may use, and says where they are defined.
func (c *Case) namesFor(f *Field) (names []string, where string) {
	if f == nil || f.Type != Wave || len(c.profiles) == 0 {
		return c.givenNames(), "[given]"
	}
	return append(c.givenNames(), c.profileNames()...), "[given] or [profile]"
}

// A scene is what waveforms are made from.
type scene struct {
	num    []float64        // of all slots; nil: as written
	known  []quantity.Value // of all given values
	curves []*curve         // by profile, what each stands for
	until  float64          // s; sampled waveforms go so far
	work   *int             // pieces gone through so far; nil: not counted
}

// asWritten is the scene of the case as it stands.
func (r *reader) asWritten() *scene {
	return &scene{known: r.known, curves: r.c.curves, until: r.c.horizon, work: &r.work}
}

// A noWave says that an expression of profiles is no waveform, in words for a message.
type noWave struct{ text string }

func (e *noWave) Error() string { return e.text }

// term computes an expression of profiles.
func (c *Case) term(expr *quantity.Expr, s *scene) (quantity.Term, error) {
	return expr.Curves(func(slot int) quantity.Term {
		if slot < profileBase {
			return quantity.Term{Value: s.known[slot]}
		}
		p := &c.profiles[slot-profileBase]
		return quantity.Term{Value: quantity.Value{Dim: p.field.Dim, Kind: p.kind}, Curve: s.curves[slot-profileBase]}
	}, s.join)
}

// follow makes the waveform of an expression.
func (m *maker) follow() laplace.Waveform {
	w := m.w
	t, err := m.c.term(w.expr, m.s)
	if err != nil {
		m.refuse(err)
		return laplace.Waveform{}
	}
	v := t.Value
	v.SI = 1e5 // any level of any kind
	if _, _, err := m.c.want(v, w.field); err != nil {
		m.refuse(err)
		return laplace.Waveform{}
	}
	m.curve = t.Curve.(*curve)
	if by := m.c.levelShift(v.Kind, w.field); by != 0 {
		m.curve = m.curve.plus(by)
	}
	made, bound, err := m.curve.wavePart(m.s.until)
	if err != nil {
		m.refuse(err)
		return laplace.Waveform{}
	}
	m.bound = bound
	return made
}

// refuse adds what is wrong with the expression of a waveform.
func (m *maker) refuse(err error) {
	var none *noWave
	if errors.As(err, &none) {
		m.fault(m.w.text, none.text)
		return
	}
	m.diags = append(m.diags, m.c.dimension(m.w.owner, m.w.text, m.w.field, err))
}

// levelShift is what turns a level of pressure of an expression into one as the case
// states levels.
func (c *Case) levelShift(kind quantity.Kind, f *Field) float64 {
	switch {
	case f.Kind != quantity.Level || f.Dim != dimPressure:
	case kind == quantity.Gauge && c.Pressures.Absolute:
		return c.Pressures.Atmosphere
	case kind == quantity.Absolute && !c.Pressures.Absolute:
		return -c.Pressures.Atmosphere
	}
	return 0
}

// sampledRemark warns that a waveform has no closed form.
func (f fielder) sampledRemark(w *wave) {
	if !(w.bound > 0) || w.self > 0 { // of a profile it is said where it is used
		return
	}
	kind := w.field.Kind
	if isLevel(kind) {
		kind = quantity.Difference
	}
	by := quantity.Print{Digits: 2}.Format(w.bound, w.field.Dim, kind)
	f.r.at(w.n.span, Diagnostic{Severity: Warning, Code: "sampled-profile", Thing: f.o.thing(),
		Text: fmt.Sprintf("%sit has no closed form between its breaks and is sampled, off by at most %s", label(w.field), by)})
}
