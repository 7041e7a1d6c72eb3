package casefile

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A profile is a waveform under a name, for use in expressions of waveforms. What a
// waveform may be is read by wave.go; its dimension is found from its values
// (profiledim.go).
type profile struct {
	name   string
	n      *node // what stands for it
	key    span
	owner  owner
	source string
	ref    network.Ref
	field  *Field        // with the dimension and kind of its values
	kind   quantity.Kind // in expressions
	wave   WaveSlot
	uses   []int // other profiles that it is made of
	state  profileState
	bad    bool // cannot be used: what uses it is not reported again
	used   bool
}

type profileState uint8

const (
	unread      profileState = iota
	beingRead                // on the path being followed
	profileRead              // as far as it can be
)

// A ProfileView is a profile of the case as it is shown.
type ProfileView struct {
	Name   string
	Text   string // as written, on one line
	Source string // where it comes from, "" if not stated
	Dim    quantity.Dim
	Kind   quantity.Kind // Level, Gauge or Absolute for levels; Either where its values, in K, are either
	Wave   WaveSlot
	Bound  float64 // by how much the wave may be off since it was sampled, SI; 0: closed form
	Used   bool
	Ref    network.Ref
}

// Profiles lists the profiles of the case in file order. Their waveforms are those as
// stated, also where a scenario lets another stand in for one.
func (c *Case) Profiles() []ProfileView {
	list := make([]ProfileView, 0, len(c.profiles))
	for i := range c.profiles {
		p := &c.profiles[i]
		info := c.WaveInfo(p.wave)
		list = append(list, ProfileView{Name: p.name, Text: info.Text, Source: p.source, Dim: info.Dim, Kind: p.kind,
			Wave: p.wave, Bound: info.Bound, Used: p.used, Ref: p.ref})
	}
	return list
}

// profileNamed returns the index of a profile.
func (c *Case) profileNamed(name string) (int, bool) {
	i, ok := c.profileIndex[name]
	return i, ok
}

func (c *Case) profileNames() []string {
	names := make([]string, len(c.profiles))
	for i := range c.profiles {
		names[i] = c.profiles[i].name
	}
	return names
}

// useProfile marks a profile, and those it is made of, as having an effect.
func (r *reader) useProfile(i int) {
	for list := []int{i}; len(list) > 0; {
		p := &r.c.profiles[list[len(list)-1]]
		list = list[:len(list)-1]
		if !p.used {
			p.used = true
			list = append(list, p.uses...)
		}
	}
}

// unusedProfiles warns of profiles that nothing follows.
func (r *reader) unusedProfiles() {
	for i := range r.c.profiles {
		if p := &r.c.profiles[i]; !p.used && !p.bad {
			r.at(p.key, Diagnostic{Severity: Warning, Code: "unused", Thing: p.owner.thing(), Text: "nothing in the case uses it"})
		}
	}
}

// standIn reads one `load = "overload"` of a scenario: a profile and the one that
// stands in for it. ok is false after a fault.
func (r *reader) standIn(o owner, k *key) (swap [2]string, ok bool) {
	i, ok := r.profileCalled(o, k.span, k.name, tomlKey)
	if k.value.kind != kindString {
		r.wrongType(o, k.value, &Field{Name: k.name}, "the name of a profile")
		return swap, false
	}
	j, found := r.profileCalled(o, k.value.span, k.value.text, basic)
	if !ok || !found {
		return swap, false
	}
	p, q := &r.c.profiles[i], &r.c.profiles[j]
	r.useProfile(j)
	if p.bad || q.bad {
		return swap, false
	}
	if p.field.Dim != q.field.Dim || isLevel(p.kind) != isLevel(q.kind) && p.kind != quantity.Either && q.kind != quantity.Either && p.field.Dim == dimKelvin {
		r.at(k.value.span, Diagnostic{Code: "dimension", Thing: o.thing(), Found: q.name, Want: quantity.Describe(p.field.Dim, p.kind),
			Text: fmt.Sprintf("%s cannot stand in for %s: it is %s, not %s", quoted(q.name), quoted(p.name), quantity.Describe(q.field.Dim, q.kind), quantity.Describe(p.field.Dim, p.kind))})
		return swap, false
	}
	return [2]string{p.name, q.name}, true
}

func isLevel(k quantity.Kind) bool {
	return k == quantity.Level || k == quantity.Gauge || k == quantity.Absolute
}

// profileCalled finds a profile by name; write makes of a better name what to put in its place.
func (r *reader) profileCalled(o owner, at span, name string, write func(string) string) (int, bool) {
	if i, ok := r.c.profileNamed(name); ok {
		return i, true
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: "profile " + quoted(name) + " is not defined", Found: name, Want: "a profile"}
	if near, ok := quantity.Nearest(name, r.c.profileNames()); ok {
		d.Fix = write(near)
	} else {
		d.Hint = "the profiles are" + listed(r.c.profileNames())[min(1, len(r.c.profiles)):]
		if len(r.c.profiles) == 0 {
			d.Hint = "the case has no profiles; write [profile." + tomlKey(name) + "]"
		}
	}
	r.at(at, d)
	return 0, false
}
