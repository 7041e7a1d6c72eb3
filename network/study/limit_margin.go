package study

import (
	"math"

	"lagbook/network/casefile"
)

// marginOf is what a margin is a share of, 1 where it is none.
func (t *trial) marginOf() float64 {
	if !t.ask.MarginShare {
		return 1
	}
	switch t.ask.Kind {
	case casefile.Reach, casefile.Settle:
		return t.allowed
	case casefile.TimeAbove:
		return t.lessThan
	}
	return math.Abs(t.level)
}

// judgeMargin fills in the margin and whether it suffices; way is what the
// margin is a share of, 0 where nothing sensible is.
func (t *trial) judgeMargin(v *Limit, margin, way float64, asked float64) {
	v.Margin = &margin
	if t.ask.HasMargin {
		v.MarginAsked = &asked
	}
	v.Met = margin >= asked
	if way > 0 {
		p := 100 * margin / way
		v.Percent = &p
	}
}

// worse orders verdicts of one limit: the one not met, then the smaller share left.
func worse(a, b Limit) bool {
	if a.Met != b.Met {
		return !a.Met
	}
	return share(a) < share(b)
}

// share is the part of the way that is left; a limit that has none governs where
// it is not met and never where it is. One that a march leaves open comes between.
func share(v Limit) float64 {
	switch {
	case v.NotJudged:
		return 0
	case v.Percent != nil && (v.Met || v.MarginAsked != nil || *v.Percent <= 0):
		return *v.Percent
	case v.Met:
		return math.Inf(1)
	}
	return math.Inf(-1)
}

// govern marks the limit with the least margin as a share of the way.
func govern(list []Limit) {
	if len(list) == 0 {
		return
	}
	g := 0
	for i := range list {
		if worse(list[i], list[g]) {
			g = i
		}
	}
	list[g].Governs = true
}
