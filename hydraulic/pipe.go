package hydraulic

import (
	"fmt"
	"math"
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// maxPipeLumps bounds the sections of one pipe: beyond it nothing is gained but time.
const maxPipeLumps = 1000

// roughest is the relative roughness to which Colebrook and White's equation reaches.
const roughest = 0.05

// pipeField is the key pipe of a line: a column of liquid by its geometry.
func pipeField() casefile.Field {
	poisson := casefile.Positive("poisson", quantity.Dim{}, "ν of the wall, for a stated restraint; 0.3 unless stated")
	poisson.HasMax, poisson.Max, poisson.With = true, 0.5, []string{"wall"}
	modulus := casefile.Positive("wall_modulus", pressure, "E of the wall; of steel, 206 GPa, for a size")
	wall := casefile.Positive("wall", length, "thickness of the wall, which gives way under pressure; of the size unless stated")
	accuracy := casefile.Positive("accuracy", quantity.Dim{}, "how far the speed of waves may be off up to the frequency up_to: as many sections as that needs")
	accuracy.HasMax, accuracy.Max, accuracy.Structural, accuracy.With = true, 0.5, true, []string{"up_to"}
	upTo := casefile.Positive("up_to", frequency, "frequency in Hz up to which accuracy holds")
	upTo.Unit, upTo.Structural, upTo.With = "Hz", true, []string{"accuracy"}
	span := casefile.Positive("length", length, "l")
	span.Required = true
	return casefile.Field{Name: "pipe", Type: casefile.Group, Structural: true, Help: "a round pipe full of liquid",
		OneOf: [][]string{{"bore", "size"}, {"lumps", "accuracy", "rigid", ""}, {"wave_speed", "wall", ""}},
		Fields: []casefile.Field{
			span,
			casefile.Positive("bore", length, "inner diameter"),
			{Name: "size", Type: casefile.Word, Words: sizeNames(), Structural: true, Help: "a nominal size of steel pipe, which states bore and wall"},
			{Name: "roughness", Type: casefile.Number, Dim: length, HasMin: true, Help: "height of the sand grains that resist as the wall does; smooth unless stated"},
			wall, modulus, poisson,
			{Name: "restraint", Type: casefile.Word, Words: []string{anchoredUpstream, anchoredThroughout, expansionJoints}, Structural: true,
				Help: "how the pipe is held along its axis; without it the wall is taken to stretch around alone"},
			casefile.Positive("wave_speed", velocity, "a of pressure waves; from liquid and wall unless stated"),
			{Name: "losses", Type: casefile.Number, HasMin: true, Help: "sum of the loss coefficients of bends and fittings, on the velocity in the bore"},
			{Name: "elevations", Type: casefile.Pairs, Dim: length, HasMin: true, Ascending: true, Structural: true, Second: &casefile.Field{Type: casefile.Number, Dim: length},
				Help: "[distance from the first end, elevation] along the pipe, straight between; straight from end to end unless stated"},
			{Name: "rigid", Type: casefile.Flag, Structural: true, Help: "the liquid moves as one column"},
			{Name: "lumps", Type: casefile.Count, Structural: true, HasMin: true, Min: 1, HasMax: true, Max: maxPipeLumps,
				Help: "number of equal sections, each a column with half of its compliance at either end"},
			accuracy, upTo,
		}}
}

// A pipe is what a line states of its pipe.
type pipe struct {
	liquid                                                     liquidSlots
	length, bore, rough, losses, wall, modulus, poisson, speed number
	size                                                       *steelPipe
	restraint                                                  string
	rigid                                                      bool
}

// A pipeState holds the numbers of a pipe for one set of values, in SI.
type pipeState struct {
	liquid
	length, bore, area    float64
	wall, modulus, giving float64 // of the wall; wall 0: it does not give way
	compress, stretch     float64 // 1/Pa, of the liquid at the atmosphere and of the wall
	speed                 float64 // m/s; 0 where the liquid is rigid and nobody asks
	rough, losses         float64
}

// pipeOf reads the pipe of a line.
func pipeOf(e *casefile.Element, c *casefile.Case) pipe {
	p := pipe{liquid: liquidOf(c), size: sizeNamed(e.Word("pipe.size")), restraint: e.Word("pipe.restraint")}
	p.length, p.bore = optional(e, "pipe.length"), optional(e, "pipe.bore")
	p.rough, p.losses = optional(e, "pipe.roughness"), optional(e, "pipe.losses")
	p.wall, p.modulus, p.poisson = optional(e, "pipe.wall"), optional(e, "pipe.wall_modulus"), optional(e, "pipe.poisson")
	p.speed = optional(e, "pipe.wave_speed")
	p.rigid = !e.Has("pipe.lumps") && !e.Has("pipe.accuracy")
	return p
}

// check reports what the pipe lacks.
func (p *pipe) check(e *casefile.Element) []casefile.Diagnostic {
	faults := p.liquid.needs(e, "pipe", ofDensity, ofViscosity)
	if p.rigid && (p.speed.has || p.wall.has || e.Has("pipe.rigid")) && !e.Flag("pipe.rigid") {
		d := e.Fault("pipe", "a pipe with waves, and not in how many sections to follow them", "lumps = 10, accuracy and up_to, or rigid = true", "")
		d.Code = "missing-key"
		faults = append(faults, d)
	}
	if !p.rigid && !p.speed.has {
		faults = append(faults, p.liquid.needs(e, "pipe", ofBulk)...)
	}
	if p.wall.has && !p.modulus.has && p.size == nil {
		d := e.Fault("pipe.wall", "a wall without its modulus", "wall_modulus beside it", "")
		d.Code, d.Hint = "missing-key", `add wall_modulus = "206 GPa", that of steel`
		faults = append(faults, d)
	}
	if p.modulus.has && !p.wall.has && p.size == nil {
		d := e.Fault("pipe.wall_modulus", "a modulus of a wall whose thickness is not stated", "wall beside it", "")
		d.Code = "missing-key"
		faults = append(faults, d)
	}
	if strings.Contains(e.Text("pipe.up_to"), "rad") {
		faults = append(faults, e.Fault("pipe.up_to", "an angular frequency, of which a radian would count as a whole swing", `a frequency, like "20 Hz"`, ""))
	}
	if p.restraint != "" && !p.wall.has && p.size == nil {
		d := e.Fault("pipe.restraint", "a restraint of a pipe whose wall is not stated", "wall and wall_modulus beside it", "")
		d.Code = "missing-key"
		faults = append(faults, d)
	}
	return faults
}

// at computes the numbers of the pipe. The error is a Diagnostic.
func (p *pipe) at(e *casefile.Element, v casefile.Values) (s pipeState, err error) {
	if s.liquid, err = p.liquid.liquid(v); err != nil {
		return s, err
	}
	s.length = p.length.of(v)
	p.walls(&s, v)
	s.area = math.Pi / 4 * s.bore * s.bore
	if p.rough.has {
		s.rough = p.rough.of(v) / s.bore
	}
	if p.losses.has {
		s.losses = p.losses.of(v)
	}
	if s.rough > roughest {
		return s, e.Fault("pipe.roughness", fmt.Sprintf("a roughness of %.3g of the bore", s.rough), "at most 0.05, where the law of friction ends", "")
	}
	p.waves(&s, v)
	return s, nil
}

// walls takes bore and wall as stated, or of the size.
func (p *pipe) walls(s *pipeState, v casefile.Values) {
	if p.size != nil {
		s.bore, s.wall, s.modulus = p.size.bore(), p.size.wall/1000, steelModulus
	}
	if p.bore.has {
		s.bore = p.bore.of(v)
	}
	if p.wall.has {
		s.wall = p.wall.of(v)
	}
	if p.modulus.has {
		s.modulus = p.modulus.of(v)
	}
}

// usualPoisson is that of steel: common practice.
const usualPoisson = 0.3

// waves computes the speed of waves, as stated or from liquid and wall.
func (p *pipe) waves(s *pipeState, v casefile.Values) {
	if p.speed.has {
		s.speed = p.speed.of(v)
		s.compress = 1 / (s.density * s.speed * s.speed)
		return
	}
	if s.bulk == 0 {
		return // a rigid column asks for none
	}
	m := s.mixture()
	_, s.compress = m.Taken(s.air)
	if s.wall > 0 {
		poisson := usualPoisson
		if p.poisson.has {
			poisson = p.poisson.of(v)
		}
		s.giving = giving(p.restraint, s.bore, s.wall, poisson)
		s.stretch = s.giving * s.bore / (s.modulus * s.wall)
	}
	s.speed = waveSpeed(s.density, s.compress, s.stretch)
}

// bubbles reports whether the compliance goes by the pressure.
func (p *pipe) bubbles() bool { return p.liquid.gas.has && !p.speed.has && !p.rigid }

// inertance is that of the whole column, ρ·l/A.
func (s *pipeState) inertance() float64 { return s.density * s.length / s.area }

// drop is the law of friction of one of n sections.
func (s *pipeState) drop(n float64) pipeDrop {
	d2 := s.bore * s.bore
	return pipeDrop{
		laminar:  128 * s.viscosity * s.length / n / (math.Pi * d2 * d2),
		reynolds: 4 * s.density / (math.Pi * s.viscosity * s.bore),
		rough:    s.rough,
		losses:   s.losses / n * s.density / (2 * s.area * s.area),
	}
}

// sections is how many a pipe is cut into. A chain of equal sections, each passed in
// Δt = l/(n·a), carries a wave of angular frequency ω with its phase off by
// asin(x)/x − 1, x = ω·Δt/2, nearly x²/6 (dispersion of a discrete chain; Brillouin, Wave
// Propagation in Periodic Structures, 1946, chapter 2): the least n for which that is
// the accuracy or less at the highest frequency.
func (s *pipeState) sections(accuracy, upTo float64) float64 {
	low, high := 0.0, 1.0 // asin(x)/x grows from 1 to π/2
	for high-low > 1e-12 {
		if mid := (low + high) / 2; math.Asin(mid)/mid-1 > accuracy {
			high = mid
		} else {
			low = mid
		}
	}
	return math.Ceil(math.Pi * upTo * s.length / s.speed / low * (1 - 1e-9))
}
