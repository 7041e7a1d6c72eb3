package casefile

import (
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// An Element is one named table of the case, checked against its Table. Its
// methods take the path of a field: "value", "layer.thickness", "between",
// "foster[0].first", "foster[0].second", "layers[2].thickness". Asking for the
// slot of a field that the case does not state is a programmer's error and
// panics: ask Has first.
type Element struct {
	Name  string
	Table *Table
	Ref   network.Ref

	c      *Case
	domain string
	use    *use // in whose part it stands, nil for the case itself
	header span
	fields []entry
	source string
	faulty bool // has faults of its own: not built
}

// An entry is one field of an element as the case states it.
type entry struct {
	field  *Field
	name   string // the field's, or first and second in a pair
	n      *node  // its value, inside {value = …} the inner one
	slot   Slot   // Number, Count
	wave   WaveSlot
	source string  // stated beside the value, or beside the group
	list   []entry // fields of a Group or of Or; items of Names, Numbers, Pairs and Groups; the points of a value
	form   form    // what stands there
}

// form tells what stands in the place of a value.
type form uint8

const (
	plainValue form = iota
	orTable         // a table with the keys of Or
	pointList       // points against something else
)

// noSlot stands where a field has no value.
const noSlot = -1

// Domain is the vocabulary the element's table belongs to: "thermal".
func (e *Element) Domain() string { return e.domain }

// Thing names the element as messages do: resistance "paste".
func (e *Element) Thing() string {
	if e.Name == "" {
		return e.Table.Name // keys in [domain] itself
	}
	return e.Table.Name + " " + quoted(e.Name) + e.use.said()
}

// Source is where the element's data come from, as stated beside it, or "".
func (e *Element) Source() string { return e.source }

// SourceOf is where a field's value comes from: stated with the value, beside
// the group it stands in, or else beside the element.
func (e *Element) SourceOf(path string) string {
	source := e.source
	list := e.fields
	for path != "" {
		x, rest := step(list, path)
		if x == nil {
			break
		}
		if x.source != "" {
			source = x.source
		}
		list, path = x.list, rest
	}
	return source
}

// Has reports whether a field is stated.
func (e *Element) Has(path string) bool { return e.find(path) != nil }

// Plain reports whether a field is stated as its plain value: neither as a table with
// the keys of Or nor as points.
func (e *Element) Plain(path string) bool {
	x := e.find(path)
	return x != nil && x.form == plainValue
}

// Num returns the slot of a Number.
func (e *Element) Num(path string) Slot {
	s := e.must(path).slot
	if s == noSlot && !e.faulty {
		panic("casefile: a number was asked for where something else stands")
	}
	return s
}

// Flag returns what a Flag says, false where it is not stated.
func (e *Element) Flag(path string) bool { return e.Text(path) == "true" }

// DimOf returns the dimension of a Number whose field allows several.
func (e *Element) DimOf(path string) quantity.Dim {
	s := e.Num(path)
	if s == noSlot {
		return e.must(path).field.Dim
	}
	return e.c.slots[s].dim
}

// NumOr returns the slot of a Number, or a slot that always holds v (SI) where
// the case does not state it. It is for Table.Build: each call may add a slot.
func (e *Element) NumOr(path string, v float64) Slot {
	if x := e.find(path); x != nil {
		return x.slot
	}
	return e.c.constant(v)
}

// Count returns a whole number; it is structural and never changes.
func (e *Element) Count(path string) int {
	s := e.Num(path)
	if s == noSlot {
		return 0
	}
	return int(e.c.slots[s].si)
}

// Wave returns the slot of a waveform.
func (e *Element) Wave(path string) WaveSlot {
	w := e.must(path).wave
	if w == noSlot && !e.faulty {
		panic("casefile: a waveform was asked for where something else stands")
	}
	return w
}

// Len returns the number of items of a list, 0 where it is not stated.
func (e *Element) Len(path string) int {
	if x := e.find(path); x != nil {
		return len(x.list)
	}
	return 0
}

// Text returns a field as it was written, a string without its quotes; "" where
// it is not stated.
func (e *Element) Text(path string) string {
	x := e.find(path)
	if x == nil || x.n == nil {
		return ""
	}
	if x.n.kind == kindArray || x.n.kind == kindTable {
		return oneLine(e.c.src.text[x.n.at:x.n.end])
	}
	return x.n.text
}

// Word returns the word of a Word field, "" where it is not stated or something else
// stands in its place.
func (e *Element) Word(path string) string {
	if !e.Plain(path) {
		return ""
	}
	return e.Text(path)
}

// NameOf returns the name a Name field holds, "" where it is not stated.
func (e *Element) NameOf(path string) string { return e.Text(path) }

// Names returns the names a Names field holds.
func (e *Element) Names(path string) []string {
	x := e.find(path)
	if x == nil {
		return nil
	}
	names := make([]string, len(x.list))
	for i := range x.list {
		names[i] = x.list[i].n.text
	}
	return names
}

// Fault returns an error about a field, placed at its value, or at the
// element's header where path is empty or not stated. Text is found, followed
// by "expected "+want where want is not empty; fix, where not empty, is what to
// put in place of the whole value, as TOML: a text with its quotes.
func (e *Element) Fault(path, found, want, fix string) Diagnostic {
	at := e.header
	if x := e.find(path); x != nil {
		at = x.n.span
	}
	d := Diagnostic{Code: "element", Thing: e.Thing(), Text: found, Found: found, Want: want, Fix: fix}
	if want != "" {
		d.Text += "; expected " + want
	}
	return e.c.src.place(d, at)
}

// RefOf returns a reference to a field's value, for faults that name it.
func (e *Element) RefOf(path string) network.Ref {
	if x := e.find(path); x != nil {
		return e.c.ref(x.n.span, owner{e: e})
	}
	return e.Ref
}

// must returns the entry of a field that is stated. Of a part at fault some are
// missing, and a part that is not may ask for them, whose setter is never called.
func (e *Element) must(path string) *entry {
	x := e.find(path)
	switch {
	case x == nil && e.faulty:
		return &entry{field: &Field{}, slot: noSlot, wave: noSlot}
	case x == nil:
		panic("casefile: a field was asked for that the case does not state")
	}
	return x
}

// find walks down a path; nil where something on it is not stated.
func (e *Element) find(path string) *entry {
	list := e.fields
	for path != "" {
		x, rest := step(list, path)
		if x == nil || rest == "" {
			return x
		}
		list, path = x.list, rest
	}
	return nil
}

// step follows the first part of a path, a name or an index, and returns the
// entry and the rest.
func step(list []entry, path string) (*entry, string) {
	if path[0] == '[' {
		digits, rest, ok := strings.Cut(path[1:], "]")
		i := 0
		for _, c := range digits {
			i = i*10 + int(c-'0')
		}
		if !ok || i >= len(list) {
			return nil, ""
		}
		return &list[i], strings.TrimPrefix(rest, ".")
	}
	end := 0
	for end < len(path) && path[end] != '.' && path[end] != '[' {
		end++
	}
	name, rest := path[:end], strings.TrimPrefix(path[end:], ".")
	for i := range list {
		if list[i].name == name {
			return &list[i], rest
		}
	}
	return nil, ""
}

// oneLine makes one line of a text with breaks.
func oneLine(s string) string {
	if strings.ContainsAny(s, "\n\r\t") {
		return strings.Join(strings.Fields(s), " ")
	}
	return s
}

// holdsFields reports whether an entry has fields below it: of a group, of the groups
// of a list, or of what stands in the place of a value.
func (x *entry) holdsFields() bool {
	return x.field.Type == Group || x.field.Type == Groups || x.form == orTable
}
