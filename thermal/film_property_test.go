package thermal

import (
	"fmt"
	"testing"

	"pgregory.net/rapid"
)

// More film is never hotter: of two bodies alike but for the area of a film, the one with more is nowhere
// above the other, neither in the end nor on the way, whatever the film.
func TestMoreFilmIsNeverHotter(t *testing.T) {
	films := []string{
		`natural = "vertical plate", height = "0.3 m"`,
		`natural = "vertical cylinder", height = "0.3 m", diameter = "60 mm"`,
		`natural = "horizontal cylinder", diameter = "60 mm"`,
		`natural = "horizontal plate", face = "up", diameter = "0.3 m"`,
		`natural = "horizontal plate", face = "down", diameter = "0.3 m"`,
		`natural = "enclosure", height = "0.3 m", gap = "15 mm"`,
		`natural = "enclosure", face = "up", gap = "25 mm"`,
		`forced = "plate", length = "0.3 m", speed = "2 m/s"`,
		`forced = "cylinder", diameter = "60 mm", speed = "0.5 m/s"`,
		`forced = "duct", diameter = "40 mm", length = "0.5 m", speed = "1.2 m/s"`,
	}
	text := func(film string, area, load, T float64) string {
		return fmt.Sprintf(`
[run]
start = "%.3f °C"
[thermal.node.air]
held = "25 °C"
[thermal.node.core]
capacitance = "800 J/K"
[thermal.node.skin]
[thermal.resistance.inside]
between = ["core", "skin"]
value = "0.2 K/W"
[thermal.resistance.film]
between = ["skin", "air"]
film = { %s, area = "%.9g m²" }
[thermal.source.load]
into = "core"
drive = "%.3f W"
[[table]]
show = ["core"]
times = ["0 s"]
`, T, film, area, load)
	}
	rapid.Check(t, func(r *rapid.T) {
		film := rapid.SampledFrom(films).Draw(r, "film")
		area := rapid.Float64Range(0.05, 0.5).Draw(r, "area")
		more := area * rapid.Float64Range(1.001, 2).Draw(r, "more")
		load := float64(rapid.IntRange(0, 40_000).Draw(r, "load")) / 1000
		T := rapid.Float64Range(25, 90).Draw(r, "start")
		small := read(t, "small.toml", text(film, area, load, T)).March(4000, "core", "skin")
		large := read(t, "large.toml", text(film, more, load, T)).March(4000, "core", "skin")
		for at := 0.0; at <= 4000; at += 250 {
			if a, b := small.At(0, at), large.At(0, at); b > a+1e-5 { // what the march allows itself
				r.Fatalf("%s: core at %g s is %.8g with %g m² and %.8g with %g m²", film, at, a, area, b, more)
			}
		}
	})
}
