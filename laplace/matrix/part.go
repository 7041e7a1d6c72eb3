package matrix

import "math"

// part is one strongly connected part, uncoupled within itself: x = V z and
// z = W·(flow into the part's stores), z' = diag(d) z.
type part struct {
	states   []int
	v, w     []float64 // m×m row-major
	d        []float64 // m×m row-major, block diagonal over the atoms
	start    []int     // where the atoms begin, closed by m
	roots    [][]Root  // of each atom
	scale    []int     // x·2^scale are comparable
	coupling float64   // of the transformation within the part
}

func newPart(states []int) *part {
	m := len(states)
	room := make([]float64, 3*m*m)
	return &part{states: states, v: room[: m*m : m*m], w: room[m*m : 2*m*m : 2*m*m], d: room[2*m*m:], scale: make([]int, m)}
}

// analyse uncouples one part by the route that suits it.
func (s *system) analyse(states []int, work *BlockWork) (*part, error) {
	if len(states) == 1 {
		p := s.single(states)
		if !allFinite(p.d) || !allFinite(p.w) {
			return nil, ErrRange
		}
		return p, nil
	}
	if s.leak != nil {
		if b, ok := s.rcWithin(states); ok {
			return rcPart(b, states, &work.rc)
		}
	}
	if s.stores != nil {
		if b, ok := s.stores.rcWithin(states); ok {
			p, err := rcPart(b, states, &work.rc)
			if err == nil {
				s.comparable(p)
			}
			return p, err
		}
	}
	work.room(len(states))
	a := &work.a
	s.matrix(states, a)
	if !allFinite(a.hi) || !allFinite(a.noise) {
		return nil, ErrRange
	}
	if len(states) == 2 {
		if p, ok := s.pair(states, a); ok {
			return p, nil
		}
	}
	p, err := s.general(states, a, work)
	if err == nil && (s.low == nil || s.stores != nil) {
		s.settleOrigin(p)
		settleMultiple(p.all(), func() int {
			return modRepeated(modCharacteristic(len(states), s.modular(states)))
		})
	}
	return p, err
}

// comparable notes the scale of the states of a plain matrix; those of a Balance
// are levels, comparable as they are.
func (s *system) comparable(p *part) {
	if s.leak == nil {
		for k, i := range p.states {
			p.scale[k] = s.scale[i]
		}
	}
}

// level is the largest entry of atom a of V, in comparable terms.
func (p *part) level(a int) (size float64) {
	m := len(p.states)
	for i := 0; i < m; i++ {
		for k := p.start[a]; k < p.start[a+1]; k++ {
			size = max(size, math.Abs(math.Ldexp(p.v[i*m+k], p.scale[i])))
		}
	}
	return size
}

// all lists the roots of a part.
func (p *part) all() []*Root {
	list := make([]*Root, 0, len(p.states))
	for _, roots := range p.roots {
		for k := range roots {
			list = append(list, &roots[k])
		}
	}
	return list
}

// single is a part of one state: its pole is a quotient, exact but for its rounding.
func (s *system) single(states []int) *part {
	p := newPart(states)
	i := states[0]
	p.v[0], p.w[0] = 1, 1/s.c[i]
	s.comparable(p)
	p.d[0] = s.rate(i)
	p.start = []int{0, 1}
	p.roots = [][]Root{{{Re: p.d[0], Radius: ulps(1, p.d[0]), mean: ulps(1, p.d[0])}}}
	return p
}

// ulps is k times the rounding unit of v.
func ulps(k, v float64) float64 { return k * eps * math.Abs(v) }

// rcWithin returns the part as a Balance of its own if it is one of resistances
// and capacitances: exchange symmetric bit for bit and not negative, and what
// it loses to the reference and to the parts it feels not negative either.
func (s *system) rcWithin(states []int) (*Balance, bool) {
	whole := Balance{N: s.n, C: s.c, F: s.g, Leak: s.leak}
	b := whole.Restrict(states)
	return &b, b.IsRC()
}

// rcPart takes the modes of a network of resistances and capacitances with a
// port at every store: both V and W are those rows.
func rcPart(b *Balance, states []int, rc *RCWork) (*part, error) {
	m := b.N
	ports := make([][]float64, m)
	for i := range ports {
		ports[i] = make([]float64, m)
		ports[i][i] = 1
	}
	modes, err := rc.Modes(b, ports)
	if err != nil {
		return nil, err
	}
	p := newPart(states)
	for i := 0; i < m; i++ {
		for k := 0; k < m; k++ {
			p.v[i*m+k] = modes.Port[i][k]
			p.w[k*m+i] = modes.Port[i][k]
		}
	}
	for k, lambda := range modes.Lambda {
		pole := 0 - lambda // never −0
		p.d[k*m+k] = pole
		p.start = append(p.start, k)
		p.roots = append(p.roots, []Root{{Re: pole, Radius: modes.RelBound * lambda, mean: modes.RelBound * lambda}})
	}
	p.start = append(p.start, m)
	return p, nil
}

// pair keeps two states as they are where their poles are complex or too close
// to part: the matrix itself is then the block, without any rounding but its own.
func (s *system) pair(states []int, mat *scaledMatrix) (*part, bool) {
	at := func(k int) dd { return dd{mat.hi[k], mat.lo[k]} }
	mean, disc := pairTerms(at(0), at(1), at(2), at(3))
	noise := 0x1p-100 * (mat.hi[0]*mat.hi[0] + mat.hi[3]*mat.hi[3] + math.Abs(mat.hi[1]*mat.hi[2]))
	root := math.Sqrt(math.Abs(disc.hi))
	if disc.hi > noise && 2*root > groupTol*(math.Abs(mean.hi)+root) {
		return nil, false
	}
	if math.Abs(disc.hi) <= noise {
		disc, root = dd{}, 0
	}
	p := newPart(states)
	p.start = []int{0, 2}
	for k := range p.d {
		p.d[k] = math.Ldexp(mat.hi[k], -mat.time)
	}
	for k, i := range states {
		p.v[k*2+k] = math.Ldexp(1, -mat.scale[k])
		p.w[k*2+k] = math.Ldexp(1, mat.scale[k]) / s.c[i]
	}
	s.comparable(p)
	err := mat.noise
	for k := range err {
		err[k] *= eps / 2
	}
	p.roots = [][]Root{pairRoots(nil, mean, disc, (err[0]+err[3])/2, discError(mat.hi, err))}
	scaleRoots(p.roots[0], mat.time)
	return p, true
}

// appendPair appends the eigenvalues of a 2×2 block whose entries are uncertain by
// err each.
func appendPair(list []Root, d [4]float64, err []float64) []Root {
	mean, disc := pairTerms(toDD(d[0]), toDD(d[1]), toDD(d[2]), toDD(d[3]))
	return pairRoots(list, mean, disc, (err[0]+err[3])/2, discError(d[:], err))
}

// pairTerms returns the mean and the discriminant of [a b; c d]: its eigenvalues
// are mean ± √disc.
func pairTerms(a, b, c, d dd) (mean, disc dd) {
	half := a.sub(d).scale(0.5)
	return a.add(d).scale(0.5), half.mul(half).add(b.mul(c))
}

// discError bounds the change of the discriminant where d changes by err.
func discError(d, err []float64) float64 {
	half, e := math.Abs(d[0]-d[3])/2, (err[0]+err[3])/2
	return (2*half+e)*e + math.Abs(d[1])*err[2] + math.Abs(d[2])*err[1] + err[1]*err[2]
}

// pairRoots appends mean ± √disc with the radius that errors of both give.
func pairRoots(list []Root, mean, disc dd, meanErr, discErr float64) []Root {
	root := disc.abs().sqrt().float()
	rad := math.Sqrt(discErr)
	if root > rad {
		rad = discErr / root
	}
	m := mean.float()
	rad += meanErr
	if disc.hi < 0 {
		rad += ulps(1, m) + ulps(1, root)
		return append(list, Root{Re: m, Im: root, Radius: rad, mean: meanErr}, Root{Re: m, Im: -root, Radius: rad, mean: meanErr})
	}
	a, b := mean.add(disc.sqrt()).float(), mean.sub(disc.sqrt()).float()
	return append(list, Root{Re: a, Radius: rad + ulps(2, a), mean: meanErr}, Root{Re: b, Radius: rad + ulps(2, b), mean: meanErr})
}

// scaleRoots multiplies by 2^−time.
func scaleRoots(list []Root, time int) {
	for k, r := range list {
		list[k] = Root{
			Re:     math.Ldexp(r.Re, -time),
			Im:     math.Ldexp(r.Im, -time),
			Radius: math.Ldexp(r.Radius, -time),
			mean:   math.Ldexp(r.mean, -time),
		}
	}
}
