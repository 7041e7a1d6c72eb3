package casefile_test

import (
	"strings"
	"testing"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// What acts on a node may have its name, whichever stands first.
func TestSourceWithTheNameOfItsNode(t *testing.T) {
	source := "[thermal.source.case]\ninto = \"case\"\ndrive = \"10 W\"\n"
	asks := "[[transfer]]\nfrom = \"case\"\nto = \"case\"\n[[table]]\nshow = [\"case\", \"flow of case\", \"case - room\"]\ntimes = [\"1 s\"]\n"
	for _, text := range []string{good + source + asks, source + good + asks} {
		c, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
		if diags != nil {
			t.Fatal(casefile.Listing(diags))
		}
		node, okNode := c.Element("node", "case")
		feed, okFeed := c.Element("thermal.source", "case")
		if !okNode || !okFeed || node.Table.Name != "node" || feed.Table.Name != "source" {
			t.Fatal("one hides the other")
		}
		if e, _ := c.Part("case"); e != node {
			t.Error("by the name alone the node is meant")
		}
		if x := c.Questions.Transfers[0]; x.From != "case" || x.To.Node != "case" {
			t.Errorf("%+v", x)
		}
		show := c.Questions.Tables[0].Show
		if show[0].Node != "case" || show[0].Kind != quantity.Level || show[1].Part != "case" || show[1].Dim != dimPower || show[2].Minus != "room" {
			t.Errorf("%+v", show)
		}
		if out, ok := c.Showing("case", "flow"); !ok || out.Flow == nil {
			t.Error("the flow of the source is not shown")
		}
	}
}

// In two domains a name with its domain still finds both.
func TestNameOfANodeInTwoDomains(t *testing.T) {
	text := good + "[thermal.source.case]\ninto = \"case\"\ndrive = \"10 W\"\n[hydraulic.node.case]\nheld = \"1 bar\"\n[hydraulic.node.out]\ncompliance = \"1e-8 m³/Pa\"\n" +
		"[hydraulic.line.l]\nbetween = [\"case\", \"out\"]\nresistance = \"1 GPa·s/m³\"\n[[table]]\nshow = [\"thermal:case\", \"hydraulic:case\"]\ntimes = [\"1 s\"]\n"
	c, diags := casefile.Read("case.toml", []byte(text), nil, profileVocabulary()...)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	if show := c.Questions.Tables[0].Show; show[0].Dim != dimTemperature || show[1].Dim != dimPressure {
		t.Errorf("%+v", show)
	}
	_, diags = casefile.Read("case.toml", []byte(strings.Replace(text, `"thermal:case"`, `"case"`, 1)), nil, profileVocabulary()...)
	if len(diags) != 1 || diags[0].Code != "ambiguous" {
		t.Errorf("%v", diags)
	}
}

// Where both have what is asked of the name, that is said.
func TestNameThatMayMeanBoth(t *testing.T) {
	words := plantVocabulary()
	words[1].Tables = append(words[1].Tables, casefile.Table{Name: "float", Stage: 1, Fields: []casefile.Field{casefile.NodeName("on", "")},
		Readings: []casefile.Reading{{Word: "level", Dim: dimLength, Kind: quantity.Level}, {Word: "force", Dim: dimPower}},
		Build: func(e *casefile.Element, _ *casefile.Case, _ *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
			id, faults := e.NodeAt("on")
			for _, word := range []string{"level", "force"} {
				e.Shows(word, network.Output{Terms: []network.Term{{Node: id, Coef: 1}}})
			}
			return nil, faults
		}})
	text := "[hydraulic.float.basin]\non = \"basin\"\n[hydraulic.node.basin]\ntank = { area = \"4 m²\" }\nstart = \"1 kPa\"\n[[table]]\nshow = [\"%s of basin\"]\ntimes = [\"1 s\"]\n"
	for word, says := range map[string]string{
		"force": "",
		"level": `"basin" is a node and a float, and both may be meant here`,
		"flow":  `node "basin" has no "flow"`,
		"spill": `node "basin" has no "spill"`,
	} {
		_, diags := casefile.Read("case.toml", []byte(strings.Replace(text, "%s", word, 1)), nil, words...)
		if says == "" && diags != nil || says != "" && (len(diags) != 1 || diags[0].Text != says) {
			t.Errorf("%s: %v", word, diags)
		}
	}
}
