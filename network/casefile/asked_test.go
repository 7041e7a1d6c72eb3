package casefile_test

import (
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// askedArchive is the archive of mistakes in what is asked; its base is the good case.
var askedArchive = archive{"testdata/asked.txt", profileVocabulary, 90}

// askedCase reads the good case with more behind it.
func askedCase(t *testing.T, more string) *casefile.Case {
	t.Helper()
	_, _, texts, _ := askedArchive.mistakes(t)
	c, diags := casefile.Read("case.toml", []byte(texts["base"]+more), nil, profileVocabulary()...)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	return c
}

func values(t *testing.T, c *casefile.Case) casefile.Values {
	t.Helper()
	v, diags := c.Eval(nil)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	return v
}

func TestResultsRead(t *testing.T) {
	c := askedCase(t, "")
	v := values(t, c)
	for _, want := range []struct {
		name string
		dim  quantity.Dim
		kind quantity.Kind
	}{
		{"mean", dimTemperature, quantity.Level}, {"lift", dimTemperature, quantity.Difference}, {"loss", dimPower, quantity.Plain},
		{"heat", quantity.Dim{1, 2, -2, 0, 0}, quantity.Plain}, {"drop", dimPressure, quantity.Difference}, {"power", dimPower, quantity.Plain},
	} {
		r, ok := c.ResultNamed(want.name)
		if !ok || r.Dim != want.dim || r.Kind != want.kind {
			t.Errorf("%s: %+v", want.name, r)
		}
	}
	mean, _ := c.ResultNamed("mean")
	if m := mean.Mean; len(m) != 2 || m[0].Node != "core" || m[1].Node != "cold plate" || v.Num[m[0].Weight] != 0.6 || v.Num[m[1].Weight] != 0.4 {
		t.Errorf("%+v", mean.Mean)
	}
	lift, _ := c.ResultNamed("lift")
	if x := lift.Expr.Operands; len(x) != 2 || x[0].Result != "mean" || x[1].Node != "inlet" || lift.Expr.Eval([]float64{320, 300}, v) != 20 {
		t.Errorf("%+v", lift.Expr)
	}
	power, _ := c.ResultNamed("power")
	if x := power.Expr.Operands; x[0].Part != "drain" || x[0].Word != "flow" || x[1].Result != "drop" || power.Expr.Eval([]float64{2, 3}, v) != 6 {
		t.Errorf("%+v", power.Expr)
	}
	heat, _ := c.ResultNamed("heat")
	if heat.IntegralOf.Result != "loss" || !heat.HasAfter || v.Num[heat.After] != 3600 {
		t.Errorf("%+v", heat)
	}
	if _, ok := c.ResultNamed("nothing"); ok {
		t.Error("there is a result called nothing")
	}
	seen := map[string]bool{} // each stands behind those it is made of
	for _, r := range c.Questions.Results {
		var of []casefile.Shown
		for _, m := range r.Mean {
			of = append(of, m.Shown)
		}
		if r.Expr != nil {
			of = append(of, r.Expr.Operands...)
		}
		if r.IntegralOf != nil {
			of = append(of, *r.IntegralOf)
		}
		for _, s := range of {
			if s.Result != "" && !seen[s.Result] {
				t.Errorf("%s stands before %s", r.Name, s.Result)
			}
		}
		seen[r.Name] = true
	}
}

func TestLimitsAndFindsRead(t *testing.T) {
	c := askedCase(t, "")
	v := values(t, c)
	limits := map[string]casefile.AskLimit{}
	for _, l := range c.Questions.Limits {
		limits[l.Name] = l
	}
	near := func(name string, s casefile.Slot, want float64) {
		t.Helper()
		if got := v.Num[s]; math.Abs(got-want) > 1e-12*math.Abs(want) {
			t.Errorf("%s: %g, want %g", name, got, want)
		}
	}
	core := limits["core"]
	if core.Of[1].Result != "mean" || core.MarginShare || core.InCycle {
		t.Errorf("%+v", core)
	}
	near("core", core.Level, 353.15)
	near("margin of core", core.Margin, 5)
	swing := limits["swing"]
	if swing.Kind != casefile.SwingBelow || !swing.InCycle || !swing.MarginShare || swing.Kind.String() != "swing_below" {
		t.Errorf("%+v", swing)
	}
	near("swing", swing.Level, 10)
	near("margin of swing", swing.Margin, 0.2)
	near("rate", limits["rate"].Level, 5.0/60)
	near("margin of rate", limits["rate"].Margin, 1.0/60)
	near("drain", limits["drain"].Level, 1000.0/60)
	if limits["rate"].Kind != casefile.RiseRateBelow || limits["drain"].Kind != casefile.FallRateBelow {
		t.Error("the rates are of another kind")
	}
	soak := limits["soak"]
	if soak.Kind != casefile.TimeAbove || !soak.PerDay || !soak.MarginShare {
		t.Errorf("%+v", soak)
	}
	near("soak", soak.Level, 323.15)
	near("less_than", soak.LessThan, 1800)
	near("heat", limits["heat"].Level, 2e6)
	if f := c.Questions.Finds; len(f) != 2 || f[0].When.Result != "mean" || f[0].NoSteady || !f[1].NoSteady || f[1].Vary != "load" || !f[1].HasRange ||
		v.Num[f[0].Crosses] != 313.15 || v.Num[f[1].Range[0]] != 10 || v.Num[f[1].Range[1]] != 100 {
		t.Errorf("%+v", f)
	}
	if shown := c.Questions.Tables[0].Show; shown[1].Result != "mean" || shown[1].Text != "mean" || shown[6].Part != "core" {
		t.Errorf("%+v", shown)
	}
}

func TestUnder(t *testing.T) {
	c := askedCase(t, "")
	plain, hot := &c.Questions.Scenarios[0], &c.Questions.Scenarios[1]
	if plain.Title != "As it is" || plain.Tables != nil || plain.Limits != nil || hot.Tables[0] != "Heat" || len(hot.Limits) != 2 || hot.Profiles[0] != [2]string{"duty", "peak"} {
		t.Errorf("%+v\n%+v", plain, hot)
	}
	film, _ := c.Element("resistance", "film")
	inlet, _ := c.Element("thermal.node", "inlet")
	source, _ := c.Element("thermal.source", "core")
	check := func(s *casefile.Scenario, given []quantity.Value, value, held, drive float64) casefile.Values {
		t.Helper()
		v, diags := c.Under(s, given)
		if diags != nil {
			t.Fatal(casefile.Listing(diags))
		}
		for _, x := range [][2]float64{{v.Num[film.Num("value")], value}, {v.Wave[inlet.Wave("held")].At(1), held}, {v.Wave[source.Wave("drive")].At(1), drive}} {
			if math.Abs(x[0]-x[1]) > 1e-12*x[1] {
				t.Errorf("%g, want %g", x[0], x[1])
			}
		}
		return v
	}
	check(nil, nil, 12.0/40, 298.15, 40)
	check(plain, nil, 12.0/40, 298.15, 40)
	v := check(hot, nil, 12.0/50, 313.15, 72) // double is set, though it is an expression; the peak is three times a load of 24 W
	for i, want := range []float64{313.15, 24, 50} {
		if s := hot.Set[i]; v.Num[s.Slot] != want {
			t.Errorf("%s is set to %g, want %g", s.Given, v.Num[s.Slot], want)
		}
	}
	given := c.GivenValues()
	load, _ := c.GivenIndex("load")
	given[load], _ = quantity.Parse("30 W")
	check(nil, given, 12.0/60, 298.15, 60)
	check(hot, given, 12.0/50, 313.15, 108)
	if given[load].SI != 30 {
		t.Error("the given values of the caller were changed")
	}
	rise, _ := c.GivenIndex("rise")
	given[rise], _ = quantity.Parse("-1 K")
	if _, diags := c.Under(hot, given); len(diags) == 0 || !strings.Contains(diags[0].Text, `in scenario "hot"`) {
		t.Errorf("a resistance below zero: %v", diags)
	}
}

// A scenario sets the same values as a case that states them.
func TestUnderIsACaseOfItsOwn(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		load := rapid.Float64Range(1, 1e3).Draw(t, "load")
		share := rapid.Float64Range(0.1, 10).Draw(t, "share")
		text := func(load, more string) string {
			return "[given]\nload = " + load + "\nshare = 2\nr = \"= share * 0.25 K/W\"\n" +
				strings.Replace(good, `"0.5 K/W"`, `"= r"`, 1) + "[thermal.source.lamp]\ninto = \"case\"\ndrive = \"= load / share\"\n" + more
		}
		watts := quantity.Number(load, 17) + " W"
		set, diags := casefile.Read("a.toml", []byte(text(`"7 W"`, "[scenario.s]\nset = { load = \""+watts+"\", share = "+quantity.Number(share, 17)+" }\n")), nil, testVocabulary()...)
		own, more := casefile.Read("b.toml", []byte(strings.Replace(text("\""+watts+"\"", ""), "share = 2", "share = "+quantity.Number(share, 17), 1)), nil, testVocabulary()...)
		if diags != nil || more != nil {
			t.Fatal(casefile.Listing(diags), casefile.Listing(more))
		}
		v, diags := set.Under(&set.Questions.Scenarios[0], nil)
		w, more := own.Eval(nil)
		if diags != nil || more != nil {
			t.Fatal(casefile.Listing(diags), casefile.Listing(more))
		}
		for i, e := range set.Elements {
			switch e.Table.Name {
			case "resistance":
				if v.Num[e.Num("value")] != w.Num[own.Elements[i].Num("value")] {
					t.Error("the resistances differ")
				}
			case "source":
				if v.Wave[e.Wave("drive")].At(1) != w.Wave[own.Elements[i].Wave("drive")].At(1) {
					t.Error("the drives differ")
				}
			}
		}
	})
}

// The expression of a result is what arithmetic makes of the same numbers.
func TestResultExprReckons(t *testing.T) {
	c := askedCase(t, "[result.r]\nexpression = \"= (core - `cold plate`)^2 * 3 K / (rise * (`inlet` - outside)) + min(rise, 2 * (core - outside))\"\n")
	r, _ := c.ResultNamed("r")
	if r.Kind != quantity.Difference || len(r.Expr.Operands) != 4 {
		t.Fatalf("%+v", r)
	}
	at := map[string]int{}
	for i, s := range r.Expr.Operands {
		at[s.Node] = i
	}
	v := values(t, c)
	rapid.Check(t, func(t *rapid.T) {
		x := make([]float64, 4)
		for i := range x {
			x[i] = rapid.Float64Range(250, 400).Draw(t, "level")
		}
		core, plate, inlet, outside := x[at["core"]], x[at["cold plate"]], x[at["inlet"]], x[at["outside"]]
		want := (core-plate)*(core-plate)*3/(12*(inlet-outside)) + math.Min(12, 2*(core-outside))
		got := r.Expr.Eval(x, v)
		if inlet == outside {
			if !math.IsNaN(got) {
				t.Errorf("a division by zero comes to %g", got)
			}
			return
		}
		if math.Abs(got-want) > 1e-12*(math.Abs(want)+math.Abs(3*(core-plate)*(core-plate)/(12*(inlet-outside)))+1e3) {
			t.Errorf("%g, want %g", got, want)
		}
	})
}

// Weights that follow given values add up to 1 whatever these are, or that is said.
func TestWeightsThatVary(t *testing.T) {
	c := askedCase(t, "[result.a]\nmean = { core = \"= share\", \"cold plate\" = \"= 1 - share\" }\n")
	given := c.GivenValues()
	i, _ := c.GivenIndex("share")
	given[i].SI, given[i].Exact = 0.3, nil
	if _, diags := c.Eval(given); len(diags) != 1 || diags[0].Code != "mean" || !strings.Contains(diags[0].Text, "0.9") || diags[0].Thing != `result "mean"` {
		t.Errorf("%v", diags)
	}
}

func TestMeasured(t *testing.T) {
	dir := t.TempDir()
	for name, text := range map[string]string{
		"log.csv":   "# a logger, all invented\ntime / min,T / °C,p / kPa,lift / K\n-10,20,1,0\n0,21.5,2,1\n30,30,3,2\n30,31,4,3\n",
		"late.csv":  "t / h,T / °C\n5,20\n6,21\n",
		"lines.csv": "t / s,T / °C\n" + strings.Repeat("1,1\n", 1_000_000),
		"bad.csv":   "t / s,T / W\n0,20\n",
	} {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer root.Close()
	_, _, texts, _ := askedArchive.mistakes(t)
	read := func(more string) (*casefile.Case, []casefile.Diagnostic) {
		return casefile.Read("case.toml", []byte(texts["base"]+more), root, profileVocabulary()...)
	}
	c, diags := read("[measured.t]\nfile = \"log.csv\"\ncolumn = \"T\"\nof = \"mean\"\nsource = \"invented\"\n" +
		"[measured.p]\nfile = \"log.csv\"\ncolumn = \"p\"\ntime = \"time\"\nof = \"basin\"\n[measured.l]\nfile = \"log.csv\"\ncolumn = \"lift\"\nof = \"lift\"\n")
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	m := c.Questions.Measured
	if len(m) != 3 || m[0].Of.Result != "mean" || m[0].Source != "invented" || m[0].Column != "T" || len(m[0].Times) != 4 || m[0].Times[0] != -600 || m[0].Times[3] != 1800 {
		t.Fatalf("%+v", m)
	}
	for i, want := range []float64{304.15, 4000, 3} {
		if got := m[i].Values[3]; math.Abs(got-want) > 1e-12*want {
			t.Errorf("%s: %g, want %g", m[i].Name, got, want)
		}
	}
	for _, bad := range []struct{ more, says string }{
		{"file = \"late.csv\"\nof = \"core\"\n", `no row of "late.csv" lies in the run: its times go from 5 h to 6 h`},
		{"file = \"lines.csv\"\nof = \"core\"\n", `"lines.csv" has more than 200000 rows`},
		{"file = \"bad.csv\"\nof = \"core\"\n", `expected a temperature level`},
		{"file = \"log.csv\"\nof = \"core\"\n", `column is missing`},
		{"file = \"log.csv\"\ncolumn = \"Q\"\nof = \"core\"\n", `has no column "Q"`},
		{"file = \"log.csv\"\ncolumn = \"T\"\ntime = \"tmie\"\nof = \"core\"\n", `has no column "tmie"`},
		{"file = \"nothing.csv\"\nof = \"core\"\n", `"nothing.csv" does not exist`},
	} {
		if _, diags := read("[measured.x]\n" + bad.more); len(diags) != 1 || !strings.Contains(diags[0].Text, bad.says) || diags[0].Thing != `measured "x"` {
			t.Errorf("%s: %v", bad.says, diags)
		}
	}
}

// FuzzReadAsked reads anything as what is asked, and computes the case under each of its
// scenarios.
func FuzzReadAsked(f *testing.F) {
	_, _, texts, _ := askedArchive.mistakes(&testing.T{})
	fuzzRead(f, askedArchive, texts["base"])
}
