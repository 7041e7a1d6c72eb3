package study

import (
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A drive is a waveform that an element follows, as an input of transfer functions:
// "opening of sv1".
type drive struct {
	element    network.ElementID
	place      int // among the drives of the element
	unit, kind string
}

// driveOf finds the drive of a name.
func (m *Model) driveOf(name string) (*drive, bool) {
	id, k, ok := m.Case.Drive(name)
	unit, kind := m.driveUnit(name)
	return &drive{id, k, unit, kind}, ok
}

// turning is the unit of the speed of what turns.
const turning = "rev/s"

// driveUnit is the unit of a drive, as the case states it; a scale is a share.
func (m *Model) driveUnit(name string) (unit, kind string) {
	d, k, ok := m.Case.DriveDim(name)
	switch {
	case !ok:
		return "1", ""
	case d == dims["1/s"]:
		return turning, ""
	case k == quantity.Level:
		return unitOf(d), kindLevel
	}
	return unitOf(d), ""
}

// ownDrives are the places of the drives of an element that are no input by themselves:
// a source whose heat depends on a temperature follows its own wave once more.
func ownDrives(e network.ElementView) (places []int) {
	for k, name := range e.Drives {
		if !strings.HasPrefix(name, "drive of ") {
			places = append(places, k)
		}
	}
	return places
}

// checkDrives lists what elements follow, among what drives the network.
func (m *Model) checkDrives() []CheckInput {
	var list []CheckInput
	for _, e := range m.elements() {
		for _, k := range ownDrives(e) {
			w := m.par.Drive[e.ID][k]
			value := func(v float64) string { return m.driveValue(e.Drives[k], v) }
			list = append(list, CheckInput{Name: m.elementName(e.ID), What: e.Drives[k], Wave: waveWords(w, value, m.Show.Time)})
		}
	}
	return list
}

// driveMoves puts a value of a drive in words: "opening of sv1 40 %".
func (m *Model) driveMoves(name string, v float64) string {
	return name + " " + m.driveValue(name, v)
}

// driveValue prints a value of a drive.
func (m *Model) driveValue(name string, v float64) string {
	unit, kind := m.driveUnit(name)
	if unit == "1" {
		return m.Show.Percent(v)
	}
	return m.Show.Value(v, unit, kind)
}
