package matrix

import "math"

// sensitivity bounds, atom by atom, what rounding of the given numbers by ε/2 each
// does to every entry of the block. For a Balance an exchange counts with the
// difference it acts on: a slow mode, nearly level over stores that exchange
// much, is not blamed for the size of that exchange.
func (s *system) sensitivity(p *part, w *BlockWork) [][]float64 {
	m := len(p.states)
	out, room := w.data[:0], w.noise[:0]
	for a := 0; a+1 < len(p.start); a++ {
		size := (p.start[a+1] - p.start[a]) * (p.start[a+1] - p.start[a])
		room = append(room, make([]float64, size)...)
		out = append(out, room[len(room)-size:len(room):len(room)])
	}
	w.data, w.noise = out, room
	row := w.low[:m] // flow into store i that rounding makes uncertain, per mode
	for i := range p.states {
		clear(row)
		if s.leak != nil {
			s.exchangeNoise(p, i, row)
		} else {
			s.entryNoise(p, i, row)
		}
		for a, d := range out {
			k0, w := p.start[a], p.start[a+1]-p.start[a]
			for k := 0; k < w; k++ {
				f := eps / 2 * math.Abs(p.w[(k0+k)*m+i])
				for l := 0; l < w; l++ {
					d[k*w+l] += f * row[k0+l]
				}
			}
		}
	}
	return out
}

// entryNoise adds Σ noise·|V| of row i of a plain matrix.
func (s *system) entryNoise(p *part, i int, row []float64) {
	m := len(p.states)
	for j, sj := range p.states {
		if e := s.uncertain(p.states[i], sj); e != 0 {
			for k, v := range p.v[j*m : j*m+m] {
				row[k] += e * math.Abs(v)
			}
		}
	}
}

// exchangeNoise adds Σ F|V_j − V_i| + |Leak||V_i| + C|(V D)_i|, stores of other
// parts at 0.
func (s *system) exchangeNoise(p *part, i int, row []float64) {
	m, si := len(p.states), p.states[i]
	own := p.v[i*m : i*m+m]
	inside := make([]bool, s.n)
	for j, sj := range p.states {
		inside[sj] = true
		f := math.Abs(s.g[si*s.n+sj])
		if sj == si || f == 0 {
			continue
		}
		for k, v := range p.v[j*m : j*m+m] {
			row[k] += f * math.Abs(v-own[k])
		}
	}
	out := math.Abs(s.leak[si])
	for j := 0; j < s.n; j++ {
		if !inside[j] {
			out += math.Abs(s.g[si*s.n+j])
		}
	}
	for a := 0; a+1 < len(p.start); a++ {
		for k := p.start[a]; k < p.start[a+1]; k++ {
			var rate float64
			for l := p.start[a]; l < p.start[a+1]; l++ {
				rate += own[l] * p.d[l*m+k]
			}
			row[k] += out*math.Abs(own[k]) + s.c[si]*math.Abs(rate)
		}
	}
}
