package hydraulic

import (
	"fmt"
	"strings"
)

// A steelPipe is a nominal size: outer diameter and wall in mm.
type steelPipe struct {
	name        string
	outer, wall float64
}

// steelPipes are seamless pipes of EN 10220 with the usual walls ("DN 50"; DIN 2448, normal
// wall) and of ASME B36.10M, schedules 40 and 80 ("NPS 2 sch 40"). Both from memory.
var steelPipes = []steelPipe{
	{"DN 15", 21.3, 2.0}, {"DN 20", 26.9, 2.3}, {"DN 25", 33.7, 2.6}, {"DN 32", 42.4, 2.6}, {"DN 40", 48.3, 2.6}, {"DN 50", 60.3, 2.9},
	{"DN 65", 76.1, 2.9}, {"DN 80", 88.9, 3.2}, {"DN 100", 114.3, 3.6}, {"DN 125", 139.7, 4.0}, {"DN 150", 168.3, 4.5}, {"DN 200", 219.1, 6.3},
	{"DN 250", 273.0, 6.3}, {"DN 300", 323.9, 7.1}, {"DN 350", 355.6, 8.0}, {"DN 400", 406.4, 8.8}, {"DN 500", 508.0, 11.0},
	{"NPS 1/2 sch 40", 21.3, 2.77}, {"NPS 3/4 sch 40", 26.7, 2.87}, {"NPS 1 sch 40", 33.4, 3.38}, {"NPS 1-1/4 sch 40", 42.2, 3.56},
	{"NPS 1-1/2 sch 40", 48.3, 3.68}, {"NPS 2 sch 40", 60.3, 3.91}, {"NPS 2-1/2 sch 40", 73.0, 5.16}, {"NPS 3 sch 40", 88.9, 5.49},
	{"NPS 4 sch 40", 114.3, 6.02}, {"NPS 6 sch 40", 168.3, 7.11}, {"NPS 8 sch 40", 219.1, 8.18}, {"NPS 10 sch 40", 273.0, 9.27},
	{"NPS 12 sch 40", 323.8, 10.31}, {"NPS 14 sch 40", 355.6, 11.13}, {"NPS 16 sch 40", 406.4, 12.70}, {"NPS 20 sch 40", 508.0, 15.09},
	{"NPS 24 sch 40", 610.0, 17.48},
	{"NPS 1/2 sch 80", 21.3, 3.73}, {"NPS 3/4 sch 80", 26.7, 3.91}, {"NPS 1 sch 80", 33.4, 4.55}, {"NPS 1-1/2 sch 80", 48.3, 5.08},
	{"NPS 2 sch 80", 60.3, 5.54}, {"NPS 3 sch 80", 88.9, 7.62}, {"NPS 4 sch 80", 114.3, 8.56}, {"NPS 6 sch 80", 168.3, 10.97},
	{"NPS 8 sch 80", 219.1, 12.70},
}

// steelModulus is that of carbon steel in Pa: common practice.
const steelModulus = 206e9

// bore is the inner diameter in m.
func (s *steelPipe) bore() float64 { return (s.outer - 2*s.wall) / 1000 }

// source says where the size comes from.
func (s *steelPipe) source() string {
	standard := "EN 10220, usual wall (DIN 2448)"
	if strings.HasPrefix(s.name, "NPS") {
		standard = "ASME B36.10M"
	}
	return fmt.Sprintf("%s: %g × %g mm (from memory, check before use)", standard, s.outer, s.wall)
}

// sizeNames are the names of all sizes.
func sizeNames() []string {
	names := make([]string, len(steelPipes))
	for i := range steelPipes {
		names[i] = steelPipes[i].name
	}
	return names
}

// sizeNamed returns the pipe of that name, nil where there is none.
func sizeNamed(name string) *steelPipe {
	for i := range steelPipes {
		if steelPipes[i].name == name {
			return &steelPipes[i]
		}
	}
	return nil
}
