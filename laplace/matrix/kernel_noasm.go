//go:build !amd64

package matrix

func dotRows(a []float64, stride, rows, cols int, u, out []float64) {
	dotRowsGo(a, stride, rows, cols, u, out)
}

func updateRows(a []float64, stride, rows, cols int, v, w, t, u, x, sum []float64) {
	updateRowsGo(a, stride, rows, cols, v, w, t, u, x, sum)
}

func addRow(f float64, x, y []float64) { addRowGo(f, x, y) }

func turnRows(sin, half float64, x, y []float64) { turnRowsGo(sin, half, x, y) }
