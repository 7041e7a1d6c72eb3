package casefile

import "lagbook/network/quantity"

// heads reads the keys that stand in [domain] itself, before anything else:
// what a pressure means is said there.
func (r *reader) heads(root *node) {
	r.c.Pressures = Pressures{Atmosphere: StandardAtmosphere}
	for i := range r.voc {
		v := &r.voc[i]
		k := root.table.find(v.Domain)
		if v.Domain == "" || k == nil || k.value.kind != kindTable {
			continue
		}
		if len(v.Tables) > 0 {
			r.domains = append(r.domains, v)
		}
		if len(v.Head) > 0 {
			r.head(v, k)
		}
	}
}

// head reads those of one domain.
func (r *reader) head(v *Vocabulary, k *key) {
	e := r.newElement()
	*e = Element{Table: &Table{Name: v.Domain, Fields: v.Head}, c: r.c, domain: v.Domain, header: k.span}
	e.Ref = r.c.ref(k.span, owner{e: e})
	f := fielder{r: r, o: owner{e: e}, v: v, word: v.Domain, header: k.span}
	for i := range k.value.table.keys {
		key := &k.value.table.keys[i]
		field := fieldNamed(v.Head, key.name)
		if field == nil {
			continue
		}
		if x, ok := f.entry(key.value, field); ok {
			e.fields = append(e.fields, x)
		} else {
			e.faulty = true
		}
	}
	if e.faulty = !f.complete(k.value, v.Head, v.OneOf) || e.faulty; e.faulty && len(v.Tables) > 0 {
		r.unready[v.Domain], r.anything = true, true
	}
	if r.c.heads == nil {
		r.c.heads = map[string]*Element{}
	}
	r.c.heads[v.Domain] = e
	if !e.faulty {
		r.pressures(e)
	}
}

// pressures takes what [hydraulic] says of pressures. The atmosphere is a number
// of its own: were it to vary, every level converted with it would move.
func (r *reader) pressures(e *Element) {
	p := &r.c.Pressures
	if word := e.Word("pressures"); word != "" {
		p.Absolute, p.Stated = word == "absolute", true
	}
	x := e.find("atmosphere")
	if x == nil {
		return
	}
	if r.c.slots[x.slot].expr != nil {
		r.at(x.n.span, Diagnostic{Code: "fixed", Thing: e.Thing(), Text: "atmosphere: " + quoted(x.n.text) + " goes by given values; expected a number, which stays as it is",
			Fix: basic(quantity.Print{Digits: 6}.Format(r.c.slots[x.slot].si, dimPressure, quantity.Absolute))})
		return
	}
	p.Atmosphere = r.c.slots[x.slot].si
}

// Keep notes what a domain has worked out for its Build functions, under a name of its
// own. Kept returns it, nil where there is none.
func (c *Case) Keep(name string, value any) {
	if c.kept == nil {
		c.kept = map[string]any{}
	}
	c.kept[name] = value
}

// Kept returns what was kept under a name, nil where there is none.
func (c *Case) Kept(name string) any { return c.kept[name] }

// Head returns the keys that stand in [domain] itself, nil where the case has
// no such table.
func (c *Case) Head(domain string) *Element { return c.heads[domain] }

// Domains lists the domains that the case has tables of, as their vocabularies
// stand.
func (c *Case) Domains() []string {
	var list []string
	for i := range c.voc {
		d := c.voc[i].Domain
		for _, e := range c.Elements {
			if d != "" && e.domain == d {
				list = append(list, d)
				break
			}
		}
	}
	return list
}

// Measures says what nodes and branches of a domain carry.
func (c *Case) Measures(domain string) Measures {
	for i := range c.voc {
		if c.voc[i].Domain == domain {
			return c.voc[i].Measures
		}
	}
	return Measures{}
}
