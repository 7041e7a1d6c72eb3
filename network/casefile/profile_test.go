package casefile_test

import (
	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// profileVocabulary has waveforms of heat, temperature, pressure and plain numbers.
func profileVocabulary() []casefile.Vocabulary {
	plant := plantVocabulary()[:2]
	plant[1].Tables = append(plant[1].Tables, casefile.Table{Name: "flap", Stage: 1, Build: buildFlap, Fields: []casefile.Field{
		between(), required(positive("resistance", quantity.Dim{1, -4, -1, 0, 0})), {Name: "scale", Type: casefile.Wave, HasMin: true}}})
	return append(testVocabulary(), plant...)
}

// buildFlap builds a line whose scale must change in steps.
func buildFlap(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	if e.Has("scale") {
		if d := casefile.NotInSteps(e, c, "scale", "the network must be linear between its changes"); d != nil {
			return nil, d
		}
	}
	return buildChain(e, c, b)
}
