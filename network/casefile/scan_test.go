package casefile

import (
	"math"
	"strconv"
	"strings"
	"testing"
	"time"
	"unicode/utf8"
)

// FuzzScan holds the index of places to the library that decodes: a text is at
// fault in both or in neither, both have the same keys and items, and every place
// holds what it is the place of.
func FuzzScan(f *testing.F) {
	for _, s := range scanSeeds {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		if len(text) > 4000 || strings.Count(text, "[") > 200 || strings.Count(text, ".") > 200 {
			return // the library takes minutes, or its stack, for such
		}
		compareWithLibrary(t, text)
	})
}

var scanSeeds = []string{
	"", "a = 1", "a.b.c = 1\na.b.d = 2", "[a]\nb = 1\n[a.c]\nd = 2\n[[x]]\ny = 1\n[[x]]\ny = 2\n[x.z]\nw = 3",
	"a = [1, 2.5, \"x\", [true, false], {b = 1, c = [2]},]\n", "a = {}\nb = []\n", "\"a b\".'c' = 'x'\n",
	"a = \"\\u00e9\\n\\\"\" # c\n", "a = \"\"\"\nx \\\n   y\"\"\"\n", "a = '''\n''x'''\n", "a = '''x'''''\n", "a = 1979-05-27T07:32:00Z\nb = 07:32:00\nc = 1979-05-27\nd = 1979-05-27 07:32:00.5",
	"a = 0xff\nb = 0o17\nc = 0b11\nd = 1_000\ne = -0.5e-3\nf = inf\ng = -nan\nh = 1e400", "a = 1\r\nb = 2\r\n", "\ufeffa = 1\n",
	"a = 1\na = 2", "[a]\n[a]", "[a.b]\n[a]\nb.c = 1", "a.b = 1\n[a]\nc = 2", "a = [\n1, # one\n2\n]\n", "a = { b = 1,\n c = 2 }\n",
	"[a.b.c]\nx = 1\n[a]\ny = 2\n[a.b]\nz = 3", "a = 007", "a = .5", "a = 5.", "a = 1__0", "[[a]]\n[a]\n", "a = {b = 1}\n[a.c]\nd = 1", "a = [{b = 1}]\n[[a]]\n",
	"[a]\nb.c = 1\n[a.b]\nd = 1", "[a]\nb.c = 1\n[a.b.e]\nd = 1",
}

func compareWithLibrary(t *testing.T, text string) {
	t.Helper()
	src := &source{file: "case.toml", text: text}
	root, faults := src.load()
	want, err := decode(text)
	for _, d := range faults {
		if d.Line > 1+strings.Count(text, "\n") || d.Line > 0 && (d.Col < 1 || d.Len < 1) || d.Text == "" {
			t.Fatalf("%q: %#v has no place", text, d)
		}
		if strings.Contains(d.Code, "too-") || d.Code == "not-utf8" {
			return // a bound, of which the library knows nothing
		}
	}
	if err == nil && len(faults) > 0 && allTwice(faults) {
		return // TOML forbids it; the library lets some of it pass
	}
	if (faults == nil) != (err == nil) {
		t.Fatalf("%q: we say %v, the library %v", text, faults, err)
	}
	if err == nil {
		compareTables(t, text, root, want)
	}
}

func allTwice(list []Diagnostic) bool {
	for _, d := range list {
		if d.Code != "defined-twice" {
			return false
		}
	}
	return true
}

func compareTables(t *testing.T, text string, n *node, want map[string]any) {
	t.Helper()
	if n.kind != kindTable || len(n.table.keys) != len(want) {
		t.Fatalf("%q: table of %d keys, library has %v", text, len(n.table.keys), want)
	}
	for i := range n.table.keys {
		k := &n.table.keys[i]
		w, ok := want[k.name]
		if !ok {
			t.Fatalf("%q: key %q is not in the library's table", text, k.name)
		}
		if at := text[k.at:k.end]; at != k.name && !strings.ContainsAny(at, `"'`) {
			t.Fatalf("%q: the place of key %q holds %q", text, k.name, at)
		}
		compareValues(t, text, k.value, w)
	}
}

func compareValues(t *testing.T, text string, n *node, want any) {
	t.Helper()
	at := text[n.at:n.end]
	ok := false
	switch w := want.(type) {
	case string:
		ok = n.kind == kindString && n.text == w && (!n.exact || text[n.inner:int(n.inner)+len(w)] == w)
	case int64:
		ok = n.kind == kindInteger && n.num == float64(w) && at == n.text
	case float64:
		x := n.num
		ok = n.kind == kindFloat && (x == w || math.IsNaN(x) && math.IsNaN(w)) && at == n.text
	case bool:
		ok = n.kind == kindBoolean && n.text == strconv.FormatBool(w) && at == n.text
	case time.Time:
		ok = n.kind == kindDate && at == n.text
	case []any:
		ok = n.kind == kindArray && len(n.items) == len(w)
		for i := range w {
			if ok {
				compareValues(t, text, n.items[i], w[i])
			}
		}
	case []map[string]any:
		ok = n.kind == kindArray && len(n.items) == len(w)
		for i := range w {
			if ok {
				compareTables(t, text, n.items[i], w[i])
			}
		}
	case map[string]any:
		ok = n.kind == kindTable
		if ok {
			compareTables(t, text, n, w)
		}
	}
	if !ok {
		t.Fatalf("%q: the scanner has %v %q at %q, the library %#v", text, n.kind, n.text, at, want)
	}
}

// BenchmarkScan finds the places in a text of 1800 lines, and decodes it.
func BenchmarkScan(b *testing.B) {
	text := strings.Repeat("[thermal.resistance.\"r %d\"]\nbetween = [\"n1\", \"n2\"]\nvalue   = \"0.1 K/W\"\n", 600)
	for i := range 600 {
		text = strings.Replace(text, "%d", strconv.Itoa(i), 1)
	}
	b.Run("places", func(b *testing.B) {
		b.SetBytes(int64(len(text)))
		b.ReportAllocs()
		for b.Loop() {
			if sc := newScanner(&source{text: text}, 0, len(text)); !sc.run() {
				b.Fatal("it sticks")
			}
		}
	})
	b.Run("library", func(b *testing.B) {
		b.SetBytes(int64(len(text)))
		b.ReportAllocs()
		for b.Loop() {
			if _, err := decode(text); err != nil {
				b.Fatal(err)
			}
		}
	})
}

// The library is shown no more than a little of what no bound has been looked at.
func TestLittleBehindAFaultIsDecoded(t *testing.T) {
	for _, text := range []string{"a = 1 K " + strings.Repeat("[", 5000), "a = " + strings.Repeat("é", 5000), "a b." + strings.Repeat("c.", 5000), "[a" + strings.Repeat(" [", 5000)} {
		src := &source{text: text}
		sc := newScanner(src, 0, len(text))
		if sc.run() || sc.bound != nil {
			t.Fatalf("%.20q: it does not stick", text)
		}
		if to := src.justBehind(sc.pos); to-sc.pos > 204 || !utf8.ValidString(text[:to]) {
			t.Errorf("%.20q: it sticks at byte %d, but %d are decoded", text, sc.pos, to)
		}
	}
}
