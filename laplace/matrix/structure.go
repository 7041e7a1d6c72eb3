package matrix

// StructuralDegree returns the relative degree of the transfer from in to out,
// counted in the graph of F: 0 where d ≠ 0, otherwise one more than the number
// of exchanges on the shortest path. It is not reachable where no path leads
// from the input to the output: the transfer is then identically zero.
func StructuralDegree(b *Balance, in, out []float64, d float64) (r int, reachable bool) {
	if d != 0 {
		return 0, true
	}
	dist, queue := distances(b, in)
	for _, i := range queue {
		if out[i] != 0 {
			return dist[i] + 1, true
		}
	}
	return 0, false
}

// distances walks the graph of F breadth first from the stores where in ≠ 0;
// queue holds the stores met, in order of distance.
func distances(b *Balance, in []float64) (dist, queue []int) {
	dist = make([]int, b.N)
	queue = make([]int, 0, b.N)
	for i := range dist {
		dist[i] = -1
		if in[i] != 0 {
			dist[i] = 0
			queue = append(queue, i)
		}
	}
	for k := 0; k < len(queue); k++ {
		j := queue[k]
		for i := 0; i < b.N; i++ {
			if i != j && dist[i] < 0 && b.F[i*b.N+j] != 0 {
				dist[i] = dist[j] + 1
				queue = append(queue, i)
			}
		}
	}
	return dist, queue
}

// Path returns, in ascending order, the stores that matter to the transfer from
// in to out: those the input reaches and from which the output is reached.
// Every other store drops out of the transfer exactly.
func (b *Balance) Path(in, out []float64) (keep []int) {
	from, _ := distances(b, in)
	turned := Balance{N: b.N, C: b.C, F: make([]float64, b.N*b.N), Leak: b.Leak}
	for i := 0; i < b.N; i++ {
		for j := 0; j < b.N; j++ {
			turned.F[i*b.N+j] = b.F[j*b.N+i]
		}
	}
	to, _ := distances(&turned, out)
	for i := range from {
		if from[i] >= 0 && to[i] >= 0 {
			keep = append(keep, i)
		}
	}
	return keep
}

// Restrict returns the balance of the stores in keep alone, in that order, with
// every other store held at 0: the exchange with them is added to Leak. Nothing is
// subtracted where no Leak is negative.
func (b *Balance) Restrict(keep []int) Balance {
	m := len(keep)
	s := Balance{N: m, C: make([]float64, m), F: make([]float64, m*m), Leak: make([]float64, m)}
	kept := make([]bool, b.N)
	for _, i := range keep {
		kept[i] = true
	}
	for p, i := range keep {
		s.C[p] = b.C[i]
		leak := toDD(b.Leak[i]) // negative where a store feeds itself: rounded once
		for j := 0; j < b.N; j++ {
			if j != i && !kept[j] {
				leak = leak.addFloat(b.F[i*b.N+j])
			}
		}
		s.Leak[p] = leak.float()
		for q, j := range keep {
			if p != q {
				s.F[p*m+q] = b.F[i*b.N+j]
			}
		}
	}
	return s
}
