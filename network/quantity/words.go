package quantity

import (
	"cmp"
	"strings"
)

// words are spellings that are not accepted, because they are ambiguous or
// because one symbol for a unit is enough, with what to write instead.
var words = []struct{ word, symbol, why string }{
	{"gal", "US gal", "US gal or imp gal"},
	{"gallon", "US gal", "US gal or imp gal"},
	{"gallons", "US gal", "US gal or imp gal"},
	{"qt", "US qt", "US qt"},
	{"pt", "US pt", "US pt"},
	{"pint", "US pt", "US pt"},
	{"cal", "cal_IT", "cal_IT (4.1868 J) or cal_th (4.184 J)"},
	{"kcal", "kcal_IT", "kcal_IT (4186.8 J) or kcal_th (4184 J)"},
	{"ton", "TR", "t (1000 kg) or TR (a ton of refrigeration)"},
	{"tons", "TR", "t (1000 kg) or TR (a ton of refrigeration)"},
	{"tonne", "t", ""}, {"tonnes", "t", ""}, {"RT", "TR", ""},
	{"MBtu", "kBtu", "kBtu (a thousand) or MMBtu (a million)"},
	{"MBTU", "kBTU", "kBTU (a thousand) or MMBTU (a million)"},
	{"MBH", "kBtu/h", ""}, {"Btuh", "Btu/h", ""}, {"BTUH", "BTU/h", ""},
	{"MM", "mm", "mm or Mm"},
	{"M", "m", "m, or a prefix before a unit"},
	{"US", "", "US gal, US qt, US pt or US fl oz"}, {"imp", "", "imp gal or imp gpm"},
	{"Pas", "Pa·s", ""}, {"Ws", "W·s", ""}, {"As", "A·s", ""}, {"Nm", "N·m", ""}, {"kNm", "kN·m", ""},
	{"C°", "°C", ""}, {"F°", "°F", ""}, {"°K", "K", ""}, {"degK", "K", ""}, {"deg", "°", ""},
	{"celsius", "°C", ""}, {"centigrade", "°C", ""}, {"fahrenheit", "°F", ""}, {"kelvin", "K", ""}, {"kelvins", "K", ""}, {"rankine", "°R", ""},
	{"sec", "s", ""}, {"secs", "s", ""}, {"second", "s", ""}, {"seconds", "s", ""}, {"msec", "ms", ""},
	{"minute", "min", ""}, {"minutes", "min", ""}, {"mins", "min", ""},
	{"hr", "h", ""}, {"hrs", "h", ""}, {"hour", "h", ""}, {"hours", "h", ""},
	{"day", "d", ""}, {"days", "d", ""}, {"weeks", "week", ""}, {"wk", "week", ""},
	{"yr", "a", ""}, {"year", "a", ""}, {"years", "a", ""},
	{"watt", "W", ""}, {"watts", "W", ""}, {"kilowatt", "kW", ""}, {"kilowatts", "kW", ""}, {"milliwatt", "mW", ""}, {"milliwatts", "mW", ""},
	{"joule", "J", ""}, {"joules", "J", ""}, {"kilojoule", "kJ", ""}, {"kilojoules", "kJ", ""},
	{"volt", "V", ""}, {"volts", "V", ""}, {"amp", "A", ""}, {"amps", "A", ""}, {"ampere", "A", ""}, {"amperes", "A", ""}, {"ohms", "Ω", ""},
	{"newton", "N", ""}, {"newtons", "N", ""}, {"pascal", "Pa", ""}, {"pascals", "Pa", ""}, {"bars", "bar", ""}, {"hertz", "Hz", ""},
	{"meter", "m", ""}, {"meters", "m", ""}, {"metre", "m", ""}, {"metres", "m", ""}, {"micron", "µm", ""}, {"microns", "µm", ""},
	{"millimeter", "mm", ""}, {"millimeters", "mm", ""}, {"millimetre", "mm", ""}, {"millimetres", "mm", ""},
	{"centimeter", "cm", ""}, {"centimeters", "cm", ""}, {"centimetre", "cm", ""}, {"centimetres", "cm", ""},
	{"inch", "in", ""}, {"inches", "in", ""}, {"foot", "ft", ""}, {"feet", "ft", ""}, {"thou", "mil", ""}, {"mils", "mil", ""}, {"yard", "yd", ""}, {"yards", "yd", ""}, {"mile", "mi", ""}, {"miles", "mi", ""},
	{"gram", "g", ""}, {"grams", "g", ""}, {"kilo", "kg", ""}, {"kilogram", "kg", ""}, {"kilograms", "kg", ""}, {"kgs", "kg", ""},
	{"lbs", "lb", ""}, {"pound", "lb", ""}, {"pounds", "lb", ""}, {"ounce", "oz", ""}, {"ounces", "oz", ""},
	{"liter", "L", ""}, {"liters", "L", ""}, {"litre", "L", ""}, {"litres", "L", ""}, {"cc", "cm³", ""}, {"ccm", "cm³", ""},
	{"LPM", "L/min", ""}, {"lpm", "L/min", ""}, {"lps", "L/s", ""}, {"kph", "km/h", ""}, {"GPM", "gpm", ""}, {"CFM", "cfm", ""},
	{"sqft", "ft²", ""}, {"sqm", "m²", ""}, {"cuft", "ft³", ""}, {"cum", "m³", ""},
	{"psid", "psi", ""}, {"inWC", "inH2O", ""}, {"inwc", "inH2O", ""}, {"inwg", "inH2O", ""}, {"PSI", "psi", ""}, {"PSIG", "psig", ""}, {"PSIA", "psia", ""},
	{"percent", "%", ""}, {"pct", "%", ""}, {"turn", "rev", ""}, {"turns", "rev", ""}, {"degree", "°", ""}, {"degrees", "°", ""},
}

// unknown says that sym is not a unit, and what was probably meant.
func (r *unitReader) unknown(sym string, n int) *fault {
	f := &fault{off: r.pos, n: n, found: quote(sym) + " is not a unit", want: "a unit"}
	if r.names != nil && r.names(sym) {
		f.found, f.want = "a number beside the name "+sym, "* between them"
		f.replace, f.fix = "* "+sym, true
		return f
	}
	if normal := strings.HasSuffix(sym, "Nm") && cubed(r.src[r.pos+n:]); normal {
		f.want = "m³ at a stated pressure and temperature"
		return f
	}
	if scale, k := degreeOf(sym, r.src[r.pos+n:]); k > 0 {
		f.n, f.found = n+k, quote(r.src[r.pos:r.pos+n+k])+" is not a unit"
		f.replace, f.want, f.fix = "°"+scale, "°"+scale, true
		return f
	}
	f.replace, f.want = instead(sym)
	f.fix = f.replace != ""
	if f.want == "" {
		f.want = "a unit"
	}
	return f
}

// degreeOf reads the C of "deg C".
func degreeOf(sym, rest string) (scale string, n int) {
	if sym != "deg" && sym != "degree" && sym != "degrees" {
		return "", 0
	}
	gap := spaces(rest)
	if k := letters(rest[gap:]); k == 1 && (rest[gap] == 'C' || rest[gap] == 'F') {
		return rest[gap : gap+1], gap + 1
	}
	return "", 0
}

func cubed(s string) bool {
	return strings.HasPrefix(s, "³") || strings.HasPrefix(s, "3") || strings.HasPrefix(s, "^3")
}

// instead returns the symbol probably meant by one that is none, and what to
// say where that is one of several.
func instead(sym string) (symbol, why string) {
	for _, w := range words {
		if w.word == sym {
			return w.symbol, cmp.Or(w.why, w.symbol)
		}
	}
	if s, ok := degreePrefixed(sym); ok {
		return s, "K, which takes a prefix; a degree does not"
	}
	if s := sameLetters(sym); s != "" {
		return s, s + "; capital and small letters differ"
	}
	for _, w := range words {
		if strings.EqualFold(w.word, sym) {
			return w.symbol, cmp.Or(w.why, w.symbol)
		}
	}
	m := marked(sym)
	return m, m
}

// degreePrefixed turns k°C into kK.
func degreePrefixed(sym string) (string, bool) {
	for _, p := range &prefixes {
		rest, ok := strings.CutPrefix(sym, p.sym)
		if u, is := plainUnit(rest); ok && is && u.degree && u.num == 1 {
			return p.sym + "K", true
		}
	}
	return "", false
}

// sameLetters finds the unit that differs from sym least in capitals only.
func sameLetters(sym string) string {
	best, least := "", len(sym)+1
	try := func(s string) {
		if !strings.EqualFold(s, sym) {
			return
		}
		n := 0
		for i := 0; i < min(len(s), len(sym)); i++ {
			if s[i] != sym[i] {
				n++
			}
		}
		if n < least {
			best, least = s, n
		}
	}
	for i := range units {
		try(units[i].sym)
	}
	for i := range units {
		for _, p := range &prefixes {
			if units[i].prefix && len(p.sym)+len(units[i].sym) == len(sym) {
				try(p.sym + units[i].sym)
			}
		}
	}
	return best
}

// marked turns kPag into kPa(g).
func marked(sym string) string {
	for _, m := range []string{"g", "a"} {
		rest, ok := strings.CutSuffix(sym, m)
		if !ok {
			rest, ok = strings.CutSuffix(sym, "_"+m)
		}
		if u, _, is := lookup(rest); ok && is && u.dim == dimPressure && u.kind == Plain {
			return rest + "(" + m + ")"
		}
	}
	return ""
}
