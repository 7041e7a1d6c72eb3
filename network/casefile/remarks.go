package casefile

// Remarks are the warnings that the domains have of values, whether Read gave them or not.
func (c *Case) Remarks(v Values) []Diagnostic {
	var diags []Diagnostic
	for i := range c.voc {
		if check := c.voc[i].Check; check != nil && c.net != nil {
			for _, d := range check(c, v) {
				if d.Severity == Warning {
					diags = append(diags, d)
				}
			}
		}
	}
	return inFileOrder(c.gathered(diags))
}
