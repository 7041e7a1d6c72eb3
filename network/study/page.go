package study

// Page answers everything a design note opens with, from one reduction.
func (m *Model) Page() (*Page, error) {
	// Outputs are registered first, so that the network is reduced once.
	if err := m.wantAll(); err != nil {
		return nil, err
	}
	poles, err := m.Poles()
	if err != nil {
		return nil, err
	}
	tables, err := m.Tables()
	if err != nil {
		return nil, err
	}
	limits, err := m.Limits()
	if err != nil {
		return nil, err
	}
	hand, err := m.Hand()
	if err != nil {
		return nil, err
	}
	check, err := m.Check()
	if err != nil {
		return nil, err
	}
	a := &Page{
		Title: m.Case.Title, About: poles.About, Limits: limits.Limits, Met: limits.Met, Transfers: poles.Transfers, Modes: poles.Modes, Range: poles.Range,
		Tables: tables.Tables, Measured: tables.Measured, Results: tables.Results, Finds: tables.Finds, Hand: hand, Understood: check.Understood,
	}
	a.Evidence = m.evidence(noted(poles.Warnings, tables.Warnings, limits.Warnings))
	return a, nil
}

// wantAll makes everything any question shows an output.
func (m *Model) wantAll() error {
	if _, _, err := m.pairs(); err != nil {
		return err
	}
	if err := m.wantModes(); err != nil {
		return err
	}
	for _, t := range m.tables() {
		for _, s := range t.Show {
			if _, err := m.want(s, t.Above); err != nil {
				return err
			}
		}
	}
	if err := m.wantNamed(); err != nil {
		return err
	}
	if err := m.wantTables(); err != nil {
		return err
	}
	if err := m.wantLimits(); err != nil {
		return err
	}
	if id, ok := m.subject(); ok {
		_, err := m.wantNode(m.Net.Name(id))
		return err
	}
	return nil
}
