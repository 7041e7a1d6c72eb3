package casefile_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"lagbook/network/casefile"
	"lagbook/network/casefile/casetest"
	"lagbook/network/quantity"
)

// cell is a battery cell on a plate, invented.
const cell casetest.Piece = `[thermal.node.{core}]
capacitance = "1.8 kJ/K"
[thermal.node.{can}]
capacitance = "250 J/K"
[thermal.resistance.{roll}]
between = ["{core}", "{can}"]
value = "0.25 K/W"
[thermal.resistance.{foot}]
between = ["{can}", "<base>"]
value = "= foot"
[thermal.source.{loss}]
into = "{core}"
drive = { step = { from = "0 W", to = "= heat", at = "0 s" } }
`

// row is n cells, each on a plate of its own: uses of a part, or what they stand for. The
// last is set to more heat.
func row(n int, byHand bool) string {
	var b strings.Builder
	b.WriteString("[given]\nheat = \"72 W\"\nfoot = \"0.15 K/W\"\n[thermal.node.room]\nheld = \"20 °C\"\n")
	if !byHand {
		b.WriteString(cell.Part("cell"))
	}
	for i := range n {
		name, plate := fmt.Sprintf("u%d", i), fmt.Sprintf("plate_%d", i)
		fmt.Fprintf(&b, "[thermal.node.%s]\ncapacitance = \"400 J/K\"\n[thermal.resistance.film_%d]\nbetween = [%[1]q, \"room\"]\nvalue = \"0.1 K/W\"\n", plate, i)
		switch last := i == n-1; {
		case byHand && last:
			b.WriteString(strings.Replace(cell.ByHand(name, "base", plate), "= heat", "= 1.25 * heat", 1))
		case byHand:
			b.WriteString(cell.ByHand(name, "base", plate))
		default:
			b.WriteString(casetest.Use(name, "cell", "base", plate))
			if last {
				b.WriteString("set = { heat = \"= 1.25 * heat\" }\n")
			}
		}
	}
	return b.String()
}

// numbers are all numbers of a network as a case sets them.
func numbers(t *testing.T, c *casefile.Case, given []quantity.Value) string {
	t.Helper()
	v, diags := c.Eval(given)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	net, set, diags := c.Build()
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	p := net.NewParams()
	for _, s := range set {
		if err := s(v, p); err != nil {
			t.Fatal(err)
		}
	}
	return fmt.Sprintf("%v\n%x\n%x\n%x", net.Nodes(), p.C, p.G, p.Wave)
}

// TestUsesAreWhatTheyStandFor: a part used twelve times makes the network that the same
// case makes which is written by hand, to the last bit and in the same order, and follows
// the given values as that does.
func TestUsesAreWhatTheyStandFor(t *testing.T) {
	used, diags := casefile.Read("used.toml", []byte(row(12, false)), nil, testVocabulary()...)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	plain, diags := casefile.Read("plain.toml", []byte(row(12, true)), nil, testVocabulary()...)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	if d := cmp.Diff(numbers(t, plain, nil), numbers(t, used, nil)); d != "" {
		t.Error(d)
	}
	vary := func(c *casefile.Case) []quantity.Value {
		values := c.GivenValues()
		for name, text := range map[string]string{"heat": "100 W", "foot": "0.2 K/W"} {
			i, ok := c.GivenIndex(name)
			if !ok {
				t.Fatalf("%s is not given", name)
			}
			values[i], _ = quantity.Parse(text)
		}
		return values
	}
	was, now := numbers(t, used, nil), numbers(t, used, vary(used))
	if d := cmp.Diff(numbers(t, plain, vary(plain)), now); d != "" || was == now {
		t.Errorf("with other given values:\n%s", d)
	}
}

// TestUses holds what is told of uses.
func TestUses(t *testing.T) {
	const text = `[given]
r = "1 K/W"
[part.pair]
source = "drawn"
[part.pair.given]
own = "2 K/W"
more = "= 2 * own"
[part.pair.thermal.node.mid]
[part.pair.thermal.resistance.one]
between = ["from", "mid"]
value = "= r"
[part.pair.thermal.resistance.two]
between = ["mid", "to"]
value = "= own + more"
[part.four.use.x]
part = "pair"
join = { from = "left", to = "half" }
[part.four.use.y]
part = "pair"
join = { from = "half", to = "right" }
set = { own = "= 3 * r", r = "= r / 2" }
[part.four.thermal.node.half]
capacitance = "1 J/K"
[use.a]
part = "four"
join = { left = "room", right = "b.half" }
set = { r = "4 K/W" }
source = "estimated"
[use.b]
part = "four"
join = { left = "a.y.mid", right = "room" }
[thermal.node.room]
held = "20 °C"
`
	c, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	var got strings.Builder
	values := c.GivenValues()
	for _, u := range c.Uses() {
		fmt.Fprintf(&got, "%s %s %v", u.Name, u.Part, u.Join)
		for _, s := range u.Set {
			g := c.Given[s.Given]
			fmt.Fprintf(&got, " %s=%g(%s,%v,%q)", g.Name, values[s.Given].SI, g.Text, s.Own, g.Source)
			if g.Use != u.Name || g.Name != u.Name+"."+s.Name {
				t.Errorf("%+v is not of use %s", g, u.Name)
			}
		}
		got.WriteString("\n")
	}
	for _, e := range c.Elements {
		fmt.Fprintf(&got, "%s %q %v %s\n", e.Name, e.Use(), e.Names("between"), e.SourceOf("value"))
	}
	const want = `a four [[left room] [right b.half]] a.r=4(4 K/W,false,"estimated")
a.x pair [[from room] [to a.half]] a.x.own=2(2 K/W,true,"drawn") a.x.more=4(= 2 * own,true,"drawn")
a.y pair [[from a.half] [to b.half]] a.y.own=12(= 3 * r,false,"") a.y.r=2(= r / 2,false,"") a.y.more=24(= 2 * own,true,"drawn")
b four [[left a.y.mid] [right room]]
b.x pair [[from a.y.mid] [to b.half]] b.x.own=2(2 K/W,true,"drawn") b.x.more=4(= 2 * own,true,"drawn")
b.y pair [[from b.half] [to room]] b.y.own=3(= 3 * r,false,"") b.y.r=0.5(= r / 2,false,"") b.y.more=6(= 2 * own,true,"drawn")
a.x.mid "a.x" [] drawn
a.x.one "a.x" [room a.x.mid] drawn
a.x.two "a.x" [a.x.mid a.half] drawn
a.y.mid "a.y" [] drawn
a.y.one "a.y" [a.half a.y.mid] drawn
a.y.two "a.y" [a.y.mid b.half] drawn
a.half "a" [] estimated
b.x.mid "b.x" [] drawn
b.x.one "b.x" [a.y.mid b.x.mid] drawn
b.x.two "b.x" [b.x.mid b.half] drawn
b.y.mid "b.y" [] drawn
b.y.one "b.y" [b.half b.y.mid] drawn
b.y.two "b.y" [b.y.mid room] drawn
b.half "b" [] 
room "" [] 
`
	if d := cmp.Diff(want, got.String()); d != "" {
		t.Error(d)
	}
}

// TestGivenOfAUseFollows: what a use sets by an expression follows what it is made of,
// and can be varied by its name where it is a number.
func TestGivenOfAUseFollows(t *testing.T) {
	c, diags := casefile.Read("case.toml", []byte(row(3, false)+"[use.own]\npart = \"cell\"\njoin = { base = \"plate_0\" }\nset = { heat = \"5 W\" }\n"), nil, testVocabulary()...)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	at := func(name string) int {
		i, ok := c.GivenIndex(name)
		if !ok {
			t.Fatalf("%s is not among the given values", name)
		}
		return i
	}
	if g := c.Given[at("u2.heat")]; !g.Derived || c.Given[at("own.heat")].Derived {
		t.Errorf("%+v and %+v", g, c.Given[at("own.heat")])
	}
	values := c.GivenValues()
	values[at("heat")], _ = quantity.Parse("100 W")
	values[at("own.heat")], _ = quantity.Parse("7 W")
	v, diags := c.Eval(values)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	for name, want := range map[string]float64{"u0.loss": 100, "u2.loss": 125, "own.loss": 7} {
		e, ok := c.Part(name)
		if !ok {
			t.Fatalf("no %s", name)
		}
		if got := v.Wave[e.Wave("drive")].At(1); got != want {
			t.Errorf("%s is %g W, want %g", name, got, want)
		}
	}
	values[at("foot")], _ = quantity.Parse("-1 K/W")
	_, diags = c.Eval(values)
	const said = `case.toml:15:9: resistance "foot" (part "cell"): value is -1 K/W (= foot), must be positive`
	if len(diags) != 1 || diags[0].Error() != said {
		t.Errorf("beyond its range:\n%s", casefile.Listing(diags))
	}
}

// TestFaultsOfAPartAreSaidOnce: however often it is used.
func TestFaultsOfAPartAreSaidOnce(t *testing.T) {
	var b strings.Builder
	b.WriteString("[part.p.thermal.node.a]\nheld = \"20 °C\"\n[part.p.thermal.node.b]\n")
	for i := range 5 {
		fmt.Fprintf(&b, "[part.p.thermal.resistance.r%d]\nbetwen = [\"a\", \"b\"]\nvalue = \"= x * %d\"\n", i, i)
	}
	for i := range 60 {
		fmt.Fprintf(&b, "[use.u%d]\npart = \"p\"\n", i)
	}
	_, diags := casefile.Read("case.toml", []byte(b.String()), nil, testVocabulary()...)
	var thing []string
	for _, d := range diags {
		thing = append(thing, d.Thing+": "+d.Text)
	}
	if len(diags) != 10 || thing[0] != `resistance "r0" (part "p"): "betwen" is not a key of resistance` {
		t.Errorf("%d are said:\n%s", len(diags), strings.Join(thing, "\n"))
	}
}

// TestUseInManyDomains: a port may be a node of several domains, each joined to the node
// of that name in its own.
func TestUseInManyDomains(t *testing.T) {
	voc := testVocabulary()
	other := voc[0]
	other.Domain = "twin"
	voc = append(voc, other)
	const text = `[part.p.thermal.source.s]
into = "end"
drive = "1 W"
[part.p.twin.source.t]
into = "end"
drive = "1 W"
[use.u]
part = "p"
join = { end = "tank" }
[thermal.node.tank]
capacitance = "1 J/K"
[thermal.resistance.r]
between = ["tank", "room"]
value = "1 K/W"
[thermal.node.room]
held = "20 °C"
`
	_, diags := casefile.Read("case.toml", []byte(text), nil, voc...)
	const said = `case.toml:9:16: use "u": node "tank" is not defined`
	if len(diags) == 0 || diags[0].Error() != said || !slices.ContainsFunc(diags, func(d casefile.Diagnostic) bool { return d.Code == "unknown-name" }) {
		t.Errorf("%s", casefile.Listing(diags))
	}
}

// TestHeadInAPart: what is said for a whole domain has no place in a part.
func TestHeadInAPart(t *testing.T) {
	const text = "[part.p.hydraulic]\ndensity = \"870 kg/m³\"\n[part.p.hydraulic.node.n]\n[use.u]\npart = \"p\"\n"
	_, diags := casefile.Read("case.toml", []byte(text), nil, plantVocabulary()...)
	const said = `case.toml:2:1: part "p": "density" is said for the whole case, not in a part`
	if len(diags) != 1 || diags[0].Error() != said {
		t.Error(casefile.Listing(diags))
	}
}

// FuzzReadParts reads anything with parts and uses in it.
func FuzzReadParts(f *testing.F) {
	fuzzRead(f, archive{file: "testdata/parts.txt", words: testVocabulary}, row(2, false))
}
