package draw

import (
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"golang.org/x/image/font/opentype"
	"golang.org/x/image/font/sfnt"
	"gonum.org/v1/plot/vg"
	"pgregory.net/rapid"
)

// Every character that this package writes of its own has a glyph: a PNG would
// silently leave out what has none, and 1e-4 once became 104.
func TestOwnCharactersHaveGlyphs(t *testing.T) {
	face, err := opentype.Parse(liberationsansregular.TTF)
	if err != nil {
		t.Fatal(err)
	}
	files, err := filepath.Glob("*.go")
	if err != nil {
		t.Fatal(err)
	}
	text := "0123456789e−→ °µζ·³²ΔΩ…□"
	literal := regexp.MustCompile(`"[^"\n]*"`)
	for _, f := range files {
		src, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		text += strings.Join(literal.FindAllString(string(src), -1), "")
	}
	var buf sfnt.Buffer
	for _, r := range text {
		if i, err := face.GlyphIndex(&buf, r); err != nil || i == 0 {
			t.Errorf("%q (%U) has no glyph", r, r)
		}
	}
}

// What is left of a line passes within a hair of every point it had.
func TestDecimateKeepsTheLine(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		n := rapid.IntRange(2, 3000).Draw(rt, "points")
		wild := rapid.Bool().Draw(rt, "wild")
		pts := make([]vg.Point, n)
		for i := range pts {
			x := 300 * float64(i) / float64(n)
			pts[i] = vg.Point{X: vg.Length(x), Y: vg.Length(100 * math.Sin(x/7))}
			if wild && i%7 == 3 {
				pts[i].Y += 50
			}
		}
		few := decimate(pts)
		if len(few) > 4*840 || few[0] != pts[0] || few[len(few)-1] != pts[n-1] {
			rt.Fatalf("%d points of %d", len(few), n)
		}
		line := straightened(few)
		if line[0] != pts[0] || line[len(line)-1] != pts[n-1] || len(line) > len(few) {
			rt.Fatalf("%d points of %d", len(line), len(few))
		}
		top, high := vg.Length(0), vg.Length(0)
		for _, p := range pts {
			top = max(top, p.Y)
		}
		for _, p := range line {
			high = max(high, p.Y)
		}
		if top-high > straight {
			rt.Fatalf("the peak %v became %v", top, high)
		}
	})
}

// Labels keep their order, do not overlap, and stay on the panel where they fit.
func TestSpreadLabels(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		n := rapid.IntRange(1, 9).Draw(rt, "labels")
		list := make([]label, n)
		for i := range list {
			list[i].from = vg.Length(rapid.Float64Range(0, 100).Draw(rt, "end"))
			if i > 0 {
				list[i].from = max(list[i].from, list[i-1].from)
			}
		}
		spread(list, 0, 100)
		for i, l := range list {
			if l.at < -1e-9 || l.at > 100+1e-9 {
				rt.Errorf("label %d at %v", i, l.at)
			}
			if i > 0 && l.at-list[i-1].at < labelPitch-1e-9 {
				rt.Errorf("labels %d and %d are %v apart", i-1, i, l.at-list[i-1].at)
			}
		}
	})
}

// Scales map their ends to 0 and 1, rise, and label round numbers only.
func TestScales(t *testing.T) {
	for name, s := range map[string]struct {
		scale
		lo, hi float64
		labels string
	}{
		"linear":  {linear(-3, 17, 5, ordinary), -3, 17, "0 5 10 15"},
		"hours":   {linear(0, 24, 8, timeSteps("h")), 0, 24, "0 3 6 9 12 15 18 21 24"},
		"decades": {logarithmic(2e-5, 3e3, 9), 2e-5, 3e3, "1e-4 0.001 0.01 0.1 1 10 100 1000"},
		"one":     {logarithmic(1, 12, 8), 1, 12, "1 2 5 10"},
		"folded":  {folded(-200, 20, 1, 9), -200, 20, "−100 −10 −1 0 1 10"},
		"small":   {linear(0, 0.004, 4, ordinary), 0, 0.004, "0 0.001 0.002 0.003 0.004"},
	} {
		var labels []string
		last := math.Inf(-1)
		for _, k := range s.ticks {
			if x := s.share(k.at); x <= last || x < -1e-9 || x > 1+1e-9 {
				t.Errorf("%s: tick %v at %v after %v", name, k.at, x, last)
			}
			last = s.share(k.at)
			if k.label != "" {
				labels = append(labels, k.label)
			}
		}
		if got := strings.Join(labels, " "); got != s.labels {
			t.Errorf("%s: labels %q, want %q", name, got, s.labels)
		}
		if a, b := s.share(s.lo), s.share(s.hi); math.Abs(a) > 1e-12 || math.Abs(b-1) > 1e-12 {
			t.Errorf("%s runs from %v to %v", name, a, b)
		}
	}
	for _, v := range []float64{-150, -0.5, 0, 0.7, 12} {
		s := folded(-200, 20, 1, 9)
		if got := unfold(s.share(v), -200, 20, 1); math.Abs(got-v) > 1e-9 {
			t.Errorf("%v comes back as %v", v, got)
		}
	}
}

// Nothing a case is called can break the picture.
func FuzzPrintable(f *testing.F) {
	for _, s := range []string{"a", "<b>&\"'", "\x00\x1b[31m", "日本", "\xff\xfe", "a\u202eb", "ab\ufffe"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, words string) {
		for _, format := range []Format{SVG, PNG} {
			s, err := newSheet(format, words, 50, 50)
			if err != nil {
				t.Fatal(err)
			}
			s.write(vg.Point{X: 5, Y: 5}, words, small, ink, 0, 0)
			b, err := s.bytes()
			if err != nil || len(b) == 0 {
				t.Fatal(err)
			}
			if format == SVG && wellFormed(b) != nil {
				t.Fatalf("%q: %v: %s", words, wellFormed(b), b)
			}
		}
	})
}
