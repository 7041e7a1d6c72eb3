package casefile

import (
	"cmp"
	"fmt"
	"strings"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/quantity"
)

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

	expr     *quantity.Expr // of profiles: what form "profile" follows
	text     *node          // that expression
	profiles []int          // in it
	self     int            // 1 + the profile that this is; 0: none
	loose    bool           // a given value or a profile that varies is in the expression
	steps    bool           // changes in steps only
	still    bool           // form "profile": none of its profiles changes
	earlier  bool           // form "profile": each that changes states its value before t = 0
	bound    float64        // by how much made may be off
}

// maxBreaks is how many pieces all waveforms of a case may have together.
const maxBreaks = 500_000

// waveFields are the tables that the waveforms of one field are read with.
type waveFields struct {
	number Field   // a single quantity
	table  []Field // what a table may hold
}

var waveForms = [][]string{{"step", "points", "stairs", "pulse", "sine", "decay", "file", "expression"}}

// formsOf makes the tables for a Wave field: its values have the dimension and
// kind of the field, what is added to one is a difference.
func (r *reader) formsOf(field *Field) *waveFields {
	if known := r.forms[field]; known != nil {
		return known
	}
	value := func(name string) Field {
		v := *field
		v.Name, v.Type, v.Required = name, Number, true
		v.Or, v.Against, v.Drives = nil, nil, ""
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
	instant := func(name string, required bool) Field {
		return Field{Name: name, Type: Number, Dim: dimTime, Required: required, clock: true}
	}
	pairs := func(name string) Field {
		v := value(name)
		return Field{Name: name, Type: Pairs, Dim: dimTime, clock: true, Second: &v}
	}
	optional := func(f Field) Field { f.Required = false; return f }
	amplitude := diff("amplitude")
	amplitude.HasMin, amplitude.Min = true, 0
	forms := &waveFields{
		number: value(cmp.Or(field.Name, "value")),
		table: []Field{
			{Name: "step", Type: Group, Fields: []Field{value("from"), value("to"), instant("at", true)}},
			pairs("points"), pairs("stairs"),
			{Name: "pulse", Type: Group, Fields: []Field{value("low"), value("high"), {Name: "width", Type: loose, Required: true, Dim: dimTime},
				time("period", true, false), instant("at", false), {Name: "count", Type: Count, HasMin: true, Min: 1, HasMax: true, Max: maxPulses}}},
			{Name: "sine", Type: Group, OneOf: [][]string{{"period", "frequency"}, {"highest_at", "phase", ""}}, Fields: []Field{value("mean"), amplitude,
				time("period", true, false), {Name: "frequency", Type: Number, Dim: dimRate, HasMin: true, MinOpen: true},
				{Name: "highest_at", Type: loose, Dim: dimTime}, {Name: "phase", Type: Number}}},
			{Name: "decay", Type: Groups, Fields: []Field{diff("amplitude"), time("time_constant", true, true)}},
			{Name: "file", Type: Text}, {Name: "time", Type: Text, With: []string{"file"}}, {Name: "column", Type: Text, With: []string{"file"}},
			{Name: "expression", Type: loose, Help: `"= load"`},
			time("repeat", true, false), optional(value("before")),
		},
	}
	forms.number.Or = field.Or // for a message that proposes it
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
	w := wave{field: field, n: n, owner: f.o, value: noSlot, before: noSlot, repeat: noSlot, self: f.profile}
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
		ok = f.single(n, forms, &w)
	}
	if !ok {
		return noSlot, source, false
	}
	w.fixed = len(c.moving) == moving && !w.loose
	w.steps = w.steps || stepwise[w.form]
	pieces := 2*w.count + len(w.list) + len(w.data)
	if f.r.breaks += pieces; pieces > 0 && f.r.breaks > maxBreaks {
		f.tooMany(n)
		return noSlot, source, false
	}
	made, diags := c.makeWave(&w, f.r.asWritten())
	if diags != nil {
		f.r.reportAll(diags)
		return noSlot, source, false
	}
	if f.r.breaks += piecesOf(&w, &made.wave); w.form == "profile" && f.r.breaks > maxBreaks {
		f.tooMany(n)
		return noSlot, source, false
	}
	w.made, w.bound = made.wave, made.bound
	f.sampledRemark(&w)
	w.ref = c.ref(n.span, f.o)
	c.waves = append(c.waves, w)
	if w.self > 0 {
		c.curves[w.self-1] = made.curve
	}
	return WaveSlot(len(c.waves) - 1), source, true
}

func (f fielder) tooMany(n *node) {
	f.r.at(n.span, Diagnostic{Code: "too-many", Thing: f.o.thing(), Text: fmt.Sprintf("with this, the waveforms of the case have more than %d pieces", maxBreaks)})
}

// piecesOf counts the pieces of the waveform of an expression, with the exponentials in them.
func piecesOf(w *wave, made *laplace.Waveform) int {
	if w.form != "profile" {
		return 0 // counted as stated
	}
	n := len(made.Segments)
	for i := range made.Segments {
		n += len(made.Segments[i].Exp)
	}
	return n
}

// single reads what is no table: an expression of profiles, one by name, or a number.
func (f fielder) single(n *node, forms *waveFields, w *wave) (ok bool) {
	if is, ok := f.follow(n, w); is {
		return ok
	}
	w.form = "constant"
	w.value, ok = f.r.number(f.o, n, &forms.number)
	return ok
}

// waveTable reads a waveform stated as a table.
func (f fielder) waveTable(n *node, forms *waveFields, w *wave) (source string, ok bool) {
	inner := f
	if w.field.Name != "" {
		inner.word += "." + w.field.Name
	}
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
		case "expression":
			ok = f.single(x.n, forms, w) && ok
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
