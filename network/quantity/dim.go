package quantity

import (
	"math"
	"strings"
)

// maxPower bounds the exponents of a Dim well inside int8.
const maxPower = 100

// plus returns d·e^sign.
func (d Dim) plus(e Dim, sign int) (Dim, bool) {
	for i := range d {
		n := int(d[i]) + sign*int(e[i])
		if n > maxPower || n < -maxPower {
			return d, false
		}
		d[i] = int8(n)
	}
	return d, true
}

// times returns d^n.
func (d Dim) times(n int) (Dim, bool) {
	for i := range d {
		m := int(d[i]) * n
		if m > maxPower || m < -maxPower {
			return d, false
		}
		d[i] = int8(m)
	}
	return d, true
}

// power returns d^x where every exponent comes out whole.
func (d Dim) power(x float64) (Dim, bool) {
	for i := range d {
		m := float64(d[i]) * x
		if m != math.Trunc(m) || math.Abs(m) > maxPower {
			return d, false
		}
		d[i] = int8(m)
	}
	return d, true
}

// A named dimension: what it is called and the unit it is printed in.
type named struct {
	dim  Dim
	word string
	unit string
	// ladder lists units by size, of which printing takes the largest that
	// leaves the number at 1 or above.
	ladder string
}

var names = []named{
	{dimNone, "plain number", "1", ""},
	{dimLength, "length", "m", "nm µm mm m km"},
	{dimArea, "area", "m²", "mm² cm² m²"},
	{dimVolume, "volume", "m³", "mm³ cm³ L m³"},
	{dimMass, "mass", "kg", "mg g kg t"},
	{dimTime, "time", "s", "ns µs ms s"},
	{dimKelvin, "temperature", "K", "µK mK K"},
	{dimCurrent, "current", "A", "nA µA mA A kA"},
	{dimRate, "rate", "1/s", ""},
	{dimSpeed, "speed", "m/s", "mm/s m/s"},
	{Dim{0, 1, -2}, "acceleration", "m/s²", ""},
	{dimForce, "force", "N", "mN N kN MN"},
	{dimPressure, "pressure", "Pa", "mPa Pa kPa MPa GPa"},
	{dimEnergy, "energy", "J", "nJ µJ mJ J kJ MJ GJ"},
	{dimPower, "power", "W", "nW µW mW W kW MW GW"},
	{Dim{1, 2, -3, -1}, "thermal conductance", "W/K", "µW/K mW/K W/K kW/K MW/K"},
	{Dim{-1, -2, 3, 1}, "thermal resistance", "K/W", "µK/W mK/W K/W kK/W"},
	{Dim{1, 2, -2, -1}, "heat capacity", "J/K", "µJ/K mJ/K J/K kJ/K MJ/K GJ/K"},
	{Dim{1, 1, -3, -1}, "thermal conductivity", "W/(m·K)", "mW/(m·K) W/(m·K) kW/(m·K)"},
	{Dim{-1, -1, 3, 1}, "thermal resistivity", "m·K/W", ""},
	{Dim{1, 0, -3, -1}, "heat transfer coefficient", "W/(m²·K)", "W/(m²·K) kW/(m²·K) MW/(m²·K)"},
	{Dim{-1, 0, 3, 1}, "thermal insulance", "m²·K/W", ""},
	{Dim{0, 2, -2, -1}, "specific heat", "J/(kg·K)", "J/(kg·K) kJ/(kg·K)"},
	{Dim{1, -1, -2, -1}, "heat capacity of a volume", "J/(m³·K)", "J/(m³·K) kJ/(m³·K) MJ/(m³·K)"},
	{Dim{0, 2, -2}, "heat of a mass", "J/kg", "J/kg kJ/kg MJ/kg"},
	{Dim{1, 0, -3}, "heat flux", "W/m²", "mW/m² W/m² kW/m² MW/m²"},
	{Dim{1, 1, -3}, "power of a length", "W/m", "mW/m W/m kW/m"},
	{Dim{1, -1, -3}, "power of a volume", "W/m³", "W/m³ kW/m³ MW/m³"},
	{Dim{1, 2, -3, -2}, "slope of a conductance", "W/K²", ""},
	{Dim{1, -3}, "density", "kg/m³", ""},
	{Dim{0, 2, -1}, "diffusivity or kinematic viscosity", "m²/s", "mm²/s m²/s"},
	{Dim{1, -1, -1}, "viscosity", "Pa·s", "µPa·s mPa·s Pa·s"},
	{dimFlow, "volume flow", "m³/s", "mm³/s cm³/s L/s m³/s"},
	{Dim{1, 0, -1}, "mass flow", "kg/s", "mg/s g/s kg/s"},
	{Dim{1, -4, -1}, "flow resistance", "Pa·s/m³", "Pa·s/m³ kPa·s/m³ MPa·s/m³ GPa·s/m³"},
	{Dim{1, -4}, "inertance", "Pa·s²/m³", "Pa·s²/m³ kPa·s²/m³ MPa·s²/m³ GPa·s²/m³"},
	{Dim{-1, 4, 2}, "compliance", "m³/Pa", ""},
	{Dim{-1, 4, 1}, "flow conductance", "m³/(Pa·s)", ""},
	{Dim{-1, 1, 2}, "compressibility", "1/Pa", ""},
	{Dim{1, -2, -2}, "pressure gradient", "Pa/m", "Pa/m kPa/m MPa/m"},
	{Dim{1, 0, -2}, "stiffness", "N/m", "N/m kN/m MN/m"},
	{Dim{1, 2}, "moment of inertia", "kg·m²", ""},
	{Dim{1, -1}, "mass of a length", "kg/m", ""},
	{Dim{0, 0, 0, -1}, "part per kelvin", "1/K", ""},
	{Dim{0, 0, -1, 1}, "rate of temperature", "K/s", "µK/s mK/s K/s"},
	{Dim{0, -1, 0, 1}, "temperature gradient", "K/m", "mK/m K/m kK/m"},
	{Dim{0, 0, 1, -1}, "time of a kelvin", "s/K", ""},
	{Dim{1, 2, -3, 0, -1}, "voltage", "V", "µV mV V kV"},
	{Dim{1, 2, -3, 0, -2}, "electrical resistance", "Ω", "µΩ mΩ Ω kΩ MΩ"},
	{Dim{1, 2, -3, -1, -1}, "voltage of a kelvin", "V/K", "µV/K mV/K V/K"},
	{Dim{1, 2, -3, -1, -2}, "electrical resistance of a kelvin", "Ω/K", "µΩ/K mΩ/K Ω/K"},
	{Dim{-1, -2, 3, 0, 2}, "electrical conductance", "S", "µS mS S"},
	{Dim{0, 0, 1, 0, 1}, "charge", "C", "µC mC C kC"},
	{Dim{1, 2, -2, 0, -1}, "magnetic flux", "V·s", "µV·s mV·s V·s"},
	{Dim{-1, -2, 4, 0, 2}, "capacitance", "F", "pF nF µF mF F"},
	{Dim{1, 2, -2, 0, -2}, "inductance", "H", "µH mH H"},
	{Dim{0, -2, 0, 0, 1}, "current of an area", "A/m²", ""},
	{Dim{1, 0, -3, -4}, "radiation constant", "W/(m²·K⁴)", ""},
}

func (d Dim) named() *named {
	for i := range names {
		if names[i].dim == d {
			return &names[i]
		}
	}
	return nil
}

// UnitOf returns the SI unit a dimension is printed in: "K/W", "W/(m·K)", and
// "1" for a plain number. Parse reads it back.
func UnitOf(dim Dim) string {
	if n := dim.named(); n != nil {
		return n.unit
	}
	base := [...]string{"kg", "m", "s", "K", "A"}
	var up, down []string
	for i, e := range dim {
		switch {
		case e > 0:
			up = append(up, base[i]+power(int(e)))
		case e < 0:
			down = append(down, base[i]+power(-int(e)))
		}
	}
	top := strings.Join(up, "·")
	if top == "" {
		top = "1"
	}
	switch len(down) {
	case 0:
		return top
	case 1:
		return top + "/" + down[0]
	}
	return top + "/(" + strings.Join(down, "·") + ")"
}

func power(n int) string {
	if n == 1 {
		return ""
	}
	s := ""
	for ; n > 0; n /= 10 {
		s = string([]rune("⁰¹²³⁴⁵⁶⁷⁸⁹")[n%10]) + s
	}
	return s
}

// WordOf returns what a dimension is called, "thermal resistance", or "" for
// one that has no name here.
func WordOf(dim Dim) string {
	if n := dim.named(); n != nil {
		return n.word
	}
	return ""
}

// Describe is WordOf with article and unit: "a thermal resistance (K/W)".
func Describe(dim Dim, kind Kind) string {
	if dim == dimNone {
		return "a plain number"
	}
	word, unit := WordOf(dim), UnitOf(dim)
	switch {
	case word == "":
		return "a quantity in " + unit
	case dim == dimKelvin && kind == Level:
		return "a temperature level (°C, K)"
	case dim == dimKelvin && kind == Difference:
		return "a temperature difference (K)"
	case dim == dimPressure && kind == Gauge:
		return "a gauge pressure, bar(g)"
	case dim == dimPressure && kind == Absolute:
		return "an absolute pressure, bar(a)"
	case dim == dimPressure && kind == Difference:
		return "a pressure difference (Pa)"
	}
	return article(word) + " " + word + " (" + unit + ")"
}

func article(word string) string {
	if strings.ContainsRune("aeio", rune(word[0])) {
		return "an"
	}
	return "a"
}
