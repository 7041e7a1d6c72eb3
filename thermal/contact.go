package thermal

import (
	"fmt"
	"math"
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
	"lagbook/thermal/material"
)

// contactField is contact = {…}: two faces pressed together.
func contactField() casefile.Field {
	return casefile.Field{Name: "contact", Type: casefile.Group, Help: "a joint: 1/(h·A)", OneOf: [][]string{{"coefficient", "joint"}},
		Fields: []casefile.Field{
			casefile.Positive("coefficient", coefficient, "h"),
			{Name: "joint", Type: casefile.Text, Structural: true, Help: "words of a joint of the handbook in place of h: \"silicone grease, aluminium\", with the pressure where there are several: \"stainless, vacuum, 100 kPa\""},
			required(casefile.Positive("area", area, "A")),
		}}
}

// jointLaw is 1/(h·A) of a contact, h stated or of the handbook.
func jointLaw(e *casefile.Element, _ *casefile.Case) (law, []casefile.Diagnostic) {
	if !e.Has("contact.joint") {
		return surfaceLaw(e, "contact"), nil
	}
	j, faults := jointOf(e)
	if faults != nil {
		return law{}, faults
	}
	// of a range the value that is as many times the lower as the upper is of it
	r, a := math.Sqrt(j.Resistance.Low*j.Resistance.High), typed(e, "contact.area")
	text := areaResistance(r)
	if j.Resistance.Low != j.Resistance.High {
		text += " (" + areaResistance(j.Resistance.Low) + " to " + areaResistance(j.Resistance.High) + ")"
	}
	source := jointName(j) + ": " + j.Source
	if j.Status == material.FromMemory {
		source += " (" + j.Status.String() + ")"
	}
	return law{formula: "R''/A", numbers: text + "/" + a.text, source: joinSources(source, a.source),
		value: func(v casefile.Values) float64 { return a.at(v) / r }}, nil
}

var areaResistanceDim = quantity.Dim{-1, 0, 3, 1, 0}

func areaResistance(r float64) string { return si(r, areaResistanceDim) }

// jointName is the joint with the pressure it was measured at.
func jointName(j material.Joint) string {
	switch p := j.Pressure; {
	case p.High == 0:
		return j.Interface
	case p.Low == p.High:
		return fmt.Sprintf("%s, %g kPa", j.Interface, p.Low/1000)
	default:
		return fmt.Sprintf("%s, %g to %g kPa", j.Interface, p.Low/1000, p.High/1000)
	}
}

// jointOf finds the one joint in whose name all the words occur.
func jointOf(e *casefile.Element) (material.Joint, []casefile.Diagnostic) {
	text := e.Text("contact.joint")
	want := strings.Fields(strings.ToLower(strings.ReplaceAll(text, ",", " ")))
	var hits []material.Joint
	for _, j := range material.Joints() {
		name := strings.ToLower(jointName(j))
		if name == strings.ToLower(text) {
			return j, nil
		}
		all := len(want) > 0
		for _, w := range want {
			all = all && strings.Contains(name, w)
		}
		if all {
			hits = append(hits, j)
		}
	}
	if len(hits) == 1 {
		return hits[0], nil
	}
	d := e.Fault("contact.joint", fmt.Sprintf("the handbook has no joint %q", text), "", "")
	d.Hint = "`lagbook materials` lists the joints; or state the coefficient"
	if len(hits) > 1 {
		const most = 6
		names := make([]string, 0, most)
		for _, j := range hits[:min(most, len(hits))] {
			names = append(names, fmt.Sprintf("%q", jointName(j)))
		}
		d.Text, d.Hint = fmt.Sprintf("%q fits %d joints of the handbook", text, len(hits)), "say which: "+strings.Join(names, ", ")
	}
	return material.Joint{}, []casefile.Diagnostic{d}
}
