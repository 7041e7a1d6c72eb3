package study

import (
	"fmt"
	"math"
)

// vacuum says where and when a pressure that is shown falls below vacuum: the
// liquid would boil or tear there, and no number after it is meant.
func (m *Model) vacuum() []Warning {
	if m.resp == nil {
		return nil
	}
	least := -m.Case.Pressures.Atmosphere
	if m.Case.Pressures.Absolute {
		least = 0
	}
	var warn []Warning
	for _, w := range m.shows {
		if w.unit != "Pa" || w.kind != kindLevel {
			continue
		}
		if r, ok := m.resp.FirstOutside(w.out, least, math.Inf(1), 0, m.reach()); ok {
			warn = append(warn, Warning{"below-vacuum", fmt.Sprintf("%s falls below vacuum at %s: liquid would boil there before, and nothing after that is meant", w.name, m.Show.Time(r.T))})
		}
	}
	return warn
}
