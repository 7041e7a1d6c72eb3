package hydraulic

import (
	"math"

	"lagbook/laplace"
	"lagbook/network/casefile"
)

// A stop is a part that stops or throttles the flow at an end of a pipe.
type stop struct {
	part *casefile.Element
	node string
	over float64 // s
	flow float64 // m³/s that it takes off; 0: not known before the case is computed
}

// stopsOf finds the quickest stop at each node at which a pipe would feel it.
func stopsOf(c *casefile.Case, v casefile.Values) map[string]stop {
	quickest := map[string]stop{}
	for _, e := range c.Elements {
		if e.Domain() != "hydraulic" {
			continue
		}
		over, flow, stops := stopOf(e, v)
		if !stops {
			continue
		}
		for _, end := range endsOf(e) {
			if best, known := quickest[end]; known && best.over <= over {
				continue
			}
			if node, ok := c.Element("hydraulic.node", end); ok && !gives(node) {
				quickest[end] = stop{e, end, over, flow}
			}
		}
	}
	return quickest
}

// quickestStop returns the part that stops the flow at an end of a pipe in the least time.
func quickestStop(pipe *casefile.Element, stops map[string]stop) (best stop, found bool) {
	for _, end := range pipe.Names("between") {
		if s, ok := stops[end]; ok && (!found || s.over < best.over) {
			best, found = s, true
		}
	}
	return best, found
}

// gives reports whether a node takes up what a pipe brings, so that a stop beyond it does
// not stop the pipe.
func gives(node *casefile.Element) bool {
	return node.Has("held") || node.Has("compliance") || node.Has("tank") || node.Has("gas")
}

// endsOf are the nodes at which a part ends.
func endsOf(e *casefile.Element) []string {
	ends := e.Names("between")
	for _, key := range []string{"into", "out_of", "from", "to"} {
		if name := e.NameOf(key); name != "" {
			ends = append(ends, name)
		}
	}
	return ends
}

// stopOf is how quickly a part stops what flows through it: by its drive, its valve, its
// scale, or the failure of its drive.
func stopOf(e *casefile.Element, v casefile.Values) (over, flow float64, stops bool) {
	switch {
	case e.Has("valve.close.over"):
		return v.Num[e.Num("valve.close.over")], 0, true
	case e.Has("drive") && e.Plain("drive"):
		return quickestFall(v.Wave[e.Wave("drive")])
	}
	for _, key := range []string{"valve.opening", "scale", "speed"} {
		if e.Has(key) && e.Plain(key) {
			over, _, stops = quickestFall(v.Wave[e.Wave(key)])
			return over, 0, stops
		}
	}
	return 0, 0, false
}

// littleFall is the share of the largest value below which a change is none to speak of.
const littleFall = 0.1

// quickestFall finds the shortest time in which a wave comes nearer to zero by a tenth of
// its largest value or more, along one straight piece or at a jump, and by how much.
func quickestFall(w laplace.Waveform) (over, fall float64, found bool) {
	largest := math.Abs(w.Before)
	for k := range w.Segments {
		begin, end, _ := piece(&w, k)
		largest = max(largest, math.Abs(begin), math.Abs(end))
	}
	note := func(from, to, time float64) {
		if f := math.Abs(from) - math.Abs(to); f > littleFall*largest && (!found || time < over) {
			over, fall, found = time, f, true
		}
	}
	last := w.Before
	for k := range w.Segments {
		begin, end, time := piece(&w, k)
		note(last, begin, 0)
		if w.Segments[k].B != 0 {
			note(begin, end, time)
		}
		last = end
	}
	return over, fall, found
}

// piece is the value at the beginning and at the end of a segment, and how long it lasts; the
// last one is taken where it begins, a sine or a decay too.
func piece(w *laplace.Waveform, k int) (begin, end, time float64) {
	s := &w.Segments[k]
	begin = s.A
	if k+1 == len(w.Segments) || len(s.Exp) > 0 {
		return begin, begin, 0
	}
	time = w.Segments[k+1].At - s.At
	return begin, w.Left(w.Segments[k+1].At), time
}
