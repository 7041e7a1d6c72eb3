package matrix

import "golang.org/x/sys/cpu"

func sumTwice(m int, x []float64, col []int, hi, lo, high, low []float64) {
	w := m &^ 7
	if !useAVX || !cpu.X86.HasFMA || w == 0 || len(col) == 0 {
		sumTwiceGo(0, m, x, col, hi, lo, high, low)
		return
	}
	for _, c := range col {
		_ = x[c*m+m-1]
	}
	_, _, _, _ = hi[len(col)-1], lo[len(col)-1], high[m-1], low[m-1]
	sumTwiceFMA(w, m, &x[0], &col[0], len(col), &hi[0], &lo[0], &high[0], &low[0])
	if w < m {
		sumTwiceGo(w, m, x, col, hi, lo, high, low)
	}
}

//go:noescape
func sumTwiceFMA(w, m int, x *float64, col *int, n int, hi, lo, high, low *float64)
