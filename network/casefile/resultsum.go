package casefile

import (
	"fmt"
	"math"
	"math/big"

	"lagbook/network/quantity"
)

// A meanSum is the weights of a mean, which add up to 1: exactly where they are written
// in decimals, else within rounding.
type meanSum struct {
	n       *node
	owner   owner
	weights []Slot
	exact   *big.Rat // of the values as written; nil where one has no fraction
	inexact bool
	moves   bool // a weight depends on given values
}

// add adds a weight.
func (m *meanSum) add(r *reader, s Slot, n *node) {
	m.weights = append(m.weights, s)
	m.moves = m.moves || r.c.slots[s].expr != nil
	if m.exact == nil {
		m.exact = new(big.Rat)
	}
	v, ok := r.peek(n)
	const longest = 4096 // bits, beyond which doubles serve as well
	if m.inexact = m.inexact || !ok || v.Exact == nil || m.exact.Denom().BitLen() > longest; !m.inexact {
		m.exact.Add(m.exact, v.Exact)
	}
}

// fault says that the weights do not add up to 1, nil where they do. at reads a weight.
func (m *meanSum) fault(c *Case, at func(Slot) float64) *Diagnostic {
	sum := 0.0
	same := !m.inexact
	for _, s := range m.weights {
		sum += at(s)
		same = same && at(s) == c.slots[s].si
	}
	if same && m.exact.Cmp(big.NewRat(1, 1)) == 0 {
		return nil
	}
	if !same && math.Abs(sum-1) <= 1e-12*float64(len(m.weights)) {
		return nil
	}
	d := Diagnostic{Code: "mean", Thing: m.owner.thing(), Text: fmt.Sprintf("the weights of the mean add up to %s, not 1", quantity.Number(sum, 12))}
	if math.Abs(sum-1) < 0.01 {
		d.Hint = `a third is written "= 1/3"`
	}
	d = c.src.place(d, m.n.span)
	return &d
}

// unbalanced checks the means whose weights vary.
func (c *Case) unbalanced(v *Values) (diags []Diagnostic) {
	for i := range c.sums {
		if d := c.sums[i].fault(c, func(s Slot) float64 { return v.Num[s] }); d != nil {
			diags = append(diags, *d)
		}
	}
	return diags
}
