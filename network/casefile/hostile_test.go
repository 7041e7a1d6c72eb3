package casefile_test

import (
	"fmt"
	"runtime"
	"strings"
	"testing"
	"time"

	"lagbook/network/casefile"
)

const good = `[thermal.node.room]
held = "20 °C"
[thermal.node.case]
capacitance = "100 J/K"
[thermal.resistance.joint]
between = ["case", "room"]
value = "0.5 K/W"
`

// many repeats a text with a number in it until it fills n bytes.
func many(n int, format string) string {
	var b strings.Builder
	for i := 0; b.Len() < n; i++ {
		fmt.Fprintf(&b, format, i)
	}
	return b.String()
}

// Texts meant to cost memory, time or a crash. Where the bytes are many they
// are made here rather than kept in files.
func hostileCases() map[string]string {
	const room = 1<<20 - 2000 // just below what a case may have
	x := strings.Repeat
	return map[string]string{
		"six megabytes of brackets":        x("[", 6<<20),
		"a megabyte of brackets":           x("[", room),
		"a megabyte of open lists":         "a = " + x("[", room),
		"a megabyte of open tables":        "a = " + x("{a=", room/3),
		"open lists on lines of their own": "a = " + x("[\n", room/2),
		"a list for every line":            x("a = [\n", room/6),
		"a key of ten thousand parts":      x("a.", 10000) + "a = 1\n",
		"a header of ten thousand parts":   "[" + x("a.", 10000) + "a]\n",
		"a key of a megabyte":              x("a", room) + " = 1\n",
		"a quoted key of a megabyte":       `"` + x("a", room) + "\" = 1\n",
		"a name of a megabyte":             "[thermal.node." + x("a", room) + "]\ncapacitance = \"1 J/K\"\n",
		"a text of a megabyte":             `title = "` + x("a", room) + `"`,
		"an open text of a megabyte":       `title = "` + x("a", room),
		"an open long text":                `title = """` + x("a\n", room/2),
		"a quantity of a megabyte":         good + `[thermal.source.x]` + "\ninto = \"case\"\ndrive = \"" + x("1", room) + ` W"`,
		"a unit of a megabyte":             good + `[thermal.source.x]` + "\ninto = \"case\"\ndrive = \"1 " + x("W·", room/3) + `W"`,
		"an expression of a megabyte":      good + "[thermal.source.x]\ninto = \"case\"\ndrive = \"= 1 W" + x("+1 W", room/5) + `"`,
		"an expression of parentheses":     good + "[thermal.source.x]\ninto = \"case\"\ndrive = \"= " + x("(", room) + `"`,
		"an expression of signs":           good + "[thermal.source.x]\ninto = \"case\"\ndrive = \"= " + x("-", room) + ` 1 W"`,
		"an expression of powers":          good + "[given]\na = \"= 9" + x("^9", 1000) + `"`,
		"a huge power":                     good + "[given]\na = \"= 2^2147483647\"\n",
		"a huge exponent in a unit":        good + "[given]\na = \"1 m^999999999\"\n",
		"a huge decimal exponent":          good + "[given]\na = \"1e999999999 m\"\n",
		"a number of many digits":          good + "[given]\na = \"" + x("9", 100000) + "." + x("9", 100000) + " m\"\n",
		"1e400":                            "a = 1e400\n",
		"an integer beyond 64 bits":        "a = 99999999999999999999\n",
		"infinity":                         good + "[thermal.node.x]\ncapacitance = inf\n",
		"not a number":                     good + "[thermal.node.x]\ncapacitance = \"nan J/K\"\n",
		"a chain of a thousand given":      good + "[given]\n" + many(200000, "a%[1]d = \"= b%[1]d * 2\"\n"),
		"given that double a thousandfold": good + "[given]\na0 = 2\n" + func() string {
			b := ""
			for i := 1; i < 2000; i++ {
				b += fmt.Sprintf("a%d = \"= a%d * a%d\"\n", i, i-1, i-1)
			}
			return b
		}(),
		"a ring of ten thousand given": good + "[given]\n" + func() string {
			var b strings.Builder
			for i := 0; i < 10000; i++ {
				fmt.Fprintf(&b, "a%d = \"= a%d\"\n", i, (i+1)%10000)
			}
			return b.String()
		}(),
		"as many keys as fit":              many(room, "a%d=1\n"),
		"as many tables as fit":            many(room, "[a%d]\n"),
		"as many elements as fit":          good + many(room-1000, "[thermal.node.a%d]\n"),
		"as many items as fit":             "a = [" + x("1,", room/2) + "]",
		"a pair for every ten bytes":       good + "[thermal.source.x]\ninto = \"case\"\ndrive = { points = [" + x("[1,1],", room/6) + "] }\n",
		"a list of equal names":            good + "[[table]]\nevery = \"1 s\"\nshow = [" + x(`"case",`, room/7) + "]\n",
		"a list of unknown names":          good + "[thermal.stream.x]\ncapacity_rate = \"1 W/K\"\npath = [" + many(room-1000, `"x%d",`) + "]\n",
		"unknown names in every element":   good + many(room-1000, "[thermal.source.s%d]\ninto = \"chase\"\ndrive = \"1 W\"\n"),
		"a hundred thousand pulses each":   good + many(100000, "[thermal.source.s%d]\ninto = \"case\"\ndrive = { pulse = { low = \"0 W\", high = \"1 W\", width = \"1 s\", period = \"2 s\", count = 100000 } }\n"),
		"a billion pulses":                 good + "[thermal.source.x]\ninto = \"case\"\ndrive = { pulse = { low = \"0 W\", high = \"1 W\", width = \"1 s\", period = \"2 s\", count = 1000000000 } }\n",
		"pulses that began long ago":       good + "[thermal.source.x]\ninto = \"case\"\ndrive = { pulse = { low = \"0 W\", high = \"1 W\", width = \"1 ns\", period = \"2 ns\", at = \"-1000 a\" } }\n",
		"a table of a trillion rows":       good + "[run]\nto = \"1000 a\"\n[[table]]\nshow = [\"case\"]\nevery = \"1 µs\"\n",
		"a data file above the case":       good + "[thermal.source.x]\ninto = \"case\"\ndrive = { file = \"../../../../etc/passwd\" }\n",
		"a device as data file":            good + "[thermal.source.x]\ninto = \"case\"\ndrive = { file = \"/dev/zero\" }\n",
		"invalid UTF-8":                    "title = \"\xff\xfe\xfd\"\n",
		"cut UTF-8":                        "title = \"a\xe2\x82",
		"UTF-16":                           "\xff\xfet\x00i\x00",
		"a byte order mark in the middle":  "a = 1\n\ufeffb = 2\n",
		"NUL":                              "title = \"a\x00b\"\n",
		"NUL alone":                        "\x00",
		"NULs in a comment":                "# " + x("\x00", 1000) + "\n",
		"an escape sequence":               "title = \"\x1b[2J\"\n",
		"a lone carriage return":           "a = 1\rb = 2\n",
		"a surrogate":                      `title = "\ud800"`,
		"a character beyond the last":      `title = "\U00110000"`,
		"an unfinished escape":             `title = "\u12`,
		"a backslash at the end":           `title = "\`,
		"only quotes":                      x(`"`, room),
		"only equals signs":                x("=", room),
		"only line ends":                   x("\n", room) + "=",
		"a line that never ends":           good + x(" ", room/2) + "=" + x(" ", room/3),
		"a fault on every line":            x("=\n", room/2),
		"a fault in every value of a line": good + "[thermal.stream.x]\npath = [" + x("1,", room/3) + "]\n",
		"the same header again and again":  x("[thermal.node.a]\n", room/17),
		"the same key again and again":     x("a = 1\n", room/6),
		"a table in a table in a table": func() string {
			s := "1"
			for i := 0; i < 40; i++ {
				s = "{ a = " + s + " }"
			}
			return "a = " + s
		}(),
		"a date that is none": "date = 2025-13-45\n",
		// the library spells out the full name of every key and list
		"a long header over many keys":   "[" + x(x("a", 200)+".", 15) + "a]\n" + many(400000, "a%d=1\n"),
		"a long key over many lists":     x(x("a", 200)+".", 15) + "a = [" + x("[],", 250000) + "]\n",
		"long keys in tables in tables":  x(x(x("a", 100)+".", 15)+"a={", 20) + many(300000, "a%d=1,") + x("}", 20) + "\n",
		"escapes in every key":           many(room, `"\u0061%d" = 1`+"\n"),
		"brackets behind a fault":        "a = 1 K " + x("[", room),
		"brackets behind an open quote":  "a = \"x\n" + x("[", room),
		"parts behind a fault":           "a b." + x("c.", room/2) + " = 1\n",
		"a fault at the end":             many(200000, "a%d=1\n") + "b = 1 K\n",
		"a number at fault on each line": many(300000, "a%d=007\n"),
	}
}

// hangs is when a refusal counts as a hang. On a free machine each of these texts
// is refused in well under a second; a shared one may be ten times slower.
const hangs = 10 * time.Second

func TestHostile(t *testing.T) {
	cases := hostileCases()
	if len(cases) < 30 {
		t.Fatalf("%d hostile cases", len(cases))
	}
	refused(t, cases, testVocabulary())
}

// The same of forms that only parts with laws of their own have.
func TestHostilePlant(t *testing.T) { refused(t, hostilePlants(), plantVocabulary()) }

func hostilePlants() map[string]string {
	const room = 1<<20 - 3000
	x := strings.Repeat
	pump := func(head string) string {
		return pond + "[hydraulic.pump.p]\nfrom = \"sea\"\nto = \"pond\"\nhead = { " + head + " }\n"
	}
	return map[string]string{
		"as many numbers as fit":           pump(`head = "1 m", flow = [` + x(`"1 L/s",`, room/8) + "]"),
		"numbers that go up without end":   pump(`head = "1 m", flow = [` + many(room, `"%d L/s",`) + "]"),
		"bare numbers without end":         pump(`head = "1 m", flow = [` + x("1,", room/2) + "]"),
		"numbers that are none":            pump(`head = ["nan m", "inf m", "1e999 m", "-inf m"], flow = [nan, inf, -inf]`),
		"lists in lists of numbers":        pump(`head = ` + x("[", 30) + x("]", 30) + `, flow = ["1 L/s"]`),
		"numbers in tables of values":      pump(`head = "1 m", flow = ` + x("{value=", 30) + `"1 L/s"` + x("}", 30)),
		"as many points as fit":            pond + "[material.m]\ndensity = [" + x(`["1 K","1 g/L"],`, room/15) + "]\n",
		"points without end":               pond + "[material.m]\ndensity = { points = [" + many(room, `["%[1]d K","1 g/L"],`) + "] }\n",
		"empty points without end":         pond + "[material.m]\ndensity = [" + x("[],", room/3) + "]\n",
		"points of lists":                  pond + "[material.m]\ndensity = [" + x("[[[[[[[1]]]]]]],", room/16) + "]\n",
		"points that are not numbers":      pond + "[material.m]\ndensity = [[nan, inf], [\"nan K\", \"-inf g/L\"], [1e308, -1e308]]\n",
		"points in points":                 pond + "[material.m]\ndensity = { points = { points = { points = [[1, 1]] } } }\n",
		"a level in a level in a level":    pond + "[hydraulic.node.x]\nheld = " + x("{level=", 28) + `"1 m"` + x("}", 28) + "\n",
		"a level that is a million pulses": pond + "[hydraulic.node.x]\nheld = { level = { pulse = { low = \"0 m\", high = \"1 m\", width = \"1 s\", period = \"2 s\", count = 1000000 } } }\n",
		"a level that is not a number":     pond + "[hydraulic.node.x]\nheld = { level = nan }\nstart = { level = \"inf m\" }\n",
		"keys without end in a level":      pond + "[hydraulic.node.x]\nheld = { level = \"1 m\", " + strings.TrimSuffix(many(room, "k%d=1,"), ",") + " }\n",
		"readings without end":             pond + "[[table]]\ntimes = [\"1 s\"]\nshow = [" + many(room, `"level of x%d",`) + "]\n",
		"a reading of a megabyte":          pond + "[[table]]\ntimes = [\"1 s\"]\nshow = [\"level of " + x("of ", room/3) + "\"]\n",
		"a reading of nothing":             pond + "[[table]]\ntimes = [\"1 s\"]\nshow = [\" of \", \"level of \", \" of pond\", \"flow of  at \", \"flow of main at \"]\n",
		"inputs without end":               pond + many(200000, "[[transfer]]\nfrom = \"opening of x%d\"\nto = \"pond\"\n"),
		"an input of nothing":              pond + "[[transfer]]\nfrom = \" of \"\nto = \"pond\"\n[[transfer]]\nfrom = \"opening of \"\nto = \"pond\"\n",
		"an input of a megabyte":           pond + "[[transfer]]\nfrom = \"opening of " + x("x", room) + "\"\nto = \"pond\"\n",
		"about not a number":               pond + "[[transfer]]\nfrom = \"sea\"\nto = \"pond\"\nabout = nan\n[[transfer]]\nfrom = \"sea\"\nto = \"pond\"\nabout = [\"start\"]\n",
		"flags of every kind":              pump(`head = "1 m", flow = "1 L/s"`) + "non_return = 1e400\n",
		"a word that is lists":             pond + "[hydraulic.gate.g]\nbetween = [\"pond\", \"sea\"]\nkv = 1\ncharacteristic = [" + x("[],", room/3) + "]\n",
		"air that is lists":                pond + "[air]\naltitude = " + x("[", 30) + x("]", 30) + "\n",
	}
}

// pond is a good case of two nodes.
const pond = `[hydraulic.node.sea]
held = "0 bar"
[hydraulic.node.pond]
tank = { area = "4 m²" }
[hydraulic.line.main]
between = ["pond", "sea"]
resistance = "1 GPa·s/m³"
`

// refused reads texts of which none may be taken for a case, take long or much, or
// make a message that cannot be read.
func refused(t *testing.T, cases map[string]string, words []casefile.Vocabulary) {
	var before, after runtime.MemStats
	for name, text := range cases {
		t.Run(strings.ReplaceAll(name, " ", "-"), func(t *testing.T) {
			runtime.ReadMemStats(&before)
			begun := time.Now()
			c, diags := casefile.Read("case.toml", []byte(text), nil, words...)
			took := time.Since(begun)
			runtime.ReadMemStats(&after)
			if c != nil || !casefile.Failed(diags) {
				t.Errorf("it is accepted")
			}
			if took > hangs && !raceDetector {
				t.Errorf("it takes %v", took)
			}
			if used := (after.TotalAlloc - before.TotalAlloc) >> 20; used > 200 && !raceDetector {
				t.Errorf("it takes %d MB", used)
			}
			for _, d := range diags {
				if len(d.String()) > 4000 {
					t.Errorf("a message of %d bytes", len(d.String()))
				}
				if strings.ContainsAny(d.String(), "\x00\x1b\r") {
					t.Errorf("control characters in %q", d.String())
				}
			}
			if n := len(casefile.Listing(diags)); n > 40000 {
				t.Errorf("a listing of %d bytes", n)
			}
		})
	}
}
