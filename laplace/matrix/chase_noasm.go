//go:build !amd64

package matrix

func chaseRows(a []float64, stride, k, cols int, c []float64) {
	chaseRowsGo(a, stride, k, cols, c)
}

func chaseColumns(a []float64, stride, k, rows int, c []float64) {
	chaseColumnsGo(a, stride, k, rows, c)
}

func sumRows(a []float64, stride, rows, cols int, f, y []float64) {
	sumRowsGo(a, stride, rows, cols, f, y)
}
