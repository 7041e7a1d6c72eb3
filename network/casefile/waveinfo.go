package casefile

import (
	"lagbook/network"
	"lagbook/network/quantity"
)

// WaveInfo tells how a waveform was stated.
type WaveInfo struct {
	Text      string // as written, on one line
	Form      string // "constant", "step", "points", "stairs", "pulse", "sine", "decay", "file", "profile"
	Constant  bool   // a single quantity: it never changes
	HasBefore bool   // the value before t = 0 was stated with `before`
	Repeats   bool   // for ever: `repeat`, a sine, or a pulse without count
	Dim       quantity.Dim
	Kind      quantity.Kind
	Bound     float64     // by how much the waveform as stated may be off since it is sampled, SI; 0: closed form
	Steps     bool        // it changes in steps only, whatever the given values
	Ref       network.Ref // its place
}

// WaveInfo returns how the waveform of a slot was stated.
func (c *Case) WaveInfo(s WaveSlot) WaveInfo {
	if s == noSlot { // of a part at fault
		return WaveInfo{}
	}
	w := &c.waves[s]
	info := WaveInfo{
		Text: c.textOf(w.n), Form: w.form, Constant: w.form == "constant", HasBefore: w.before != noSlot,
		Repeats: w.repeat != noSlot || w.form == "sine" || w.form == "pulse" && w.count == 0,
		Dim:     w.field.Dim, Kind: w.field.Kind, Bound: w.bound, Steps: w.steps, Ref: w.ref,
	}
	if w.self > 0 {
		info.Form = "profile"
	}
	if w.form == "profile" {
		info.Constant, info.HasBefore, info.Repeats = w.still, w.earlier || w.before != noSlot, w.made.Repeats()
	}
	return info
}

// textOf returns a waveform as it is written, on one line; of a table with a header of
// its own the keys, up to a length that one reads.
func (c *Case) textOf(n *node) string {
	switch {
	case n.kind == kindString:
		return n.text
	case n.kind != kindTable || n.table.made == byBraces:
		return oneLine(c.src.text[n.at:n.end])
	}
	const most = 200
	text := ""
	for i := range n.table.keys {
		k := &n.table.keys[i]
		if k.name == "source" {
			continue
		}
		if text != "" {
			text += ", "
		}
		value := k.value
		if text += k.name + " = "; len(text) > most || value.end-value.at > most {
			return text + "…"
		}
		text += oneLine(c.src.text[value.at:value.end])
	}
	return text
}
