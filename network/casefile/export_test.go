package casefile

import "lagbook/network/quantity"

// EvalWith is evalWith, for tests.
func (c *Case) EvalWith(given []quantity.Value, swap [][2]string) (Values, []Diagnostic) {
	return c.evalWith(given, swap)
}
