package study

import "lagbook/network/casefile"

// Remarks are what the domains say of the values in force: that a valve shuts at once, that
// a damping is one of laminar flow.
func (m *Model) Remarks() []casefile.Diagnostic {
	if !m.doubted {
		m.doubt, m.doubted = m.Case.Remarks(m.val), true
	}
	return m.doubt
}

// remarked are the remarks as warnings of an answer.
func (m *Model) remarked() []Warning {
	var warn []Warning
	for _, d := range m.Remarks() {
		text := d.Text
		if d.Thing != "" {
			text = d.Thing + ": " + text
		}
		if d.Hint != "" {
			text += "; " + d.Hint
		}
		warn = append(warn, Warning{d.Code, text})
	}
	return warn
}
