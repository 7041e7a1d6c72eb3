package casefile

import "lagbook/network"

// A Use tells how a part is used, for check and the note.
type Use struct {
	Name   string      // in full: "a"; "a.x" of use x in the part of use a
	Part   string      // the name of the part
	Join   [][2]string // each port with the full name of the node it is joined to, as stated
	Set    []UseSet
	Source string
	Ref    network.Ref
}

// A UseSet is a given value of a use: what set states, then what the part states for
// those that are not set.
type UseSet struct {
	Name  string // in the part: "r_cell"
	Given int    // in Case.Given, where it is "c.r_cell"
	Own   bool   // the use does not set it: it is as the part says
}

// Uses lists the uses of parts as they stand in the file, those in a part behind the use
// of it.
func (c *Case) Uses() []Use {
	list := make([]Use, 0, len(c.uses))
	for _, u := range c.uses {
		x := Use{Name: u.name, Part: u.part.name, Source: u.source, Ref: u.ref}
		for i := range u.joins {
			x.Join = append(x.Join, [2]string{u.joins[i].name, u.joinedName(&u.joins[i])})
		}
		for i := range u.set {
			if at, ok := u.given[u.set[i].name]; ok {
				x.Set = append(x.Set, UseSet{Name: u.set[i].name, Given: at})
			}
		}
		for i := range u.part.given {
			if at := u.given[u.part.given[i].name]; c.givens[at].scope == u {
				x.Set = append(x.Set, UseSet{Name: u.part.given[i].name, Given: at, Own: true})
			}
		}
		list = append(list, x)
	}
	return list
}

// joinedName is the full name of the node that a port is joined to.
func (u *use) joinedName(j *stated) string {
	for _, p := range u.ports {
		if p.name == j.name {
			full, _ := u.outer.resolve(p.domain, "node", bareIn(p.domain, j.n.text))
			return full
		}
	}
	return j.n.text
}

// Use is the use that an element stands in, in full, "" for one of the case's own.
func (e *Element) Use() string {
	if e.use == nil {
		return ""
	}
	return e.use.name
}

// addUse keeps a use.
func (c *Case) addUse(u *use) {
	if c.useNamed == nil {
		c.useNamed, c.useWords = map[string]*use{}, map[string]*use{}
	}
	c.uses = append(c.uses, u)
	c.useNamed[u.name], c.useWords[u.words] = u, u
}
