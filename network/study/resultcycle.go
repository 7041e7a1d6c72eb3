package study

// resultCycle reads the cycle of a result that is worked out of others, from one period of
// what it is made of that begins at t = 0. An integral counts from there.
func (m *Model) resultCycle(base answers, w shown, period float64) (Cycle, []Warning, error) {
	resp, err := m.withResults(base, 0, period)
	if err != nil {
		return Cycle{}, nil, err
	}
	hi, lo := resp.Max(w.out, 0, period), resp.Min(w.out, 0, period)
	mean := resp.Integral(w.out, 0, period) / period
	y := Cycle{Output: w.name, Unit: w.unit, Kind: w.kind, Period: period, Max: hi.Y, MaxAt: hi.T, Min: lo.Y, MinAt: lo.T,
		Mean: min(max(mean, lo.Y), hi.Y)}
	var warn []Warning
	if w.from.ask.IntegralOf != nil {
		warn = append(warn, Warning{"integral-in-cycle", w.name + " counts from the start of the period: at its end it is what one period brings, " + m.Show.Value(resp.Left(w.out, period), w.unit, w.kind)})
	}
	return y, warn, nil
}

// marchedResult is resultCycle of a march; what has no value is said and left out.
func (m *Model) marchedResult(base answers, w shown, period float64) ([]Cycle, []Warning) {
	y, warn, err := m.resultCycle(base, w, period)
	if err != nil {
		return nil, []Warning{{"no-cycle", err.Error()}}
	}
	return []Cycle{y}, warn
}
