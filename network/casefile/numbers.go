package casefile

import "fmt"

// maxPoints is how many points a curve, and how many numbers a list, may have.
const maxPoints = 10_000

// numbers reads a list of quantities.
func (f fielder) numbers(n *node, field *Field) ([]entry, bool) {
	items := n.items
	switch {
	case n.kind == kindString || n.kind == kindInteger || n.kind == kindFloat || n.kind == kindTable && n.get("value") != nil:
		items = []*node{n}
	case n.kind != kindArray:
		f.r.wrongType(f.o, n, field, "a list, like "+sample(field))
		return nil, false
	}
	ok := f.length(n, len(items), field)
	if !ok && len(items) > maxPoints {
		return nil, false
	}
	list := f.r.newEntries(len(items))
	slots := make([]Slot, 0, len(items))
	for _, item := range items {
		x := entry{field: field, n: item, slot: noSlot, wave: noSlot}
		good := true
		if item.kind == kindTable {
			if x.n, x.source = f.r.withSource(f.o, item); x.n == nil {
				ok = false
				continue
			}
		}
		x.slot, good = f.r.number(f.o, x.n, field)
		ok = ok && good
		list, slots = append(list, x), append(slots, x.slot)
	}
	if ok && field.Ascending {
		ok = f.r.rising(f.o, field, slots)
	}
	return list, ok
}

// A climb is numbers of which each must be greater than the one before.
type climb struct {
	name  string
	slots []Slot
}

// rising checks numbers that must go up, and notes them for Eval where they may vary.
func (r *reader) rising(o owner, field *Field, slots []Slot) bool {
	x := climb{field.Name, slots}
	num := func(s Slot) float64 { return r.c.slots[s].si }
	if d := r.c.climbs(&x, num); d != nil {
		r.report(*d)
		return false
	}
	for _, s := range slots {
		if r.c.slots[s].expr != nil {
			r.c.rising = append(r.c.rising, x)
			break
		}
	}
	return true
}

// climbs reports the first number that is not greater than the one before.
func (c *Case) climbs(x *climb, num func(Slot) float64) *Diagnostic {
	for i := 1; i < len(x.slots); i++ {
		if num(x.slots[i]) > num(x.slots[i-1]) {
			continue
		}
		s, before := &c.slots[x.slots[i]], &c.slots[x.slots[i-1]]
		d := c.src.place(Diagnostic{Code: "order", Thing: s.owner.thing(),
			Text: fmt.Sprintf("%s: %s comes after %s; these numbers go up", x.name, quoted(s.n.text), quoted(before.n.text))}, s.n.span)
		return &d
	}
	return nil
}
