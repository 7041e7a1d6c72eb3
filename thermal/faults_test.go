package thermal

import (
	"slices"
	"strings"
	"testing"

	"lagbook/network/casefile"
)

// What is wrong with a part, in the words a user reads.
func TestFaults(t *testing.T) {
	base := `
[thermal.node.air]
held = "20 °C"
[thermal.node.body]
capacitance = "10 J/K"
[thermal.resistance.r]
between = ["body", "air"]
value   = "1 K/W"
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
`
	for _, c := range []struct{ name, text, want string }{
		{"unknown material", "[thermal.node.x]\nlump = { material = \"coper\", mass = \"1 kg\" }", `material "coper" is not known`},
		{"its suggestion", "[thermal.node.x]\nlump = { material = \"coper\", mass = \"1 kg\" }", `did you mean "copper"?`},
		{"a word in several names", "[thermal.node.x]\nlump = { material = \"steel\", mass = \"1 kg\" }",
			"the handbook has stainless steel 316, stainless steel 347, stainless steel 304, carbon steel 1010, carbon steel, building steel"},
		{"a word in one name", "[thermal.node.x]\nlump = { material = \"bakelite sheet\", mass = \"1 kg\" }", "define it under [material.\"bakelite sheet\"]"},
		{"half a name", "[thermal.node.x]\nlump = { material = \"polycarb\", mass = \"1 kg\" }", `did you mean "polycarbonate"?`},
		{"American spelling", "[thermal.node.x]\nlump = { material = \"aluminum\", mass = \"1 kg\" }", `did you mean "aluminium"?`},
		{"no specific heat", "[thermal.node.x]\nlump = { material = \"glass fibre\", mass = \"1 kg\" }", "the handbook has no specific_heat of glass fibre"},
		{"own without density", "[material.m]\nspecific_heat = \"1 kJ/(kg·K)\"\n[thermal.node.x]\nlump = { material = \"m\", volume = \"1 L\" }", `material "m" states no density`},
		{"both lump and capacitance", "[thermal.node.x]\ncapacitance = \"1 J/K\"\nlump = { material = \"copper\", mass = \"1 kg\" }", "stated-twice: "},
		{"both volume and mass", "[thermal.node.x]\nlump = { material = \"copper\", mass = \"1 kg\", volume = \"1 L\" }", "stated-twice: "},
		{"density against temperature", "[material.m]\ndensity = [[\"0 °C\", \"1 kg/m³\"], [\"90 °C\", \"2 kg/m³\"]]", "not-built: "},
		{"follows with nothing", "[thermal.source.s]\ninto = \"body\"\ndrive = \"1 W\"\nfollows = \"air\"", "follows needs slope, per_kelvin, doubles_every or points beside it"},
		{"start of a held node", "[thermal.node.x]\nheld = \"20 °C\"\nstart = \"20 °C\"", "start of a held node"},
		{"negative resistance", "[thermal.resistance.x]\nbetween = [\"body\", \"air\"]\nvalue = \"-1 K/W\"", "range: "},
		{"efficiency above one", "[thermal.resistance.x]\nbetween = [\"body\", \"air\"]\nfilm = { coefficient = \"5 W/(m²·K)\", area = \"1 m²\", efficiency = 1.2 }", "range: "},
		{"both ends at one node", "[thermal.resistance.x]\nbetween = [\"body\", \"body\"]\nvalue = \"1 K/W\"", "same-name: "},
		{"inside out", "[thermal.resistance.x]\nbetween = [\"body\", \"air\"]\nshell = { material = \"copper\", inner_radius = \"2 cm\", outer_radius = \"1 cm\", length = \"1 m\" }",
			"outer_radius is 1 cm; expected more than the inner_radius, 2 cm"},
		{"negative time constant", "[thermal.impedance.x]\nbetween = [\"body\", \"air\"]\nfoster = [[\"1 K/W\", \"-1 s\"]]", "range: "},
		{"no term", "[thermal.impedance.x]\nbetween = [\"body\", \"air\"]\nfoster = []", "list-length: "},
		{"too many terms", "[thermal.impedance.x]\nbetween = [\"body\", \"air\"]\nfoster = [" + strings.Repeat("[\"1 K/W\", \"1 s\"],", 65) + "]", "65 pairs; expected at most 64"},
		{"name of an inner node", "[thermal.node.\"x.1\"]\ncapacitance = \"1 J/K\"\n[thermal.resistance.y]\nbetween = [\"x.1\", \"air\"]\nvalue = \"1 K/W\"\n" +
			"[thermal.wall.x]\nbetween = [\"body\", \"air\"]\nlayers = [{ material = \"copper\", thickness = \"1 cm\", area = \"1 m²\" }]\nlumps = 2", `its inner node "x.1" bears the name of another node`},
		{"wall without area", "[thermal.wall.x]\nbetween = [\"body\", \"air\"]\nlayers = [{ material = \"copper\", thickness = \"1 cm\" }]\nlumps = 2", "a layer without area"},
		{"wall without density", "[thermal.wall.x]\nbetween = [\"body\", \"air\"]\nlayers = [{ conductivity = \"1 W/(m·K)\", thickness = \"1 cm\", area = \"1 m²\" }]\nlumps = 2", "conductivity without density"},
		{"density beside material", "[thermal.wall.x]\nbetween = [\"body\", \"air\"]\nlayers = [{ material = \"copper\", density = \"1 kg/m³\", thickness = \"1 cm\", area = \"1 m²\" }]\nlumps = 2", "density beside material"},
		{"too many lumps", "[thermal.wall.x]\nbetween = [\"body\", \"air\"]\nlayers = [{ material = \"copper\", thickness = \"1 cm\", area = \"1 m²\" }]\nlumps = 2000", "range: "},
		{"slope without about", "[thermal.source.x]\ninto = \"body\"\ndrive = \"1 W\"\nslope = \"1 W/K\"", "missing-key: "},
		{"about without slope", "[thermal.source.x]\ninto = \"body\"\ndrive = \"1 W\"\nabout = \"20 °C\"", "missing-key: "},
		{"into and out", "[thermal.source.x]\ninto = \"body\"\nout_of = \"body\"\ndrive = \"1 W\"", "stated-twice: "},
		{"into a held node", "[thermal.source.x]\ninto = \"air\"\ndrive = \"1 W\"", "is held: this source changes nothing"},
		{"scale below 0", "[thermal.resistance.x]\nbetween = [\"body\", \"air\"]\nvalue = \"1 K/W\"\nscale = -1", "scale is -1"},
		{"per_kelvin alone", "[thermal.source.x]\ninto = \"body\"\ndrive = \"1 W\"\nper_kelvin = \"1 %/K\"", "per_kelvin needs at beside it"},
		{"degrees for a slope", "[thermal.source.x]\ninto = \"body\"\ndrive = \"20 °C\"", "dimension: "},
	} {
		if got := faults(base + c.text + "\n"); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
}

// Words that are agreed and not built are refused by name, one by one.
func TestWordsNotBuiltAreRefused(t *testing.T) {
	for _, c := range []struct{ word, text string }{
		{"exact", "[thermal.wall.x]\nbetween = [\"a\", \"b\"]\nlayers = [{ material = \"copper\", thickness = \"1 cm\", area = \"1 m²\" }]\nexact = true"},
		{"points of density", "[material.x]\ndensity = [[\"0 °C\", \"1 kg/m³\"]]"},
	} {
		got := faults("[thermal.node.a]\ncapacitance = \"1 J/K\"\n[thermal.node.b]\nheld = \"20 °C\"\n" + c.text + "\n")
		line, _, _ := strings.Cut(got[max(0, strings.Index(got, `"`+c.word+`"`)):], "\n")
		if !strings.Contains(line, "not") || !strings.Contains(line, c.word) {
			t.Errorf("%s is not refused by name:\n%s", c.word, got)
		}
	}
}

// The tables are sound: every key has its help, groups name keys that exist, and no key is both built and refused.
func TestVocabularyIsSound(t *testing.T) {
	for _, v := range Vocabulary() {
		for _, table := range v.Tables {
			if table.Help == "" {
				t.Errorf("%s has no help", table.Name)
			}
			soundFields(t, v.NotBuilt, table.Name, table.Fields, table.OneOf)
		}
	}
}

func soundFields(t *testing.T, notBuilt []string, word string, fields []casefile.Field, oneOf [][]string) {
	t.Helper()
	names := []string{""}
	for _, f := range fields {
		path := word + "." + f.Name
		if f.Help == "" {
			t.Errorf("%s has no help", path)
		}
		if slices.Contains(notBuilt, path) {
			t.Errorf("%s is built and refused", path)
		}
		names = append(names, f.Name)
		soundFields(t, notBuilt, path, append(slices.Clone(f.Fields), f.Or...), f.OneOf)
	}
	for _, group := range oneOf {
		for _, name := range group {
			if !slices.Contains(names, name) {
				t.Errorf("%s: a group names %q, which is no key", word, name)
			}
		}
	}
	for _, f := range fields {
		for _, name := range f.With {
			if !slices.Contains(names, name) {
				t.Errorf("%s.%s goes with %q, which is no key", word, f.Name, name)
			}
		}
	}
}
