package matrix

import "golang.org/x/sys/cpu"

// useAVX selects the vector kernels; tests turn it off to compare.
var useAVX = cpu.X86.HasAVX

func dotRows(a []float64, stride, rows, cols int, u, out []float64) {
	if !useAVX || rows == 0 || cols == 0 {
		dotRowsGo(a, stride, rows, cols, u, out)
		return
	}
	_, _, _ = a[(rows-1)*stride+cols-1], u[cols-1], out[rows-1]
	dotRowsAVX(&a[0], stride, rows, cols, &u[0], &out[0])
}

func updateRows(a []float64, stride, rows, cols int, v, w, t, u, x, sum []float64) {
	if !useAVX || rows == 0 || cols == 0 {
		updateRowsGo(a, stride, rows, cols, v, w, t, u, x, sum)
		return
	}
	_, _, _, _ = a[(rows-1)*stride+cols-1], v[rows-1], t[rows-1], x[rows-1]
	_, _ = w[cols-1], u[cols-1]
	clear(sum[:cols])
	updateRowsAVX(&a[0], stride, rows, cols, &v[0], &w[0], &t[0], &u[0], &x[0], &sum[0])
}

func addRow(f float64, x, y []float64) {
	if !useAVX || len(y) < 8 {
		addRowGo(f, x, y)
		return
	}
	_ = x[len(y)-1]
	addRowAVX(f, &x[0], &y[0], len(y))
}

func turnRows(sin, half float64, x, y []float64) {
	if !useAVX || len(x) == 0 {
		turnRowsGo(sin, half, x, y)
		return
	}
	_ = y[len(x)-1]
	turnRowsAVX(sin, half, &x[0], &y[0], len(x))
}

//go:noescape
func dotRowsAVX(a *float64, stride, rows, cols int, u, out *float64)

//go:noescape
func updateRowsAVX(a *float64, stride, rows, cols int, v, w, t, u, x, sum *float64)

//go:noescape
func addRowAVX(f float64, x, y *float64, n int)

//go:noescape
func turnRowsAVX(sin, half float64, x, y *float64, n int)
