package hydraulic

import "math"

// A vessel is how the volume of a tank goes by the level above its floor. Below the floor
// and above the last height it goes on straight, with the area there.
type vessel interface {
	// fill returns the volume below the level h and the area of the surface there.
	fill(h float64) (v, a float64)
}

// prism is a tank whose walls stand upright.
type prism struct{ area float64 }

func (p *prism) fill(h float64) (v, a float64) { return p.area * h, p.area }

// within returns h held to [0, top], and how far it lies outside.
func within(h, top float64) (in, out float64) {
	in = min(max(h, 0), top)
	return in, h - in
}

// round is a shape that may narrow to nothing at its bottom and its top.
type round interface {
	// inside returns the volume below h, from 0 to height, and the area there.
	inside(h float64) (v, a float64)
	height() float64
}

// tip is the share of the whole volume, at the bottom and at the top, in which a round
// vessel is taken to have upright walls: where a cone, a sphere or a lying cylinder narrows to
// nothing, a level without any area would move at any speed.
const tip = 1e-6

// A blunt is a round vessel with such ends. Between them nothing is changed.
type blunt struct {
	of          round
	low, high   float64 // where the ends begin, m
	foot, under float64 // area of the lower end; volume below the upper one
	lid         float64 // area of the upper end
}

// settle works out the ends.
func (b *blunt) settle() {
	top := b.of.height()
	full, _ := b.of.inside(top)
	b.low = b.level(tip * full)
	b.high = b.level((1 - tip) * full)
	b.under, _ = b.of.inside(b.high)
	low, _ := b.of.inside(b.low)
	b.foot, b.lid = low/b.low, (full-b.under)/(top-b.high)
}

// level is the height below which that volume lies, by halving.
func (b *blunt) level(v float64) float64 {
	lo, hi := 0.0, b.of.height()
	for range 60 {
		mid := lo + (hi-lo)/2
		if below, _ := b.of.inside(mid); below < v {
			lo = mid
		} else {
			hi = mid
		}
	}
	return hi
}

func (b *blunt) fill(h float64) (v, a float64) {
	switch {
	case h < b.low:
		return b.foot * h, b.foot
	case h > b.high:
		return b.under + b.lid*(h-b.high), b.lid
	}
	return b.of.inside(h)
}

// lying is a cylinder on its side.
type lying struct{ diameter, length float64 }

func (c *lying) height() float64 { return c.diameter }

func (c *lying) inside(h float64) (v, a float64) {
	r := c.diameter / 2
	chord := 2 * math.Sqrt(max(0, h*(c.diameter-h)))
	if h < r/100 { // half the angle, by its sine: the segment is a small difference
		half := math.Asin(chord / (2 * r))
		return r * r * lens(2*half) / 2 * c.length, chord * c.length
	}
	segment := r*r*math.Acos(min(max(1-h/r, -1), 1)) - (r-h)*chord/2
	return segment * c.length, chord * c.length
}

// lens is x − sin x for a small x.
func lens(x float64) float64 {
	x2 := x * x
	return x * x2 / 6 * (1 - x2/20*(1-x2/42*(1-x2/72)))
}

// sphere is a ball.
type sphere struct{ diameter float64 }

func (s *sphere) height() float64 { return s.diameter }

func (s *sphere) inside(h float64) (v, a float64) {
	return math.Pi * h * h * (s.diameter/2 - h/3), math.Pi * h * (s.diameter - h)
}

// cone is one that narrows or widens from its bottom to its top.
type cone struct{ bottom, top, tall float64 } // diameters and height, m

func (c *cone) height() float64 { return c.tall }

func (c *cone) inside(h float64) (v, a float64) {
	d := c.bottom + (c.top-c.bottom)*h/c.tall
	return math.Pi / 12 * h * (c.bottom*c.bottom + c.bottom*d + d*d), math.Pi / 4 * d * d
}

// survey is a tank by its heights and the areas there, straight between them.
type survey struct {
	height, area, below []float64 // below: volume under each height
}

// sum works out the volumes.
func (s *survey) sum() {
	s.below = s.below[:0]
	v := 0.0
	for i, h := range s.height {
		if i > 0 {
			v += (h - s.height[i-1]) * (s.area[i] + s.area[i-1]) / 2
		}
		s.below = append(s.below, v)
	}
}

func (s *survey) fill(h float64) (v, a float64) {
	last := len(s.height) - 1
	in, out := within(h, s.height[last])
	i := 1
	for i < last && in >= s.height[i] {
		i++
	}
	x, step := in-s.height[i-1], s.height[i]-s.height[i-1]
	a = s.area[i-1] + (s.area[i]-s.area[i-1])*x/step
	return s.below[i-1] + x*(s.area[i-1]+a)/2 + a*out, a
}

// strapping is a tank by its heights and the volumes below them, straight between them.
type strapping struct {
	height, volume []float64
}

func (s *strapping) fill(h float64) (v, a float64) {
	last := len(s.height) - 1
	i := 1
	for i < last && h >= s.height[i] {
		i++
	}
	a = (s.volume[i] - s.volume[i-1]) / (s.height[i] - s.height[i-1])
	return s.volume[i-1] + a*(h-s.height[i-1]), a
}
