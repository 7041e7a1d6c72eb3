package main

import (
	"math"
	"strings"

	"lagbook/network/study"
)

// rates reports whether a limit is on how fast something changes.
func rates(l study.Limit) bool { return strings.HasSuffix(l.Demand, "rate_below") }

// rateWords prints a rate in the time in which what is allowed is a number of a usual size:
// "0.12 K/min".
func rateWords(p study.Printer, l study.Limit, v float64) string {
	base, ok := strings.CutSuffix(l.Unit, "/s")
	if !ok || l.Level == nil {
		return p.Value(v, l.Unit, "")
	}
	in := func(x float64) float64 { return p.In(x, base, "difference") }
	per, factor := "/h", 3600.0
	switch x := math.Abs(in(*l.Level)); {
	case x >= 0.1:
		per, factor = "/s", 1
	case x*60 >= 0.1:
		per, factor = "/min", 60
	}
	return p.Number(in(v*factor)) + " " + p.Unit(base, "difference") + per
}
