package casefile_test

import (
	"strings"
	"testing"

	"lagbook/network"
)

// The flow in a fault is printed in the unit of its node's domain, as the case wants it, the
// hint says what the text does not, and a march that stops at such a fault says both. All
// data invented.
func TestExplainFlows(t *testing.T) {
	c := readPlant(t, strings.Replace(wholePlant, "[print]\n", "[print]\nflow = \"L/min\"\n", 1))
	e, ok := c.Element("node", "basin")
	if !ok {
		t.Fatal("no basin")
	}
	fault := func(text string) network.Fault {
		from := strings.Index(text, "0.0005")
		return network.Fault{Code: network.NoWayOut, Refs: []network.Ref{e.Ref}, Text: text,
			Figure: network.Figure{From: from, To: from + len("0.0005"), Flow: 0.0005, Ref: e.Ref}}
	}
	f := fault(`"p1" brings 0.0005, and nothing is open to take it away`)
	const brings = `"p1" brings 30 L/min, and nothing is open to take it away`
	const opens = "open a way for it, as a relief is one, or give one of them a compliance or tank"
	g := fault(`takes in 0.0005 from "p1" before t = 0; a start must be given`)
	params := &network.ParamFault{List: []network.Fault{f}}
	for _, c2 := range []struct {
		err              error
		code, text, hint string
	}{
		{params, "undetermined", brings, opens},
		{&network.NoSteady{List: []network.SteadyFault{{Refs: f.Refs, Reason: network.Enclosed, Text: f.Text, Figure: f.Figure}}}, "no-steady-state", brings, opens},
		{&network.NoSteady{List: []network.SteadyFault{{Refs: g.Refs, Reason: network.Integrating, Text: g.Text, Figure: g.Figure}}}, "no-steady-state",
			`takes in 30 L/min from "p1" before t = 0`, "state where it starts with [run] start, or start at the nodes"},
		{&network.MarchFault{Text: "no state at t = 3 s balances: " + params.Error(), Err: params}, "not-marched",
			"no state at t = 3 s balances: network: " + brings, opens},
	} {
		list := c.Explain(c2.err)
		if len(list) != 1 || list[0].Code != c2.code || list[0].Text != c2.text || list[0].Hint != c2.hint || list[0].Line == 0 {
			t.Errorf("%+v, want %s: %s (%s)", list, c2.code, c2.text, c2.hint)
		}
	}
	f.Figure = network.Figure{}
	if list := c.Explain(&network.ParamFault{List: []network.Fault{f}}); len(list) != 1 || list[0].Text != f.Text {
		t.Errorf("%+v, want the text as it was", list)
	}
}
