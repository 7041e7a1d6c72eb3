package study

import (
	"fmt"
	"slices"

	"lagbook/network"
)

// marched is what is known of a case that is not linear.
type marched struct {
	begun   *network.State // at t = 0⁻
	moments []*moment      // states that transfer functions are about
	run     *network.Trajectory
}

// Nonlinear reports whether a part of the case follows a law that is not linear, so
// that it is marched.
func (m *Model) Nonlinear() bool { return m.Net.Nonlinear() }

// marches reports whether what is answered against time is a march.
func (m *Model) marches() bool { return m.Net.Nonlinear() && !m.linearly }

// begin returns the state at t = 0⁻ of a case that is not linear.
func (m *Model) begin() (*network.State, error) {
	if m.march.begun == nil {
		s, err := m.Net.Begin(m.par)
		if err != nil {
			return nil, err
		}
		m.march.begun = s
	}
	return m.march.begun, nil
}

// marchOn marches over the run with every output wanted so far.
func (m *Model) marchOn() error {
	from, err := m.begin()
	if err != nil {
		return err
	}
	if err := m.findEnd(); err != nil {
		return err
	}
	run, err := m.Net.March(m.par, from, m.outs, network.Run{Until: m.until})
	if err != nil {
		return err
	}
	m.march.run, m.resp = run, run
	return nil
}

// findEnd settles how long the run of a nonlinear case is; where nothing says so, the
// linear network about the start does.
func (m *Model) findEnd() error {
	end, ok := m.askedEnd()
	if !ok {
		red, err := m.reducedAbout(nil)
		if err != nil {
			return err
		}
		end = settled(red.System)
	}
	m.until = end
	return nil
}

// reach is the end of what is known: that of the run, or where a march had to stop.
func (m *Model) reach() float64 {
	if m.marches() && m.march.run != nil {
		return min(m.until, m.march.run.Until())
	}
	return m.until
}

// cut reports whether the march had to stop before the end of the run.
func (m *Model) cut() bool { return m.reach() < m.until*(1-1e-12) }

// Marched is what a march adds to an answer.
type Marched struct {
	Events     []Event  `json:"events"`
	Balance    Balance  `json:"balance"`
	ValidUntil *float64 `json:"valid_until,omitempty"` // s; where the run had to stop
	Stopped    string   `json:"-"`                     // why it had to, in words

	Steps, Rejected int `json:"-"`
}

// An Event is what happened to a part in a march: "shut", "runs over". At is in s.
type Event struct {
	Part string  `json:"part"`
	What string  `json:"what"`
	At   float64 `json:"at"`

	Scenario string `json:"scenario,omitempty"`
}

// A Balance is how well a march closes: what came in, less what went out and what is
// stored more than at the start, as a share of what passed.
type Balance struct {
	Error float64 `json:"error"`
}

// marched is what the march adds to an answer, nil where there was none.
func (m *Model) marchedEvidence() *Marched {
	run := m.march.run
	if run == nil || !m.marches() {
		return nil
	}
	a := &Marched{Events: m.events(), Balance: Balance{run.Balance()}}
	a.Steps, a.Rejected = run.Steps()
	if m.cut() {
		t := m.reach()
		a.ValidUntil = &t
		a.Stopped = "the run ends at " + m.Show.Time(t) + ", before " + m.Show.Time(m.until)
		if n := len(a.Events); n > 0 && run.Events()[n-1].Last {
			e := a.Events[n-1]
			a.Stopped += ": " + e.Part + " " + e.What
		}
		a.Stopped += "; no number after that is meant"
	}
	return a
}

// events are the changes of mode in words, in order of time.
func (m *Model) events() []Event {
	list := []Event{}
	if m.march.run == nil || !m.marches() {
		return list
	}
	for _, e := range m.march.run.Events() {
		list = append(list, Event{Part: m.elementName(e.Element), What: e.What, At: e.At})
	}
	return list
}

// elementName is the name of the part that an element is, or belongs to.
func (m *Model) elementName(id network.ElementID) string {
	e := m.elements()[id]
	if part := m.partOf(e.Ref); part != "" {
		return part
	}
	return e.Name
}

// elements are the elements of the network, by ElementID.
func (m *Model) elements() []network.ElementView {
	if m.views == nil {
		m.views = m.Net.Elements()
	}
	return m.views
}

// mostUnbalanced is how far a march may miss its balance before that is said.
const mostUnbalanced = 1e-6

// marchWarnings are the doubts about a march.
func (m *Model) marchWarnings() []Warning {
	run := m.march.run
	if run == nil || !m.marches() {
		return nil
	}
	var warn []Warning
	for _, w := range run.Cautions() {
		warn = append(warn, Warning{w.Code, fmt.Sprintf("%s: %s (first at %s)", m.elementName(w.Element), w.Text, m.Show.Time(w.At))})
	}
	if a := m.marchedEvidence(); a.Stopped != "" {
		warn = append(warn, Warning{"stopped", a.Stopped})
	}
	if b := run.Balance(); b > mostUnbalanced {
		warn = append(warn, Warning{"balance", fmt.Sprintf("the balance of the march closes to %s of what passed only", m.Show.Percent(b))})
	}
	return warn
}

// nonlinearParts names what makes the case nonlinear, in file order.
func (m *Model) nonlinearParts() []string {
	curved := map[string]bool{}
	for _, e := range m.elements() {
		if !e.Passive {
			curved[m.elementName(e.ID)] = true
		}
	}
	for _, b := range m.Net.Branches() {
		if b.Kind == network.InertanceBranch && m.par.Drop[b.Index] != nil {
			curved[m.partOf(b.Ref)] = true
		}
	}
	var names []string
	for _, e := range m.Case.Elements {
		if name := e.FullName(); curved[name] && !slices.Contains(names, name) {
			names = append(names, name)
		}
	}
	return names
}

// stores reports whether a free node stores: by a capacity or by an element.
func (m *Model) stores(id network.NodeID) bool {
	if n := m.Net.Node(id); n.Held || !n.Massless {
		return !n.Held
	}
	for _, e := range m.elements() {
		if e.Stores && e.Ports[0] == id {
			return true
		}
	}
	return false
}

// storeCount is the number of free nodes that store.
func (m *Model) storeCount() int {
	n := 0
	for id := range m.Net.NodeCount() {
		if m.stores(network.NodeID(id)) {
			n++
		}
	}
	return n
}

// nonlinear says of a nonlinear case how it was computed, and what follows no straight line.
func (m *Model) nonlinear() string {
	parts := m.nonlinearParts()
	follow, those := " follow laws that are not linear", "those laws are"
	if len(parts) == 1 {
		follow, those = " follows a law that is not linear", "that law is"
	}
	if m.linearly {
		return "linear about the start: " + join(firstNames(parts)) + follow + ", of which the slopes at the start count"
	}
	return "marched: " + join(firstNames(parts)) + follow + "; valid as far as " + those
}

// endingAt leaves out instants after the end of what is known, which is the last.
func endingAt(times []float64, end float64) []float64 {
	return append(slices.DeleteFunc(times, func(t float64) bool { return t >= end }), end)
}
