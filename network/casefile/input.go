package casefile

import (
	"fmt"
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A driven is a waveform that an element of the network follows.
type driven struct {
	id    network.ElementID
	k     int
	field *Field
}

// Driven registers an input of this element, "opening of NAME": drive k of an element
// of the network. Build calls it. The word is the Drives of one of the table's fields.
func (e *Element) Driven(word string, id network.ElementID, k int) {
	f := fieldDriving(word, e.Table.Fields)
	if f == nil {
		panic("casefile: an element is driven by a word that no field of its table has")
	}
	if e.c.drives == nil {
		e.c.drives = map[string]driven{}
	}
	e.c.drives[word+" of "+e.FullName()] = driven{id, k, f}
}

// Drive returns the drive of the network that an input names, "opening of sv1", the
// part in full, as in AskTransfer.From.
func (c *Case) Drive(name string) (id network.ElementID, k int, ok bool) {
	d, ok := c.drives[name]
	return d.id, d.k, ok
}

// DriveDim returns the dimension and kind of the waveform of a drive: a plain number of an
// opening, 1/s of the speed of a pump, a level in K of the target of a heater.
func (c *Case) DriveDim(name string) (dim quantity.Dim, kind quantity.Kind, ok bool) {
	d, ok := c.drives[name]
	if !ok {
		return dim, kind, false
	}
	return d.field.Dim, d.field.Kind, true
}

// fieldDriving returns the field that an element is driven by under a word, nil for none.
func fieldDriving(word string, fields []Field) *Field {
	for i := range fields {
		f := &fields[i]
		if f.Drives == word {
			return f
		}
		for _, below := range [][]Field{f.Fields, f.Or} {
			if found := fieldDriving(word, below); found != nil {
				return found
			}
		}
	}
	return nil
}

// driveWords adds the words that some fields drive by.
func driveWords(words []string, fields []Field) []string {
	for i := range fields {
		f := &fields[i]
		if f.Drives != "" && !contains(words, f.Drives) {
			words = append(words, f.Drives)
		}
		words = driveWords(driveWords(words, f.Fields), f.Or)
	}
	return words
}

// drives reports whether an element is an input by its name alone: a source, a held node.
func (e *Element) drives() bool {
	if e.c.net != nil && !e.faulty && e.twin() == nil {
		return e.c.inputs[e.FullName()]
	}
	return e.followed()
}

// wants is what a message says may stand for an input.
const wants = "a source, a held node, or what a part is driven by"

// input checks that a name is that of a source, a held node or a drive, and returns
// its full name.
func (r *reader) input(o owner, n *node) (string, bool) {
	if word, part, ok := strings.Cut(n.text, " of "); ok && len(r.c.parts(n.text)) == 0 {
		if word, part = strings.TrimSpace(word), strings.TrimSpace(part); len(r.c.parts(part)) > 0 || r.nearDrive(word) {
			return r.drive(o, n, word, part)
		}
	}
	e, ok := r.pick(o, n, n.text, (*Element).drives)
	switch {
	case ok:
		return e.FullName(), true
	case e != nil && (e.faulty || e.drives()):
		return "", false // it may be an input, or two are, which is reported
	case e != nil:
		r.noInput(o, n, e)
		return "", false
	}
	if r.missing(n.text) {
		return "", false
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: quoted(n.text) + " is not defined", Found: n.text, Want: "a source or a held node"}
	inputs := r.inputNames()
	if near, ok := quantity.Nearest(n.text, inputs); ok {
		d.Fix = basic(near)
	} else {
		d.Hint = "an input is a source or a held node" + listed(inputs)
	}
	r.at(n.span, d)
	return "", false
}

// inputNames lists what may stand for an input, in file order.
func (r *reader) inputNames() []string {
	var list []string
	for _, e := range r.c.Elements {
		if e.domain == "" {
			continue
		}
		if e.drives() {
			list = append(list, e.FullName())
		}
		for _, word := range e.driven() {
			list = append(list, word+" of "+e.FullName())
		}
	}
	return list
}

// driven lists the words of the drives of an element.
func (e *Element) driven() []string {
	var list []string
	for _, word := range driveWords(nil, e.Table.Fields) {
		if _, _, ok := e.c.Drive(word + " of " + e.FullName()); ok {
			list = append(list, word)
		}
	}
	return list
}

// nearDrive reports whether a word is, or nearly is, one that parts are driven by.
func (r *reader) nearDrive(word string) bool {
	var words []string
	for i := range r.voc {
		for j := range r.voc[i].Tables {
			words = driveWords(words, r.voc[i].Tables[j].Fields)
		}
	}
	_, near := quantity.Nearest(word, words)
	return near || contains(words, word)
}

// drive reads "opening of sv1".
func (r *reader) drive(o owner, n *node, word, part string) (string, bool) {
	has := func(e *Element) bool { return e.faulty || contains(e.driven(), word) }
	e, ok := r.pick(o, n, part, has)
	switch {
	case ok:
		return word + " of " + e.FullName(), true
	case e != nil && has(e):
		return "", false // there are two: reported
	case e != nil:
		r.noDrive(o, n, e, word)
		return "", false
	case r.missing(part):
		return "", false
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: quoted(part) + " is not defined", Found: part, Want: wants}
	inputs := r.inputNames()
	if near, ok := quantity.Nearest(n.text, inputs); ok {
		d.Fix = basic(near)
	} else {
		d.Hint = "the inputs are" + strings.TrimPrefix(listed(inputs), ":")
	}
	r.at(n.span, d)
	return "", false
}

// noDrive reports a word by which an element is not driven.
func (r *reader) noDrive(o owner, n *node, e *Element, word string) {
	d := Diagnostic{Code: "no-input", Thing: o.thing(), Found: word, Text: fmt.Sprintf("%s %s has no %s to drive it by", e.Table.Name, quoted(e.Name), quoted(word))}
	has := e.driven()
	near, ok := quantity.Nearest(word, has)
	switch {
	case ok:
		d.Fix = basic(near + " of " + e.FullName())
	case e.drives():
		d.Fix = basic(e.FullName())
	case len(has) > 0:
		d.Hint = "it is driven by its " + strings.Join(has, " and its ")
	case contains(driveWords(nil, e.Table.Fields), word):
		d.Text, d.Hint = e.Table.Name+" "+quoted(e.Name)+" states no "+word, "state "+word+": a number, or a waveform"
	default:
		d.Hint = "an input is " + wants + listed(r.inputNames())
	}
	r.at(n.span, d)
}

// noInput reports a part that nothing drives.
func (r *reader) noInput(o owner, n *node, e *Element) {
	d := Diagnostic{Code: "no-input", Thing: o.thing(), Text: fmt.Sprintf("%s is %s, not an input", quoted(n.text), article(e.Table.Name)),
		Hint: "an input is a source or a held node"}
	if e.isNode() {
		d.Text = fmt.Sprintf("node %s is not held: it is not an input", quoted(n.text))
	}
	if has := e.driven(); len(has) > 0 {
		d.Fix, d.Hint = basic(has[0]+" of "+e.FullName()), ""
	}
	r.at(n.span, d)
}

// listed adds a few names to a hint.
func listed(names []string) string {
	const most = 8
	if len(names) == 0 {
		return ""
	}
	if len(names) > most {
		return ": " + strings.Join(names[:most], ", ") + ", …"
	}
	return ": " + strings.Join(names, ", ")
}
