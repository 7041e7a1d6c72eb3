package network_test

import (
	"reflect"
	"testing"

	"lagbook/network"
)

func TestViews(t *testing.T) {
	b := network.NewBuilder()
	inlet, body, skin, far := b.Node("inlet", 1), b.Node("body", 2), b.Node("skin", 3), b.Node("far", 4)
	b.Hold(inlet, 5)
	first, second := b.Capacity(body, 6), b.Capacity(body, 7)
	b.Capacity(far, 8)
	b.Resistance("wall", body, skin, 9)
	b.OneWay("water", inlet, skin, 10)
	b.Feedback("gain", body, skin, 11)
	b.Source("heater", far, -1, 12)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	if got := n.Nodes(); !reflect.DeepEqual(got, []string{"inlet", "body", "skin", "far"}) {
		t.Errorf("nodes %v", got)
	}
	if n.NodeCount() != 4 || n.InputCount() != 2 || n.StoreCount() != 2 {
		t.Errorf("%d nodes, %d inputs, %d stores", n.NodeCount(), n.InputCount(), n.StoreCount())
	}
	wantNodes := []network.NodeView{
		{ID: inlet, Name: "inlet", Ref: 1, Held: true, Input: 0, Neighbours: []network.NodeID{skin}, Island: -1},
		{ID: body, Name: "body", Ref: 2, Input: -1, Capacities: []network.CapacityID{first, second}, Neighbours: []network.NodeID{skin}, Island: 0},
		{ID: skin, Name: "skin", Ref: 3, Input: -1, Massless: true, Neighbours: []network.NodeID{inlet, body}, Island: 0},
		{ID: far, Name: "far", Ref: 4, Input: -1, Capacities: []network.CapacityID{2}, Island: 1},
	}
	for i, want := range wantNodes {
		if got := n.Node(network.NodeID(i)); !reflect.DeepEqual(got, want) {
			t.Errorf("node %+v, want %+v", got, want)
		}
	}
	wantBranches := []network.BranchView{
		{network.ResistanceBranch, 0, "wall", body, skin, 9},
		{network.OneWayBranch, 0, "water", inlet, skin, 10},
		{network.FeedbackBranch, 0, "gain", skin, body, 11},
	}
	if got := n.Branches(); !reflect.DeepEqual(got, wantBranches) {
		t.Errorf("branches %+v", got)
	}
	wantInputs := []network.InputView{{0, "inlet", inlet, true, 0, 5}, {1, "heater", far, false, -1, 12}}
	if got := n.Inputs(); !reflect.DeepEqual(got, wantInputs) {
		t.Errorf("inputs %+v", got)
	}
	if got := n.Massless(); !reflect.DeepEqual(got, []network.NodeID{skin}) {
		t.Errorf("massless %v", got)
	}
	p := n.NewParams()
	copy(p.C, []float64{3, 4, 5})
	if got := n.CapacityOf(p, body); got != 7 {
		t.Errorf("capacity %v", got)
	}
}

// A Network is a copy: the Builder may go on to another.
func TestBuilderGoesOn(t *testing.T) {
	b := network.NewBuilder()
	body, air := b.Node("body", 1), b.Node("air", 2)
	b.Capacity(body, network.NoRef)
	b.Hold(air, network.NoRef)
	b.Resistance("film", body, air, network.NoRef)
	n, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	b.Capacity(body, network.NoRef)
	b.Resistance("film", body, air, network.NoRef)
	if len(n.Branches()) != 1 || len(n.Node(body).Capacities) != 1 {
		t.Errorf("the network changed: %+v", n.Branches())
	}
}
