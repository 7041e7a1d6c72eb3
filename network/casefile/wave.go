package casefile

import (
	"fmt"
	"strings"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/quantity"
)

// WaveInfo tells how a waveform was stated.
type WaveInfo struct {
	Text      string // as written, on one line
	Form      string // "constant", "step", "points", "stairs", "pulse", "sine", "decay", "file"
	Constant  bool   // a single quantity: it never changes
	HasBefore bool   // the value before t = 0 was stated with `before`
	Repeats   bool   // for ever: `repeat`, a sine, or a pulse without count
	Dim       quantity.Dim
	Kind      quantity.Kind
	Ref       network.Ref // its place
}

// WaveInfo returns how the waveform of a slot was stated.
func (c *Case) WaveInfo(s WaveSlot) WaveInfo {
	w := &c.waves[s]
	text := oneLine(c.src.text[w.n.at:w.n.end])
	if w.n.kind == kindString {
		text = w.n.text
	}
	return WaveInfo{
		Text: text, Form: w.form, Constant: w.form == "constant", HasBefore: w.before != noSlot,
		Repeats: w.repeat != noSlot || w.form == "sine" || w.form == "pulse" && w.count == 0,
		Dim:     w.field.Dim, Kind: w.field.Kind, Ref: w.ref,
	}
}

// A wave is a waveform as stated: slots, from which each Eval makes the waveform.
type wave struct {
	field  *Field
	n      *node
	owner  owner
	ref    network.Ref
	form   string
	value  Slot            // constant
	group  map[string]Slot // step, pulse, sine by key
	places map[string]*node
	list   []entry // points, stairs, decay
	data   [][2]float64
	count  int     // pulse; 0: for ever
	share  bool    // the width is a share of the period
	clock  float64 // s on the clock at t = 0
	before Slot
	repeat Slot
	fixed  bool // depends on no given value
	made   laplace.Waveform
}

// maxBreaks is how many pieces all waveforms of a case may have together.
const maxBreaks = 500_000

// waveFields are the tables that the waveforms of one field are read with.
type waveFields struct {
	number Field   // a single quantity
	table  []Field // what a table may hold
}

var waveForms = [][]string{{"step", "points", "stairs", "pulse", "sine", "decay", "file"}}

// formsOf makes the tables for a Wave field: its values have the dimension and
// kind of the field, what is added to one is a difference.
func (r *reader) formsOf(field *Field) *waveFields {
	if known := r.forms[field]; known != nil {
		return known
	}
	value := func(name string) Field {
		v := *field
		v.Name, v.Type, v.Required = name, Number, true
		return v
	}
	diff := func(name string) Field {
		v := Field{Name: name, Type: Number, Dim: field.Dim, Required: true}
		if field.Kind == quantity.Level {
			v.Kind = quantity.Difference
		}
		return v
	}
	time := func(name string, positive, required bool) Field {
		return Field{Name: name, Type: Number, Dim: dimTime, HasMin: positive, MinOpen: true, Required: required}
	}
	pairs := func(name string) Field {
		v := value(name)
		return Field{Name: name, Type: Pairs, Dim: dimTime, Second: &v}
	}
	optional := func(f Field) Field { f.Required = false; return f }
	amplitude := diff("amplitude")
	amplitude.HasMin, amplitude.Min = true, 0
	forms := &waveFields{
		number: value(field.Name),
		table: []Field{
			{Name: "step", Type: Group, Fields: []Field{value("from"), value("to"), time("at", false, true)}},
			pairs("points"), pairs("stairs"),
			{Name: "pulse", Type: Group, Fields: []Field{value("low"), value("high"), {Name: "width", Type: loose, Required: true, Dim: dimTime},
				time("period", true, false), time("at", false, false), {Name: "count", Type: Count, HasMin: true, Min: 1, HasMax: true, Max: maxPulses}}},
			{Name: "sine", Type: Group, OneOf: [][]string{{"period", "frequency"}, {"highest_at", "phase", ""}}, Fields: []Field{value("mean"), amplitude,
				time("period", true, false), {Name: "frequency", Type: Number, Dim: dimRate, HasMin: true, MinOpen: true},
				{Name: "highest_at", Type: loose, Dim: dimTime}, {Name: "phase", Type: Number}}},
			{Name: "decay", Type: Groups, Fields: []Field{diff("amplitude"), time("time_constant", true, true)}},
			{Name: "file", Type: Text}, {Name: "time", Type: Text, With: []string{"file"}}, {Name: "column", Type: Text, With: []string{"file"}},
			time("repeat", true, false), optional(value("before")),
		},
	}
	r.forms[field] = forms
	return forms
}

// maxPulses is how many pulses a train with a count may have.
const maxPulses = 100_000

var dimRate = quantity.Dim{0, 0, -1, 0, 0}

// wave reads a waveform: a quantity, or a table of one form.
func (f fielder) wave(n *node, field *Field) (s WaveSlot, source string, ok bool) {
	c := f.r.c
	forms := f.r.formsOf(field)
	w := wave{field: field, n: n, owner: f.o, value: noSlot, before: noSlot, repeat: noSlot}
	moving := len(c.moving)
	if n.kind == kindTable && n.get("value") != nil {
		if n, source = f.r.withSource(f.o, n); n == nil {
			return noSlot, source, false
		}
		w.n = n
	}
	if n.kind == kindTable {
		source, ok = f.waveTable(n, forms, &w)
	} else {
		w.form = "constant"
		w.value, ok = f.r.number(f.o, n, &forms.number)
	}
	if !ok {
		return noSlot, source, false
	}
	w.fixed = len(c.moving) == moving
	if f.r.breaks += 2*w.count + len(w.list) + len(w.data); f.r.breaks > maxBreaks {
		f.r.at(n.span, Diagnostic{Code: "too-many", Thing: f.o.thing(), Text: fmt.Sprintf("with this, the waveforms of the case have more than %d pieces", maxBreaks)})
		return noSlot, source, false
	}
	made, diags := c.makeWave(&w, nil)
	if diags != nil {
		f.r.reportAll(diags)
		return noSlot, source, false
	}
	w.made = made
	w.ref = c.ref(n.span, f.o)
	c.waves = append(c.waves, w)
	return WaveSlot(len(c.waves) - 1), source, true
}

// waveTable reads a waveform stated as a table.
func (f fielder) waveTable(n *node, forms *waveFields, w *wave) (source string, ok bool) {
	inner := f
	inner.word += "." + w.field.Name
	list, source, ok := inner.fields(n, forms.table, waveForms)
	file, column, times := "", "", ""
	for i := range list {
		x := &list[i]
		switch x.name {
		case "before":
			w.before = x.slot
		case "repeat":
			w.repeat = x.slot
		case "file":
			w.form, file = "file", x.n.text
		case "time":
			times = x.n.text
		case "column":
			column = x.n.text
		default:
			w.form = x.name
			if ok {
				ok = f.form(x, w)
			}
		}
	}
	if ok && w.form == "file" {
		w.data, ok = f.file(n, w, file, times, column)
	}
	return source, ok
}

// form reads what is particular to one form.
func (f fielder) form(x *entry, w *wave) bool {
	w.clock = f.r.c.Questions.Clock
	w.list = x.list
	if x.field.Type != Group {
		if x.name == "decay" && w.field.Kind == quantity.Level {
			f.r.at(x.n.span, Diagnostic{Code: "wave", Thing: f.o.thing(), Text: "decay dies away to 0 " + unitOf(&Field{Dim: w.field.Dim}) + "; a level cannot", Hint: "write the level as points or stairs"})
			return false
		}
		return true
	}
	w.group, w.places = map[string]Slot{}, map[string]*node{}
	ok := true
	for i := range x.list {
		k := &x.list[i]
		w.places[k.name] = k.n
		switch {
		case k.name == "count":
			w.count = int(f.r.c.slots[k.slot].si)
		case k.name == "width":
			k.slot, w.share, ok = f.width(k.n)
		case k.name == "highest_at":
			var good bool
			k.slot, good = f.onClock(k.n)
			ok = ok && good
		case k.name == "frequency" && strings.Contains(k.n.text, "rad"):
			f.r.at(k.n.span, Diagnostic{Code: "wave", Thing: f.o.thing(), Text: "frequency: " + quoted(k.n.text) + " counts radians; expected periods in a time, like \"50 Hz\""})
			ok = false
		}
		w.group[k.name] = k.slot
	}
	if x.name != "pulse" || !ok {
		return ok
	}
	_, period := w.group["period"]
	switch {
	case period:
	case w.share:
		f.r.at(w.places["width"].span, Diagnostic{Code: "missing-key", Thing: f.o.thing(), Text: "width is a share of the period, which is missing", Hint: `add period = "1 s"`})
		return false
	case w.count > 1:
		f.r.at(x.n.span, Diagnostic{Code: "missing-key", Thing: f.o.thing(), Text: "period is missing", Hint: `add period = "1 s"`})
		return false
	default:
		w.count = 1
	}
	return true
}

// width reads the width of a pulse, a time or a percentage of the period.
func (f fielder) width(n *node) (s Slot, share, ok bool) {
	if n = f.r.bareValue(f.o, n); n == nil {
		return noSlot, false, false
	}
	as := &Field{Name: "width", Dim: dimTime, HasMin: true, MinOpen: true}
	if n.kind == kindString {
		if _, v, ok := f.r.quantity(f.o, n, as); !ok {
			return noSlot, false, false
		} else if v.Dim == (quantity.Dim{}) {
			share = true
			as = &Field{Name: "width", HasMin: true, MinOpen: true, HasMax: true, Max: 1}
		}
	}
	s, ok = f.r.number(f.o, n, as)
	return s, share, ok
}

// onClock reads a time from t = 0, or on the clock where the case has one.
func (f fielder) onClock(n *node) (Slot, bool) {
	if at, ok := clockTime(n.text); ok && n.kind == kindString {
		if !f.r.c.Questions.HasClock {
			f.r.at(n.span, Diagnostic{Code: "no-clock", Thing: f.o.thing(), Text: quoted(n.text) + " is a time of day; [run] states no clock", Hint: `add clock = "00:00" to [run]`})
			return noSlot, false
		}
		return f.r.c.constant(at), true
	}
	return f.r.number(f.o, n, &Field{Name: "highest_at", Dim: dimTime})
}
